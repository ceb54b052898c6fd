import { afterAll, describe, expect, it, vi } from "vitest";
import { POST as postKey } from "@/app/api/v1/check/route";
import { GET as getDescription } from "@/app/api/v1/openapi.json/route";
import { POST as postClaim } from "@/app/api/check/route";
import { checkFiles } from "@/lib/check/check-files";
import { jsonReport } from "@/lib/check/report-json";
import { CheckReport, ProblemDocument } from "@/lib/check/openapi";
import { closeLimits } from "@/lib/limits";

// Whoever asks is signed out here: sessions have tests of their own.
vi.mock("@/lib/auth/session", () => ({ getUser: () => Promise.resolve(null) }));
afterAll(closeLimits);

let address = 0;
function request(
  path: string,
  body: string | Uint8Array<ArrayBuffer>,
  headers: Record<string, string> = {},
): Request {
  address += 1;
  return new Request(`http://localhost:3000${path}`, {
    method: "POST",
    body,
    headers: {
      "content-type": "application/json",
      "x-forwarded-for": `10.0.${address >> 8}.${address & 255}`,
      ...headers,
    },
  });
}
const KEY = {
  claims: [
    { ref: "7.1", quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/15)" },
    { ref: "7.2", quantity: "(1 2 1; 0 0 0)", claimed: "sqrt(2/3)" },
  ],
};
const check = (body: unknown, headers = {}) =>
  postKey(request("/api/v1/check", typeof body === "string" ? body : JSON.stringify(body), headers), {});
async function problem(response: Response) {
  expect(response.headers.get("content-type")).toBe("application/problem+json");
  return ProblemDocument.parse(await response.json());
}

describe("POST /api/v1/check", () => {
  it("answers what the command line answers", async () => {
    const response = await check(KEY);
    expect(response.status).toBe(200);
    const answer: unknown = await response.json();
    expect(CheckReport.parse(answer)).toEqual(answer);
    const file = checkFiles([{ name: "key.json", bytes: new TextEncoder().encode(JSON.stringify(KEY)) }]);
    const fromFile = JSON.parse(jsonReport(file)) as { findings: object[] };
    expect(answer).toEqual({
      ...fromFile,
      findings: fromFile.findings.map((finding) => ({ ...finding, place: null })),
    });
  });

  it.each([
    ["no JSON", "x", "", /a value is expected/],
    ["an empty body", "", "", /file is empty/],
    [
      "a number for a value",
      { claims: [{ ref: "1", quantity: "(1 1 2; 0 0 0)", claimed: 0.3 }] },
      "/claims/0/claimed",
      /is a number here/,
    ],
    ["no ref", { claims: [{ quantity: "q", claimed: "1" }] }, "/claims/0/ref", /“ref” is missing/],
    ["an unknown convention", { conventions: { x: 1 }, claims: KEY.claims }, "/conventions/x", /not known/],
    [
      "201 claims",
      { claims: Array.from({ length: 201 }, () => KEY.claims[0]) },
      "/claims",
      /more than 200 claims/,
    ],
    ["deep nesting", "[".repeat(100_000), "", /nested more than 16 deep/],
    ["a key twice", '{"claims": [], "claims": []}', "/claims", /twice/],
  ])("answers %s with a problem and a pointer", async (_name, body, pointer, says) => {
    const response = await check(body);
    expect(response.status).toBe(422);
    const { errors, status, instance } = await problem(response);
    expect({ status, instance }).toEqual({ status: 422, instance: "/api/v1/check" });
    expect(errors?.find((error) => error.pointer === pointer)?.detail).toMatch(says);
  });

  it("refuses a large body, and another site's", async () => {
    expect((await problem(await check("x".repeat(256 * 1024 + 1)))).status).toBe(413);
    expect((await problem(await check(KEY, { "sec-fetch-site": "cross-site" }))).status).toBe(403);
  });

  it("leaves costly symbols undecided", async () => {
    const response = await check({
      claims: [{ ref: "1", quantity: "(4000 4000 4000; 0 0 0)", claimed: "1" }],
    });
    expect(await response.json()).toMatchObject({ summary: { undecided: 1, total: 1 } });
  });

  it("limits one address and tells when to come back", async () => {
    const again = () => check(KEY, { "x-forwarded-for": "192.0.2.7" });
    const statuses: number[] = [];
    let last = await again();
    for (let n = 0; n < 40 && last.status === 200; n++) {
      statuses.push(last.status);
      last = await again();
    }
    expect(statuses.length).toBeGreaterThan(5);
    expect((await problem(last.clone())).status).toBe(429);
    expect(Number(last.headers.get("retry-after"))).toBeGreaterThan(0);
    expect((await check(KEY, { "x-forwarded-for": "192.0.2.8" })).status).toBe(200);
  });
});

describe("POST /api/check", () => {
  const ask = (body: unknown) => postClaim(request("/api/check", JSON.stringify(body)), {});

  it("answers a finding, typeset, with its evidence", async () => {
    const response = await ask({ quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/3)" });
    expect(response.status).toBe(200);
    expect(await response.json()).toMatchObject({
      finding: {
        verdict: "discrepant",
        slips: [{ causes: ["cg-for-3j", "dimension-factor"], certainty: "likely" }],
        errors: [],
      },
      html: {
        quantity: expect.stringContaining("<") as string,
        slips: [{ formula: expect.stringContaining("<") as string }],
      },
      evidence: {
        reggeSquare: [
          [expect.any(Number), expect.any(Number), expect.any(Number)],
          expect.anything(),
          expect.anything(),
        ],
      },
    });
  });

  it("answers errors with their places, also while half is typed", async () => {
    const response = await ask({
      quantity: "(1 1 2; 0 0",
      claimed: "",
      conventions: { cgOrder: "j1j2m1m2" },
    });
    expect(await response.json()).toMatchObject({
      finding: {
        verdict: "unreadable",
        errors: [
          { field: "quantity", at: 11, length: 0 },
          { field: "claimed", at: 0 },
        ],
      },
      evidence: null,
    });
  });

  it("sends large symbols to a run", async () => {
    const response = await ask({ quantity: "(500 500 500; 0 0 0)", claimed: "1" });
    expect(await response.json()).toMatchObject({
      finding: {
        verdict: "undecided",
        reason: expect.stringContaining("A run of a chapter works them out up to 5,000") as string,
      },
    });
  });

  it("refuses what is no claim", async () => {
    expect((await ask({ quantity: 1 })).status).toBe(422);
    expect((await ask({ quantity: "1".repeat(40_000), claimed: "1" })).status).toBe(413);
  });
});

describe("GET /api/v1/openapi.json", () => {
  it("describes the interface with references that lead somewhere", async () => {
    const text = await getDescription().text();
    const description = JSON.parse(text) as {
      openapi: string;
      paths: object;
      components: { schemas: Record<string, unknown> };
    };
    expect(description.openapi).toBe("3.1.0");
    expect(Object.keys(description.paths)).toEqual(["/api/v1/check", "/api/v1/openapi.json"]);
    for (const [, name] of text.matchAll(/"#\/components\/schemas\/(\w+)"/g))
      expect(description.components.schemas).toHaveProperty(name ?? "");
    expect(text).not.toContain("__shared");
  });
});
