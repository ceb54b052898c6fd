import type { Transaction } from "sequelize";
import { transact } from "@/lib/transact";
import { log } from "@/lib/log";
import { PAYLOADS, RETRY, waitAfter, type JobKind, type Payload } from "./definitions";
import {
  finishLease,
  giveBack,
  LEASE_MS,
  LeaseLost,
  renewLease,
  setAside,
  takeLease,
  type Lease,
} from "./lease";

/** The worker is ending: what is not finished goes back, with nothing held against it. */
export class HandedBack extends Error {
  override name = "HandedBack";
}

/** What a handler knows of the row that it works on. */
export type Job = {
  id: string;
  /** 1 at the first try */
  attempt: number;
  /** Marks the row as done in the handler's own transaction. Without it the row is done when the handler returns. */
  done: (transaction: Transaction) => Promise<void>;
  /**
   * To be called between two pieces of work.
   * @throws HandedBack when the worker is ending; LeaseLost when another worker has the row
   */
  goOn: () => void;
};

export type Handler<K extends JobKind> = {
  run: (payload: Payload<K>, job: Job) => Promise<void>;
  /** What else must be so once the row is given up; in the same transaction. */
  dead?: (payload: Payload<K>, transaction: Transaction) => Promise<void>;
};
export type Handlers = { [K in JobKind]: Handler<K> };

/**
 * Begins one row, if it is due and free, and carries it to done, to a later try, or to the dead ones. Never throws: when
 * even that cannot be written down, the lease runs out and the row is found again.
 * @returns whether there was something to do
 */
export async function workOn(id: string, handlers: Handlers, stopping: AbortSignal): Promise<boolean> {
  if (stopping.aborted) return false;
  try {
    const lease = await takeLease(id);
    if (!lease) return false;
    await carryOut(lease, handlers, stopping);
    return true;
  } catch (error) {
    log.warn({ error, outboxId: id }, "an outbox row could not be worked on; it will be found again");
    return false;
  }
}

async function carryOut(lease: Lease, handlers: Handlers, stopping: AbortSignal): Promise<void> {
  let finished = false;
  let lost: LeaseLost | null = null;
  // The row stays ours for as long as this process can still say so.
  const alive = setInterval(() => {
    renewLease(lease).catch((error: unknown) => {
      if (error instanceof LeaseLost && !finished) lost = error;
    });
  }, LEASE_MS / 3);
  const job: Job = {
    id: lease.id,
    attempt: lease.token,
    done: async (transaction) => {
      await finishLease(lease, transaction);
      transaction.afterCommit(() => {
        finished = true;
      });
    },
    goOn: () => {
      if (lost) throw lost;
      if (stopping.aborted) throw new HandedBack("The worker is ending");
    },
  };
  try {
    await run(lease, handlers, job);
    if (!finished) await finishLease(lease);
    finished = true;
  } catch (error) {
    await record(error, lease, handlers);
  } finally {
    clearInterval(alive);
  }
}

function run<K extends JobKind>(lease: Lease & { kind: K }, handlers: Handlers, job: Job): Promise<void> {
  return handlers[lease.kind].run(PAYLOADS[lease.kind].parse(lease.payload) as Payload<K>, job);
}

async function record(error: unknown, lease: Lease, handlers: Handlers): Promise<void> {
  if (error instanceof LeaseLost) return;
  if (error instanceof HandedBack) return giveBack(lease, new Date(), null);
  const about = { error, outboxId: lease.id, kind: lease.kind, attempt: lease.token };
  const says = (error instanceof Error ? error.message : String(error)).slice(0, 1_000);
  if (lease.token < RETRY[lease.kind].attempts) {
    log.warn(about, "will be tried again");
    return giveBack(lease, new Date(Date.now() + waitAfter(lease.kind, lease.token)), says);
  }
  log.error(about, "given up; the administrator finds it among the dead");
  await transact(async (transaction) => {
    await setAside(lease, says, transaction);
    await bury(lease, handlers, transaction);
  });
}

async function bury<K extends JobKind>(
  lease: Lease & { kind: K },
  handlers: Handlers,
  transaction: Transaction,
) {
  const payload = PAYLOADS[lease.kind].safeParse(lease.payload);
  if (payload.success) await handlers[lease.kind].dead?.(payload.data as Payload<K>, transaction);
}
