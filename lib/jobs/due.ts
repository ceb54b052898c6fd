import { Outbox } from "@/models";
import { isDue } from "./lease";

export type DueRow = { id: string; attempts: number; waitingMs: number };

/** Rows that wait to be begun, the longest-waiting first. */
export async function dueRows(limit: number): Promise<DueRow[]> {
  const now = new Date();
  const rows = await Outbox.findAll({
    attributes: ["id", "attempts", "dueAt", "leasedUntil"],
    where: isDue(now),
    order: [
      ["dueAt", "ASC"],
      ["createdAt", "ASC"],
    ],
    limit,
  });
  return rows.map(({ id, attempts, dueAt, leasedUntil }) => ({
    id,
    attempts,
    waitingMs: now.getTime() - Math.max(dueAt.getTime(), leasedUntil?.getTime() ?? 0),
  }));
}
