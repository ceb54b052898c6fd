import { describe, expect, it } from "vitest";
import { z } from "zod";
import { AppError } from "@/lib/errors";
import { readJson, route } from "@/lib/http";
import { addressOf } from "@/lib/auth/address";

const post = (headers: Record<string, string> = {}, body = "{}") =>
  new Request("http://localhost:3000/api/sample", { method: "POST", headers, body });
const ok = route(() => Promise.resolve(new Response("fine")));

describe("a writing request", () => {
  it.each([
    [{ "sec-fetch-site": "same-origin" }, 200],
    [{ "sec-fetch-site": "same-origin", origin: "http://localhost:3000" }, 200],
    [{ "sec-fetch-site": "same-site" }, 403],
    [{ "sec-fetch-site": "cross-site" }, 403],
    [{ "sec-fetch-site": "none" }, 403],
    [{ origin: "http://localhost:3000" }, 200],
    [{ origin: "https://evil.example" }, 403],
    [{ origin: "null" }, 403],
    [{ origin: "https://evil.example", "x-forwarded-host": "evil.example" }, 403],
    [{}, 200],
  ] as [Record<string, string>, number][])("with %o is answered %i", async (headers, status) => {
    expect((await ok(post(headers), undefined)).status).toBe(status);
  });
});

describe("a failure", () => {
  const failing = (error: unknown) =>
    route(() => Promise.reject(error instanceof Error ? error : new Error()))(
      new Request("http://localhost:3000/api/sample"),
      undefined,
    );

  it("that is expected becomes a problem document", async () => {
    const answer = await failing(new AppError("too_many", "Wait.", { details: { retryAfter: 7 } }));
    expect(answer.status).toBe(429);
    expect(answer.headers.get("content-type")).toBe("application/problem+json");
    expect(answer.headers.get("retry-after")).toBe("7");
    expect(await answer.json()).toMatchObject({ status: 429, detail: "Wait.", instance: "/api/sample" });
  });

  it("of ours says nothing but a reference", async () => {
    const answer = await failing(new Error("secret detail of the store"));
    expect(answer.status).toBe(500);
    const text = await answer.text();
    expect(text).not.toContain("secret");
    expect((JSON.parse(text) as { reference: string }).reference).toMatch(/^[0-9a-f]{8}$/);
  });
});

describe("a JSON body", () => {
  const shape = z.object({ a: z.number() });

  it("is read", async () => {
    expect(await readJson(post({}, '{"a":1}'), shape, 100)).toEqual({ a: 1 });
  });

  it.each([
    ["not JSON", "{", "invalid"],
    ["the wrong shape", '{"a":"1"}', "invalid"],
    ["too long", `{"a":1${" ".repeat(100)}}`, "too_large"],
  ])("that is %s is refused", async (_name, body, code) => {
    await expect(readJson(post({}, body), shape, 100)).rejects.toMatchObject({ code });
  });
});

it("takes the address that the nearest proxy saw, and one IPv6 network as one address", () => {
  expect(addressOf(new Headers({ "x-forwarded-for": "1.1.1.1, 9.9.9.9" }))).toBe("9.9.9.9");
  expect(addressOf({ "x-forwarded-for": "::ffff:10.0.0.1" })).toBe("10.0.0.1");
  expect(addressOf({ "x-forwarded-for": "2001:db8:1:2:3::9" })).toBe(
    addressOf({ "x-forwarded-for": "2001:db8:1:2::1" }),
  );
  expect(addressOf({})).toBe("unknown");
});
