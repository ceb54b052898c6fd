import { spawn, type ChildProcess } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { afterAll, beforeAll, expect, it } from "vitest";
import { lock, openFolder, secrets } from "../../scripts/services/folder.mjs";
import { mariadb } from "../../scripts/services/mariadb.mjs";
import { beganAt, stop } from "../../scripts/services/processes.mjs";
import { redis } from "../../scripts/services/redis.mjs";

const ROOT = path.resolve(import.meta.dirname, "../..");
let at: string;

beforeAll(() => {
  at = mkdtempSync(path.join(os.tmpdir(), "surdmark-servers-"));
});
afterAll(() => rmSync(at, { recursive: true, force: true }));

/** A start that has got as far as its servers: it notes them down and waits. */
const HOLDER = `
  const { openFolder, lock, secrets, remember } = await import("${ROOT}/scripts/services/folder.mjs");
  const { mariadb } = await import("${ROOT}/scripts/services/mariadb.mjs");
  const { redis } = await import("${ROOT}/scripts/services/redis.mjs");
  const folder = openFolder(process.argv[1], ".");
  await lock(folder, "Surdmark");
  const secret = secrets(folder);
  const servers = [await mariadb(folder), await redis(folder, secret.redis)];
  if (servers[0].isNew()) await servers[0].create();
  const children = servers.map((server) => ({ name: server.name, child: server.begin() }));
  await Promise.all(servers.map((server, i) => server.ready(children[i].child)));
  remember(folder, null, children);
  console.log("holding");
  setInterval(() => {}, 1000);
`;

function hold(folder: string): Promise<ChildProcess> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ["--input-type=module", "-e", HOLDER, folder]);
    child.stdout.on("data", () => resolve(child));
    child.stderr.on("data", (data: Buffer) => reject(new Error(data.toString())));
  });
}

it("keeps what was committed through a killed start, leaves no process, and starts again", async () => {
  const first = await hold(at);
  const folder = openFolder(at, ".");
  const database = await mariadb(folder);
  await database.prepare(secrets(folder));
  await database.sql(
    "create table surdmark.kept (id int primary key) engine=innodb; insert into surdmark.kept values (7);",
  );
  const { processes } = folder.read("running.json") as { processes: { pid: number; began: string }[] };
  expect(processes).toHaveLength(2);

  first.kill("SIGKILL");
  await new Promise((resolve) => first.once("exit", resolve));
  for (let turn = 0; turn < 200 && processes.some(({ pid, began }) => beganAt(pid) === began); turn += 1)
    await sleep(100);
  expect(processes.filter(({ pid, began }) => beganAt(pid) === began)).toEqual([]);

  const second = await hold(at);
  const again = await mariadb(openFolder(at, "."));
  expect((await again.sql("select id from surdmark.kept")).trim()).toBe("7");
  second.kill("SIGTERM");
  await new Promise((resolve) => second.once("exit", resolve));
  await lock(folder, "Surdmark"); // waits for what the second left
});

it("starts Redis anew when its data are damaged, and keeps the damaged ones", async () => {
  const folder = openFolder(at, "damaged");
  mkdirSync(folder.file("redis", "appendonlydir"), { recursive: true });
  writeFileSync(folder.file("redis", "appendonlydir", "appendonly.aof.manifest"), "nonsense\n");
  const server = await redis(folder, "a-password");
  await expect(server.ready(server.begin())).rejects.toThrow("Redis does not start");
  expect(server.putAside()).toMatch(/redis\.damaged-\d+$/);
  const child = server.begin();
  await server.ready(child);
  await stop(child, 5_000);
});
