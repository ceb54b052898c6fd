import type { VerdictId } from "@/components/words";
import type { Evidence } from "@/lib/symbols/kinds";
import type { FindingHtml } from "@/lib/typeset/finding-view";

export type ReadingError = {
  field: "quantity" | "claimed";
  at: number;
  length: number;
  found: string;
  expected: string;
  says: string;
  suggestion?: string;
  alternative?: string;
};

/** What a page shows of a finding; a finding of the verifier has all of it. */
export type ShownFinding = {
  quantity: string;
  claimed: string;
  verdict: VerdictId;
  exact: { text: string; decimal: string } | null;
  slips: readonly { says: string; certainty: "likely" | "possible" }[];
  reason: string;
  errors: readonly ReadingError[];
  houseForm: { text: string } | null;
  /** A convention under which a wrong claim would be right. */
  rightUnder?: { says: string } | null;
  zero: readonly { says: string }[];
};

/** The answer of POST /api/check. */
export type CheckAnswer = { finding: ShownFinding; html: FindingHtml; evidence: Evidence | null };
