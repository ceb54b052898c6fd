import { TooCostly } from "@/lib/symbols/failures";
import { integerRoot } from "@/lib/symbols/square-free";
import type { Term } from "@/lib/symbols/term";

/** low ≤ value·2^bits ≤ high, both integers. */
export type Interval = Readonly<{ low: bigint; high: bigint }>;

/** Working precision above which a decision is refused (about 30,000 decimal digits). */
export const MOST_BITS = 100_000;

/** An interval that holds value·2^bits for a real sum of terms; its width is at most a few units a term. */
export function enclose(terms: readonly Term[], bits: number): Interval {
  let low = 0n;
  let high = 0n;
  for (const term of terms) {
    const size = encloseTerm(term, bits);
    low += term.coefficient.s < 0n ? -size.high : size.low;
    high += term.coefficient.s < 0n ? -size.low : size.high;
  }
  return { low, high };
}

/** |coefficient|·√radicand·π^(pi/2), scaled. */
function encloseTerm(term: Term, bits: number): Interval {
  const { n, d } = term.coefficient;
  // The square of the term without π, n²·r/d², is rational: one integer root encloses it.
  const guard = term.pi === 0 ? 0 : 8 + Math.abs(term.pi) + bitLength(n) + (bitLength(term.radicand) >> 1);
  const scale = BigInt(bits + guard);
  const top = (n * n * term.radicand) << (2n * scale);
  const bottom = d * d;
  const low = integerRoot(top / bottom);
  const exact = low * low * bottom === top;
  const surd: Interval = { low, high: exact ? low : low + 1n };
  if (term.pi === 0) return surd;
  return shrink(timesPower(surd, term.pi, bits + guard), guard);
}

function shrink(x: Interval, by: number): Interval {
  const shift = BigInt(by);
  return { low: x.low >> shift, high: -(-x.high >> shift) };
}

/** An interval at 2^bits times π^(half/2). */
function timesPower(x: Interval, half: number, bits: number): Interval {
  const scale = BigInt(bits);
  const pi = enclosePi(bits);
  const rootPi: Interval = { low: integerRoot(pi.low << scale), high: integerRoot(pi.high << scale) + 1n };
  let result = x;
  for (let n = Math.abs(half); n > 0; n -= n >= 2 ? 2 : 1) {
    const factor = n >= 2 ? pi : rootPi;
    result =
      half > 0
        ? { low: (result.low * factor.low) >> scale, high: -((-result.high * factor.high) >> scale) }
        : { low: (result.low << scale) / factor.high, high: (result.high << scale) / factor.low + 1n };
  }
  return result;
}

/** π·2^bits by Machin's formula π = 16 arctan(1/5) − 4 arctan(1/239); the omitted tails are below the guard. */
function enclosePi(bits: number): Interval {
  const guard = 32n;
  const one = 1n << (BigInt(bits) + guard);
  const value = 16n * arctanInverse(5n, one) - 4n * arctanInverse(239n, one);
  // Each of the fewer than bits terms is off by less than one unit, times 20: far below 2^32 units.
  const error = BigInt(20 * (bits + 64));
  return { low: (value - error) >> guard, high: ((value + error) >> guard) + 1n };
}

/** arctan(1/n)·one by its alternating series. */
function arctanInverse(n: bigint, one: bigint): bigint {
  const square = n * n;
  let power = one / n;
  let sum = power;
  for (let k = 3n, sign = -1n; power !== 0n; k += 2n, sign = -sign) {
    power /= square;
    sum += (sign * power) / k;
  }
  return sum;
}

/** The sign of a real sum. A canonical sum is 0 only when it has no terms, so refining the interval must end. */
export function signOfSum(terms: readonly Term[]): -1 | 0 | 1 {
  const [first] = terms;
  if (!first) return 0;
  if (terms.length === 1) return first.coefficient.s < 0n ? -1 : 1;
  const sized = Math.max(...terms.map((t) => bitLength(t.coefficient.d)));
  for (let bits = 64 + sized; bits <= MOST_BITS; bits *= 2) {
    const { low, high } = enclose(terms, bits);
    if (low > 0n) return 1;
    if (high < 0n) return -1;
  }
  throw new TooCostly("Two values lie too close together to be told apart within the stated precision.");
}

/** Number of binary digits of n ≥ 0. */
export function bitLength(n: bigint): number {
  return n === 0n ? 0 : n.toString(16).length * 4;
}
