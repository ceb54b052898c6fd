import Fraction from "fraction.js";
import { root, negate, ZERO, type Exact } from "@/lib/symbols/exact";

/** sign·√(n/d), reduced. Every 3j and CG value is one; closed under ×, ÷, squaring and change of sign. */
export type SignedRoot = Readonly<{ sign: -1 | 0 | 1; n: bigint; d: bigint }>;

export const ZERO_ROOT: SignedRoot = { sign: 0, n: 0n, d: 1n };

/** sign·√(n/d) in lowest terms. */
export function signedRootOf(sign: number, n: bigint, d: bigint): SignedRoot {
  if (sign === 0 || n === 0n) return ZERO_ROOT;
  const g = gcd(n, d);
  return { sign: sign < 0 ? -1 : 1, n: n / g, d: d / g };
}

/** A real value of one term without π, as a signed root; null for any other. */
export function asSignedRoot(x: Exact): SignedRoot | null {
  const [term, ...more] = x.terms;
  if (!term) return ZERO_ROOT;
  if (more.length > 0 || term.pi !== 0 || term.i !== 0) return null;
  const { n, d, s } = term.coefficient;
  return signedRootOf(Number(s), n * n * term.radicand, d * d);
}

export function exactOf(x: SignedRoot): Exact {
  if (x.sign === 0) return ZERO;
  const size = root(new Fraction(x.n, x.d));
  return x.sign < 0 ? negate(size) : size;
}

export function keyOf(x: SignedRoot): string {
  return `${x.sign}:${x.n}/${x.d}`;
}

/** x·sign·√(n/d) */
export function scaled(x: SignedRoot, n: bigint, d: bigint, sign: 1 | -1 = 1): SignedRoot {
  return signedRootOf(x.sign * sign, x.n * n, x.d * d);
}

/** sgn(x)·x² */
export function squared(x: SignedRoot): SignedRoot {
  return signedRootOf(x.sign, x.n * x.n, x.d * x.d);
}

/** sgn(x)·√|x| where x is rational; null otherwise. */
export function rooted(x: SignedRoot): SignedRoot | null {
  const n = exactRoot(x.n);
  const d = exactRoot(x.d);
  return n === null || d === null ? null : signedRootOf(x.sign, n, d);
}

/** Largest square divisor, as far as small primes tell: x = outside²·inside. */
export function squarePart(x: bigint): { outside: bigint; inside: bigint } {
  let outside = 1n;
  let inside = 1n;
  let rest = x;
  for (let p = 2n; p <= 200n && p * p <= rest; p += p === 2n ? 1n : 2n) {
    while (rest % (p * p) === 0n) {
      outside *= p;
      rest /= p * p;
    }
    if (rest % p === 0n) {
      inside *= p;
      rest /= p;
    }
  }
  const whole = exactRoot(rest);
  return whole === null ? { outside, inside: inside * rest } : { outside: outside * whole, inside };
}

/** √x where it is whole; null otherwise. */
export function exactRoot(x: bigint): bigint | null {
  if (x < 0n) return null;
  if (x < 2n) return x;
  // Newton's steps from above; a double is near enough to begin with while it is exact to about half its digits.
  let r =
    x < 1n << 100n
      ? BigInt(Math.ceil(Math.sqrt(Number(x)))) + 1n
      : 1n << BigInt((x.toString(16).length * 4) / 2 + 1);
  for (let next = (r + x / r) >> 1n; next < r; next = (r + x / r) >> 1n) r = next;
  return r * r === x ? r : null;
}

function gcd(a: bigint, b: bigint): bigint {
  while (b) [a, b] = [b, a % b];
  return a;
}
