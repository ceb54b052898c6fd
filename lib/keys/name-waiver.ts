import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate, notFound } from "@/lib/errors";
import type { NameWaiver } from "@/lib/keys/schema";
import { transact } from "@/lib/transact";
import { Claim, Waiver } from "@/models";

/**
 * A lead answers, with a reason, for freezing an undecided claim as it stands.
 * @throws AppError not_found, forbidden; conflict when the claim was changed or is not undecided, or has a waiver already
 */
export async function nameWaiver(input: NameWaiver, user: SessionUser): Promise<{ waiverId: string }> {
  await gate(user, "waiver.name", input.workId);
  return transact(async (transaction) => {
    const claim = await Claim.findOne({
      where: { id: input.claimId, workId: input.workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!claim) throw notFound();
    await gate(user, "waiver.name", input.workId, { chapterId: claim.chapterId }, transaction);
    if (claim.current !== input.claimVersion || claim.verdict !== "undecided" || claim.withdrawnAt !== null)
      throw new AppError(
        "conflict",
        `${claim.ref} is no longer undecided as you saw it. Reload to see how it stands.`,
      );
    const { id: claimId, workId, current: claimVersion } = claim;
    try {
      const waiver = await Waiver.create(
        { workId, claimId, claimVersion, namedById: user.id, reason: input.reason },
        { transaction },
      );
      await audit(transaction, {
        workId,
        actorId: user.id,
        action: "waiver.name",
        subjectType: "claim",
        subjectId: claimId,
        after: { claimVersion, reason: input.reason },
      });
      return { waiverId: waiver.id };
    } catch (error) {
      if (isDuplicate(error)) throw new AppError("conflict", `${claim.ref} has a waiver already.`);
      throw error;
    }
  });
}
