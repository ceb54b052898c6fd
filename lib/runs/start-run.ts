import { Op, type Transaction } from "sequelize";
import { Chapter, Claim, Finding, Run, Work } from "@/models";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { postAll } from "@/lib/jobs/outbox";
import { ringAll } from "@/lib/jobs/queue";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import { transact } from "@/lib/transact";
import { BATCH_SIZE, batchKey, GOING, LARGEST_RUN } from "./going";
import type { NewRun } from "./schema";

export type StartedRun = { runId: string; total: number };

/**
 * Starts the verification of a chapter, or of a whole work: writes down every claim that is not withdrawn in the version
 * it has now, as a finding without a verdict, and posts the batches. All of it or nothing.
 * @throws AppError not_found, forbidden; conflict with details.runId while a run that covers some of the same claims is
 *   going; invalid when there is nothing to check, or more than LARGEST_RUN claims
 */
export async function startRun({ workId, chapterId }: NewRun, user: SessionUser): Promise<StartedRun> {
  const { runId, total, posted } = await transact(async (transaction) => {
    const { work } = await gate(user, "run.start", workId, { chapterId }, transaction);
    // Two starts at once take turns here; the second then sees the first one's run.
    await Work.findByPk(workId, { attributes: ["id"], transaction, lock: transaction.LOCK.UPDATE });
    if (chapterId && !(await Chapter.count({ where: { id: chapterId, workId }, transaction })))
      throw notFound();
    await refuseBeside(workId, chapterId, transaction);
    const claims = await claimsOf(workId, chapterId, transaction);
    const batches = Math.ceil(claims.length / BATCH_SIZE);
    const run = await Run.create(
      {
        workId,
        chapterId,
        startedById: user.id,
        conventionsVersion: work.conventionsVersion,
        engine: ENGINE_VERSION,
        total: claims.length,
        batches,
      },
      { transaction },
    );
    await writeEmptyFindings(run.id, claims, transaction);
    const posts = Array.from({ length: batches }, (_, batch) => ({
      kind: "run-batch" as const,
      payload: { runId: run.id, batch },
      dedupeKey: batchKey(run.id, batch),
    }));
    const posted = await postAll(transaction, posts);
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "run.start",
      subjectType: "run",
      subjectId: run.id,
      after: { chapterId, claims: claims.length, conventionsVersion: work.conventionsVersion },
    });
    return { runId: run.id, total: claims.length, posted };
  });
  await ringAll(posted);
  return { runId, total };
}

async function refuseBeside(
  workId: string,
  chapterId: string | null,
  transaction: Transaction,
): Promise<void> {
  const going = await Run.findOne({
    attributes: ["id", "chapterId"],
    where: {
      workId,
      state: { [Op.in]: [...GOING] },
      ...(chapterId !== null && { chapterId: { [Op.or]: [chapterId, null] } }),
    },
    transaction,
    lock: transaction.LOCK.SHARE,
  });
  if (!going) return;
  const says =
    going.chapterId === null ? "the whole work" : chapterId ? "this chapter" : "one of the chapters";
  throw new AppError("conflict", `A run of ${says} is going already. Watch that one, or cancel it first.`, {
    details: { runId: going.id, path: `/works/${workId}/runs/${going.id}` },
  });
}

async function claimsOf(
  workId: string,
  chapterId: string | null,
  transaction: Transaction,
): Promise<Claim[]> {
  const where = { workId, withdrawnAt: null, ...(chapterId !== null && { chapterId }) };
  const count = await Claim.count({ where, transaction });
  if (count === 0)
    throw new AppError(
      "invalid",
      "There is no claim to check here yet. Add one, or upload a key file, then start the run.",
    );
  if (count > LARGEST_RUN)
    throw new AppError(
      "invalid",
      `A run takes at most ${LARGEST_RUN.toLocaleString("en-GB")} claims; here are ${count.toLocaleString("en-GB")}. Start one chapter at a time.`,
    );
  return Claim.findAll({
    attributes: ["id", "workId", "chapterId", "current", "position"],
    where,
    include: [
      { model: Chapter, as: "chapter", attributes: ["number"] },
      { association: "problem", attributes: ["position"] },
    ],
    order: [
      ["chapter", "number", "ASC"],
      ["problem", "position", "ASC"],
      ["position", "ASC"],
      ["id", "ASC"],
    ],
    transaction,
  });
}

async function writeEmptyFindings(runId: string, claims: Claim[], transaction: Transaction): Promise<void> {
  const rows = claims.map(({ id, workId, chapterId, current }, i) => ({
    workId,
    chapterId,
    runId,
    claimId: id,
    claimVersion: current,
    batch: Math.floor(i / BATCH_SIZE),
  }));
  for (let from = 0; from < rows.length; from += 1_000)
    await Finding.bulkCreate(rows.slice(from, from + 1_000), { transaction });
}
