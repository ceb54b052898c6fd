import { Op, type Transaction } from "sequelize";
import { Outbox } from "@/models";
import type { OutboxKind } from "@/models/outbox";

/** How long a row belongs to the worker that began it, unless it says again that it is alive. */
export const LEASE_MS = 15_000;

/** Somebody else holds the row now, because this worker was silent for longer than its lease. */
export class LeaseLost extends Error {
  override name = "LeaseLost";
}

/** A row that this worker holds. `token` is the count of beginnings: whoever begins it later has a higher one. */
export type Lease = { id: string; kind: OutboxKind; payload: unknown; token: number };

const until = () => new Date(Date.now() + LEASE_MS);

/** The rows that this lease still holds: none, once another worker has begun it. */
const held = ({ id, token }: Lease) => ({ id, attempts: token, state: "pending" as const });

/** Rows that may be begun now. */
export const isDue = (now: Date) => ({
  state: "pending" as const,
  dueAt: { [Op.lte]: now },
  leasedUntil: { [Op.or]: [null, { [Op.lt]: now }] },
});

/** Takes the row when it is due and nobody holds it; of several who try at once, one gets it. */
export async function takeLease(id: string): Promise<Lease | null> {
  const now = new Date();
  const row = await Outbox.findOne({ where: { id, ...isDue(now) } });
  if (!row) return null;
  const token = row.attempts + 1;
  const [taken] = await Outbox.update(
    { attempts: token, leasedUntil: until() },
    { where: { id, attempts: row.attempts, ...isDue(now) } },
  );
  return taken === 1 ? { id, kind: row.kind, payload: row.payload, token } : null;
}

/** Says that this worker is alive. @throws LeaseLost */
export async function renewLease(lease: Lease): Promise<void> {
  await changed({ leasedUntil: until() }, lease);
}

/**
 * Marks the row as done, in the transaction of what it did: both or neither. Its key is free again from then on, and a
 * post with the same key that is not committed yet is waited for. Of a mail only its kind and its address are kept:
 * the link of an invitation lets somebody in.
 * @throws LeaseLost, which must roll the transaction back
 */
export async function finishLease(lease: Lease, transaction?: Transaction): Promise<void> {
  const done = {
    state: "done" as const,
    doneAt: new Date(),
    dedupeKey: null,
    leasedUntil: null,
    lastError: null,
  };
  await changed(
    lease.kind === "mail" ? { ...done, payload: envelope(lease.payload) } : done,
    lease,
    transaction,
  );
}

/** Gives the row back unfinished, to be begun again at `dueAt`. @throws LeaseLost */
export async function giveBack(lease: Lease, dueAt: Date, lastError: string | null): Promise<void> {
  await changed({ leasedUntil: null, dueAt, ...(lastError !== null && { lastError }) }, lease);
}

/** Sets the row aside for the administrator. @throws LeaseLost, which must roll the transaction back */
export async function setAside(lease: Lease, lastError: string, transaction: Transaction): Promise<void> {
  await changed({ state: "dead", leasedUntil: null, dedupeKey: null, lastError }, lease, transaction);
}

async function changed(values: Parameters<typeof Outbox.update>[0], lease: Lease, transaction?: Transaction) {
  const [rows] = await Outbox.update(values, { where: held(lease), transaction: transaction ?? null });
  if (rows !== 1) throw new LeaseLost(`Another worker has begun ${lease.kind} ${lease.id} again`);
}

function envelope(payload: unknown) {
  const { template, to } = payload as { template?: unknown; to?: unknown };
  return { template, to };
}
