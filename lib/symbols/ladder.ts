import { divide, negate, ZERO, type Exact } from "@/lib/symbols/exact";
import type { Twice } from "@/lib/symbols/half";
import { timesFactorial, timesInteger, timesRoot, unit, type PrimeExponents } from "@/lib/symbols/primes";
import { binomial, type ThreeJ } from "@/lib/symbols/three-j";

/**
 * Second route, independent of Racah's sum: |J M⟩ is the eigenvector of J² in the space of products |j1 m1⟩|j2 M−m1⟩.
 *
 * In the basis f_m = √((j+m)!(j−m)!) |j m⟩ the ladder operators have whole matrix elements, J± f_m = (j∓m) f_{m±1}, and
 * J² = J1² + J2² + 2 J1z J2z + J1+J2− + J1−J2+ becomes the three-term recursion (VMK section 8.6 in this basis)
 *   (j1−m1+1)(j2+m2+1) c(m1−1) = [J(J+1) − j1(j1+1) − j2(j2+1) − 2 m1 m2] c(m1) − (j1+m1+1)(j2−m2+1) c(m1+1).
 * It is run downwards from the largest m1, where Condon and Shortley's phase makes the coefficient positive (VMK 8.1.1),
 * and the vector is normalised by Σ c² (j1±m1)!(j2±m2)! = N. Throws an Error if a step is not whole or N does not
 * factor as it must: then the program, not the symbol, is wrong.
 */
function couplingByLadder(a: number, b: number, c: number, x: number, y: number): Exact {
  const M = x + y;
  const top = Math.min(a, M + b);
  const bottom = Math.max(-a, M - b);
  // Any positive start will do; this one keeps every c(m1) a whole number.
  let current =
    top === a ? binomial((b + c - a) / 2, (b + M - a) / 2) : binomial((a + c - b) / 2, (a - top) / 2);
  let above = 0n;
  let weight = [a + top, a - top, b + M - top, b - M + top].reduce((w, d) => w * factorial(d / 2), 1n);
  let norm = 0n;
  let wanted = 0n;
  const casimir = c * (c + 2) - a * (a + 2) - b * (b + 2); // four times the j(j+1) terms
  for (let m = top; m >= bottom; m -= 2) {
    const n = M - m;
    if (m === x) wanted = current;
    norm += current * current * weight;
    if (m === bottom) break;
    const down = ((a - m) / 2 + 1) * ((b + n) / 2 + 1);
    const up = ((a + m) / 2 + 1) * ((b - n) / 2 + 1);
    const raised = BigInt((casimir - 2 * m * n) / 4) * current - BigInt(up) * above;
    const next = exactQuotient(raised, BigInt(down));
    above = current;
    current = next;
    weight = exactQuotient(weight * BigInt(down), BigInt(((a + m) / 2) * ((b - n) / 2)));
  }
  if (wanted === 0n) return ZERO;
  const under = unit((a + b + c) / 2 + 1);
  for (const d of [a + x, a - x, b + y, b - y]) timesFactorial(under, d / 2, 1);
  divideByNumber(under, norm);
  return timesRoot(wanted, under);
}

/** ⟨j1 m1 j2 m2 | J M⟩ by ladder operators; entries j1 j2 J m1 m2 −M as for a 3j, doubled. 0 when a selection rule fails. */
export function clebschGordanByLadder([a, b, c, x, y, z]: ThreeJ): Exact {
  const belongs = (j: number, m: number) => j >= 0 && Math.abs(m) <= j && (j - m) % 2 === 0;
  const coupled = x + y === -z && c <= a + b && c >= Math.abs(a - b) && (a + b + c) % 2 === 0;
  if (!coupled || !belongs(a, x) || !belongs(b, y) || !belongs(c, z)) return ZERO;
  return couplingByLadder(a, b, c, x, y);
}

/** The 3j symbol (j1 j2 j3; m1 m2 m3) = (−1)^(j1−j2−m3) ⟨j1 m1 j2 m2 | j3 −m3⟩ / √(2j3+1), the latter by ladder operators. */
export function threeJByLadder(entries: ThreeJ): Exact {
  const coupled = clebschGordanByLadder(entries);
  if (coupled === ZERO) return ZERO;
  const [a, b, c, , , z] = entries;
  const dimension = unit(c + 1);
  timesInteger(dimension, c + 1, 1);
  const value = divide(coupled, timesRoot(1n, dimension));
  return ((a - b - z) / 2) % 2 === 0 ? value : negate(value);
}

/** Number of steps of the recursion: what the second route costs, beside the length of its integers. */
export function ladderSteps([a, b, , x, y]: ThreeJ): number {
  const M = (x + y) as Twice;
  return Math.max(0, (Math.min(a, M + b) - Math.max(-a, M - b)) / 2 + 1);
}

function exactQuotient(n: bigint, d: bigint): bigint {
  if (n % d !== 0n) throw new Error("A step of the ladder recursion is not whole: the program is wrong.");
  return n / d;
}

/** Divides in place by a number that has no primes other than those of x. */
function divideByNumber(x: PrimeExponents, n: bigint): void {
  let rest = n;
  x.primes.forEach((prime, k) => {
    for (const p = BigInt(prime); rest % p === 0n; rest /= p) x.exponents[k] = (x.exponents[k] as number) - 1;
  });
  if (rest !== 1n)
    throw new Error("The norm of the ladder recursion has an impossible prime: the program is wrong.");
}

function factorial(n: number): bigint {
  let result = 1n;
  for (let k = 2n; k <= BigInt(n); k++) result *= k;
  return result;
}
