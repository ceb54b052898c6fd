import { spawn } from "node:child_process";
import { closeSync, mkdirSync, openSync, readFileSync, renameSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { find } from "./find.mjs";
import { Fault } from "./report.mjs";

/** Every process started here that has not ended, so that a signal can end them all. */
const living = new Set();

/**
 * Starts a process in a group of its own (Ctrl-C in a terminal then reaches only us, and we end the rest in order)
 * that the kernel ends when we die, however we die.
 * @param {string} log file that its output is added to; without it the output is ours
 */
export function start(command, args, { log, env = process.env, cwd, input } = {}) {
  const setpriv = process.platform === "linux" ? find("setpriv") : null;
  const [file, list] = setpriv ? [setpriv, ["--pdeathsig", "TERM", "--", command, ...args]] : [command, args];
  const out = log === undefined ? "inherit" : openLog(log);
  const child = spawn(file, list, {
    cwd,
    env,
    detached: true,
    stdio: [input === undefined ? "ignore" : "pipe", out, out],
  });
  if (typeof out === "number") closeSync(out);
  if (input !== undefined) {
    child.stdin.on("error", () => {}); // it ended before it read everything; its exit status tells
    child.stdin.end(input);
  }
  child.ended = new Promise((resolve) => {
    child.on("error", (error) => resolve({ code: null, signal: null, error }));
    child.on("exit", (code, signal) => resolve({ code, signal }));
  }).finally(() => living.delete(child));
  living.add(child);
  return child;
}

/** Runs a process to its end. @throws Error with the end of its output when it fails */
export async function run(command, args, options = {}) {
  const before = options.log === undefined ? 0 : sizeOf(options.log);
  const { code, signal, error } = await start(command, args, options).ended;
  if (code === 0) return;
  const output = options.log === undefined ? "" : `\n${lastLines(options.log, before)}`;
  throw new Error(
    `${path.basename(command)} ${error ? error.message : `ended with ${signal ?? code}`}${output}`,
  );
}

/** Runs a process and gives what it printed. @throws Error with what it said on standard error */
export function capture(command, args, { env = process.env, input } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { env, stdio: ["pipe", "pipe", "pipe"] });
    let out = "";
    let err = "";
    child.stdout.on("data", (data) => (out += data));
    child.stderr.on("data", (data) => (err += data));
    child.stdin.on("error", () => {});
    child.on("error", reject);
    child.on("close", (code) =>
      code === 0 ? resolve(out) : reject(new Error(err.trim() || `ended with ${code}`)),
    );
    child.stdin.end(input ?? "");
  });
}

/** Ends a process and what it started: asks first, kills after the given time. */
export async function stop(child, milliseconds) {
  if (child.pid === undefined) return;
  signalGroup(child.pid, "SIGTERM");
  const timer = setTimeout(() => signalGroup(child.pid, "SIGKILL"), milliseconds);
  await child.ended;
  clearTimeout(timer);
  signalGroup(child.pid, "SIGKILL"); // what it left behind
}

export const stopAll = (milliseconds) => Promise.all([...living].map((child) => stop(child, milliseconds)));

function signalGroup(pid, signal) {
  try {
    process.kill(-pid, signal);
  } catch {
    // it has ended
  }
}

/** Something about a process that another process with the same id would not share: when it began. */
export function beganAt(pid) {
  try {
    const text = readFileSync(`/proc/${pid}/stat`, "utf8");
    const fields = text.slice(text.lastIndexOf(")") + 2).split(" ");
    return fields[0] === "Z" ? null : (fields[19] ?? null);
  } catch {
    return null;
  }
}

/** Waits for processes that an earlier, killed start left behind; ends those that stay. */
export async function endLeftovers(remembered) {
  const alive = () => remembered.filter(({ pid, began }) => began !== null && beganAt(pid) === began);
  const left = alive();
  for (const { pid } of left) signalGroup(pid, "SIGTERM");
  for (let turn = 0; turn < 100 && alive().length > 0; turn += 1) await sleep(100);
  for (const { pid } of alive()) signalGroup(pid, "SIGKILL");
  for (let turn = 0; turn < 30 && alive().length > 0; turn += 1) await sleep(100);
  return left.length;
}

/**
 * Keeps a process running: starts it again whenever it ends by itself.
 * A process that ends more than `patience` times within a minute is given up.
 * @param {import("node:child_process").ChildProcess} first already running
 * @param {() => import("node:child_process").ChildProcess} begin starts it again
 * @param {{name: string, log?: string, changed: () => void, giveUp: (fault: Fault) => void, patience?: number}} options
 */
export function supervise(first, begin, { name, log, changed, giveUp, patience = 5 }) {
  const ends = [];
  const keeper = { child: first, stopping: false, name };
  const watch = async () => {
    const { code, signal, error } = await keeper.child.ended;
    if (keeper.stopping) return;
    const now = Date.now();
    ends.push(now);
    const recent = ends.filter((time) => now - time < 60_000).length;
    if (recent > patience) {
      const where = log === undefined ? "" : `; the reason is at the end of ${log}`;
      return giveUp(
        new Fault(`${name} keeps ending (${error?.message ?? signal ?? `status ${code}`})${where}.`),
      );
    }
    console.log(`  ${name} ended by itself (${signal ?? `status ${code}`}); starting it again.`);
    if (recent > 1) await sleep(500 * recent);
    if (keeper.stopping) return;
    keeper.child = begin();
    changed();
    void watch();
  };
  void watch();
  return keeper;
}

/** Ends a supervised process for good. */
export function retire(keeper, milliseconds) {
  keeper.stopping = true;
  return stop(keeper.child, milliseconds);
}

/** Writes a file whole or not at all, readable by its owner only. */
export function writePrivately(file, text) {
  writeFileSync(`${file}.new`, text, { mode: 0o600 });
  renameSync(`${file}.new`, file);
}

function openLog(file) {
  mkdirSync(path.dirname(file), { recursive: true });
  if (sizeOf(file) > 10_000_000) renameSync(file, `${file}.1`);
  return openSync(file, "a", 0o600);
}

const sizeOf = (file) => {
  try {
    return statSync(file).size;
  } catch {
    return 0;
  }
};

/** The last lines of a log, from a byte on. */
export function lastLines(file, from = 0, count = 15) {
  try {
    return readFileSync(file).subarray(from).toString("utf8").trimEnd().split("\n").slice(-count).join("\n");
  } catch {
    return "";
  }
}
