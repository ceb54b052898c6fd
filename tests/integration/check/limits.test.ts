import Redis from "ioredis";
import { afterAll, expect, it } from "vitest";
import { POST } from "@/app/api/v1/check/route";
import { env } from "@/lib/env";
import { closeLimits } from "@/lib/limits";

const redis = new Redis(env.REDIS_URL);
afterAll(async () => {
  await closeLimits();
  await redis.quit();
});

const check = (address: string) =>
  POST(
    new Request("http://localhost:3000/api/v1/check", {
      method: "POST",
      body: JSON.stringify({ claims: [{ ref: "1", quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/15)" }] }),
      headers: { "content-type": "application/json", "x-forwarded-for": address },
    }),
    {},
  );

it("counts the checks of an address in Redis, where every process sees them", async () => {
  for (let n = 0; n < env.CHECK_LIMIT_PER_MINUTE; n++) expect((await check("192.0.2.1")).status).toBe(200);
  const refused = await check("192.0.2.1");
  expect(refused.status).toBe(429);
  expect(Number(refused.headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await redis.get("limit:check-key:192.0.2.1")).toBe(String(env.CHECK_LIMIT_PER_MINUTE + 1));
  expect((await check("192.0.2.2")).status).toBe(200);
});

it("does not let an address hide behind entries that it writes itself", async () => {
  const statuses = [];
  for (let n = 0; n <= env.CHECK_LIMIT_PER_MINUTE; n++)
    statuses.push((await check(`203.0.113.${n}, 192.0.2.3`)).status);
  expect(statuses.at(-1)).toBe(429);
});
