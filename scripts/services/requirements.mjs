import { existsSync, readdirSync, statfsSync } from "node:fs";
import { find } from "./find.mjs";
import { Fault } from "./report.mjs";
import { run } from "./processes.mjs";

/** What is looked for, and the Debian packages that bring it. The server-core package starts no system service. */
const TOOLS = {
  mariadb: {
    names: ["mariadbd", "mariadb-install-db", "mariadb"],
    packages: ["mariadb-server-core", "mariadb-client-core"],
    says: "MariaDB",
    variable: "DATABASE_URL",
  },
  redis: { names: ["redis-server"], packages: ["redis-server"], says: "Redis", variable: "REDIS_URL" },
  chromium: { names: ["chromium"], packages: ["chromium"], says: "Chromium", variable: null },
};

const list = (words) =>
  words.length < 3 ? words.join(" and ") : `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;

/**
 * Decides what to do about programs that are missing.
 * @param {string[]} wanted keys of TOOLS
 * @param {(name: string) => string | null} where finds a program
 * @param {boolean} mayInstall root, and apt-get is there
 * @returns the Debian packages to install, [] when nothing is missing
 * @throws Fault with the sentence for a person who has to install them
 */
export function packagesToInstall(wanted, where, mayInstall) {
  const missing = wanted
    .map((tool) => TOOLS[tool])
    .filter(({ names }) => names.some((name) => where(name) === null));
  const packages = missing.flatMap((tool) => tool.packages);
  if (packages.length === 0 || mayInstall) return packages;
  const variables = missing.flatMap(({ variable }) => variable ?? []);
  const orElse =
    variables.length > 0
      ? `, or set ${list(variables)} to ${variables.length > 1 ? "servers" : "a server"} of your own`
      : "";
  throw new Fault(
    `${list(missing.map(({ says }) => says))} cannot be found on this machine: install with ` +
      `"sudo apt-get install ${packages.join(" ")}"${orElse}, and start again.`,
  );
}

/** Finds the wanted programs, installing from Debian what is missing where that is possible. */
export async function requireTools(wanted, log) {
  const root = process.getuid?.() === 0;
  const packages = packagesToInstall(wanted, find, root && find("apt-get") !== null);
  if (packages.length === 0) return "present";
  const options = {
    log,
    env: { ...process.env, DEBIAN_FRONTEND: "noninteractive", APT_LISTCHANGES_FRONTEND: "none" },
  };
  const apt = (...args) => run("apt-get", ["-qq", "-o", "DPkg::Lock::Timeout=300", ...args], options);
  const install = () => apt("install", "-y", "--no-install-recommends", ...packages);
  const lists = "/var/lib/apt/lists";
  const known =
    existsSync(lists) &&
    readdirSync(lists).some((name) => name.endsWith("Packages") || name.endsWith(".lz4"));
  try {
    if (!known) await apt("update");
    await install().catch(async (error) => {
      if (!known) throw error;
      await apt("update"); // the lists were older than the archive
      await install();
    });
  } catch (error) {
    throw new Fault(
      `Debian's ${list(packages)} could not be installed (the output is in ${log}): install with ` +
        `"apt-get install ${packages.join(" ")}" and start again.\n${error.message}`,
    );
  }
  packagesToInstall(wanted, find, false);
  return `installed ${list(packages)}`;
}

/** Refuses to begin what the disk cannot hold. */
export function requireSpace(folder, megabytes, available = freeMegabytes(folder)) {
  if (available >= megabytes) return;
  throw new Fault(
    `The disk that holds ${folder} is almost full (${available} MB free, ${megabytes} MB needed): free some space and start again.`,
  );
}

function freeMegabytes(folder) {
  const { bavail, bsize } = statfsSync(folder);
  return Math.floor((bavail * bsize) / 1_048_576);
}
