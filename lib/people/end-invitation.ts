import type { Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { ring } from "@/lib/jobs/queue";
import { transact } from "@/lib/transact";
import { Invitation } from "@/models";
import { sendLink } from "./invitations";

type Which = { workId: string; invitationId: string };

/**
 * Sends the invitation again with a new link; the old link stops working.
 * @throws AppError not_found; conflict when it was accepted or withdrawn
 */
export async function resendInvitation({ workId, invitationId }: Which, user: SessionUser): Promise<void> {
  const outboxId = await transact(async (transaction) => {
    await gate(user, "people.manage", workId, {}, transaction);
    const invitation = await lockOpen(transaction, invitationId, workId);
    return resend(transaction, invitation, user);
  });
  await ring(outboxId);
}

/**
 * Takes the invitation back; its link stops working at once.
 * @throws AppError not_found; conflict when it was accepted or withdrawn
 */
export async function withdrawInvitation({ workId, invitationId }: Which, user: SessionUser): Promise<void> {
  await transact(async (transaction) => {
    await gate(user, "people.manage", workId, {}, transaction);
    await withdraw(transaction, await lockOpen(transaction, invitationId, workId), user);
  });
}

/** The row of an invitation that was neither accepted nor withdrawn, locked. */
export async function lockOpen(
  transaction: Transaction,
  id: string,
  workId: string | null,
): Promise<Invitation> {
  const invitation = await Invitation.findOne({
    where: { id, workId },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!invitation) throw notFound();
  if (invitation.acceptedAt)
    throw new AppError("conflict", "This invitation has been accepted in the meantime.");
  if (invitation.withdrawnAt)
    throw new AppError("conflict", "This invitation has been withdrawn in the meantime.");
  return invitation;
}

/** The part of resending that works and the site share. */
export async function resend(
  transaction: Transaction,
  invitation: Invitation,
  user: SessionUser,
): Promise<string> {
  const outboxId = await sendLink(transaction, invitation, user);
  await audit(transaction, {
    workId: invitation.workId,
    actorId: user.id,
    action: "invitation.resend",
    subjectType: "invitation",
    subjectId: invitation.id,
    after: { email: invitation.email },
  });
  return outboxId;
}

/** The part of withdrawing that works and the site share. */
export async function withdraw(
  transaction: Transaction,
  invitation: Invitation,
  user: SessionUser,
): Promise<void> {
  await invitation.update({ withdrawnAt: new Date() }, { transaction });
  await audit(transaction, {
    workId: invitation.workId,
    actorId: user.id,
    action: "invitation.withdraw",
    subjectType: "invitation",
    subjectId: invitation.id,
    before: { email: invitation.email, role: invitation.role },
  });
}
