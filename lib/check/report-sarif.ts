import { createHash } from "node:crypto";
import type { Finding, Verdict } from "@/lib/verify/finding";
import type { FileFault, FilesReport } from "./check-files";

/** The verdicts that are reported, as the rules of the log. */
const RULES: readonly {
  id: Exclude<Verdict, "confirmed">;
  level: "error" | "warning" | "note";
  name: string;
  says: string;
}[] = [
  {
    id: "discrepant",
    level: "error",
    name: "Discrepant",
    says: "The claimed value is not the exact value of the quantity.",
  },
  {
    id: "contradicted",
    level: "error",
    name: "Contradicted",
    says: "The claimed value is wrong, and another claim says otherwise under a symmetry.",
  },
  {
    id: "unreadable",
    level: "warning",
    name: "Unreadable",
    says: "The quantity or the claimed value could not be read.",
  },
  {
    id: "undecided",
    level: "warning",
    name: "Undecided",
    says: "A convention is missing, or a stated limit is passed.",
  },
  {
    id: "confirmed-not-house-form",
    level: "note",
    name: "NotInHouseForm",
    says: "The claimed value is right, but not written in the house form of the work.",
  },
];

/** The findings that are not plainly confirmed, as a SARIF 2.1.0 log. Columns count UTF-16 units. */
export function sarifReport({ findings, faults, summary }: FilesReport): string {
  const files = [
    ...new Set([
      ...findings.flatMap(({ place }) => (place ? [place.file] : [])),
      ...faults.map(({ file }) => file),
    ]),
  ];
  const log = {
    $schema: "https://json.schemastore.org/sarif-2.1.0.json",
    version: "2.1.0",
    runs: [
      {
        tool: {
          driver: {
            name: "Surdmark",
            rules: RULES.map(({ id, level, name, says }) => ({
              id,
              name,
              shortDescription: { text: says },
              defaultConfiguration: { level },
            })),
          },
        },
        columnKind: "utf16CodeUnits",
        artifacts: files.map((file) => ({ location: { uri: uriOf(file) } })),
        invocations: [
          {
            executionSuccessful: faults.length === 0,
            ...(faults.length > 0 && {
              toolConfigurationNotifications: faults.map((fault) => notification(fault, files)),
            }),
          },
        ],
        results: withFingerprints(findings.filter(({ verdict }) => verdict !== "confirmed")).map(
          ([finding, print]) => result(finding, print, files),
        ),
        properties: { summary },
      },
    ],
  };
  return `${JSON.stringify(log, null, 2)}\n`;
}

function result(finding: Finding, fingerprint: string, files: readonly string[]) {
  const { verdict, place, ref, quantity, claimed, reason, slips, exact } = finding;
  const ruleIndex = RULES.findIndex(({ id }) => id === verdict);
  const first = slips[0];
  return {
    ruleId: verdict,
    ruleIndex,
    level: RULES[ruleIndex]?.level ?? "warning",
    message: { text: `${ref}: ${reason}${first ? ` ${first.says}` : ""}` },
    locations: place ? [{ physicalLocation: location(place, files) }] : [],
    partialFingerprints: { "surdmarkClaim/v1": fingerprint },
    properties: {
      ref,
      quantity,
      claimed,
      exact,
      slips: slips.map(({ causes, says, certainty }) => ({ causes, says, certainty })),
    },
  };
}

/**
 * A fingerprint names a claim by its file, ref and quantity: it stays the same when lines move, when the value is
 * changed, and when other claims come and go.
 */
function withFingerprints(findings: readonly Finding[]): [Finding, string][] {
  return findings.map((finding) => {
    const identity = [finding.place?.file ?? "", finding.ref, finding.quantity.replace(/\s+/g, " ").trim()];
    return [finding, createHash("sha256").update(JSON.stringify(identity)).digest("hex").slice(0, 32)];
  });
}

function notification(fault: FileFault, files: readonly string[]) {
  return {
    level: "error",
    message: { text: fault.says },
    locations: [{ physicalLocation: location(fault, files) }],
  };
}

function location(
  { file, line, column }: { file: string; line: number; column: number },
  files: readonly string[],
) {
  return {
    artifactLocation: { uri: uriOf(file), index: files.indexOf(file) },
    region: { startLine: line, startColumn: column },
  };
}

/** A path as a URI reference: forward slashes, everything else escaped. */
function uriOf(file: string): string {
  const path = file.replaceAll("\\", "/").split("/").map(encodeURIComponent).join("/");
  return path.startsWith("/") ? `file://${path}` : path.replace(/^\.\//, "");
}
