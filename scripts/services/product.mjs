import { existsSync, mkdirSync } from "node:fs";
import path from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { openFolder, privatePort } from "./folder.mjs";
import { run, start, supervise } from "./processes.mjs";
import { Fault } from "./report.mjs";
import { processEnvironment } from "./settings.mjs";

const TSX = ["--import", "tsx"];

/** Runs one of the repository's TypeScript programs to its end. */
export const runScript = (root, name, args, { env, log }) =>
  run(process.execPath, [...TSX, path.join(root, "scripts", name), ...args], { cwd: root, env, log });

/** The commands of the product's own processes, each with the file its output goes to. */
export function productProcesses(root, folder, env, { dev = false, showLogs = false, mail = true } = {}) {
  const logOf = (name) => (showLogs || dev ? undefined : folder.log(name));
  const host = env.LISTEN_HOST ? ["-H", env.LISTEN_HOST] : [];
  const next = [
    path.join(root, "node_modules/next/dist/bin/next"),
    dev ? "dev" : "start",
    "-p",
    env.PORT,
    ...host,
  ];
  const worker = dev
    ? [path.join(root, "node_modules/tsx/dist/cli.mjs"), "watch", "--clear-screen=false", "workers/index.ts"]
    : [...TSX, "workers/index.ts"];
  const all = [
    {
      name: "The mail server",
      key: "mail",
      args: [...TSX, "scripts/mail-server.ts"],
      log: folder.log("mail"),
      on: mail,
    },
    { name: "The web server", key: "web", args: next, log: logOf("web"), on: true },
    {
      name: "The worker",
      key: "worker",
      args: worker,
      log: logOf("worker"),
      on: existsSync(path.join(root, "workers/index.ts")),
    },
  ];
  return all
    .filter(({ on }) => on)
    .map(({ name, key, args, log }) => ({
      name,
      log,
      begin: () => start(process.execPath, args, { cwd: root, env: { ...env, SURDMARK_PROCESS: key }, log }),
    }));
}

/** Waits until web, database, Redis and worker all answer. @throws Fault saying which did not */
export async function untilHealthy(env, { withWorker, seconds, folder, given = () => false }) {
  const everywhere = !env.LISTEN_HOST || /^(0\.0\.0\.0|::)$/.test(env.LISTEN_HOST);
  const host = everywhere
    ? "127.0.0.1"
    : env.LISTEN_HOST.includes(":")
      ? `[${env.LISTEN_HOST}]`
      : env.LISTEN_HOST;
  const until = Date.now() + seconds * 1000;
  let last = "no answer";
  while (Date.now() < until && !given()) {
    try {
      const answer = await fetch(`http://${host}:${env.PORT}/api/health`, {
        signal: AbortSignal.timeout(5_000),
      });
      const body = await answer.json();
      if (answer.ok && (!withWorker || body.worker?.ok)) return;
      last = [body.database, body.redis, body.worker].flatMap((part) => part?.reason ?? []).join("; ");
    } catch (error) {
      last = error.cause?.code ?? error.message;
    }
    await sleep(100);
  }
  if (given()) return;
  throw new Fault(
    `The product did not become healthy within ${seconds} seconds (${last}): see the ends of ${folder.log("web")} and ${folder.log("worker")}.`,
  );
}

/** The built product on the tests' own servers, migrated and seeded, for the browser tests. */
export async function startProduct(testFolder, root, { server, bell }, base, log) {
  const folder = openFolder(testFolder.at, "product");
  const passwords = { database: "tests", databaseOwner: "tests-owner" };
  const mail = folder.file("mail");
  mkdirSync(mail, { mode: 0o700 });
  await server.prepare(passwords);
  const env = processEnvironment(
    {
      ...withoutOurs(base),
      CHECK_LIMIT_PER_MINUTE: "1000",
      SIGN_IN_LIMIT_PER_MINUTE: "1000",
      DIGEST_DELAY_SECONDS: "2",
    },
    {
      dev: false,
      demo: true,
      port: base.PORT,
      own: {
        DATABASE_URL: server.url("surdmark", passwords.database),
        REDIS_URL: bell.url.replace(/\/0$/, "/60"),
        SMTP_URL: `smtp://127.0.0.1:${await privatePort(testFolder, "mail")}`,
        MAIL_FOLDER: mail,
        NEXTAUTH_SECRET: bell.url.slice(-30) + root.length + "pQ7-wK2_zX9vB4nM1",
        LOCAL_FOLDER: folder.at,
      },
    },
  );
  const owner = { ...env, DATABASE_URL: server.url("surdmark_owner", passwords.databaseOwner) };
  if (existsSync(path.join(root, "scripts/migrate.ts")))
    await runScript(root, "migrate.ts", ["up"], { env: owner, log });
  await server.grant();
  if (existsSync(path.join(root, "scripts/seed.ts"))) await runScript(root, "seed.ts", [], { env, log });
  const keepers = [];
  for (const { name, begin, log: output } of productProcesses(root, folder, env)) {
    const giveUp = (fault) => console.error(fault.message);
    keepers.push(supervise(begin(), begin, { name, log: output, changed: () => {}, giveUp }));
  }
  await untilHealthy(env, {
    withWorker: existsSync(path.join(root, "workers/index.ts")),
    seconds: 60,
    folder,
  });
  return { env, keepers };
}

/** Leaves out what a person's own environment says about servers: the tests bring their own. */
function withoutOurs(env) {
  const names = [
    "DATABASE_URL",
    "REDIS_URL",
    "SMTP_URL",
    "APP_URL",
    "NEXTAUTH_URL",
    "NEXTAUTH_SECRET",
    "MAIL_FOLDER",
  ];
  return Object.fromEntries(
    Object.entries(env).filter(
      ([name]) => ![...names, "LOCAL_FOLDER", "LISTEN_HOST", "SURDMARK_DEMO", "MAIL_FROM"].includes(name),
    ),
  );
}
