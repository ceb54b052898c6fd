import { createHash, randomBytes } from "node:crypto";
import { chmodSync, mkdirSync, readFileSync, rmSync } from "node:fs";
import net from "node:net";
import os from "node:os";
import path from "node:path";
import { beganAt, endLeftovers, writePrivately } from "./processes.mjs";
import { Fault } from "./report.mjs";

/**
 * The git-ignored folder that holds everything a start keeps: servers' data, secrets, chosen ports, logs, mail.
 * @param {string} root the clone
 * @param {string} name ".local" for the product, ".test" for the tests, or any full path
 */
export function openFolder(root, name) {
  const at = path.resolve(root, name);
  mkdirSync(path.join(at, "logs"), { recursive: true, mode: 0o700 });
  chmodSync(at, 0o700);
  return {
    root,
    at,
    file: (...parts) => path.join(at, ...parts),
    log: (process) => path.join(at, "logs", `${process}.log`),
    read: (file) => readJson(path.join(at, file)),
    write: (file, value) => writePrivately(path.join(at, file), `${JSON.stringify(value, null, 2)}\n`),
    remove: (file) => rmSync(path.join(at, file), { force: true }),
  };
}

function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch {
    return null; // not written yet, or cut off by a crash: whoever asks makes it anew
  }
}

/** Passwords made once and kept, so that the data they protect stays within reach. */
export function secrets(folder) {
  const known = folder.read("secrets.json") ?? {};
  const make = () => randomBytes(36).toString("base64url");
  const all = { database: make(), databaseOwner: make(), redis: make(), session: make(), ...known };
  if (Object.keys(known).length < Object.keys(all).length) folder.write("secrets.json", all);
  return all;
}

/**
 * Makes sure that this is the only start in its folder, and ends what a killed one left running.
 * The lock is a socket name that the kernel gives up with its process, so that it can never be stale.
 */
export async function lock(folder, what) {
  const name = `surdmark-${createHash("sha256").update(folder.at).digest("hex").slice(0, 32)}`;
  const server = net.createServer((socket) => socket.destroy());
  const address = process.platform === "linux" ? `\0${name}` : path.join(os.tmpdir(), `${name}.sock`);
  const taken = await new Promise((resolve, reject) => {
    server.once("error", (error) => (error.code === "EADDRINUSE" ? resolve(true) : reject(error)));
    server.listen(address, () => resolve(false));
  });
  const running = folder.read("running.json");
  if (taken) {
    const where = running?.address ? ` at ${running.address}` : "";
    const which = running?.pid ? ` (process ${running.pid})` : "";
    throw new Fault(
      `${what} already runs from this clone${where}${which}: use it, or stop it and start again.`,
    );
  }
  server.unref();
  return endLeftovers(running?.processes ?? []);
}

/** Notes what runs, for the next start to find should this one be killed. */
export function remember(folder, address, children) {
  const processes = children.map(({ name, child }) => ({ name, pid: child.pid, began: beganAt(child.pid) }));
  folder.write("running.json", { pid: process.pid, address, processes });
}

/** Whether nothing listens on a port of this machine, on any of its usual addresses. */
export async function isFree(port) {
  for (const host of ["127.0.0.1", "::1", "::"]) {
    const code = await new Promise((resolve) => {
      const server = net.createServer();
      server.once("error", (error) => resolve(error.code));
      server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(null)));
    });
    if (code === "EADDRINUSE" || code === "EACCES") return false;
  }
  return true;
}

/** The port remembered under a name, or another free one when somebody else has taken it meanwhile. */
export async function privatePort(folder, name) {
  const ports = folder.read("ports.json") ?? {};
  if (ports[name] !== undefined && (await isFree(ports[name]))) return ports[name];
  const port = await anyPort();
  folder.write("ports.json", { ...(folder.read("ports.json") ?? {}), [name]: port });
  return port;
}

function anyPort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}
