import { randomBytes } from "node:crypto";
import { createConnection, type Connection } from "mariadb";
import { afterAll, beforeAll, expect, it } from "vitest";
import * as models from "@/models";
import { migrate } from "@/scripts/migrate";

const template = new URL(process.env.TEST_DATABASE_URL ?? "");
const name = `surdmark_migrate_${randomBytes(5).toString("hex")}`;
const url = Object.assign(new URL(template), { pathname: `/${name}` }).href;
let connection: Connection;

beforeAll(async () => {
  connection = await createConnection({
    host: template.hostname,
    port: Number(template.port),
    user: decodeURIComponent(template.username),
    password: decodeURIComponent(template.password),
  });
  await connection.query(`create database \`${name}\` character set utf8mb4`);
});
afterAll(async () => {
  await connection.query(`drop database \`${name}\``);
  await connection.end();
  await models.sequelize.close();
});

/** Every column, key, check and trigger, as text. */
async function shape(): Promise<string> {
  const queries = [
    "select table_name, column_name, column_type, is_nullable, collation_name from information_schema.columns where table_schema = ? order by 1, 2",
    "select table_name, index_name, seq_in_index, column_name, non_unique from information_schema.statistics where table_schema = ? order by 1, 2, 3",
    "select table_name, constraint_name, check_clause from information_schema.check_constraints where constraint_schema = ? order by 1, 2",
    "select trigger_name, event_manipulation, action_statement from information_schema.triggers where trigger_schema = ? order by 1",
  ];
  const rows = [];
  for (const query of queries) rows.push(await connection.query<object[]>(query, [name]));
  return JSON.stringify(rows, (_key, value: unknown) => (typeof value === "bigint" ? String(value) : value));
}

it("go up, all the way down, and up again to the same tables", async () => {
  const up = await migrate("up", url);
  expect(up.length).toBeGreaterThan(0);
  const before = await shape();
  expect(await migrate("up", url)).toEqual([]);
  expect(await migrate("down", url)).toEqual([...up].reverse());
  const left = await connection.query<{ name: string }[]>(
    "select table_name name from information_schema.tables where table_schema = ?",
    [name],
  );
  expect(left.map((row) => row.name)).toEqual(["migrations"]);
  expect(await migrate("status", url)).toEqual(up);
  await migrate("up", url);
  expect(await shape()).toBe(before);
});

it("run once when two processes start at the same moment", async () => {
  await migrate("down", url);
  const [one, two] = await Promise.all([migrate("up", url), migrate("up", url)]);
  expect([one.length === 0, two.length === 0].sort()).toEqual([false, true]);
});

it("have a column for every attribute of every model", async () => {
  await migrate("up", url);
  const rows = await connection.query<{ name: string }[]>(
    "select concat(table_name, '.', column_name) name from information_schema.columns where table_schema = ?",
    [name],
  );
  const there = new Set(rows.map((row) => row.name));
  for (const model of Object.values(models.sequelize.models))
    for (const attribute of Object.values(model.getAttributes()))
      expect(there).toContain(`${String(model.getTableName())}.${String(attribute.field)}`);
});
