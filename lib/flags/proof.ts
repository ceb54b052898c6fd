import { toText } from "@/lib/symbols/exact-print";
import { showHalf } from "@/lib/symbols/half";
import {
  costOf,
  evidence,
  quantityLatex,
  variants,
  type Evidence,
  type Quantity,
} from "@/lib/symbols/quantity";
import type { Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";

/** A symbol whose sum is longer is not recomputed 72 times for a page. */
const MOST_TERMS = 60;

/** One related symbol in plain data: its entries as printed, how it was made, and what came out. */
export type VariantRow = {
  name: string;
  does: string;
  entries: string[];
  phase: 1 | -1;
  /** printed only when it is not 1 */
  factor: string | null;
  value: string;
  agrees: boolean;
};

export type Proof = {
  latex: string;
  kind: Quantity["kind"];
  evidence: Evidence | null;
  /** null when the symbol is too large to show them all here */
  variants: VariantRow[] | null;
};

/**
 * What a person needs to audit a flag by hand: the evidence that the run kept (or made now, when it kept none), and the
 * related symbols, each recomputed. Null when the quantity cannot be read.
 */
export function proofOf(text: string, conventions: Conventions, stored: unknown): Proof | null {
  const read = readQuantity(text, conventions);
  if (!read.ok) return null;
  const { quantity } = read;
  const kept = isEvidence(stored) ? stored : null;
  const small = costOf(quantity).terms <= MOST_TERMS;
  return {
    latex: quantityLatex(quantity, conventions.cgOrder),
    kind: quantity.kind,
    evidence: kept ?? (small ? evidence(quantity) : null),
    variants: small ? variants(quantity).map(toRow) : null,
  };
}

function toRow({
  name,
  does,
  quantity,
  phase,
  factor,
  value,
  agrees,
}: ReturnType<typeof variants>[number]): VariantRow {
  const shown = toText(factor);
  return {
    name,
    does,
    entries: quantity.args.map((entry) => showHalf(entry)),
    phase,
    factor: shown === "1" ? null : shown,
    value: toText(value),
    agrees,
  };
}

/** The column is our own JSON; an engine of another version may have written it differently. */
function isEvidence(stored: unknown): stored is Evidence {
  if (typeof stored !== "object" || stored === null) return false;
  const { rules, formula, terms, value, routes } = stored as Partial<Evidence>;
  return (
    Array.isArray(rules) &&
    Array.isArray(terms) &&
    Array.isArray(routes) &&
    formula !== undefined &&
    value !== undefined
  );
}
