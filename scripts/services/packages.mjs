import { createHash } from "node:crypto";
import { existsSync, readFileSync, readdirSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { find } from "./find.mjs";
import { run } from "./processes.mjs";
import { Fault } from "./report.mjs";

/**
 * Whether node_modules holds what package-lock.json names. npm writes node_modules/.package-lock.json when it has
 * finished, so a cut-off installation is never taken for a whole one.
 */
export function packagesMatch(root) {
  const wanted = lockedPackages(path.join(root, "package-lock.json"));
  const present = lockedPackages(path.join(root, "node_modules/.package-lock.json"));
  if (wanted === null || present === null) return false;
  return Object.entries(wanted).every(
    ([name, entry]) =>
      name === "" ||
      (present[name] === undefined
        ? entry.optional || entry.peer || entry.link
        : present[name].version === entry.version),
  );
}

function lockedPackages(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8")).packages ?? null;
  } catch {
    return null;
  }
}

/** Installs the locked packages, with those for building even when NODE_ENV says production. */
export async function requirePackages(root, log) {
  if (packagesMatch(root)) return "up to date";
  const again = existsSync(path.join(root, "node_modules"));
  const npm = process.env.npm_execpath;
  const [command, first] =
    npm && /\.c?js$/.test(npm) ? [process.execPath, [npm]] : [find("npm") ?? "npm", []];
  try {
    await run(command, [...first, "ci", "--include=dev", "--no-audit", "--no-fund"], { cwd: root, log });
  } catch (error) {
    throw new Fault(
      `The packages could not be installed (the whole output is in ${log}): see that the npm registry can be reached and start again.\n${error.message}`,
    );
  }
  return again ? "brought up to date" : "installed";
}

/** What a build is made from. tsconfig.json is left out: the build itself may rewrite it. */
const SOURCES = [
  "app",
  "components",
  "lib",
  "models",
  "public",
  "instrumentation.ts",
  "proxy.ts",
  "next.config.ts",
  "postcss.config.mjs",
  "package.json",
  "package-lock.json",
];

/** One hash over the names and contents of all sources. */
export function sourceHash(root) {
  const hash = createHash("sha256").update(process.version);
  const add = (name) => {
    const file = path.join(root, name);
    if (!existsSync(file)) return;
    if (statSync(file).isDirectory()) {
      for (const child of readdirSync(file).sort()) add(path.join(name, child));
      return;
    }
    hash.update(`\0${name}\0`).update(readFileSync(file));
  };
  SOURCES.forEach(add);
  return hash.digest("hex");
}

/** Builds when the sources differ from those of the last finished build. */
export async function requireBuild(root, distDir, env, log) {
  const mark = path.join(root, distDir, "built-from");
  const hash = sourceHash(root);
  const before = existsSync(mark) ? readFileSync(mark, "utf8") : null;
  if (before === hash && existsSync(path.join(root, distDir, "BUILD_ID"))) return "up to date";
  await build(root, env, log);
  writeFileSync(mark, hash);
  return before === null ? "built" : "built anew, the sources have changed";
}

async function build(root, env, log) {
  try {
    await run(process.execPath, [path.join(root, "node_modules/next/dist/bin/next"), "build"], {
      cwd: root,
      env,
      log,
    });
  } catch (error) {
    if (/ENOSPC|No space left/i.test(error.message)) throw Object.assign(error, { code: "ENOSPC" });
    throw new Fault(`The build failed (the whole output is in ${log}).\n${error.message}`);
  }
}
