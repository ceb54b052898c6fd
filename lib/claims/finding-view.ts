import { readDetails, readSlips, type Diagnosis } from "@/lib/flags/finding-details";
import type { Finding } from "@/models";
import type { Verdict } from "@/models/finding";

/** What a page shows of a stored finding. Formulas are LaTeX of our own engine. */
export type FindingShown = {
  id: string;
  runId: string;
  claimVersion: number;
  verdict: Verdict;
  exact: { text: string; latex: string; decimal: string } | null;
  reason: string;
  slips: Diagnosis[];
  reading: { quantityLatex: string; claimedLatex: string } | null;
  houseForm: { text: string; latex: string } | null;
  zero: { says: string }[];
  errors: {
    field: "quantity" | "claimed";
    at: number;
    length: number;
    says: string;
    suggestion?: string | undefined;
  }[];
  judgedAt: string | null;
};

/** The columns that toFindingShown reads: all but the evidence, which is long. */
export const FINDING_COLUMNS = [
  "id",
  "runId",
  "claimVersion",
  "verdict",
  "exactText",
  "exactLatex",
  "exactDecimal",
  "slips",
  "reason",
  "details",
  "judgedAt",
] as const;

/** A stored finding as pages show it; null while it is not judged. */
export function toFindingShown(finding: Finding | null | undefined): FindingShown | null {
  if (!finding || finding.verdict === null) return null;
  const { id, runId, claimVersion, verdict, exactText, exactLatex, exactDecimal, reason } = finding;
  const { reading, houseForm, zero, errors } = readDetails(finding.details);
  return {
    id,
    runId,
    claimVersion,
    verdict,
    exact:
      exactText === null ? null : { text: exactText, latex: exactLatex ?? "", decimal: exactDecimal ?? "" },
    reason: reason ?? "",
    slips: readSlips(finding.slips),
    reading,
    houseForm,
    zero,
    errors,
    judgedAt: finding.judgedAt?.toISOString() ?? null,
  };
}
