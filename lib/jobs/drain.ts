import { dueRows } from "./due";
import { workOn, type Handlers } from "./work";

/**
 * Works off what is due, one row after the other, straight from the database and without Redis, until nothing is left
 * that has waited for `waitedMs`.
 * @returns how many rows were begun
 */
export async function drain(handlers: Handlers, stopping: AbortSignal, waitedMs = 0): Promise<number> {
  let begun = 0;
  for (;;) {
    const rows = (await dueRows(50)).filter((row) => row.waitingMs >= waitedMs);
    let here = 0;
    for (const { id } of rows) {
      if (stopping.aborted) return begun;
      if (await workOn(id, handlers, stopping)) here += 1;
    }
    begun += here;
    if (here === 0) return begun;
  }
}
