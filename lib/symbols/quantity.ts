import type { Exact } from "@/lib/symbols/exact";
import { TooCostly } from "@/lib/symbols/failures";
import { halfLatex, showHalf, type Twice } from "@/lib/symbols/half";
import type { CgOrder, Cost, Kind, Quantity } from "@/lib/symbols/kinds";
import { clebschGordan, threeJ, type ThreeJ } from "@/lib/symbols/three-j";

export type {
  CgOrder,
  Cost,
  Evidence,
  EvidenceTerm,
  Kind,
  Orbit,
  Quantity,
  Rule,
  Variant,
  VanishingReason,
  VanishingRule,
} from "@/lib/symbols/kinds";

/** How many entries a symbol of each kind has. */
export const ENTRIES: Record<Kind, number> = { "3j": 6, cg: 6 };

/** Stated limits. A symbol past them throws TooCostly before any work is done. */
export const LIMITS = {
  /** Largest j that is evaluated. */
  largestJ: 5_000,
  /** Largest j for which the second route is run as well. */
  largestCheckedJ: 1_000,
} as const;

/** A quantity with its entries checked for number. @throws RangeError on a wrong number of entries */
export function quantity(kind: Kind, args: readonly Twice[]): Quantity {
  if (args.length !== ENTRIES[kind]) {
    throw new RangeError(`A ${kind} symbol has ${ENTRIES[kind]} entries; ${args.length} were given.`);
  }
  return { kind, args };
}

/** The entries of the 3j symbol that a 3j or a CG is made of (for a CG the last projection is −M). */
function threeJEntries({ kind, args }: Quantity): ThreeJ {
  if (args.length !== 6) throw new RangeError(`A ${kind} symbol has 6 entries; ${args.length} were given.`);
  const [a, b, c, d, e, f] = args as ThreeJ;
  return kind === "3j" ? [a, b, c, d, e, f] : [a, c, e, b, d, -f as Twice];
}

/** Terms of the sum and digits of the largest integer that a value may take; known before any work. */
export function costOf(q: Quantity): Cost {
  const [a, b, c] = threeJEntries(q);
  const J = Math.max(0, a + b + c) / 2;
  return { terms: Math.floor(J / 3) + 1, digits: Math.ceil(J * Math.log10(2)) + 1 };
}

/** Exact value by Racah's sum; 0 when a selection rule fails. @throws TooCostly past LIMITS.largestJ */
export function evaluate(q: Quantity): Exact {
  const entries = threeJEntries(q);
  const largest = Math.max(...entries.slice(0, 3)) / 2;
  if (largest > LIMITS.largestJ) {
    throw new TooCostly(
      `Entries up to j = ${LIMITS.largestJ.toLocaleString("en-GB")} are evaluated; this symbol has ${largest}.`,
    );
  }
  return q.kind === "3j" ? threeJ(entries) : clebschGordan(entries);
}

/** Typed notation: `(1 1 2; 0 0 0)`, `<1 0 1 0 | 2 0>` (or `<1 1 0 0 | 2 0>` where the order is j1 j2 m1 m2). */
export function quantityText(q: Quantity, cgOrder: CgOrder = "j1m1j2m2"): string {
  const [a, b, c, d, e, f] = q.args.map((t) => showHalf(t));
  if (q.kind === "3j") return `(${a} ${b} ${c}; ${d} ${e} ${f})`;
  return cgOrder === "j1m1j2m2" ? `<${a} ${b} ${c} ${d} | ${e} ${f}>` : `<${a} ${c} ${b} ${d} | ${e} ${f}>`;
}

/** Printed form in LaTeX: the 2×3 array of a 3j, the bra-ket of a CG. */
export function quantityLatex(q: Quantity, cgOrder: CgOrder = "j1m1j2m2"): string {
  const [a, b, c, d, e, f] = q.args.map((t) => halfLatex(t));
  if (q.kind === "3j") return `\\begin{pmatrix} ${a} & ${b} & ${c} \\\\ ${d} & ${e} & ${f} \\end{pmatrix}`;
  const four = cgOrder === "j1m1j2m2" ? [a, b, c, d] : [a, c, b, d];
  return `\\left\\langle ${four.join("\\,")} \\middle| ${e}\\,${f} \\right\\rangle`;
}
