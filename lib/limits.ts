import Redis from "ioredis";
import { RateLimiterMemory, RateLimiterRedis, RateLimiterRes } from "rate-limiter-flexible";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { log } from "@/lib/log";

/** So many points in so many seconds. */
export type Limit = { name: string; points: number; seconds: number };

type Kept = { redis: Redis; limiters: Map<string, RateLimiterRedis> };
const global = globalThis as { surdmarkLimits?: Kept };

function kept(): Kept {
  if (global.surdmarkLimits) return global.surdmarkLimits;
  const redis = new Redis(env.REDIS_URL, {
    maxRetriesPerRequest: 1,
    commandTimeout: 1_000,
    connectTimeout: 1_000,
  });
  redis.on("error", (error: Error) => log.warn({ error: error.message }, "rate limits are kept in memory"));
  return (global.surdmarkLimits = { redis, limiters: new Map() });
}

/** The counter of one limit; without Redis each process counts for itself, half as generously. */
function limiterOf(limit: Limit): RateLimiterRedis {
  const { redis, limiters } = kept();
  const id = `${limit.name}:${limit.points}:${limit.seconds}`;
  const known = limiters.get(id);
  if (known) return known;
  const made = new RateLimiterRedis({
    storeClient: redis,
    keyPrefix: `limit:${limit.name}`,
    points: limit.points,
    duration: limit.seconds,
    insuranceLimiter: new RateLimiterMemory({
      keyPrefix: `limit:${limit.name}`,
      points: Math.max(1, Math.floor(limit.points / 2)),
      duration: limit.seconds,
    }),
  });
  limiters.set(id, made);
  return made;
}

/**
 * Takes one point of a limit.
 * @throws AppError too_many with details.retryAfter in seconds
 */
export async function takePoint(limit: Limit, key: string): Promise<void> {
  try {
    await limiterOf(limit).consume(key);
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal;
    const retryAfter = Math.max(1, Math.ceil(refusal.msBeforeNext / 1000));
    throw new AppError("too_many", `Too many attempts. Try again in ${retryAfter} s.`, {
      details: { retryAfter },
    });
  }
}

/** Forgets what was counted for a key, as after a sign-in that succeeded. */
export async function resetPoints(limit: Limit, key: string): Promise<void> {
  await limiterOf(limit).delete(key);
}

/** Closes the connection, so that a test or a script can end. */
export async function closeLimits(): Promise<void> {
  const current = global.surdmarkLimits;
  delete global.surdmarkLimits;
  await current?.redis.quit().catch(() => current.redis.disconnect());
}
