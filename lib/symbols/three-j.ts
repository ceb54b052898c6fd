import { timesFactorial, timesInteger, timesRoot, unit, type PrimeExponents } from "@/lib/symbols/primes";
import { ZERO, type Exact } from "@/lib/symbols/exact";
import type { Twice } from "@/lib/symbols/half";

/** The six entries of a 3j symbol, doubled: j1 j2 j3 m1 m2 m3. */
export type ThreeJ = readonly [Twice, Twice, Twice, Twice, Twice, Twice];

/**
 * The nine entries of the Regge square, row by row (Regge 1958; VMK 8.1.3), or null when a selection rule fails:
 *   −j1+j2+j3   j1−j2+j3   j1+j2−j3
 *     j1+m1       j2+m2      j3+m3
 *     j1−m1       j2−m2      j3−m3
 * They are non-negative integers exactly when the symbol is allowed, and then all rows and columns add up to j1+j2+j3.
 */
export function reggeSquare([a, b, c, x, y, z]: ThreeJ): number[] | null {
  if (x + y + z !== 0) return null;
  const doubled = [b + c - a, a + c - b, a + b - c, a + x, b + y, c + z, a - x, b - y, c - z];
  return doubled.every((d) => d >= 0 && d % 2 === 0) ? doubled.map((d) => d / 2) : null;
}

/** The parts of Racah's sum in whole numbers; see racahParts. */
export type RacahParts = {
  sign: 1 | -1;
  /** Smallest and largest k of the sum. */
  from: number;
  to: number;
  /** t_k = (−1)^k C(A,k) C(B,j1−m1−k) C(C,j2+m2−k), for k from..to. */
  terms: bigint[];
  total: bigint;
  /** The number under the root. */
  prefactor: PrimeExponents;
};

/**
 * Racah's finite sum for an allowed 3j symbol with Regge square s, over whole numbers. With A = j1+j2−j3, B = j1−j2+j3,
 * C = −j1+j2+j3, J = j1+j2+j3, formula DLMF 34.2.4 (VMK section 8.2) is
 *   3j = (−1)^(j1−j2−m3) √( Π(ji+mi)!(ji−mi)! / ((J+1)! A! B! C!) ) Σ_k (−1)^k C(A,k) C(B,j1−m1−k) C(C,j2+m2−k),
 * because the six factorials below each of its terms pair off into three binomials.
 */
export function racahParts(s: readonly number[]): RacahParts {
  const [C, B, A, p1, p2, p3, q1, q2, q3] = s as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const J = A + B + C;
  const exponent = q3 - C; // j1−j2−m3 = (j1−j2−j3) + (j3−m3)
  const from = Math.max(0, q1 - B, p2 - C);
  const to = Math.min(A, q1, p2);
  const terms: bigint[] = [];
  let total = 0n;
  let term = binomial(A, from) * binomial(B, q1 - from) * binomial(C, p2 - from);
  if (from % 2) term = -term;
  for (let k = from; k <= to; k++) {
    terms.push(term);
    total += term;
    // The quotient is whole: the next term is a product of binomials again.
    term =
      (-term * (BigInt(A - k) * BigInt(q1 - k) * BigInt(p2 - k))) /
      (BigInt(k + 1) * BigInt(B - q1 + k + 1) * BigInt(C - p2 + k + 1));
  }
  const prefactor = unit(J + 1);
  for (const n of [p1, p2, p3, q1, q2, q3]) timesFactorial(prefactor, n, 1);
  for (const n of [J + 1, A, B, C]) timesFactorial(prefactor, n, -1);
  return { sign: exponent % 2 === 0 ? 1 : -1, from, to, terms, total, prefactor };
}

/** The 3j symbol by Racah's sum, and 0 when a selection rule fails. */
export function threeJ(entries: ThreeJ): Exact {
  const square = reggeSquare(entries);
  if (!square) return ZERO;
  const { sign, total, prefactor } = racahParts(square);
  return timesRoot(BigInt(sign) * total, prefactor);
}

/**
 * ⟨j1 m1 j2 m2 | J M⟩ = (−1)^(j1−j2+M) √(2J+1) (j1 j2 J; m1 m2 −M) (DLMF 34.1.1, VMK 8.1(12)), and 0 when a rule fails.
 */
export function clebschGordan(entries: ThreeJ): Exact {
  const square = reggeSquare(entries);
  if (!square) return ZERO;
  const [a, b, c, , , z] = entries;
  const { sign, total, prefactor } = racahParts(square);
  timesInteger(prefactor, c + 1, 1);
  const phase = ((a - b - z) / 2) % 2 === 0 ? 1n : -1n;
  return timesRoot(phase * BigInt(sign) * total, prefactor);
}

/** C(n, k) for 0 ≤ k ≤ n, multiplied up so that each step is whole. */
export function binomial(n: number, k: number): bigint {
  const m = BigInt(Math.min(k, n - k));
  let result = 1n;
  for (let i = 1n; i <= m; i++) result = (result * (BigInt(n) - m + i)) / i;
  return result;
}
