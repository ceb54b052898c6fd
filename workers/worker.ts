import { Redis } from "ioredis";
import { env } from "@/lib/env";
import { HEARTBEAT_KEY } from "@/lib/health";
import { drain } from "@/lib/jobs/drain";
import { dueRows } from "@/lib/jobs/due";
import { pruneOutbox } from "@/lib/jobs/prune";
import { queue, ring } from "@/lib/jobs/queue";
import { workOn } from "@/lib/jobs/work";
import { log } from "@/lib/log";
import { rescueRuns } from "@/lib/runs/rescue-runs";
import { openVerifier } from "@/lib/runs/verifier";
import { sequelize } from "@/models";
import { handlersWith } from "./handlers";

/** Rows worked on at a time: while one computes, the others read and write. */
const AT_A_TIME = 3;
const LOOK_EVERY_MS = 2_000;
const RESCUE_EVERY_MS = 30_000;
const PRUNE_EVERY_MS = 3_600_000;
const BEAT_EVERY_MS = 5_000;
/** A due row that nobody began for this long is begun without the bell, whatever Redis says. */
const OVERDUE_MS = 8_000;
const END_WITHIN_MS = 10_000;

export type RunningWorker = {
  /** Takes nothing new, lets what is in flight come to a stop within ten seconds, and gives back what it holds. */
  stop: () => Promise<void>;
};

/** Starts everything that a worker does: listening to the bell, looking into the database, and saying that it is alive. */
export function startWorker(): RunningWorker {
  const stopping = new AbortController();
  const { signal } = stopping;
  const verifier = openVerifier();
  const handlers = handlersWith(verifier);
  const inFlight = new Set<Promise<unknown>>();
  const tracked = <T>(work: Promise<T>): Promise<T> => {
    inFlight.add(work);
    return work.finally(() => inFlight.delete(work));
  };

  const bell = queue();
  bell
    .process(AT_A_TIME, (job) => tracked(workOn(job.data.id, handlers, signal)).then(() => undefined))
    .catch((error: unknown) => {
      if (!signal.aborted) log.warn({ error }, "the bell is silent; the database is looked at instead");
    });

  async function look(): Promise<void> {
    let heard = true;
    for (const row of await dueRows(200)) {
      if (signal.aborted) return;
      heard = heard && row.waitingMs < OVERDUE_MS && (await ring(row.id, row.attempts));
    }
    if (!heard) await tracked(drain(handlers, signal, LOOK_EVERY_MS));
  }

  const redis = new Redis(env.REDIS_URL, {
    maxRetriesPerRequest: 1,
    commandTimeout: 2_000,
    connectTimeout: 2_000,
  });
  redis.on("error", () => {}); // the queue says it
  const beat = async () => {
    await redis.set(HEARTBEAT_KEY, Date.now()).catch(() => undefined);
  };

  const loops = [
    every(BEAT_EVERY_MS, beat, signal),
    every(LOOK_EVERY_MS, look, signal),
    every(RESCUE_EVERY_MS, rescueRuns, signal),
    every(PRUNE_EVERY_MS, pruneOutbox, signal),
  ];

  return {
    stop: async () => {
      stopping.abort();
      await within(END_WITHIN_MS - 2_000, Promise.all([...inFlight, ...loops]));
      await within(1_500, Promise.all([verifier.close(), sequelize.close(), bell.close(true)]));
      redis.disconnect();
    },
  };
}

/** Does something again and again with a pause in between, until the worker ends. A failure is said and the next round comes. */
async function every(pauseMs: number, act: () => Promise<unknown>, signal: AbortSignal): Promise<void> {
  while (!signal.aborted) {
    await act().catch((error: unknown) =>
      log.warn({ error }, "a round of the worker failed; the next one comes"),
    );
    await pause(pauseMs, signal);
  }
}

function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (signal.aborted) return resolve();
    const end = () => {
      clearTimeout(timer);
      signal.removeEventListener("abort", end);
      resolve();
    };
    const timer = setTimeout(end, ms);
    signal.addEventListener("abort", end);
  });
}

/** Waits for it, but no longer than this; what it fails with no longer matters. */
async function within(ms: number, work: Promise<unknown>): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<void>((resolve) => {
    timer = setTimeout(resolve, ms);
  });
  await Promise.race([work.catch(() => undefined), late]).finally(() => clearTimeout(timer));
}
