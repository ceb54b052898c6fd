import type { Transaction } from "sequelize";
import { gate, visibleChapters, type Access } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { Claim, User } from "@/models";

/**
 * A claim that this person may see.
 * @throws AppError not_found: no member, not their chapter, a claim of another work
 */
export async function findClaim(
  workId: string,
  claimId: string,
  user: SessionUser,
): Promise<{ claim: Claim; access: Access }> {
  const access = await gate(user, "chapter.read", workId);
  if (!isId(claimId)) throw notFound();
  const claim = await Claim.findOne({ where: { id: claimId, workId, ...visibleChapters(access) } });
  if (!claim) throw notFound();
  return { claim, access };
}

/**
 * Locks a claim for a change and asks the gate once more, as it is now.
 * @throws AppError not_found, forbidden
 */
export async function lockClaim(
  workId: string,
  claimId: string,
  user: SessionUser,
  transaction: Transaction,
): Promise<{ claim: Claim; access: Access }> {
  const claim = await Claim.findOne({
    where: { id: claimId, workId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!claim) throw notFound();
  const access = await gate(user, "claim.edit", workId, { chapterId: claim.chapterId }, transaction);
  return { claim, access };
}

/** What stands in the store now, for somebody whose own text is still in their form. */
export type StoredClaim = {
  version: number;
  ref: string;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  withdrawn: boolean;
  by: string;
  at: string;
};

/** The failure that says: somebody was quicker. It carries what they saved; nothing of the person's text is touched. */
export async function staleClaim(claim: Claim, transaction: Transaction): Promise<AppError> {
  const by = await User.findByPk(claim.claimantId, { attributes: ["name"], transaction });
  const stored: StoredClaim = {
    version: claim.version,
    ref: claim.ref,
    quantity: claim.quantity,
    claimed: claim.claimed,
    note: claim.note,
    page: claim.page,
    withdrawn: claim.withdrawnAt !== null,
    by: by?.name ?? "somebody",
    at: claim.updatedAt.toISOString(),
  };
  return new AppError(
    "conflict",
    `${claim.ref} was changed while you were looking at it. Your text is kept here; beside it stands what is stored now.`,
    { details: { stored } },
  );
}
