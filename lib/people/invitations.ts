import { Op, type Transaction, type WhereOptions } from "sequelize";
import { hashToken, newToken } from "@/lib/auth/tokens";
import { AppError } from "@/lib/errors";
import { post } from "@/lib/jobs/outbox";
import { Invitation, Work } from "@/models";

/** A link works for a week. */
export const LINK_DAYS = 7;
export const expiryFrom = (now: Date) => new Date(now.getTime() + LINK_DAYS * 86_400_000);

/** One sentence for every link that does not work, so that it tells nothing: wrong, expired, used or withdrawn. */
export const unusableLink = () =>
  new AppError(
    "invalid",
    "This link cannot be used: it is incomplete, has expired, or was used already. Ask the person who invited you for a new one.",
  );

/** Invitations that can still be accepted. */
export const pending = (now = new Date()): WhereOptions<Invitation> => ({
  acceptedAt: null,
  withdrawnAt: null,
  expiresAt: { [Op.gt]: now },
});

/**
 * Makes a new link and posts the mail that carries it, in the caller's transaction.
 * @returns the id of the outbox row to ring after the commit
 */
export async function sendLink(
  transaction: Transaction,
  invitation: Invitation,
  inviter: { name: string },
): Promise<string> {
  const token = newToken();
  await invitation.update(
    { tokenHash: hashToken(token), expiresAt: expiryFrom(new Date()) },
    { transaction },
  );
  const work = invitation.workId ? await Work.findByPk(invitation.workId, { transaction }) : null;
  return post(transaction, {
    kind: "mail",
    payload: {
      template: "invitation",
      to: invitation.email,
      data: {
        invitedBy: inviter.name,
        workTitle: work?.title ?? null,
        role: work ? invitation.role : null,
        path: `/join#${token}`,
        expiresAt: invitation.expiresAt.toISOString(),
      },
    },
  });
}

/** The invitation of a link, held by a row lock until the transaction ends. */
export async function lockByToken(transaction: Transaction, token: string): Promise<Invitation> {
  const invitation = await Invitation.findOne({
    where: { tokenHash: hashToken(token) },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!invitation || !isPending(invitation)) throw unusableLink();
  return invitation;
}

export const isPending = (invitation: Invitation, now = new Date()) =>
  invitation.acceptedAt === null && invitation.withdrawnAt === null && invitation.expiresAt > now;
