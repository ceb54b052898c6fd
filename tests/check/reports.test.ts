import { describe, expect, it } from "vitest";
import { checkFiles } from "@/lib/check/check-files";
import { jsonReport } from "@/lib/check/report-json";
import { junitReport } from "@/lib/check/report-junit";
import { sarifReport } from "@/lib/check/report-sarif";
import { textReport } from "@/lib/check/report-text";

const bytes = (text: string) => new TextEncoder().encode(text);
const rows = [
  "7.1,(1 1 2; 0 0 0),sqrt(2/15)",
  "7.2,(2 2 2; 0 0 0),sqrt(2/35)",
  "7.3,<1 0 1 0 | 2 0>,-sqrt(2/3)",
  "7.4,<,1",
];
const key = (lines: readonly string[]) => [
  { name: "a chapter/7 é.csv", bytes: bytes(`ref,quantity,claimed\n${lines.join("\n")}\n`) },
];

type Sarif = {
  runs: {
    artifacts: { location: { uri: string } }[];
    invocations: { executionSuccessful: boolean }[];
    tool: { driver: { rules: { id: string }[] } };
    results: {
      ruleId: string;
      ruleIndex: number;
      level: string;
      message: { text: string };
      locations: {
        physicalLocation: {
          artifactLocation: { uri: string; index: number };
          region: { startLine: number; startColumn: number };
        };
      }[];
      partialFingerprints: Record<string, string>;
    }[];
  }[];
};
const sarif = (lines: readonly string[]) =>
  (JSON.parse(sarifReport(checkFiles(key(lines)))) as Sarif).runs[0] as Sarif["runs"][0];

describe("SARIF", () => {
  it("has a result for each claim that is not confirmed, at its place, under its rule", () => {
    const run = sarif(rows);
    expect(run.results.map(({ ruleId, level }) => [ruleId, level])).toEqual([
      ["discrepant", "error"],
      ["contradicted", "error"],
      ["unreadable", "warning"],
    ]);
    for (const result of run.results) {
      expect(run.tool.driver.rules[result.ruleIndex]?.id).toBe(result.ruleId);
      const { artifactLocation, region } = result.locations[0]?.physicalLocation ?? {
        artifactLocation: { uri: "", index: -1 },
        region: null,
      };
      expect(run.artifacts[artifactLocation.index]?.location.uri).toBe(artifactLocation.uri);
      expect(artifactLocation.uri).toBe("a%20chapter/7%20%C3%A9.csv");
      expect(region?.startColumn).toBe(5);
    }
    expect(run.results.map((result) => result.locations[0]?.physicalLocation.region.startLine)).toEqual([
      3, 4, 5,
    ]);
    expect(run.invocations[0]?.executionSuccessful).toBe(true);
  });

  it("keeps the fingerprint of a claim when lines move and values change", () => {
    const prints = (lines: readonly string[]) =>
      sarif(lines).results.map(({ partialFingerprints }) => partialFingerprints["surdmarkClaim/v1"]);
    const before = prints(rows);
    const after = prints([
      "0.1,(1 1 2; 0 0 0),0",
      ...rows.map((row) => row.replace("sqrt(2/35)", "sqrt(2/37)")),
    ]);
    expect(new Set(before).size).toBe(3);
    expect(after).toEqual(expect.arrayContaining(before));
  });

  it("says that a file could not be used whole", () => {
    const run = sarif(["7.1,(1 1 2; 0 0 0)"]);
    expect(run.invocations[0]).toMatchObject({
      executionSuccessful: false,
      toolConfigurationNotifications: [
        { level: "error", message: { text: "This row has 2 cells, and the header has 3." } },
      ],
    });
  });
});

describe("JUnit", () => {
  it("escapes markup and spells out what XML cannot hold", () => {
    const xml = junitReport(checkFiles(key(['"7.1 <&""> \u0001 \ud83d\ude00",(1 1 2; 0 0 0),1'])));
    expect(xml).toContain("7.1 &lt;&amp;&quot;&gt; \\u0001 \ud83d\ude00: (1 1 2; 0 0 0) = 1");
    expect(xml).toContain('<testsuites name="Surdmark" tests="1" failures="1" errors="0">');
  });

  it("counts failures and errors", () => {
    const xml = junitReport(checkFiles(key([...rows, "7.5,(1 1 2; 0 0 0)"])));
    expect(xml).toContain('tests="5" failures="2" errors="2"');
    expect(xml.match(/<failure /g)).toHaveLength(2);
    expect(xml.match(/<error /g)).toHaveLength(2);
  });
});

describe("text and JSON", () => {
  it("let no control character through to a terminal", () => {
    expect(textReport(checkFiles(key(["\u001b[31m7.1,(1 1 2; 0 0 0),1"])))).not.toMatch(/\u001b/);
  });
  it("hold nothing but the contract", () => {
    const { findings } = JSON.parse(jsonReport(checkFiles(key(rows)))) as { findings: object[] };
    expect(findings.map((finding) => Object.keys(finding).join())).toEqual(
      Array.from({ length: 4 }, () => "ref,quantity,claimed,verdict,exact,slips,place,reason"),
    );
  });
});
