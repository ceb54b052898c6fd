import type { Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import { Flag } from "@/models";

/**
 * Closes the open flags of claims whose text has changed: they speak of a version that is no longer current. The
 * claims are locked by the caller, so the order claim before flag is kept.
 * @returns how many were closed
 */
export async function supersedeFlags(
  claimIds: readonly string[],
  actorId: string,
  transaction: Transaction,
): Promise<number> {
  if (claimIds.length === 0) return 0;
  const open = await Flag.findAll({
    where: { openClaimId: [...claimIds] },
    order: [["id", "ASC"]],
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  for (const flag of open) {
    await flag.update({ state: "superseded", openClaimId: null }, { transaction });
    await audit(transaction, {
      workId: flag.workId,
      actorId,
      action: "flag.supersede",
      subjectType: "flag",
      subjectId: flag.id,
      before: { state: "open" },
      after: { state: "superseded" },
    });
  }
  return open.length;
}
