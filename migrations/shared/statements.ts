import type { QueryInterface } from "sequelize";

export type Migration = { context: QueryInterface };

/** Carries out constant statements one after the other. */
export async function statements(context: QueryInterface, list: readonly string[]): Promise<void> {
  for (const statement of list) await context.sequelize.query(statement, { type: "RAW" });
}

/** Drops tables in the order given. */
export async function dropTables(context: QueryInterface, names: readonly string[]): Promise<void> {
  await statements(
    context,
    names.map((name) => `DROP TABLE IF EXISTS ${name}`),
  );
}
