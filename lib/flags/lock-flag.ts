import type { Transaction } from "sequelize";

import { gate, visibleChapters, type Access } from "@/lib/auth/gate";
import type { Action } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { Claim, Flag, Settlement, User } from "@/models";

/**
 * Whether this person may see the flag at all, asked before anything is locked.
 * @throws AppError not_found
 */
export async function findFlag(workId: string, flagId: string, user: SessionUser): Promise<Flag> {
  const access = await gate(user, "flag.read", workId);
  if (!isId(flagId)) throw notFound();
  const flag = await Flag.findOne({ where: { id: flagId, workId, ...visibleChapters(access) } });
  if (!flag) throw notFound();
  return flag;
}

export type Locked = { flag: Flag; claim: Claim; access: Access };

/**
 * Locks a flag for a change: its claim first, then the flag, the order that everything keeps which changes either.
 * Then asks the gate about the flag as it is now.
 * @throws AppError not_found, forbidden
 */
export async function lockFlag(
  found: Flag,
  action: Action,
  user: SessionUser,
  transaction: Transaction,
): Promise<Locked> {
  const claim = await Claim.findByPk(found.claimId, {
    lock: transaction.LOCK.UPDATE,
    rejectOnEmpty: true,
    transaction,
  });
  const flag = await Flag.findByPk(found.id, {
    lock: transaction.LOCK.UPDATE,
    rejectOnEmpty: true,
    transaction,
  });
  const subject = { chapterId: flag.chapterId, claimantId: flag.claimantId, assigneeId: flag.assigneeId };
  const access = await gate(user, action, flag.workId, subject, transaction);
  return { flag, claim, access };
}

/**
 * Refuses a change to a flag that is no longer what the person was looking at.
 * @throws AppError conflict: who settled it, how and when, when somebody did; otherwise that it was changed
 */
export async function refuseStale(flag: Flag, version: number, transaction: Transaction): Promise<void> {
  if (flag.state === "open" && flag.version === version) return;
  if (flag.state === "settled") throw await settledConflict(flag, transaction);
  if (flag.state === "superseded")
    throw new AppError(
      "conflict",
      "The claim was changed or confirmed in the meantime, so this flag is closed.",
      {
        details: { state: "superseded" },
      },
    );
  throw new AppError(
    "conflict",
    "This flag was changed while you were looking at it. Read it once more, then send this again.",
    {
      details: { state: "open", version: flag.version },
    },
  );
}

async function settledConflict(flag: Flag, transaction: Transaction): Promise<AppError> {
  // Locking reads see what the transaction that was waited for has committed.
  const settlement = await Settlement.findOne({
    where: { activeFlagId: flag.id },
    lock: transaction.LOCK.SHARE,
    rejectOnEmpty: true,
    transaction,
  });
  const settler = await User.findByPk(settlement.settlerId, {
    attributes: ["name"],
    rejectOnEmpty: true,
    transaction,
  });
  return new AppError(
    "conflict",
    `${settler.name} has settled this flag in the meantime: ${settlement.word}.`,
    {
      details: {
        state: "settled",
        by: settler.name,
        word: settlement.word,
        reason: settlement.reason,
        at: settlement.createdAt.toISOString(),
      },
    },
  );
}
