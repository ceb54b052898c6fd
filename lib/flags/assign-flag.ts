import type { Transaction } from "sequelize";

import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { findFlag, lockFlag, refuseStale } from "@/lib/flags/lock-flag";
import { postDigest } from "@/lib/flags/raise-flags";
import type { AssignFlag, TakeFlag } from "@/lib/flags/schema";
import { transact } from "@/lib/transact";
import { Membership, User, type Flag } from "@/models";

/**
 * The lead gives an open flag to somebody who may settle it, or takes it from everybody. Who gets it is told by digest.
 * @throws AppError not_found, forbidden, conflict; invalid for the claimant or somebody who cannot read the chapter
 */
export async function assignFlag(input: AssignFlag, user: SessionUser): Promise<{ version: number }> {
  const found = await findFlag(input.workId, input.flagId, user);
  return transact(async (transaction) => {
    const { flag } = await lockFlag(found, "flag.assign", user, transaction);
    await refuseStale(flag, input.version, transaction);
    if (input.assigneeId !== null) await requireSecond(flag, input.assigneeId, transaction);
    await give(flag, input.assigneeId, "flag.assign", user, transaction);
    if (input.assigneeId !== null && input.assigneeId !== user.id)
      await postDigest(input.assigneeId, flag.workId, transaction);
    return { version: flag.version };
  });
}

/**
 * An author takes an open flag for themselves.
 * @throws AppError not_found, conflict; forbidden for the claimant and for a referee
 */
export async function takeFlag(input: TakeFlag, user: SessionUser): Promise<{ version: number }> {
  const found = await findFlag(input.workId, input.flagId, user);
  return transact(async (transaction) => {
    const { flag } = await lockFlag(found, "flag.settle", user, transaction);
    await refuseStale(flag, input.version, transaction);
    await give(flag, user.id, "flag.take", user, transaction);
    return { version: flag.version };
  });
}

async function give(
  flag: Flag,
  assigneeId: string | null,
  action: "flag.assign" | "flag.take",
  user: SessionUser,
  transaction: Transaction,
): Promise<void> {
  const before = flag.assigneeId;
  await flag.update({ assigneeId, toldAt: null }, { transaction });
  await audit(transaction, {
    workId: flag.workId,
    actorId: user.id,
    action,
    subjectType: "flag",
    subjectId: flag.id,
    before: { assigneeId: before },
    after: { assigneeId },
  });
}

/** @throws AppError invalid when this person is the claimant or may not settle flags of the chapter */
async function requireSecond(flag: Flag, assigneeId: string, transaction: Transaction): Promise<void> {
  const refuse = (message: string) => new AppError("invalid", message, { fields: { assigneeId: [message] } });
  if (assigneeId === flag.claimantId) throw refuse("Nobody settles a flag on their own claim");
  const member = await Membership.findOne({
    where: { workId: flag.workId, userId: assigneeId },
    include: [{ model: User, as: "user", attributes: ["id"], where: { disabledAt: null }, required: true }],
    transaction,
  });
  if (!member || member.role === "production") throw refuse("Choose somebody who settles flags on this work");
  if (member.role === "referee" && member.chapterIds !== null && !member.chapterIds.includes(flag.chapterId))
    throw refuse("This referee does not see the chapter");
}
