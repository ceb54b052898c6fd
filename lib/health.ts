import { createConnection } from "mariadb";
import { Redis } from "ioredis";
import { env } from "@/lib/env";

/** The worker writes the time here (milliseconds since 1970) every five seconds. */
export const HEARTBEAT_KEY = "surdmark:worker:heartbeat";
const LATE_AFTER_SECONDS = 30;

type Part = { ok: boolean; reason?: string };
export type Health = {
  ok: boolean;
  database: Part;
  redis: Part;
  worker: Part & { seenSecondsAgo: number | null };
};

/** Asks MariaDB and Redis for an answer, and when the worker was last seen. Reasons name no address and no secret. */
export async function health(): Promise<Health> {
  const [database, bell] = await Promise.all([databaseAnswers(), redisAnswers()]);
  const { seen, ...redis } = bell;
  const seenSecondsAgo = seen === null ? null : Math.max(0, Math.round((Date.now() - seen) / 1000));
  const worker = {
    ok: seenSecondsAgo !== null && seenSecondsAgo <= LATE_AFTER_SECONDS,
    seenSecondsAgo,
    ...(seenSecondsAgo === null
      ? { reason: "no worker has been seen" }
      : seenSecondsAgo > LATE_AFTER_SECONDS
        ? { reason: `no worker has been seen for ${seenSecondsAgo} seconds` }
        : {}),
  };
  return { ok: database.ok && redis.ok, database, redis, worker };
}

async function databaseAnswers(): Promise<Part> {
  const url = new URL(env.DATABASE_URL);
  try {
    const connection = await createConnection({
      host: url.hostname,
      port: Number(url.port || 3306),
      user: decodeURIComponent(url.username),
      password: decodeURIComponent(url.password),
      database: decodeURIComponent(url.pathname.slice(1)),
      connectTimeout: 2_000,
      queryTimeout: 2_000,
    });
    await connection.query("select 1").finally(() => connection.end());
    return { ok: true };
  } catch (error) {
    return { ok: false, reason: `the database does not answer (${codeOf(error)})` };
  }
}

async function redisAnswers(): Promise<Part & { seen: number | null }> {
  const client = new Redis(env.REDIS_URL, {
    lazyConnect: true,
    connectTimeout: 2_000,
    commandTimeout: 2_000,
    maxRetriesPerRequest: 0,
    retryStrategy: () => null,
  });
  client.on("error", () => {}); // the calls below reject with it
  try {
    await client.connect();
    const seen = Number(await client.get(HEARTBEAT_KEY));
    return { ok: true, seen: Number.isFinite(seen) && seen > 0 ? seen : null };
  } catch (error) {
    return { ok: false, reason: `Redis does not answer (${codeOf(error)})`, seen: null };
  } finally {
    client.disconnect();
  }
}

/** The short code of a failure; messages may carry addresses and user names. */
function codeOf(error: unknown): string {
  const code = error instanceof Error && "code" in error ? error.code : null;
  return typeof code === "string" ? code : "no answer";
}
