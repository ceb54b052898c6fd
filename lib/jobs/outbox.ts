import { randomUUID } from "node:crypto";
import type { Transaction } from "sequelize";
import { Outbox } from "@/models";
import { PAYLOADS, type JobKind, type Payload } from "./definitions";

export type Post = {
  [K in JobKind]: {
    kind: K;
    payload: Payload<K>;
    /** At most one pending row has this key; a second post while it is pending leaves the first as it is. */
    dedupeKey?: string;
    /** Not before this moment; now when left out. */
    dueAt?: Date;
  };
}[JobKind];

/**
 * Writes what must happen after the caller's commit, in the caller's own transaction. Call `ring` with the id once the
 * transaction is committed; when that is forgotten or fails, the worker finds the row by itself within seconds.
 * @returns the id of the new row. With a dedupe key whose row is still pending nothing is written, and the id
 *   belongs to no row: ringing it does no harm.
 * @throws ZodError when the payload is not of its kind.
 */
export async function post(transaction: Transaction, what: Post): Promise<string> {
  const [id] = await postAll(transaction, [what]);
  return id ?? "";
}

/** Like `post`, for many rows in one statement. */
export async function postAll(transaction: Transaction, posts: Post[]): Promise<string[]> {
  const rows = posts.map(({ kind, payload, dedupeKey, dueAt }) => ({
    id: randomUUID() as string,
    kind,
    payload: PAYLOADS[kind].parse(payload),
    dedupeKey: dedupeKey ?? null,
    dueAt: dueAt ?? new Date(),
  }));
  // Ignoring only the duplicate key: every other column is ours and of the right shape. A duplicate also makes this
  // transaction hold the pending row until its commit, so the row cannot be finished unseen in between.
  await Outbox.bulkCreate(rows, { transaction, ignoreDuplicates: true });
  return rows.map(({ id }) => id);
}
