import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { isFree, lock, openFolder, privatePort, remember } from "./folder.mjs";
import { requireBuild, requirePackages } from "./packages.mjs";
import { lastLines, retire, run, stopAll } from "./processes.mjs";
import { startProduct } from "./product.mjs";
import { explain, Fault, step } from "./report.mjs";
import { requireSpace, requireTools } from "./requirements.mjs";
import { endWithParent } from "./signals.mjs";
import { startTestServers } from "./test-servers.mjs";

const ROOT = path.resolve(import.meta.dirname, "../..");
/** Apart from a product that runs from the same clone. */
const DIST_DIR = ".test/next";
const TSCONFIG = ".test/tsconfig.json";

const counts = { passed: 0, failed: 0 };
let ending = null;
let closeServers = async () => {};

/** Runs every test of the repository. Exits with 0 only when all passed. */
export async function main() {
  const end = (code) =>
    (ending ??= (async () => {
      await Promise.all([closeServers(), stopAll(3_000)]);
      console.log(`tests: ${counts.passed} passed, ${counts.failed} failed`);
      process.exit(code);
    })());
  const cutOff = (why) => {
    if (ending !== null) return;
    console.error(`\n${why}`);
    counts.failed += 1;
    void end(1);
  };
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"])
    process.on(signal, () => cutOff(`Cut off by ${signal}.`));
  endWithParent(() => end(1));
  const fail = (error) => {
    if (ending !== null) return;
    const cause = explain(error, ROOT);
    cutOff(cause instanceof Fault ? cause.message : (cause?.stack ?? cause));
  };
  process.on("uncaughtException", fail);
  process.on("unhandledRejection", fail);
  try {
    const folder = openFolder(ROOT, ".test");
    await lock(folder, "npm test");
    await runAll(folder);
    await end(counts.failed === 0 ? 0 : 1);
  } catch (error) {
    fail(error);
  }
}

async function runAll(folder) {
  console.log("Testing Surdmark");
  requireSpace(ROOT, existsSync(path.join(ROOT, "node_modules")) ? 800 : 2_500);
  await step("Programs", () => requireTools(["mariadb", "redis", "chromium"], folder.log("apt")));
  await step("Packages", () => requirePackages(ROOT, folder.log("npm")));
  for (const stale of ["servers", "product", "reports", "tmp"])
    rmSync(folder.file(stale), { recursive: true, force: true });
  for (const fresh of ["reports", "tmp"]) mkdirSync(folder.file(fresh), { mode: 0o700 });
  for (const log of readdirSync(folder.file("logs")))
    rmSync(folder.log(log.replace(/\.log$/, "")), { force: true });
  writeTsconfig();

  let servers = null;
  await step("Data", async () => {
    servers = await startTestServers(folder.at, ROOT);
    closeServers = servers.stop;
    remember(folder, null, servers.keepers);
    return `MariaDB ${servers.server.port}, Redis ${servers.bell.port}`;
  });
  const env = {
    ...process.env,
    CI: "1",
    NO_COLOR: "1",
    TMPDIR: folder.file("tmp"),
    TEST_DATABASE_URL: servers.databaseUrl,
    TEST_REDIS_URL: servers.redisUrl,
    NEXT_DIST_DIR: DIST_DIR,
    NEXT_TSCONFIG: TSCONFIG,
    NEXT_TELEMETRY_DISABLED: "1",
  };
  delete env.FORCE_COLOR;
  const stage = makeStage(folder, env);

  // Two tracks for two processors; browsers come alone at the end, since people notice time.
  const checks = async () => {
    await stage.tool("Types", [
      ["next/dist/bin/next", "typegen"],
      ["typescript/bin/tsc", "--noEmit", "-p", TSCONFIG],
    ]);
    await stage.tool("Lint", [
      ["eslint/bin/eslint.js", ".", "--max-warnings=0"],
      ["prettier/bin/prettier.cjs", "--check", "--log-level=warn", "."],
    ]);
    return stage.check("Build", (log) =>
      requireBuild(ROOT, DIST_DIR, { ...env, NODE_ENV: "production", SKIP_TYPES: "1" }, log),
    );
  };
  const suites = async () => {
    await stage.vitest("unit");
    await stage.vitest("integration");
    await stage.vitest("start");
  };
  const [built] = await Promise.all([checks(), suites()]);
  if (built) await stage.browser(servers);
}

/** The stages by kind: each prints a line, adds to the counts, and shows the output of what failed. */
function makeStage(folder, env) {
  const node = (args, log, extra = {}) =>
    run(process.execPath, args, { cwd: ROOT, env: { ...env, ...extra }, log });

  async function line(name, log, work) {
    let outcome = { passed: 0, failed: 1 };
    await step(name, async () => {
      outcome = await work();
      if (ending !== null) return new Promise(() => {}); // cut off: it is neither passed nor failed
      counts.passed += outcome.passed;
      counts.failed += outcome.failed;
      const skipped = outcome.skipped ? `, ${outcome.skipped} skipped` : "";
      return `${outcome.says ? `${outcome.says}: ` : ""}${outcome.passed} passed, ${outcome.failed} failed${skipped}`;
    });
    if (outcome.failed > 0 && ending === null) console.log(`${indent(lastLines(log, 0, 250))}\n`);
    return outcome.failed === 0;
  }

  /** One test: it passes when nothing is thrown. */
  const check = (name, work) => {
    const log = folder.log(name.toLowerCase());
    return line(name, log, async () => {
      try {
        return { passed: 1, failed: 0, says: await work(log) };
      } catch (error) {
        if (error instanceof Fault === false && !/ended with/.test(error.message)) throw error;
        return { passed: 0, failed: 1 };
      }
    });
  };

  /** Programs out of node_modules, one after the other; together one test. */
  const tool = (name, commands) =>
    check(name, async (log) => {
      for (const [program, ...args] of commands)
        await node([path.join("node_modules", program), ...args], log);
    });

  /** Runs a test runner and counts from its report, never from what it prints. */
  const runner = (name, args, count, extra) => {
    const log = folder.log(name.toLowerCase());
    const report = folder.file("reports", `${name.toLowerCase()}.json`);
    return line(name, log, async () => {
      const clean = await node(args(report), log, extra?.(report)).then(
        () => true,
        () => false,
      );
      const outcome = existsSync(report)
        ? count(JSON.parse(readFileSync(report, "utf8")))
        : { passed: 0, failed: 0 };
      if (!clean && outcome.failed === 0) outcome.failed = 1;
      return outcome;
    });
  };

  const vitest = (project) =>
    runner(
      project[0].toUpperCase() + project.slice(1),
      (report) => [
        "node_modules/vitest/vitest.mjs",
        "run",
        `--project=${project}`,
        "--reporter=default",
        "--reporter=json",
        `--outputFile.json=${report}`,
      ],
      countVitest,
    );

  /** The product as people meet it, built and seeded, with a browser in front of it. */
  async function browser(servers) {
    let product = null;
    const set = await check("Product", async (log) => {
      product = await startProduct(
        folder,
        ROOT,
        servers,
        { ...env, PORT: String(await freePort(folder)) },
        log,
      );
      return "seeded and healthy";
    });
    try {
      if (set)
        await runner(
          "Browser",
          () => ["node_modules/@playwright/test/cli.js", "test", "--pass-with-no-tests"],
          countPlaywright,
          (report) => ({
            ...product.env,
            PLAYWRIGHT_JSON_OUTPUT_FILE: report,
            BASE_URL: product.env.APP_URL,
          }),
        );
    } finally {
      await Promise.all((product?.keepers ?? []).map((keeper) => retire(keeper, 5_000)));
    }
  }

  return { tool, check, vitest, browser };
}

async function freePort(folder) {
  const port = await privatePort(folder, "web");
  if (await isFree(port)) return port;
  throw new Fault(`Port ${port} was taken while the tests ran: run them again.`);
}

function countVitest({ numPassedTests, numFailedTests, numPendingTests, testResults }) {
  // A file that could not be loaded has no tests to count; it is a failure all the same.
  const unloaded = testResults.filter(
    ({ status, assertionResults }) => status === "failed" && assertionResults.length === 0,
  );
  return { passed: numPassedTests, failed: numFailedTests + unloaded.length, skipped: numPendingTests };
}

const countPlaywright = ({ stats, errors }) => ({
  passed: stats.expected,
  failed: stats.unexpected + stats.flaky + (errors?.length ?? 0),
  skipped: stats.skipped,
});

const indent = (text) => text.replace(/^/gm, "    ");

/** The repository's TypeScript settings with the route types of the tests' own build. */
function writeTsconfig() {
  const settings = {
    extends: "../tsconfig.json",
    compilerOptions: { incremental: true, tsBuildInfoFile: "./tsc.tsbuildinfo" },
    include: ["../next-env.d.ts", "../**/*.ts", "../**/*.tsx", "../**/*.mts", "./next/types/**/*.ts"],
    exclude: ["../node_modules", "../.local", "../.next", "./servers", "./product", "./tmp"],
  };
  writeFileSync(path.join(ROOT, TSCONFIG), `${JSON.stringify(settings, null, 2)}\n`);
}
