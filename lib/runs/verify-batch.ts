import { Op, type Transaction } from "sequelize";
import { Claim, ClaimVersion, Finding, Run } from "@/models";
import { postAll } from "@/lib/jobs/outbox";
import { ringAll } from "@/lib/jobs/queue";
import type { Payload } from "@/lib/jobs/definitions";
import type { Job } from "@/lib/jobs/work";
import { transact } from "@/lib/transact";
import { conventionsAt } from "@/lib/works/conventions-at";
import { finishKey, isGoing } from "./going";
import type { Task } from "./judge";
import type { Result, Verifier } from "./verifier";
import { fillFindings, type Empty } from "./write-findings";

/** Claims judged and written together. */
const CHUNK = 20;
/** A claim that was begun this often without an end is left undecided. */
export const MOST_ATTEMPTS = 3;

type Begun = Empty & { attempts: number };

/**
 * Fills the findings of one batch that are still empty. Running it twice, or in two places at once, changes nothing:
 * a finding is only ever filled while it is empty. When it fills the last one of its run, the run's end is posted.
 */
export async function verifyBatch(
  { runId, batch }: Payload<"run-batch">,
  job: Job,
  verifier: Verifier,
): Promise<void> {
  const run = await Run.findByPk(runId);
  if (!run || !isGoing(run.state)) return;
  if (run.state === "queued")
    await Run.update({ state: "running", startedAt: new Date() }, { where: { id: runId, state: "queued" } });
  const conventions = await conventionsAt(run.workId, run.conventionsVersion);
  for (;;) {
    job.goOn();
    const chunk = await nextChunk(runId, batch);
    if (chunk.length === 0) break;
    const worn = chunk.filter(({ attempts }) => attempts >= MOST_ATTEMPTS);
    const fresh = chunk.filter(({ attempts }) => attempts < MOST_ATTEMPTS);
    await countAttempt(fresh);
    const results = [...worn.map(giveUp), ...(await verifier.verify(await tasksOf(fresh), conventions))];
    const byId = new Map(results.map((result) => [result.id, result]));
    const pairs = chunk.flatMap((empty) => {
      const result = byId.get(empty.id);
      return result ? [{ empty, result }] : [];
    });
    if (!(await transact((transaction) => fillFindings(runId, pairs, transaction)))) return;
  }
  const posted = await transact(async (transaction) => {
    const ids = await postFinishOfLast(runId, transaction);
    await job.done(transaction);
    return ids;
  });
  await ringAll(posted);
}

/**
 * The next findings to fill. First those that nobody has begun, many at a time; then, one by one, those that somebody
 * began and did not end, so that a claim that fells its worker is found out and its neighbours are not blamed for it.
 */
async function nextChunk(runId: string, batch: number): Promise<Begun[]> {
  const attributes = ["id", "workId", "runId", "claimId", "claimVersion", "attempts"];
  const where = { runId, batch, verdict: null };
  const fresh = await Finding.findAll({
    attributes,
    where: { ...where, attempts: 0 },
    order: [["id", "ASC"]],
    limit: CHUNK,
  });
  if (fresh.length > 0) return fresh;
  return Finding.findAll({
    attributes,
    where,
    order: [
      ["attempts", "ASC"],
      ["id", "ASC"],
    ],
    limit: 1,
  });
}

/** Counted before the work begins: a worker that dies of it cannot count afterwards. */
async function countAttempt(begun: Begun[]): Promise<void> {
  if (begun.length === 0) return;
  await Finding.increment("attempts", { where: { id: { [Op.in]: begun.map(({ id }) => id) } } });
}

function giveUp({ id, attempts }: Begun): Result {
  return {
    kind: "stopped",
    id,
    says: `the check of it was begun ${attempts} times and never came to an end`,
  };
}

/** The claims in the versions that the run was started with. */
async function tasksOf(begun: Begun[]): Promise<Task[]> {
  if (begun.length === 0) return [];
  const claimIds = begun.map(({ claimId }) => claimId);
  const [claims, versions] = await Promise.all([
    Claim.findAll({ attributes: ["id", "ref"], where: { id: claimIds } }),
    ClaimVersion.findAll({
      attributes: ["claimId", "number", "quantity", "claimed"],
      where: { [Op.or]: begun.map(({ claimId, claimVersion }) => ({ claimId, number: claimVersion })) },
    }),
  ]);
  const refs = new Map(claims.map(({ id, ref }) => [id, ref]));
  const texts = new Map(versions.map((version) => [version.claimId, version]));
  return begun.map(({ id, claimId }) => ({
    id,
    ref: refs.get(claimId) ?? "",
    quantity: texts.get(claimId)?.quantity ?? "",
    claimed: texts.get(claimId)?.claimed ?? "",
  }));
}

/**
 * What must be so once a batch is given up: its claims are undecided instead of waiting for ever, and the run can end.
 */
export async function buryBatch(
  { runId, batch }: Payload<"run-batch">,
  transaction: Transaction,
): Promise<void> {
  const left = await Finding.findAll({
    attributes: ["id", "workId", "runId", "claimId", "claimVersion"],
    where: { runId, batch, verdict: null },
    transaction,
  });
  const says = "the program could not carry out its part of the run";
  const pairs = left.map((empty) => ({ empty, result: { kind: "stopped" as const, id: empty.id, says } }));
  if (await fillFindings(runId, pairs, transaction)) await postFinishOfLast(runId, transaction);
}

/**
 * Posts the end of a run when no finding is left without a verdict. Batches that end at the same time take turns at the
 * run's row, so that the last one knows that it is the last.
 */
export async function postFinishOfLast(runId: string, transaction: Transaction): Promise<string[]> {
  const run = await Run.findByPk(runId, {
    attributes: ["state"],
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!run || !isGoing(run.state)) return [];
  const left = await Finding.count({ where: { runId, verdict: null }, transaction });
  if (left > 0) return [];
  return postAll(transaction, [{ kind: "run-finish", payload: { runId }, dedupeKey: finishKey(runId) }]);
}
