import type { Evidence } from "@/lib/symbols/kinds";
import { evidenceHtml, type EvidenceHtml } from "@/lib/typeset/evidence-view";
import { typeset } from "@/lib/typeset/typeset";

/** The parts of a finding that are formulas. */
export type FindingParts = {
  exact: { latex: string } | null;
  houseForm: { latex: string } | null;
  reading: { quantityLatex: string | null; claimedLatex: string | null } | null;
  slips: readonly { says: string; formulaLatex?: string | null }[];
};

/** A finding's formulas set as HTML by our server, for pages that have no typesetter of their own. */
export type FindingHtml = {
  quantity: string | null;
  claimed: string | null;
  exact: string | null;
  houseForm: string | null;
  slips: { says: string; formula: string | null }[];
  evidence: EvidenceHtml | null;
};

export type FindingView<F extends FindingParts> = {
  finding: F;
  html: FindingHtml;
  evidence: Evidence | null;
};

/**
 * What a page needs to show one finding: the finding itself, its formulas as HTML, and the evidence where it is given.
 * Every formula was printed by our engine, from a reading that had passed its limits.
 */
export function findingView<F extends FindingParts>(
  finding: F,
  evidence: Evidence | null = null,
): FindingView<F> {
  const set = (latex: string | null | undefined) => (latex ? typeset(latex, { own: true }) : null);
  return {
    finding,
    evidence,
    html: {
      quantity: set(finding.reading?.quantityLatex),
      claimed: set(finding.reading?.claimedLatex),
      exact: set(finding.exact?.latex),
      houseForm: set(finding.houseForm?.latex),
      slips: finding.slips.map(({ says, formulaLatex }) => ({ says, formula: set(formulaLatex) })),
      evidence: evidence ? evidenceHtml(evidence) : null,
    },
  };
}
