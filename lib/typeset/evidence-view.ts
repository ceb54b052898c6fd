import type { Evidence } from "@/lib/symbols/kinds";
import { typeset } from "@/lib/typeset/typeset";

/** The parts of the evidence that are formulas, set as HTML. Everything else is shown as plain text. */
export type EvidenceHtml = { formula: string; prefactor: string; value: string; steps: string[] };

/** Sets the formulas of an engine's evidence. */
export function evidenceHtml(evidence: Evidence): EvidenceHtml {
  return {
    formula: typeset(evidence.formula.latex, { display: true, own: true }),
    prefactor: typeset(evidence.prefactor.latex, { own: true }),
    value: typeset(evidence.value.latex, { own: true }),
    steps: evidence.steps.map((latex) => typeset(latex, { display: true, own: true })),
  };
}
