import { readdirSync } from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { QueryTypes, Sequelize, type QueryInterface } from "sequelize";
import { SequelizeStorage, Umzug, type RunnableMigration } from "umzug";
import { env } from "@/lib/env";

const FOLDER = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../migrations");
const LOCK = "surdmark-migrations";

/** The migrations, oldest first, on the given connection. */
export function migrator(sequelize: Sequelize) {
  const names = readdirSync(FOLDER)
    .filter((name) => /^\d{4}-\d\d-\d\d-\d\d-.*\.ts$/.test(name))
    .sort();
  return new Umzug({
    migrations: names.map(named),
    context: sequelize.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize, tableName: "migrations" }),
    logger: undefined,
  });
}

type Steps = Record<"up" | "down", (migration: { context: QueryInterface }) => Promise<void>>;

/** A migration is loaded when it is carried out, and remembered by its name without the ending. */
function named(file: string): RunnableMigration<QueryInterface> {
  const load = () => import(path.join(FOLDER, file)) as Promise<Steps>;
  return {
    name: file.replace(/\.ts$/, ""),
    up: async ({ context }) => (await load()).up({ context }),
    down: async ({ context }) => (await load()).down({ context }),
  };
}

/** A pool of one connection: the lock belongs to a connection, and must be held by the one that migrates. */
const connectForMigrations = (url: string) =>
  new Sequelize(url, {
    dialect: "mariadb",
    logging: false,
    timezone: "+00:00",
    pool: { max: 1, min: 1, idle: 3_600_000 },
    dialectOptions: { supportBigNumbers: true, bigNumberStrings: true },
    define: { charset: "utf8mb4" },
  });

async function underLock<T>(sequelize: Sequelize, work: () => Promise<T>): Promise<T> {
  const [row] = await sequelize.query<{ got: number | string | null }>("SELECT GET_LOCK(:name, 60) AS got", {
    type: QueryTypes.SELECT,
    replacements: { name: LOCK },
  });
  if (Number(row?.got) !== 1)
    throw new Error("Another process has been migrating this database for a minute.");
  try {
    return await work();
  } finally {
    await sequelize.query("SELECT RELEASE_LOCK(:name) AS done", {
      type: QueryTypes.SELECT,
      replacements: { name: LOCK },
    });
  }
}

/**
 * Carries out what is missing, takes everything back, or says what is there.
 * @returns names of the migrations carried out; for "status", those still missing
 * @throws when another process holds the lock for a minute, or a statement fails
 */
export async function migrate(command: "up" | "down" | "status", url = env.DATABASE_URL): Promise<string[]> {
  const sequelize = connectForMigrations(url);
  try {
    return await underLock(sequelize, async () => {
      const umzug = migrator(sequelize);
      const done =
        command === "up"
          ? await umzug.up()
          : command === "down"
            ? await umzug.down({ to: 0 })
            : await umzug.pending();
      return done.map(({ name }) => name);
    });
  } finally {
    await sequelize.close();
  }
}

async function main() {
  const command = process.argv[2];
  if (command !== "up" && command !== "down" && command !== "status") {
    console.error("Usage: tsx scripts/migrate.ts up|down|status");
    process.exit(2);
  }
  const names = await migrate(command);
  const said = { up: "carried out", down: "taken back", status: "missing" }[command];
  console.log(names.length === 0 ? `migrations: nothing ${said}` : `migrations ${said}: ${names.join(", ")}`);
}

if (process.argv[1] === fileURLToPath(import.meta.url))
  main().catch((error: unknown) => {
    console.error(error instanceof Error ? error.message : error);
    process.exit(1);
  });
