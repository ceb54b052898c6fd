import type { Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import { hashPassword } from "@/lib/auth/password";
import { isToken } from "@/lib/auth/tokens";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Membership, User, type Invitation } from "@/models";
import { lockByToken, unusableLink } from "./invitations";
import type { NewPerson } from "./password-schema";
import { lookAtInvitation } from "./look-at-invitation";

/** Where to go after accepting, and the address to sign in with. */
export type Accepted = { path: string; email: string };

/**
 * Accepts as somebody who has an account and is signed in with the invited address.
 * @throws AppError invalid when the link cannot be used; forbidden when it was sent to another address
 */
export async function acceptSignedIn(token: string, user: SessionUser): Promise<Accepted> {
  if (!isToken(token)) throw unusableLink();
  return transact(async (transaction) => {
    const invitation = await lockByToken(transaction, token);
    if (invitation.email !== user.email)
      throw new AppError(
        "forbidden",
        "This invitation was sent to another address than the one you are signed in with. Sign out, then open the link again.",
      );
    return take(transaction, invitation, user);
  });
}

/**
 * Accepts as a new person: makes the account and joins, or neither.
 * @throws AppError invalid when the link cannot be used; conflict when the address has an account by now
 */
export async function acceptAsNewPerson(input: NewPerson): Promise<Accepted> {
  // A password is only hashed for a link that works: hashing is dear, and the link is not yet held.
  const seen = await lookAtInvitation(input.token);
  const email = seen.email ?? input.email;
  if (!email)
    throw new AppError("invalid", "Give your e-mail address.", {
      fields: { email: ["Give your e-mail address."] },
    });
  const passwordHash = await hashPassword(input.password);
  try {
    return await transact(async (transaction) => {
      const invitation = await lockByToken(transaction, input.token);
      if (invitation.email !== "" && invitation.email !== email) throw unusableLink();
      const person = await User.create({ email, name: input.name, passwordHash }, { transaction });
      await audit(transaction, {
        actorId: person.id,
        action: "account.create",
        subjectType: "user",
        subjectId: person.id,
        after: { name: input.name, invitationId: invitation.id },
      });
      return take(transaction, invitation, person);
    });
  } catch (error) {
    if (isDuplicate(error))
      throw new AppError(
        "conflict",
        "This address has an account already. Sign in, then open the link again.",
        {
          details: { hasAccount: true },
        },
      );
    throw error;
  }
}

/** Spends the link, whose row is locked, and gives what it promises. Somebody who is already a member keeps their role. */
async function take(
  transaction: Transaction,
  invitation: Invitation,
  person: { id: string; email: string },
): Promise<Accepted> {
  await invitation.update({ acceptedAt: new Date(), acceptedById: person.id }, { transaction });
  const { workId, role, chapterIds } = invitation;
  if (role === "administrator")
    await User.update({ isAdmin: true }, { where: { id: person.id }, transaction });
  else if (workId && role !== "person" && !(await isMember(transaction, workId, person.id)))
    await Membership.create({ workId, userId: person.id, role, chapterIds }, { transaction });
  await audit(transaction, {
    workId,
    actorId: person.id,
    action: "invitation.accept",
    subjectType: "invitation",
    subjectId: invitation.id,
    after: { role, chapterIds },
  });
  return {
    path: workId ? `/works/${workId}` : role === "administrator" ? "/admin" : "/desk",
    email: person.email,
  };
}

const isMember = async (transaction: Transaction, workId: string, userId: string) =>
  (await Membership.count({ where: { workId, userId }, transaction })) > 0;
