import Bull from "bull";
import Redis, { type RedisOptions } from "ioredis";
import { env } from "@/lib/env";
import { log } from "@/lib/log";

/** What travels through Redis: the id of an outbox row, nothing else. */
export type Ring = { id: string };

const RING_MS = 2_000;
const kept = globalThis as { surdmarkQueue?: Bull.Queue<Ring> };

/**
 * The bell. The database holds what is to be done; a ring only says that somebody should look now, so rings may be
 * lost, doubled or late. One queue for this process.
 */
export function queue(): Bull.Queue<Ring> {
  return (kept.surdmarkQueue ??= open());
}

function open(): Bull.Queue<Ring> {
  const bell = new Bull<Ring>("outbox", {
    prefix: "surdmark",
    createClient: (type) => {
      const client = new Redis(env.REDIS_URL, optionsFor(type));
      client.on("error", quietly);
      return client;
    },
    // A killed worker's ring comes back after seconds instead of Bull's minute; being stalled is never held against it.
    settings: { lockDuration: 10_000, stalledInterval: 5_000, maxStalledCount: 1_000 },
    defaultJobOptions: { attempts: 1, removeOnComplete: true, removeOnFail: 100 },
  });
  bell.on("error", quietly);
  return bell;
}

/** Commands give up at once while Redis is away; Bull's own two listening connections must wait, and Bull insists on it. */
function optionsFor(type: "client" | "subscriber" | "bclient"): RedisOptions {
  const retryStrategy = (times: number) => Math.min(200 * times, 2_000);
  if (type !== "client") return { maxRetriesPerRequest: null, enableReadyCheck: false, retryStrategy };
  return { maxRetriesPerRequest: 1, commandTimeout: RING_MS, connectTimeout: RING_MS, retryStrategy };
}

let lastSaid = 0;

/** Redis being away is one line in the log every half minute, not one a retry. */
function quietly(error: Error) {
  if (Date.now() - lastSaid < 30_000) return;
  lastSaid = Date.now();
  log.warn({ error }, "Redis does not answer; work goes on from the database");
}

/**
 * Says that an outbox row is due. Never throws and takes at most two seconds.
 * @param attempt how often the row was begun before; a ring left behind by a killed worker then does not swallow this one.
 * @returns whether Redis took it. When not, the row is found in the database all the same.
 */
export async function ring(id: string, attempt = 0): Promise<boolean> {
  return inTime(async () => {
    await queue().add({ id }, { jobId: `${id}.${attempt}` });
  });
}

/** Like `ring`, for many rows at once. */
export async function ringAll(ids: string[]): Promise<boolean> {
  if (ids.length === 0) return true;
  return inTime(async () => {
    await queue().addBulk(ids.map((id) => ({ data: { id }, opts: { jobId: `${id}.0` } })));
  });
}

async function inTime(send: () => Promise<void>): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<boolean>((resolve) => {
    timer = setTimeout(() => resolve(false), RING_MS);
  });
  const sent = send().then(
    () => true,
    (error: unknown) => {
      quietly(error instanceof Error ? error : new Error(String(error)));
      return false;
    },
  );
  return Promise.race([sent, late]).finally(() => clearTimeout(timer));
}
