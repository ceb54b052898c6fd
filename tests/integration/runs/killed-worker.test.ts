import { spawn, type ChildProcess } from "node:child_process";
import { createInterface } from "node:readline";
import Redis from "ioredis";
import { afterEach, expect, it } from "vitest";
import { Finding } from "@/models";
import { env } from "@/lib/env";
import { startRun } from "@/lib/runs/start-run";
import { buildScene, judgedIn, manyClaims, saidIn, stateOf, until, writeClaims } from "./setup";

const workers = new Set<ChildProcess>();
afterEach(() => {
  for (const worker of workers) worker.kill("SIGKILL");
});

/** A worker in a process of its own, as `npm start` begins it; resolves when it says that it is at work. */
async function begin(): Promise<ChildProcess> {
  const worker = spawn(process.execPath, ["--import", "tsx", "workers/index.ts"], {
    env: { ...process.env, LOG_LEVEL: "info", DATABASE_URL: env.DATABASE_URL, REDIS_URL: env.REDIS_URL },
    stdio: ["ignore", "pipe", "inherit"],
  });
  workers.add(worker);
  worker.once("exit", () => workers.delete(worker));
  await new Promise<void>((resolve) => {
    createInterface({ input: worker.stdout }).on("line", (line) => line.includes("is at work") && resolve());
  });
  return worker;
}

const end = (worker: ChildProcess, signal: NodeJS.Signals) =>
  new Promise<number | null>((resolve) => {
    worker.once("exit", resolve);
    worker.kill(signal);
  });

it("finishes a run of 2,000 claims whose worker is killed twice and whose Redis is emptied, as if nothing had been", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(2_000));

  let worker = await begin();
  const calm = await startRun(scene, scene.lead);
  await until(async () => (await stateOf(calm.runId)) === "ended");

  const { runId } = await startRun(scene, scene.lead);
  for (const share of [300, 900]) {
    await until(async () => (await judgedIn(runId)) >= share);
    await end(worker, "SIGKILL");
    worker = await begin();
    const before = await judgedIn(runId);
    await until(async () => (await judgedIn(runId)) > before);
  }
  const redis = new Redis(env.REDIS_URL);
  await redis.flushdb();
  await redis.quit();
  await until(async () => (await stateOf(runId)) === "ended");

  expect(await Finding.count({ where: { runId } })).toBe(2_000);
  expect(await saidIn(runId)).toEqual(await saidIn(calm.runId));
  expect(await end(worker, "SIGTERM")).toBe(0);
}, 240_000);
