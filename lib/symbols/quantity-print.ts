import { halfLatex, showHalf } from "@/lib/symbols/half";
import type { CgOrder, Quantity } from "@/lib/symbols/kinds";

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
