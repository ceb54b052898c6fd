import { TooCostly } from "@/lib/symbols/failures";

/** Trial division of a radicand goes up to this prime; what is left is then square-free up to its cube. */
export const TRIAL_LIMIT = 200_000;
/** A radicand with more digits than this is refused unread. */
export const RADICAND_DIGITS = 20_000;

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);

let smallPrimes: readonly number[] | null = null;

/** All primes up to TRIAL_LIMIT: made once, at first use, and only read afterwards (about 18,000 numbers). */
function trialPrimes(): readonly number[] {
  return (smallPrimes ??= primesUpTo(TRIAL_LIMIT));
}

/** The primes p ≤ n in order (sieve of Eratosthenes). */
export function primesUpTo(n: number): number[] {
  const composite = new Uint8Array(n + 1);
  const primes: number[] = [];
  for (let p = 2; p <= n; p++) {
    if (composite[p]) continue;
    primes.push(p);
    for (let q = p * p; q <= n; q += p) composite[q] = 1;
  }
  return primes;
}

/** ⌊√n⌋ for n ≥ 0, by Newton's method from above. */
export function integerRoot(n: bigint): bigint {
  if (n < 2n) return n;
  if (n <= SAFE) {
    const guess = BigInt(Math.floor(Math.sqrt(Number(n))));
    return guess * guess > n ? guess - 1n : (guess + 1n) * (guess + 1n) <= n ? guess + 1n : guess;
  }
  let x = 1n << BigInt((n.toString(16).length * 4) / 2 + 1);
  for (;;) {
    const y = (x + n / x) >> 1n;
    if (y >= x) return x;
    x = y;
  }
}

/**
 * n = outside² · inside with a square-free inside, for n ≥ 1. The cost is bounded: trial division up to
 * TRIAL_LIMIT, and what is left is settled when it is below the cube of that limit or a perfect square.
 * @throws TooCostly when the remaining factor is larger, because deciding it would need a long factorisation
 */
export function squareFree(n: bigint): { outside: bigint; inside: bigint } {
  if (n < 1n) throw new RangeError("Only a positive integer has a square-free part.");
  if (n >= 1n << BigInt(Math.ceil(RADICAND_DIGITS * Math.log2(10)))) throw tooLong();
  let rest = n;
  let outside = 1n;
  let inside = 1n;
  const take = (p: bigint, count: number) => {
    if (count > 1) outside *= p ** BigInt(count >> 1);
    if (count & 1) inside *= p;
  };
  for (const prime of trialPrimes()) {
    if (rest === 1n) break;
    if (rest <= SAFE) {
      if (prime * prime > Number(rest)) break; // what is left is 1 or a prime
      if (Number(rest) % prime) continue;
    }
    const p = BigInt(prime);
    let count = 0;
    while (rest % p === 0n) {
      rest /= p;
      count++;
    }
    if (count) take(p, count);
  }
  if (rest === 1n) return { outside, inside };
  const root = integerRoot(rest);
  if (root * root === rest) {
    // Every prime of root is above the limit, so root itself only has to be a whole number.
    return { outside: outside * root, inside };
  }
  if (rest >= BigInt(TRIAL_LIMIT) ** 3n) throw tooLong();
  return { outside, inside: inside * rest };
}

function tooLong(): TooCostly {
  return new TooCostly(
    `A number under a root has prime factors above ${TRIAL_LIMIT.toLocaleString("en-GB")} and is too long to be split ` +
      "into its factors here. Write the root with smaller numbers.",
  );
}
