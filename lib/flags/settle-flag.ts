import type { Transaction } from "sequelize";

import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { addVersion, correctionFor } from "@/lib/flags/correct-claim";
import { findFlag, lockFlag, refuseStale, type Locked } from "@/lib/flags/lock-flag";
import type { SettleFlag } from "@/lib/flags/schema";
import { post } from "@/lib/jobs/outbox";
import { ring } from "@/lib/jobs/queue";
import { transact } from "@/lib/transact";
import { Settlement, User, type Claim } from "@/models";

/**
 * Settles an open flag with one of the proof-reader's words, in one transaction with its audit event:
 * `correct` gives the claim its recomputed value and tells the claimant; `stet` lets it stand with reason and convention;
 * `reword` leaves it waiting for its claimant; `withdraw` takes it out of the key.
 * @throws AppError not_found; forbidden for the claimant, or for a referee it is not assigned to; conflict when the flag
 *   is no longer what the person was looking at, with who settled it and how; invalid when there is no value to take
 */
export async function settleFlag(
  input: SettleFlag,
  user: SessionUser,
): Promise<{ flagId: string; claimed: string }> {
  const found = await findFlag(input.workId, input.flagId, user);
  const { mailId, claimed } = await transact(async (transaction) => {
    const locked = await lockFlag(found, "flag.settle", user, transaction);
    await refuseStale(locked.flag, input.version, transaction);
    return settle(locked, input, user, transaction);
  });
  if (mailId) await ring(mailId);
  return { flagId: found.id, claimed };
}

async function settle(
  { flag, claim, access }: Locked,
  input: SettleFlag,
  user: SessionUser,
  transaction: Transaction,
): Promise<{ mailId: string | null; claimed: string }> {
  const before = { quantity: claim.quantity, claimed: claim.claimed, withdrawn: claim.withdrawnAt !== null };
  const versionBefore = claim.current;
  let mailId: string | null = null;
  if (input.word === "correct") {
    const { claimed } = await correctionFor(claim, flag, access.work, transaction);
    const current = await addVersion(claim, { claimed, authorId: user.id, origin: "corrected" }, transaction);
    await claim.update({ claimed, current, verdict: "confirmed", findingId: null }, { transaction });
    mailId = await tellClaimant(claim, access.work.title, user, transaction);
  }
  if (input.word === "withdraw") await claim.update({ withdrawnAt: new Date() }, { transaction });

  const reason = input.reason ?? null;
  const convention = input.word === "stet" ? (input.convention ?? null) : null;
  await Settlement.create(
    {
      workId: flag.workId,
      flagId: flag.id,
      claimantId: flag.claimantId,
      settlerId: user.id,
      word: input.word,
      reason,
      convention,
      claimVersionBefore: versionBefore,
      claimVersionAfter: claim.current === versionBefore ? null : claim.current,
      claimBefore: before,
      activeFlagId: flag.id,
    },
    { transaction },
  );
  await flag.update({ state: "settled", openClaimId: null }, { transaction });
  await audit(transaction, {
    workId: flag.workId,
    actorId: user.id,
    action: "flag.settle",
    subjectType: "flag",
    subjectId: flag.id,
    before: { state: "open", ...before },
    after: {
      state: "settled",
      word: input.word,
      reason,
      convention,
      claimed: claim.claimed,
      withdrawn: claim.withdrawnAt !== null,
    },
  });
  return { mailId, claimed: claim.claimed };
}

/** One mail to whoever wrote the claim: that it was corrected and where to see it, not what it says. */
async function tellClaimant(
  claim: Claim,
  workTitle: string,
  settler: SessionUser,
  transaction: Transaction,
): Promise<string> {
  const claimant = await User.findByPk(claim.claimantId, {
    attributes: ["email"],
    rejectOnEmpty: true,
    transaction,
  });
  return post(transaction, {
    kind: "mail",
    payload: {
      template: "claim-corrected",
      to: claimant.email,
      data: { workTitle, settledBy: settler.name, path: `/works/${claim.workId}/claims/${claim.id}` },
    },
  });
}
