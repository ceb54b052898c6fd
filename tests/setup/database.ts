import { randomBytes } from "node:crypto";
import { createConnection, type Connection } from "mariadb";

/** A database made from all migrations, for one test or one test file. */
export type FreshDatabase = {
  /** mariadb://… of a user with the product's rights: rows, not tables. */
  url: string;
  /** mariadb://… of the server's administrator, for tests that tamper with what the product may not. */
  ownerUrl: string;
  drop: () => Promise<void>;
};

/**
 * Copies the migrated template: its tables, triggers and the list of migrations, in about a tenth of a second.
 * Integration test files need not call this: tests/setup/integration.ts gives each of them one.
 */
export async function freshDatabase(): Promise<FreshDatabase> {
  const template = new URL(process.env.TEST_DATABASE_URL ?? "");
  const name = `surdmark_test_${randomBytes(6).toString("hex")}`;
  const connection = await administrator(template);
  try {
    await copyDatabase(connection, template.pathname.slice(1), name);
    await connection.query(`grant select, insert, update, delete on \`${name}\`.* to surdmark@'127.0.0.1'`);
  } finally {
    await connection.end();
  }
  const withName = (user?: { name: string; password: string }) => {
    const url = new URL(template);
    url.pathname = `/${name}`;
    if (user) [url.username, url.password] = [user.name, user.password];
    return url.href;
  };
  return {
    url: withName({ name: "surdmark", password: "tests" }),
    ownerUrl: withName(),
    drop: async () => {
      const again = await administrator(template);
      await again.query(`drop database if exists \`${name}\``);
      await again.end();
    },
  };
}

const administrator = (url: URL): Promise<Connection> =>
  createConnection({
    host: url.hostname,
    port: Number(url.port),
    user: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    multipleStatements: true,
  });

async function copyDatabase(connection: Connection, from: string, to: string): Promise<void> {
  const tables: string[] = (
    await connection.query<{ name: string }[]>(
      "select table_name name from information_schema.tables where table_schema = ? and table_type = 'BASE TABLE'",
      [from],
    )
  ).map(({ name }) => name);
  await connection.query(`create database \`${to}\` character set utf8mb4 collate utf8mb4_unicode_ci`);
  const statements = [`use \`${to}\``, "set foreign_key_checks = 0"];
  for (const table of tables) {
    const [row] = await connection.query<Record<string, string>[]>(
      `show create table \`${from}\`.\`${table}\``,
    );
    statements.push(row?.["Create Table"] ?? "");
  }
  if (tables.includes("migrations"))
    statements.push(`insert into \`migrations\` select * from \`${from}\`.\`migrations\``);
  const triggers = await connection.query<{ name: string }[]>(
    "select trigger_name name from information_schema.triggers where trigger_schema = ?",
    [from],
  );
  for (const { name } of triggers) {
    const [row] = await connection.query<Record<string, string>[]>(
      `show create trigger \`${from}\`.\`${name}\``,
    );
    statements.push(row?.["SQL Original Statement"] ?? "");
  }
  for (const statement of statements) await connection.query(statement);
}
