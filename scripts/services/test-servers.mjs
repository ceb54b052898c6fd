import { randomBytes } from "node:crypto";
import { existsSync } from "node:fs";
import path from "node:path";
import { openFolder } from "./folder.mjs";
import { mariadb } from "./mariadb.mjs";
import { retire, run, supervise } from "./processes.mjs";
import { redis } from "./redis.mjs";

/**
 * A MariaDB and a Redis for tests in an empty folder, with a migrated template database.
 * The administrator may do everything on this server; `surdmark` gets the product's rights on each copy.
 */
export async function startTestServers(at, root) {
  const folder = openFolder(at, "servers");
  const secret = randomBytes(18).toString("base64url");
  const server = await mariadb(folder);
  const bell = await redis(folder, secret);
  const kept = [];
  const stop = () => Promise.all(kept.map((keeper) => retire(keeper, 5_000)));
  const open = async (service) => {
    const child = service.begin();
    await service.ready(child);
    const giveUp = (fault) => console.error(fault.message);
    kept.push(supervise(child, service.begin, { name: service.name, changed: () => {}, giveUp }));
  };
  if (server.isNew()) await server.create();
  await Promise.all([open(server), open(bell)]);
  await server.sql(`
    create or replace user tester@'127.0.0.1' identified by '${secret}';
    grant all privileges on *.* to tester@'127.0.0.1' with grant option;
    create or replace user surdmark@'127.0.0.1' identified by 'tests';
    create or replace database surdmark_template character set utf8mb4 collate utf8mb4_unicode_ci;`);
  const databaseUrl = server.url("tester", secret, "surdmark_template");
  if (existsSync(path.join(root, "scripts/migrate.ts")))
    await run(process.execPath, ["--import", "tsx", "scripts/migrate.ts", "up"], {
      cwd: root,
      log: folder.log("migrate"),
      env: {
        ...process.env,
        NODE_ENV: "test",
        DATABASE_URL: databaseUrl,
        REDIS_URL: bell.url,
        SMTP_URL: "smtp://127.0.0.1:1",
        NEXTAUTH_SECRET: randomBytes(36).toString("base64"),
      },
    });
  return {
    databaseUrl,
    redisUrl: bell.url,
    server,
    bell,
    keepers: kept,
    stop,
  };
}
