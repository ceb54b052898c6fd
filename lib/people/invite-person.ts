import { randomUUID } from "node:crypto";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import { hashToken, newToken } from "@/lib/auth/tokens";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { ring } from "@/lib/jobs/queue";
import { transact } from "@/lib/transact";
import { Chapter, Invitation, Membership, User, Work } from "@/models";
import { expiryFrom, sendLink } from "./invitations";
import type { NewInvitation } from "./schema";

/**
 * Invites an address to a work; an earlier invitation of the same address to it stops working.
 * The mail is posted in the same transaction.
 * @throws AppError conflict when the person already belongs to the work; invalid when a chapter is not of this work
 */
export async function invitePerson(input: NewInvitation, user: SessionUser): Promise<{ id: string }> {
  const { workId, email, role, chapterIds } = input;
  const sent = await transact(async (transaction) => {
    await gate(user, "people.manage", workId, {}, transaction);
    // Two leads who invite the same address at once come one after the other.
    await Work.findByPk(workId, { attributes: ["id"], transaction, lock: transaction.LOCK.UPDATE });
    await refuseMember(workId, email);
    if (
      chapterIds &&
      (await Chapter.count({ where: { workId, id: chapterIds }, transaction })) !== chapterIds.length
    )
      throw new AppError("invalid", "One of these chapters is not part of this work any more.", {
        fields: { chapterIds: ["Choose again: one of these chapters is gone."] },
      });
    await Invitation.update(
      { withdrawnAt: new Date() },
      { where: { workId, email, acceptedAt: null, withdrawnAt: null }, transaction },
    );
    const invitation = await Invitation.create(
      {
        id: randomUUID(),
        workId,
        email,
        role,
        chapterIds,
        tokenHash: hashToken(newToken()),
        invitedById: user.id,
        expiresAt: expiryFrom(new Date()),
      },
      { transaction },
    );
    const outboxId = await sendLink(transaction, invitation, user);
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "invitation.send",
      subjectType: "invitation",
      subjectId: invitation.id,
      after: { email, role, chapterIds },
    });
    return { id: invitation.id, outboxId };
  });
  await ring(sent.outboxId);
  return { id: sent.id };
}

async function refuseMember(workId: string, email: string) {
  const person = await User.findOne({ where: { email }, attributes: ["id"] });
  if (person && (await Membership.count({ where: { workId, userId: person.id } })) > 0)
    throw new AppError(
      "conflict",
      "This person already belongs to the work. Change the role in the list instead.",
      {
        fields: { email: ["This person already belongs to the work."] },
      },
    );
}
