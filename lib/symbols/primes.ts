import Fraction from "fraction.js";
import { surd, type Exact } from "@/lib/symbols/exact";
import { primesUpTo } from "@/lib/symbols/square-free";

/** A positive rational as prime exponents: exponents[n] belongs to primes[n]. */
export type PrimeExponents = { readonly primes: readonly number[]; readonly exponents: number[] };

/** The number 1, with room for all primes up to `largest`. */
export function unit(largest: number): PrimeExponents {
  const primes = primesUpTo(Math.max(2, largest));
  return { primes, exponents: new Array<number>(primes.length).fill(0) };
}

/** Multiplies in place by (n!)^times, by Legendre's formula for the exponent of each prime in n!. */
export function timesFactorial(x: PrimeExponents, n: number, times: number): void {
  for (let k = 0; k < x.primes.length; k++) {
    const p = x.primes[k] as number;
    if (p > n) break;
    let exponent = 0;
    for (let q = Math.floor(n / p); q > 0; q = Math.floor(q / p)) exponent += q;
    x.exponents[k] = (x.exponents[k] as number) + times * exponent;
  }
}

/** Multiplies in place by n^times for a small n ≥ 1 whose primes are all among x.primes. */
export function timesInteger(x: PrimeExponents, n: number, times: number): void {
  let rest = n;
  for (let k = 0; rest > 1; k++) {
    const p = x.primes[k];
    if (p === undefined) throw new RangeError(`${n} has a prime factor that there is no room for.`);
    for (; rest % p === 0; rest /= p) x.exponents[k] = (x.exponents[k] as number) + times;
  }
}

/** factor·√x: the square root is read off the exponents, so nothing has to be factored. */
export function timesRoot(factor: bigint, x: PrimeExponents): Exact {
  let above = factor;
  let below = 1n;
  let radicand = 1n;
  x.exponents.forEach((e, k) => {
    if (e === 0) return;
    const p = BigInt(x.primes[k] as number);
    const half = Math.floor(e / 2); // an odd negative exponent leaves one p under the root: p^-3 = (p^-2)²·p
    if (half > 0) above *= p ** BigInt(half);
    if (half < 0) below *= p ** BigInt(-half);
    if (e % 2 !== 0) radicand *= p;
  });
  return surd(new Fraction(above, below), radicand);
}

/** The pairs [prime, exponent] with an exponent other than 0. */
export function listPrimes(x: PrimeExponents): [number, number][] {
  return x.primes.flatMap((p, k): [number, number][] => {
    const e = x.exponents[k] as number;
    return e === 0 ? [] : [[p, e]];
  });
}
