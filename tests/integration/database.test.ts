import { createConnection } from "mariadb";
import { Redis } from "ioredis";
import { expect, it } from "vitest";
import { env } from "@/lib/env";
import { freshDatabase } from "../setup/database";

it("gives each test file a database and a Redis of its own", async () => {
  expect(env.DATABASE_URL).toMatch(/\/surdmark_test_[0-9a-f]{12}$/);
  const database = await createConnection(env.DATABASE_URL);
  expect(await database.query("select 1 one")).toMatchObject([{ one: 1 }]);
  await database.end();
  const redis = new Redis(env.REDIS_URL);
  expect(await redis.dbsize()).toBe(0);
  await redis.quit();
});

it("lets the product's user change rows, not tables", async () => {
  const fresh = await freshDatabase();
  const owner = await createConnection(fresh.ownerUrl);
  await owner.query("create table sample (id int primary key)");
  await owner.end();
  const product = await createConnection(fresh.url);
  await product.query("insert into sample values (1)");
  expect(await product.query("select id from sample")).toMatchObject([{ id: 1 }]);
  await expect(product.query("drop table sample")).rejects.toThrow(/denied/);
  await product.end();
  await fresh.drop();
});
