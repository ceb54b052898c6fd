import { publicFinding } from "@/lib/verify/finding";
import type { KeyVerification } from "@/lib/verify/verify-key";

/** The answer of the command line and of POST /api/v1/check: a fixed contract. */
export function publicReport({ findings, summary }: KeyVerification) {
  return { findings: findings.map(publicFinding), summary };
}

export function jsonReport(report: KeyVerification): string {
  return `${JSON.stringify(publicReport(report), null, 2)}\n`;
}
