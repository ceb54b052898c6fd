import { randomUUID } from "node:crypto";
import { audit } from "@/lib/audit";
import { hashToken, newToken } from "@/lib/auth/tokens";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { ring } from "@/lib/jobs/queue";
import { lockOpen, resend, withdraw } from "@/lib/people/end-invitation";
import { expiryFrom, sendLink } from "@/lib/people/invitations";
import type { SiteInvitation } from "@/lib/people/schema";
import { transact } from "@/lib/transact";
import { Invitation, User } from "@/models";
import { administer } from "./administer";

/**
 * Invites an address to the site, without a work; an earlier invitation of this kind stops working.
 * @throws AppError not_found; conflict when the address has an account and there is nothing to add to it
 */
export async function inviteToSite(
  { email, role }: SiteInvitation,
  user: SessionUser,
): Promise<{ id: string }> {
  administer(user);
  const sent = await transact(async (transaction) => {
    const account = await User.findOne({ where: { email }, attributes: ["isAdmin"], transaction });
    if (account && (role === "person" || account.isAdmin))
      throw new AppError("conflict", "This address has an account already.", {
        fields: { email: ["This address has an account already."] },
      });
    await Invitation.update(
      { withdrawnAt: new Date() },
      { where: { workId: null, email, acceptedAt: null, withdrawnAt: null }, transaction },
    );
    const invitation = await Invitation.create(
      {
        id: randomUUID(),
        email,
        role,
        tokenHash: hashToken(newToken()),
        invitedById: user.id,
        expiresAt: expiryFrom(new Date()),
      },
      { transaction },
    );
    const outboxId = await sendLink(transaction, invitation, user);
    await audit(transaction, {
      actorId: user.id,
      action: "invitation.send",
      subjectType: "invitation",
      subjectId: invitation.id,
      after: { email, role },
    });
    return { id: invitation.id, outboxId };
  });
  await ring(sent.outboxId);
  return { id: sent.id };
}

/** Sends it again with a new link. @throws AppError not_found; conflict */
export async function resendSiteInvitation(invitationId: string, user: SessionUser): Promise<void> {
  administer(user);
  const outboxId = await transact(async (transaction) =>
    resend(transaction, await lockOpen(transaction, invitationId, null), user),
  );
  await ring(outboxId);
}

/** Takes it back. @throws AppError not_found; conflict */
export async function withdrawSiteInvitation(invitationId: string, user: SessionUser): Promise<void> {
  administer(user);
  await transact(async (transaction) =>
    withdraw(transaction, await lockOpen(transaction, invitationId, null), user),
  );
}
