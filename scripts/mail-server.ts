import { randomBytes } from "node:crypto";
import { mkdir, readdir, rename, rm, writeFile } from "node:fs/promises";
import path from "node:path";
import { buffer } from "node:stream/consumers";
import { SMTPServer } from "smtp-server";
import { env } from "@/lib/env";
import { log } from "@/lib/log";

/** Older mails make room for newer ones, so that a demo left running cannot fill the disk. */
const KEEP = 1_000;
const LARGEST = 10 * 1024 * 1024;

const folder = env.MAIL_FOLDER ?? path.join(env.LOCAL_FOLDER, "mail");
const { hostname, port } = new URL(env.SMTP_URL);

/** Keeps one message as a file whose name sorts by arrival; it is whole or not there. */
async function keep(message: Buffer): Promise<void> {
  const name = `${new Date().toISOString().replaceAll(":", "-")}-${randomBytes(4).toString("hex")}.eml`;
  await writeFile(path.join(folder, `${name}.part`), message, { mode: 0o600 });
  await rename(path.join(folder, `${name}.part`), path.join(folder, name));
  const kept = (await readdir(folder)).filter((file) => file.endsWith(".eml")).sort();
  for (const old of kept.slice(0, -KEEP)) await rm(path.join(folder, old), { force: true });
}

const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ["AUTH", "STARTTLS"],
  disableReverseLookup: true,
  size: LARGEST,
  onData(stream, _session, callback) {
    buffer(stream)
      .then(async (message) => {
        if (stream.sizeExceeded) throw Object.assign(new Error("Message too large"), { responseCode: 552 });
        await keep(message);
      })
      .then(
        () => callback(),
        (error: unknown) => {
          log.error({ error }, "a mail was not kept");
          callback(error instanceof Error ? error : new Error("not kept"));
        },
      );
  },
});

server.on("error", (error) => {
  log.error({ error }, "the mail server failed");
  process.exit(1);
});
await mkdir(folder, { recursive: true, mode: 0o700 });
server.listen(Number(port), hostname, () => log.info({ folder }, "the mail server listens"));
for (const signal of ["SIGTERM", "SIGINT"] as const)
  process.on(signal, () => server.close(() => process.exit(0)));
