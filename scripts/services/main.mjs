import { existsSync, mkdirSync, readdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { isFree, lock, openFolder, privatePort, remember, secrets } from "./folder.mjs";
import { mariadb } from "./mariadb.mjs";
import { packagesMatch, requireBuild, requirePackages } from "./packages.mjs";
import { lastLines, retire, stopAll, supervise } from "./processes.mjs";
import { productProcesses, runScript, untilHealthy } from "./product.mjs";
import { redis } from "./redis.mjs";
import { explain, Fault, step } from "./report.mjs";
import { requireSpace, requireTools } from "./requirements.mjs";
import { isConfigured, isDemo, loadDotenv, portOf, processEnvironment } from "./settings.mjs";
import { endWithParent } from "./signals.mjs";

const ROOT = path.resolve(import.meta.dirname, "../..");

/** Everything that runs, in the order it was started. */
const keepers = [];
let ending = null;

/** Starts the whole product and keeps it running until a signal comes. */
export async function main({ dev, showLogs }) {
  loadDotenv(ROOT);
  const folder = openFolder(ROOT, process.env.LOCAL_FOLDER || ".local");
  const end = (code) => (ending ??= shutDown(folder, code));
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"])
    process.on(signal, () => {
      if (ending !== null) return void stopAll(0);
      console.log("\nStopping.");
      void end(0);
    });
  const fail = (error) => {
    if (ending !== null) return;
    const cause = explain(error, ROOT);
    console.error(`\n${cause instanceof Fault ? cause.message : (cause?.stack ?? cause)}`);
    void end(1);
  };
  process.on("uncaughtException", fail);
  process.on("unhandledRejection", fail);
  endWithParent(() => end(0));
  try {
    await startAll(folder, { dev, showLogs, fail });
  } catch (error) {
    fail(error);
  }
}

async function startAll(folder, { dev, showLogs, fail }) {
  const since = performance.now();
  const port = portOf(process.env);
  const demo = isDemo(process.env);
  const recovered = await lock(folder, "Surdmark");
  if (!(await isFree(port)))
    throw new Fault(
      `Port ${port} is taken by another program: stop that program, or choose another port with PORT=${port + 1} npm start.`,
    );
  console.log(dev ? "Starting Surdmark for development" : "Starting Surdmark");
  if (recovered > 0)
    console.log(
      `  An earlier start was cut off; ${recovered} of its processes were still running and have been ended.`,
    );

  const built = packagesMatch(ROOT) && existsSync(path.join(ROOT, ".next/BUILD_ID"));
  requireSpace(ROOT, built ? 200 : 1_500);
  const ownDatabase = !process.env.DATABASE_URL;
  const ownRedis = !process.env.REDIS_URL;
  const ownMail = !process.env.SMTP_URL && (demo || dev);
  const tools = [...(ownDatabase ? ["mariadb"] : []), ...(ownRedis ? ["redis"] : [])];
  if (tools.length > 0) await step("Servers", () => requireTools(tools, folder.log("apt")));
  await step("Packages", () => requirePackages(ROOT, folder.log("npm")));

  const secret = secrets(folder);
  const database = ownDatabase ? await mariadb(folder) : null;
  const bell = ownRedis ? await redis(folder, secret.redis) : null;
  const mailFolder = folder.file("mail");
  const env = processEnvironment(process.env, {
    dev,
    demo,
    port,
    own: {
      DATABASE_URL: database?.url("surdmark", secret.database),
      REDIS_URL: bell?.url,
      SMTP_URL: ownMail ? `smtp://127.0.0.1:${await privatePort(folder, "mail")}` : undefined,
      MAIL_FOLDER: ownMail ? mailFolder : undefined,
      NEXTAUTH_SECRET: secret.session,
      LOCAL_FOLDER: folder.at,
    },
  });
  const script = (name) => path.join(ROOT, "scripts", name);
  const runTool = (name, args, log, extra = {}) =>
    runScript(ROOT, name, args, { env: { ...env, ...extra }, log });

  if (isConfigured(process.env)) await step("Settings", () => checkSettings(runTool, folder.log("settings")));
  const changed = () => remember(folder, env.APP_URL, keepers);
  const keep = (name, child, begin, log) => {
    keepers.push(supervise(child, begin, { name, log, changed, giveUp: fail }));
    changed();
  };
  const open = async (service) => {
    const child = service.begin();
    child.service = service.name;
    try {
      await service.ready(child);
    } finally {
      if (ending === null && child.exitCode === null && child.signalCode === null)
        keep(service.name, child, service.begin, service.log);
    }
  };

  if (database || bell)
    await step("Data", async () => {
      const isNew = database?.isNew() ?? false;
      if (isNew) await database.create();
      let aside = null;
      const openBell = () =>
        open(bell).catch((error) => {
          if (!existsSync(folder.file("redis"))) throw error;
          aside = bell.putAside(); // the database knows all that was in it
          return open(bell);
        });
      const results = await Promise.allSettled([database && open(database), bell && openBell()]);
      const failed = results.find(({ status }) => status === "rejected");
      if (failed) throw failed.reason;
      if (database) await database.prepare(secret);
      const what = [database && `MariaDB ${database.port}`, bell && `Redis ${bell.port}`]
        .filter(Boolean)
        .join(", ");
      if (aside) return `${what}; damaged Redis data put aside`;
      return `${isNew ? "created, " : ""}${what}`;
    });

  if (!dev)
    await step("Build", () => requireBuild(ROOT, ".next", { ...env, SKIP_TYPES: "1" }, folder.log("build")));

  if (existsSync(script("migrate.ts")))
    await step("Tables", async () => {
      const current = database !== null && (await isMigrated(database));
      if (!current) {
        const owner = database ? { DATABASE_URL: database.url("surdmark_owner", secret.databaseOwner) } : {};
        await runTool("migrate.ts", ["up"], folder.log("migrate"), owner).catch((error) => {
          throw new Fault(
            `The tables could not be brought up to date (the whole output is in ${folder.log("migrate")}).\n${error.message}`,
          );
        });
      }
      if (database) await database.grant();
      return current ? "up to date" : "brought up to date";
    });

  if (ownMail) {
    mkdirSync(mailFolder, { recursive: true, mode: 0o700 });
    const mail = productProcesses(ROOT, folder, env).find(({ name }) => name === "The mail server");
    keep(mail.name, mail.begin(), mail.begin, mail.log);
  }

  const seeding = demo && existsSync(script("seed.ts"));
  const seeded = database?.mark("seeded");
  if (seeding && !(seeded && existsSync(seeded)))
    await step("Demo work", async () => {
      await runTool("seed.ts", [], folder.log("seed")).catch((error) => {
        throw new Fault(
          `The demo work could not be made (the whole output is in ${folder.log("seed")}).\n${error.message}`,
        );
      });
      if (seeded) writeFileSync(seeded, `${new Date().toISOString()}\n`);
      return "made";
    });

  await step("Web, worker", async () => {
    for (const { name, begin, log } of productProcesses(ROOT, folder, env, { dev, showLogs, mail: false }))
      keep(name, begin(), begin, log);
    const withWorker = existsSync(path.join(ROOT, "workers/index.ts"));
    await untilHealthy(env, { withWorker, seconds: dev ? 180 : 60, folder, given: () => ending !== null });
    return "healthy";
  });

  announce(folder, env, { demo, ownMail, mailFolder, dev, since });
  if (!demo && existsSync(script("first-administrator.ts"))) await runTool("first-administrator.ts", []);
}

/** Judges the whole environment at once, before anything waits for it. */
async function checkSettings(runTool, log) {
  await runTool("check-environment.ts", [], log).catch(() => {
    throw new Fault(
      `These settings are wrong; set them in the environment or in .env and start again:\n${lastLines(log)}`,
    );
  });
  return "sound";
}

/** Whether each migration file has been applied, asked without starting the program that applies them. */
async function isMigrated(database) {
  const files = readdirSync(path.join(ROOT, "migrations")).filter((name) => name.endsWith(".ts"));
  const applied = await database.applied();
  return files.every((name) => applied.has(name) || applied.has(name.replace(/\.ts$/, "")));
}

function announce(folder, env, { demo, ownMail, mailFolder, since }) {
  const lines = [
    `\nSurdmark is ready at ${env.APP_URL} (${((performance.now() - since) / 1000).toFixed(1)} s)\n`,
  ];
  const people = demo ? folder.read("demo.json") : null;
  if (Array.isArray(people) && people.length > 0) {
    const width = (key) => Math.max(...people.map((person) => String(person[key]).length));
    lines.push("  Sign in as");
    for (const { name, email, password, role } of people)
      lines.push(
        `    ${email.padEnd(width("email"))}  ${password.padEnd(width("password"))}  ${name}, ${role}`,
      );
    lines.push("");
  }
  if (ownMail)
    lines.push(
      `  Outgoing mail  ${env.APP_URL}/development/mail  (files in ${path.relative(ROOT, mailFolder)})`,
    );
  lines.push(`  Logs           ${path.relative(ROOT, folder.file("logs"))}`);
  if (demo && !process.env.LISTEN_HOST)
    lines.push(
      "  Network        other machines can reach it too; LISTEN_HOST=127.0.0.1 keeps it to this one",
    );
  lines.push("  Stop           Ctrl-C\n");
  console.log(lines.join("\n"));
}

/** Ends everything: first those that use the servers, then the servers. */
async function shutDown(folder, code) {
  for (const keeper of keepers) keeper.stopping = true;
  const servers = ["MariaDB", "Redis"];
  const isServer = ({ name }) => servers.includes(name);
  await Promise.all(keepers.filter((keeper) => !isServer(keeper)).map((keeper) => retire(keeper, 5_000)));
  await Promise.all(keepers.filter(isServer).map((keeper) => retire(keeper, 3_500)));
  await stopAll(1_000);
  if (keepers.length > 0) folder.remove("running.json");
  process.exit(code);
}
