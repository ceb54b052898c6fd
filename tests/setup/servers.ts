import { mkdtempSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { startTestServers } from "../../scripts/services/test-servers.mjs";

/**
 * Servers for the integration tests: those that the environment names (scripts/test.mjs starts them), or else
 * a MariaDB and a Redis of this run alone, in a temporary folder that goes with them.
 */
export default async function setup(): Promise<(() => Promise<void>) | undefined> {
  if (process.env.TEST_DATABASE_URL && process.env.TEST_REDIS_URL) return undefined;
  const folder = mkdtempSync(path.join(os.tmpdir(), "surdmark-test-"));
  const servers = await startTestServers(folder, path.resolve(import.meta.dirname, "../.."));
  process.env.TEST_DATABASE_URL = servers.databaseUrl;
  process.env.TEST_REDIS_URL = servers.redisUrl;
  return async () => {
    await servers.stop();
    rmSync(folder, { recursive: true, force: true });
  };
}
