import { divide, ZERO, add, multiply, negate, type Exact } from "@/lib/symbols/exact";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import { timesFactorial, timesRoot, unit, type PrimeExponents } from "@/lib/symbols/primes";
import { binomial, threeJ } from "@/lib/symbols/three-j";

/** The six entries of a 6j symbol {j1 j2 j3; l1 l2 l3}, doubled, row by row. */
export type SixJ = readonly [Twice, Twice, Twice, Twice, Twice, Twice];

/** The four triads of a 6j symbol, as places of its entries: the upper row, and one upper entry with two lower ones. */
export const SIX_J_TRIADS = [
  [0, 1, 2],
  [0, 4, 5],
  [3, 1, 5],
  [3, 4, 2],
] as const;

/**
 * The 4×3 array of whole numbers β_j − α_i, row by row, or null when a triad is broken. α are the sums of the triads (in the order
 * of SIX_J_TRIADS) and β those of two whole columns: j1+j2+l1+l2, j2+j3+l2+l3, j3+j1+l3+l1. The symbol is allowed exactly
 * when none is negative and all are whole, and it depends only on which numbers stand in common rows and columns (Regge 1959).
 */
export function sixJArray(entries: SixJ): number[] | null {
  const [a, b, c, d, e, f] = entries;
  if (entries.some((j) => j < 0)) return null;
  const alphas = SIX_J_TRIADS.map((t) => t.reduce<number>((sum, n) => sum + (entries[n] as number), 0));
  if (alphas.some((n) => n % 2 !== 0)) return null;
  const betas = [a + b + d + e, b + c + e + f, c + a + f + d];
  const array = alphas.flatMap((alpha) => betas.map((beta) => (beta - alpha) / 2));
  return array.every((n) => n >= 0) ? array : null;
}

/** The parts of the single sum in whole numbers; see sixJParts. */
export type SixJParts = {
  from: number;
  to: number;
  terms: bigint[];
  total: bigint;
  prefactor: PrimeExponents;
};

/**
 * The single sum of an allowed 6j symbol over whole numbers. With α1 ≥ … the sums of triads and β of two columns (see sixJArray),
 * DLMF 34.4.2 (VMK section 9.2) is
 *   6j = ΔΔΔΔ (α1+1)!/((β1−α2)!(β2−α3)!(β3−α4)!) Σ_s (−1)^s C(s+1,α1+1) C(β1−α2,s−α2) C(β2−α3,s−α3) C(β3−α4,s−α4).
 */
export function sixJParts(entries: SixJ): SixJParts {
  const [a, b, c, d, e, f] = entries;
  const alphas = SIX_J_TRIADS.map((t) => t.reduce<number>((sum, n) => sum + (entries[n] as number), 0) / 2);
  const [a1, a2, a3, a4] = alphas as [number, number, number, number];
  const [b1, b2, b3] = [(a + b + d + e) / 2, (b + c + e + f) / 2, (c + a + f + d) / 2];
  const from = Math.max(a1, a2, a3, a4);
  const to = Math.min(b1, b2, b3);
  const terms: bigint[] = [];
  let total = 0n;
  let term =
    binomial(from + 1, a1 + 1) *
    binomial(b1 - a2, from - a2) *
    binomial(b2 - a3, from - a3) *
    binomial(b3 - a4, from - a4);
  if (from % 2) term = -term;
  for (let s = from; s <= to; s++) {
    terms.push(term);
    total += term;
    term =
      (-term * BigInt(s + 2) * BigInt(b1 - s) * BigInt(b2 - s) * BigInt(b3 - s)) /
      (BigInt(s + 1 - a1) * BigInt(s + 1 - a2) * BigInt(s + 1 - a3) * BigInt(s + 1 - a4));
  }
  const prefactor = unit(from + 1);
  for (const [x, y, z] of SIX_J_TRIADS) timesTriangle(prefactor, entries[x], entries[y], entries[z]);
  timesFactorial(prefactor, a1 + 1, 2);
  for (const n of [b1 - a2, b2 - a3, b3 - a4]) timesFactorial(prefactor, n, -2);
  return { from, to, terms, total, prefactor };
}

/** Multiplies by Δ(abc)² = (a+b−c)!(a−b+c)!(−a+b+c)!/(a+b+c+1)! (DLMF 34.4.2); entries doubled. */
function timesTriangle(x: PrimeExponents, a: number, b: number, c: number): void {
  for (const d of [a + b - c, a - b + c, b + c - a]) timesFactorial(x, d / 2, 1);
  timesFactorial(x, (a + b + c) / 2 + 1, -1);
}

/** The 6j symbol by its single sum, and 0 when a triad is broken. */
export function sixJ(entries: SixJ): Exact {
  if (!sixJArray(entries)) return ZERO;
  const { total, prefactor } = sixJParts(entries);
  return timesRoot(total, prefactor);
}

/**
 * The same from 3j symbols, the second route (DLMF 34.4.1 summed against one 3j; VMK section 9.1):
 *   {j1 j2 j3; l1 l2 l3}(j1 j2 j3; m1 m2 m3)
 *     = Σ (−1)^(l1+n1+l2+n2+l3+n3) (j1 l2 l3; m1 n2 −n3)(l1 j2 l3; −n1 m2 n3)(l1 l2 j3; n1 −n2 m3)
 * with m1 = j1 and m3 = −j3, where the 3j on the left is never 0; n2 and n1 follow from n3.
 */
export function sixJFromThreeJ(entries: SixJ): Exact {
  if (!sixJArray(entries)) return ZERO;
  const [a, b, c, d, e, f] = entries;
  const [x, y, z] = [a, c - a, -c];
  let sum = ZERO;
  for (let n3 = -f; n3 <= f; n3 += 2) {
    const [n2, n1] = [n3 - x, n3 + y];
    if (Math.abs(n2) > e || Math.abs(n1) > d) continue;
    const term = [three(a, e, f, x, n2, -n3), three(d, b, f, -n1, y, n3), three(d, e, c, n1, -n2, z)].reduce(
      (p, q) => multiply(p, q),
    );
    sum = add(sum, ((d + n1 + e + n2 + f + n3) / 2) % 2 === 0 ? term : negate(term));
  }
  return divide(sum, three(a, b, c, x, y, z));
}

function three(...doubled: [number, number, number, number, number, number]): Exact {
  const [a, b, c, x, y, z] = doubled.map((n) => fromTwice(n)) as [Twice, Twice, Twice, Twice, Twice, Twice];
  return threeJ([a, b, c, x, y, z]);
}

/**
 * Racah's W(abcd; ef) = (−1)^(a+b+c+d) {a b e; d c f} (VMK section 9.10); entries doubled, in the order a b c d e f. 0 when a triad of
 * the 6j is broken. `sixJRoute` is the route to the 6j.
 */
export function racahW([a, b, c, d, e, f]: SixJ, sixJRoute: (entries: SixJ) => Exact = sixJ): Exact {
  const value = sixJRoute([a, b, e, d, c, f]);
  return ((a + b + c + d) / 2) % 2 === 0 ? value : negate(value); // the exponent is whole whenever the value is not 0
}
