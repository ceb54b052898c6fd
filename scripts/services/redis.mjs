import { mkdirSync, renameSync } from "node:fs";
import net from "node:net";
import { setTimeout as sleep } from "node:timers/promises";
import { find } from "./find.mjs";
import { privatePort } from "./folder.mjs";
import { start, writePrivately } from "./processes.mjs";
import { Fault } from "./report.mjs";

/**
 * A Redis server of our own in `folder`, on a loopback port of its own, with an append-only file.
 * It holds nothing that the database does not know, so damaged data are put aside and the server begins anew.
 */
export async function redis(folder, password) {
  const data = folder.file("redis");
  const log = folder.log("redis");
  const port = await privatePort(folder, "redis");
  const config = folder.file("redis.conf");

  const begin = () => {
    mkdirSync(data, { recursive: true, mode: 0o700 });
    // In a file, not on the command line, where every user of the machine could read the password.
    writePrivately(
      config,
      [
        `port ${port}`,
        "bind 127.0.0.1",
        `dir ${JSON.stringify(data)}`,
        `requirepass ${password}`,
        "databases 64",
        "appendonly yes",
        "appendfsync everysec",
        "maxmemory-policy noeviction",
        "save 300 1",
        "daemonize no",
        "",
      ].join("\n"),
    );
    return start(find("redis-server"), [config], { log });
  };

  /** Waits until it answers. */
  async function ready(child) {
    let dead = false;
    void child.ended.then(() => (dead = true));
    for (let turn = 0; turn < 300 && !dead; turn += 1) {
      if (await answers(port, password)) return;
      await sleep(30);
    }
    throw new Fault(`Redis does not start (its reasons are at the end of ${log}).`);
  }

  return {
    name: "Redis",
    port,
    log,
    begin,
    url: `redis://:${password}@127.0.0.1:${port}/0`,
    ready,
    /** Puts the data aside, so that the next start has none; gives their new place. */
    putAside: () => {
      const aside = `${data}.damaged-${Date.now()}`;
      renameSync(data, aside);
      return aside;
    },
  };
}

/** Whether a Redis with this password answers on the port. */
function answers(port, password) {
  return new Promise((resolve) => {
    const socket = net.connect(port, "127.0.0.1");
    const end = (result) => {
      socket.destroy();
      resolve(result);
    };
    socket.setTimeout(1_000, () => end(false));
    socket.on("error", () => end(false));
    socket.on("connect", () => socket.write(`AUTH ${password}\r\nPING\r\n`));
    let text = "";
    socket.on("data", (data) => {
      text += data;
      if (text.includes("+PONG")) end(true);
      else if (text.startsWith("-")) end(false);
    });
  });
}
