import type { Finding } from "@/lib/verify/finding";
import { isConfirmed } from "@/lib/verify/finding";
import type { FilesReport } from "./check-files";

const WORDS: Record<Finding["verdict"], string> = {
  confirmed: "confirmed",
  "confirmed-not-house-form": "confirmed, not in house form",
  discrepant: "discrepant",
  contradicted: "contradicted",
  unreadable: "unreadable",
  undecided: "undecided",
};

/** The report for a person at a terminal: what needs attention, each at its line, and the counts. */
export function textReport({ findings, summary }: FilesReport): string {
  const lines = findings.filter(({ verdict }) => verdict !== "confirmed").flatMap(describe);
  const counts = Object.entries(WORDS)
    .map(([verdict, words]) => ({ words, count: summary[verdict as Finding["verdict"]] }))
    .filter(({ count }) => count > 0)
    .map(({ words, count }) => `${count} ${words}`);
  const all = `${summary.total} ${summary.total === 1 ? "claim" : "claims"}: ${counts.join(", ") || "none"}.`;
  return [...lines, all].map(printable).join("\n") + "\n";
}

function describe(finding: Finding): string[] {
  const { place, ref, verdict, quantity, claimed, reason, slips } = finding;
  const where = place ? `${place.file}:${place.line}:${place.column}: ` : "";
  const head = `${where}${ref}: ${WORDS[verdict]}: ${short(quantity)} = ${short(claimed)}`;
  if (verdict === "confirmed-not-house-form") return [head, `    ${reason}`, ""];
  return [
    head,
    `    ${reason}`,
    ...slips.map((slip) => `    ${slip.certainty === "likely" ? "Likely" : "Possibly"}: ${slip.says}`),
    "",
  ];
}

function short(text: string): string {
  return text.length > 80 ? `${text.slice(0, 79)}…` : text;
}

/** Control characters of a file must not reach a terminal. */
function printable(line: string): string {
  return line.replace(
    /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/gu,
    (c) => `\\u${(c.codePointAt(0) ?? 0).toString(16).padStart(4, "0")}`,
  );
}

/** Whether every claim may stand. */
export function allConfirmed({ findings }: FilesReport): boolean {
  return findings.every(({ verdict }) => isConfirmed(verdict));
}
