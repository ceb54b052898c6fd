import { execFile } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, describe, expect, it, vi } from "vitest";

// Each case starts a process of its own.
vi.setConfig({ testTimeout: 120_000 });

const root = path.resolve(import.meta.dirname, "../..");
const folder = mkdtempSync(path.join(tmpdir(), "surdmark-check-"));
afterAll(() => rmSync(folder, { recursive: true }));

function file(name: string, content: string | Uint8Array): string {
  const at = path.join(folder, name);
  writeFileSync(at, content);
  return at;
}

function directory(name: string): string {
  mkdirSync(path.join(folder, name));
  return path.join(folder, name);
}

/** Runs the command as a person does, without any of our environment. */
function check(...args: string[]): Promise<{ code: number; out: string; err: string }> {
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      ["--import", "tsx", "scripts/check.ts", ...args],
      { cwd: root, env: { PATH: process.env.PATH, NODE_ENV: "production" }, maxBuffer: 32 * 1024 * 1024 },
      (error, out, err) => resolve({ code: error ? Number(error.code) : 0, out, err }),
    );
  });
}

const GOOD = file(
  "good.csv",
  "ref,quantity,claimed\n7.1,(1 1 2; 0 0 0),sqrt(2/15)\n7.2,<1 0 1 0 | 2 0>,0.8165\n",
);
const WRONG = file(
  "wrong.csv",
  'ref,quantity,claimed\n7.1,(1 1 2; 0 0 0),sqrt(2/15)\n7.2,(2 2 2; 0 0 0),sqrt(2/35)\n7.3,"(1, 1",x\n',
);
const BROKEN = file(
  "broken.csv",
  "ref,quantity,claimed\n7.1,(1 1 2; 0 0 0),sqrt(2/15)\n7.2,(1 1 2; 0 0 0)\n",
);
const KEY = file(
  "house.json",
  JSON.stringify({
    conventions: { houseForm: "rationalised" },
    claims: [{ ref: "1", quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/15)" }],
  }),
);

describe("the command line", () => {
  it("ends with 0 when all is confirmed", async () => {
    expect(await check(GOOD, KEY)).toEqual({
      code: 0,
      out: expect.stringMatching(
        /confirmed, not in house form[\s\S]*3 claims: 2 confirmed, 1 confirmed, not in house form\.\n$/,
      ) as string,
      err: "",
    });
  });

  it("ends with 1 when something is not, and says what at its line", async () => {
    const { code, out, err } = await check(WRONG);
    expect([code, err]).toEqual([1, ""]);
    expect(out).toContain(`${WRONG}:3:5: 7.2: discrepant: (2 2 2; 0 0 0) = sqrt(2/35)`);
    expect(out).toContain("Likely: The sign is the opposite one");
    expect(out).toContain("3 claims: 1 confirmed, 1 discrepant, 1 unreadable.");
  });

  it("answers the fixed JSON", async () => {
    const { code, out } = await check("--format", "json", WRONG);
    const answer = JSON.parse(out) as {
      findings: Record<string, unknown>[];
      summary: Record<string, number>;
    };
    expect(code).toBe(1);
    expect(Object.keys(answer)).toEqual(["findings", "summary"]);
    expect(answer.findings[1]).toEqual({
      ref: "7.2",
      quantity: "(2 2 2; 0 0 0)",
      claimed: "sqrt(2/35)",
      verdict: "discrepant",
      exact: { text: "-sqrt(70)/35", latex: "-\\frac{\\sqrt{70}}{35}", decimal: "-0.23904572186687872799" },
      slips: [expect.objectContaining({ causes: ["overall-sign"], certainty: "likely" })],
      place: { file: WRONG, line: 3, column: 5 },
      reason: "The value of (2 2 2; 0 0 0) is -sqrt(70)/35, not sqrt(2/35).",
    });
    expect(answer.summary).toEqual({
      confirmed: 1,
      "confirmed-not-house-form": 0,
      discrepant: 1,
      contradicted: 0,
      unreadable: 1,
      undecided: 0,
      total: 3,
    });
  });

  it("writes SARIF and JUnit", async () => {
    const sarif = await check("--format=sarif", WRONG);
    expect(sarif.code).toBe(1);
    expect(JSON.parse(sarif.out)).toMatchObject({
      version: "2.1.0",
      runs: [{ tool: { driver: { name: "Surdmark" } } }],
    });
    const junit = await check("--format", "junit", WRONG);
    expect(junit.out).toMatch(
      /^<\?xml version="1.0" encoding="UTF-8"\?>\n<testsuites name="Surdmark" tests="3" failures="1" errors="1">/,
    );
  });

  it("ends with 2 when a file cannot be used whole, and still tells of the rest", async () => {
    const { code, out, err } = await check(BROKEN);
    expect(code).toBe(2);
    expect(err).toBe(`${BROKEN}:3:1: This row has 2 cells, and the header has 3.\n`);
    expect(out).toContain("1 claim: 1 confirmed.");
  });

  it.concurrent.each([
    ["no file", [], /Name at least one/],
    ["a missing file", ["nothing.csv"], /nothing.csv: there is no such file/],
    ["a folder", [directory("folder.csv")], /this is a folder/],
    ["another kind of file", ["chapter.tex"], /.tex files are not read/],
    ["a name without ending", ["chapter"], /without .csv or .json/],
    ["an unknown format", ["--format", "xml", GOOD], /format “xml” is not known/],
    ["an unknown option", ["--fast", GOOD], /Unknown option '--fast'/],
    [
      "bytes that are no text",
      [file("picture.csv", Uint8Array.from([0x89, 0x50, 0x4e, 0x47]))],
      /a PNG picture/,
    ],
  ] as [string, string[], RegExp][])("ends with 2 on %s", async (_name, args, says) => {
    const { code, err } = await check(...args);
    expect(code).toBe(2);
    expect(err).toMatch(says);
  });

  it("helps", async () => {
    const { code, out } = await check("--help");
    expect(code).toBe(0);
    expect(out).toContain("Exit status: 0");
  });
});
