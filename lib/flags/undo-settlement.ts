import { Op } from "sequelize";

import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { addVersion } from "@/lib/flags/correct-claim";
import { findFlag, lockFlag } from "@/lib/flags/lock-flag";
import type { UndoSettlement } from "@/lib/flags/schema";
import { transact } from "@/lib/transact";
import { Finding, Flag, FrozenKey, Settlement } from "@/models";

/**
 * Takes a settlement back: the claim is what it was before, as a new version where its text had changed, and the flag is
 * open again. Open to the settler and to a lead, until a key has been frozen since.
 * @throws AppError not_found, forbidden; conflict when a key was frozen, the claim was changed again, or it has another open flag
 */
export async function undoSettlement(input: UndoSettlement, user: SessionUser): Promise<{ flagId: string }> {
  const found = await findFlag(input.workId, input.flagId, user);
  await transact(async (transaction) => {
    const { flag, claim } = await lockFlag(found, "flag.read", user, transaction);
    const settlement = await Settlement.findOne({
      where: { activeFlagId: flag.id },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!settlement || flag.state !== "settled" || flag.version !== input.version)
      throw new AppError(
        "conflict",
        "This flag is no longer settled as you saw it. Reload to see what happened.",
      );
    const subject = {
      chapterId: flag.chapterId,
      claimantId: flag.claimantId,
      settlerId: settlement.settlerId,
    };
    await gate(user, "settlement.undo", flag.workId, subject, transaction);

    const key = await FrozenKey.findOne({
      attributes: ["number"],
      where: { workId: flag.workId, createdAt: { [Op.gte]: settlement.createdAt } },
      order: [["number", "ASC"]],
      lock: transaction.LOCK.SHARE,
      transaction,
    });
    if (key)
      throw new AppError(
        "conflict",
        `Key ${key.number} was frozen with this settlement in it. Change the claim instead; the next key will have it.`,
      );
    const expected = settlement.claimVersionAfter ?? settlement.claimVersionBefore;
    const other = await Flag.count({ where: { openClaimId: claim.id }, transaction });
    if (claim.current !== expected || other > 0)
      throw new AppError(
        "conflict",
        "The claim was changed after this was settled, so there is nothing left to undo.",
      );

    const { claimBefore } = settlement;
    const now = { claimed: claim.claimed, withdrawn: claim.withdrawnAt !== null };
    let current = claim.current;
    if (settlement.word === "correct") {
      current = await addVersion(
        claim,
        { claimed: claimBefore.claimed, authorId: user.id, origin: "undone" },
        transaction,
      );
      const judged = await Finding.findByPk(flag.findingId, {
        attributes: ["verdict"],
        rejectOnEmpty: true,
        transaction,
      });
      await claim.update(
        { claimed: claimBefore.claimed, current, verdict: judged.verdict, findingId: flag.findingId },
        { transaction },
      );
    }
    if (settlement.word === "withdraw" && !claimBefore.withdrawn)
      await claim.update({ withdrawnAt: null }, { transaction });
    await settlement.update(
      { activeFlagId: null, undoneAt: new Date(), undoneById: user.id },
      { transaction },
    );
    await flag.update({ state: "open", openClaimId: claim.id, claimVersion: current }, { transaction });
    await audit(transaction, {
      workId: flag.workId,
      actorId: user.id,
      action: "flag.undo",
      subjectType: "flag",
      subjectId: flag.id,
      before: { word: settlement.word, ...now },
      after: { state: "open", claimed: claimBefore.claimed, withdrawn: claimBefore.withdrawn },
    });
  });
  return { flagId: found.id };
}
