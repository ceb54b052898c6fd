import { Op } from "sequelize";
import { Finding, Outbox, Run } from "@/models";
import { postAll } from "@/lib/jobs/outbox";
import { log } from "@/lib/log";
import { transact } from "@/lib/transact";
import { batchKey, GOING, runKeys } from "./going";
import { postFinishOfLast } from "./verify-batch";

/** A run younger than this may have its rows in a transaction that is not committed yet. */
const OLD_ENOUGH_MS = 30_000;

/**
 * Finds runs that are going with nothing left to carry them on, as after a restored backup or a row that an administrator
 * removed, and posts what is missing.
 * @returns how many runs were helped
 */
export async function rescueRuns(): Promise<number> {
  const runs = await Run.findAll({
    attributes: ["id"],
    where: { state: { [Op.in]: [...GOING] }, createdAt: { [Op.lt]: new Date(Date.now() - OLD_ENOUGH_MS) } },
    limit: 50,
  });
  let helped = 0;
  for (const { id } of runs) {
    const pending = await Outbox.count({
      where: { state: "pending", dedupeKey: { [Op.startsWith]: runKeys(id) } },
    });
    if (pending > 0) continue;
    helped += 1;
    await transact(async (transaction) => {
      const empty = await Finding.findAll({
        attributes: ["batch"],
        where: { runId: id, verdict: null },
        group: ["batch"],
        transaction,
      });
      if (empty.length === 0) return postFinishOfLast(id, transaction);
      return postAll(
        transaction,
        empty.map(({ batch }) => ({
          kind: "run-batch" as const,
          payload: { runId: id, batch },
          dedupeKey: batchKey(id, batch),
        })),
      );
    });
    log.warn({ runId: id }, "a run had nothing left to carry it on and was helped");
  }
  return helped;
}
