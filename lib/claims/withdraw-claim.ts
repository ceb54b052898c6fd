import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { transact } from "@/lib/transact";
import { nextVersion } from "./edit-claim";
import { findClaim, lockClaim, staleClaim } from "./find-claim";
import type { ClaimAt } from "./schema";
import { supersedeFlags } from "./supersede-flag";

/**
 * Takes a claim out of the key. It keeps its ref and its history and can be restored; an open flag is closed.
 * Doing it twice is harmless.
 * @throws AppError not_found; forbidden; conflict with details.stored
 */
export async function withdrawClaim(input: ClaimAt, user: SessionUser): Promise<{ version: number }> {
  await findClaim(input.workId, input.claimId, user);
  return transact(async (transaction) => {
    const { claim } = await lockClaim(input.workId, input.claimId, user, transaction);
    if (claim.withdrawnAt !== null) return { version: claim.version };
    if (claim.version !== input.version) throw await staleClaim(claim, transaction);
    await claim.update({ withdrawnAt: new Date() }, { transaction });
    await supersedeFlags([claim.id], user.id, transaction);
    await audit(transaction, {
      workId: claim.workId,
      actorId: user.id,
      action: "claim.withdraw",
      subjectType: "claim",
      subjectId: claim.id,
      before: { ref: claim.ref, withdrawn: false },
      after: { ref: claim.ref, withdrawn: true },
    });
    return { version: claim.version };
  });
}

/**
 * Brings a withdrawn claim back as a new version of the same text and the same claimant, unchecked until a run.
 * Doing it twice is harmless.
 * @throws AppError not_found; forbidden; conflict with details.stored
 */
export async function restoreClaim(input: ClaimAt, user: SessionUser): Promise<{ version: number }> {
  await findClaim(input.workId, input.claimId, user);
  return transact(async (transaction) => {
    const { claim } = await lockClaim(input.workId, input.claimId, user, transaction);
    if (claim.withdrawnAt === null) return { version: claim.version };
    if (claim.version !== input.version) throw await staleClaim(claim, transaction);
    await nextVersion(claim, claim, { authorId: user.id, origin: "restored" }, transaction);
    // The version has set its own columns; update() would write only the one it is given.
    claim.set({ withdrawnAt: null });
    await claim.save({ transaction });
    await audit(transaction, {
      workId: claim.workId,
      actorId: user.id,
      action: "claim.restore",
      subjectType: "claim",
      subjectId: claim.id,
      before: { ref: claim.ref, withdrawn: true },
      after: { ref: claim.ref, withdrawn: false },
    });
    return { version: claim.version };
  });
}
