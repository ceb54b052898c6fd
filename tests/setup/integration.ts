import { afterAll } from "vitest";
import { Redis } from "ioredis";
import { freshDatabase } from "./database";

// Runs before each test file and before anything it imports, so that lib/env.ts reads these addresses.
const database = await freshDatabase();
process.env.DATABASE_URL = database.url;
process.env.REDIS_URL = await emptyRedis();

afterAll(() => database.drop());

/** A numbered Redis database of this worker process alone, emptied for this file. */
async function emptyRedis(): Promise<string> {
  const url = new URL(process.env.TEST_REDIS_URL ?? "");
  url.pathname = `/${process.env.VITEST_POOL_ID ?? "1"}`;
  const client = new Redis(url.href);
  await client.flushdb();
  await client.quit();
  return url.href;
}
