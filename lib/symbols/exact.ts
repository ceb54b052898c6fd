import Fraction from "fraction.js";
import { OutsideDomain, TooCostly } from "@/lib/symbols/failures";
import { signOfSum } from "@/lib/symbols/interval";
import { integerRoot, squareFree } from "@/lib/symbols/square-free";
import { collect, type Term } from "@/lib/symbols/term";

/**
 * An exact value: a finite sum of rational · √(square-free) · π^(n/2) · i^k. Immutable and canonical (one
 * term a kind, sorted, none zero), so two values are equal exactly when their terms are.
 */
export type Exact = Readonly<{ terms: readonly Term[] }>;

/**
 * Limits of arithmetic; an operation that would pass them throws TooCostly before it works. terms: products of terms that one
 * multiplication may make; digits: of the longest number that may go into an operation; power: the largest exponent.
 */
export const EXACT_LIMITS = { terms: 1_024, digits: 10_000, power: 2_000 } as const;

const TOO_LONG = 10n ** BigInt(EXACT_LIMITS.digits);

export const ZERO: Exact = { terms: [] };
export const ONE: Exact = rational(1n);
export const PI: Exact = { terms: [{ coefficient: new Fraction(1n), radicand: 1n, pi: 2, i: 0 }] };
export const I: Exact = { terms: [{ coefficient: new Fraction(1n), radicand: 1n, pi: 0, i: 1 }] };

/** The integer n. */
export function integer(n: bigint | number): Exact {
  return rational(new Fraction(n));
}

/** The rational number n/d, or a Fraction. @throws OutsideDomain on a denominator of 0 */
export function rational(n: Fraction | bigint | number, d: bigint | number = 1n): Exact {
  if (BigInt(d) === 0n) throw new OutsideDomain("A division by zero has no value.");
  const q = n instanceof Fraction ? n.div(new Fraction(d)) : new Fraction(BigInt(n), BigInt(d));
  return q.n === 0n ? ZERO : { terms: [{ coefficient: q, radicand: 1n, pi: 0, i: 0 }] };
}

/** √q for a rational q; a negative q gives i√|q|. @throws TooCostly when q cannot be reduced at a bounded cost */
export function root(q: Fraction | bigint | number): Exact {
  const f = q instanceof Fraction ? q : new Fraction(q);
  if (f.n === 0n) return ZERO;
  const above = squareFree(f.n);
  const below = squareFree(f.d);
  // √(n/d) = (a/b)·√(u/v) = (a/(b·v))·√(u·v); u and v are coprime because n/d is reduced.
  const coefficient = new Fraction(above.outside, below.outside * below.inside);
  return { terms: [{ coefficient, radicand: above.inside * below.inside, pi: 0, i: f.s < 0n ? 1 : 0 }] };
}

/** coefficient·√radicand where the radicand is known to be square-free, as when it is read off prime exponents. */
export function surd(coefficient: Fraction, radicand: bigint): Exact {
  return coefficient.n === 0n ? ZERO : { terms: [{ coefficient, radicand, pi: 0, i: 0 }] };
}

export function add(x: Exact, y: Exact): Exact {
  if (x.terms.length === 0) return y;
  if (y.terms.length === 0) return x;
  limit(x, y, x.terms.length + y.terms.length);
  return { terms: collect([...x.terms, ...y.terms]) };
}

export function negate(x: Exact): Exact {
  return { terms: x.terms.map((t) => ({ ...t, coefficient: t.coefficient.neg() })) };
}

export function subtract(x: Exact, y: Exact): Exact {
  return add(x, negate(y));
}

export function multiply(x: Exact, y: Exact): Exact {
  limit(x, y, x.terms.length * y.terms.length);
  return { terms: collect(x.terms.flatMap((a) => y.terms.map((b) => timesTerm(a, b)))) };
}

/** √r·√s = g·√((r/g)(s/g)) with g = gcd(r, s), again square-free: no factoring. */
function timesTerm(a: Term, b: Term): Term {
  const common = a.radicand === 1n || b.radicand === 1n ? 1n : gcd(a.radicand, b.radicand);
  let coefficient = a.coefficient.mul(b.coefficient);
  if (common !== 1n) coefficient = coefficient.mul(new Fraction(common));
  if (a.i + b.i === 2) coefficient = coefficient.neg();
  const radicand = (a.radicand / common) * (b.radicand / common);
  return { coefficient, radicand, pi: a.pi + b.pi, i: ((a.i + b.i) % 2) as 0 | 1 };
}

/**
 * x/y. A denominator that is a sum of surds is cleared by its conjugates; one with several powers of π divides
 * only where the quotient is again a finite sum.
 * @throws OutsideDomain for y = 0 or a quotient outside the domain, TooCostly for a denominator of many roots
 */
export function divide(x: Exact, y: Exact): Exact {
  if (isZero(y)) throw new OutsideDomain("A division by zero has no value.");
  if (y.terms.length === 1) return multiply(x, inverseOfTerm(y.terms[0] as Term));
  const powers = new Set(y.terms.map((t) => t.pi));
  if (powers.size === 1) return multiply(x, inverseOfSum(y));
  return divideByPiSum(x, y);
}

function inverseOfTerm(t: Term): Exact {
  // 1/(c√r·i) = -i√r/(c·r)
  const coefficient = t.coefficient.mul(new Fraction(t.radicand)).inverse();
  return {
    terms: [{ coefficient: t.i ? coefficient.neg() : coefficient, radicand: t.radicand, pi: -t.pi, i: t.i }],
  };
}

/**
 * Inverse of a sum whose terms share one power of π. Each independent root √b (and i) is removed in turn: with σ
 * the automorphism √b → -√b, the product y·σ(y) contains it no more.
 */
function inverseOfSum(y: Exact): Exact {
  const basis = coprimeBasis(y.terms.map((t) => t.radicand));
  if (basis.length > 7) {
    throw new TooCostly("The denominator is a sum of too many different roots to be cleared.");
  }
  let numerator = ONE;
  let denominator = y;
  const clear = (conjugate: Exact) => {
    numerator = multiply(numerator, conjugate);
    denominator = multiply(denominator, conjugate);
  };
  if (y.terms.some((t) => t.i)) clear(flip(denominator, (t) => t.i === 1));
  for (const b of basis) {
    if (denominator.terms.some((t) => t.radicand % b === 0n))
      clear(flip(denominator, (t) => t.radicand % b === 0n));
  }
  return multiply(numerator, inverseOfTerm(denominator.terms[0] as Term));
}

function flip(x: Exact, chosen: (t: Term) => boolean): Exact {
  return { terms: x.terms.map((t) => (chosen(t) ? { ...t, coefficient: t.coefficient.neg() } : t)) };
}

/** Pairwise coprime numbers > 1 such that each radicand is a product of some of them (no factoring needed). */
function coprimeBasis(radicands: readonly bigint[]): bigint[] {
  let basis: bigint[] = [];
  for (const radicand of radicands) {
    let rest = radicand;
    const next: bigint[] = [];
    for (const b of basis) {
      const g = gcd(b, rest);
      if (g > 1n) next.push(g);
      if (b / g > 1n) next.push(b / g);
      rest /= g;
    }
    if (rest > 1n) next.push(rest);
    basis = next;
  }
  return basis;
}

/** Long division in powers of √π, whose coefficients form a field; π is transcendental, so the remainder decides. */
function divideByPiSum(x: Exact, y: Exact): Exact {
  const lead = highestPower(y);
  const inverse = inverseOfSum(lead.part);
  const lowest = Math.min(...y.terms.map((t) => t.pi));
  let rest = x;
  let quotient = ZERO;
  while (!isZero(rest)) {
    const top = highestPower(rest);
    const bottom = Math.min(...rest.terms.map((t) => t.pi));
    if (top.power - bottom < lead.power - lowest) {
      throw new OutsideDomain("This quotient is no finite sum of roots and powers of π.");
    }
    const step = multiply(top.part, inverse);
    quotient = add(quotient, step);
    rest = subtract(rest, multiply(step, y));
  }
  return quotient;
}

function highestPower(x: Exact): { power: number; part: Exact } {
  const power = Math.max(...x.terms.map((t) => t.pi));
  return { power, part: { terms: x.terms.filter((t) => t.pi === power) } };
}

/**
 * x to a rational power whose denominator is 1 or 2 (x^(n/2) is the n-th power of the principal square root).
 * @throws OutsideDomain for 0 to a negative power, another denominator, or a root outside the domain
 */
export function power(x: Exact, exponent: Fraction | bigint | number): Exact {
  const e = exponent instanceof Fraction ? exponent : new Fraction(exponent);
  if (e.d === 2n) return power(squareRoot(x), new Fraction(e.s * e.n));
  if (e.d !== 1n) throw new OutsideDomain("Only whole and half powers can be taken.");
  if (e.n === 0n) return ONE;
  if (isZero(x) && e.s < 0n) throw new OutsideDomain("Zero to a negative power has no value.");
  if (e.n > BigInt(EXACT_LIMITS.power) || Number(e.n) * digitsOf(x) > EXACT_LIMITS.digits) {
    const one = x.terms.length === 1 && /^-?1?i?$/.test(unitOf(x));
    if (!one) throw new TooCostly(`A power of ${e.n} is larger than can be worked out here.`);
    return power(x, e.n % 4n); // 1, -1, i and -i repeat after four steps; their inverses as well
  }
  const base = e.s < 0n ? divide(ONE, x) : x;
  let result = ONE;
  let square = base;
  for (let n = e.n; ;) {
    if (n & 1n) result = multiply(result, square);
    n >>= 1n;
    if (n === 0n) return result;
    square = multiply(square, square);
  }
}

/** "1", "-1", "i", "-i" for these four values, something else otherwise. */
function unitOf(x: Exact): string {
  const t = x.terms[0] as Term;
  const plain = t.radicand === 1n && t.pi === 0 && t.coefficient.n === 1n && t.coefficient.d === 1n;
  return plain ? `${t.coefficient.s < 0n ? "-" : ""}${t.i ? "i" : "1"}` : "other";
}

/**
 * The principal square root (positive, or with positive real part, or on the positive imaginary axis), where it
 * is again such a sum: of a rational or i times one, times an even power of π, or of a sum such as 3 + 2√2 = (1 + √2)².
 * @throws OutsideDomain otherwise
 */
export function squareRoot(x: Exact): Exact {
  if (isZero(x)) return ZERO;
  const pi = (x.terms[0] as Term).pi;
  if (pi % 2 !== 0 || x.terms.some((t) => t.pi !== pi) || x.terms.length > 2) throw noRoot();
  const scale: Exact = { terms: [{ coefficient: new Fraction(1n), radicand: 1n, pi: pi / 2, i: 0 }] };
  const plain = x.terms.map((t) => ({ ...t, pi: 0 }));
  const [a, b] = plain.length === 2 ? plain : splitSingle(plain[0] as Term);
  if (a && (a.radicand !== 1n || a.i !== 0)) throw noRoot();
  if (!b) return multiply(scale, root((a as Term).coefficient));
  // √(a + w) = √((a+d)/2) ± √((a-d)/2) with d² = a² - w², when d is rational.
  const half = a?.coefficient ?? new Fraction(0n);
  const square = b.coefficient.mul(b.coefficient).mul(new Fraction(b.i ? -b.radicand : b.radicand));
  const d = rationalRoot(half.mul(half).sub(square));
  if (!d) throw noRoot();
  const first = root(half.add(d).div(2));
  const second = root(half.sub(d).div(2));
  const found = [add(first, second), subtract(first, second)].find((r) =>
    equals(multiply(r, r), { terms: plain }),
  );
  if (!found) throw noRoot();
  const leading = isZero(realPart(found)) ? imaginaryPart(found) : realPart(found);
  return multiply(scale, signOfSum(leading.terms) < 0 ? negate(found) : found);
}

/** A single term as (rational part, other part). */
function splitSingle(t: Term): [Term | null, Term | null] {
  return t.radicand === 1n && t.i === 0 ? [t, null] : [null, t];
}

function rationalRoot(q: Fraction): Fraction | null {
  if (q.s < 0n) return null;
  const n = integerRoot(q.n);
  const d = integerRoot(q.d);
  return n * n === q.n && d * d === q.d ? new Fraction(n, d) : null;
}

function noRoot(): OutsideDomain {
  return new OutsideDomain("The square root of this value is no finite sum of square roots and powers of π.");
}

/** Exact equality: canonical sums are equal exactly when their terms are (roots and powers of π are independent). */
export function equals(x: Exact, y: Exact): boolean {
  return (
    x.terms.length === y.terms.length &&
    x.terms.every((a, n) => {
      const b = y.terms[n] as Term;
      return (
        a.radicand === b.radicand &&
        a.pi === b.pi &&
        a.i === b.i &&
        a.coefficient.s === b.coefficient.s &&
        a.coefficient.n === b.coefficient.n &&
        a.coefficient.d === b.coefficient.d
      );
    })
  );
}

export function isZero(x: Exact): boolean {
  return x.terms.length === 0;
}

export function isReal(x: Exact): boolean {
  return x.terms.every((t) => t.i === 0);
}

/** The rational number that x is, or null. */
export function asRational(x: Exact): Fraction | null {
  if (isZero(x)) return new Fraction(0n);
  const [t] = x.terms;
  return x.terms.length === 1 && t && t.radicand === 1n && t.pi === 0 && t.i === 0 ? t.coefficient : null;
}

export function realPart(x: Exact): Exact {
  return { terms: x.terms.filter((t) => t.i === 0) };
}

/** The real number y of x = … + iy. */
export function imaginaryPart(x: Exact): Exact {
  return { terms: x.terms.filter((t) => t.i === 1).map((t) => ({ ...t, i: 0 as const })) };
}

/** The sign of a real value, decided exactly by intervals over integers. @throws OutsideDomain if it is not real */
export function sign(x: Exact): -1 | 0 | 1 {
  if (!isReal(x)) throw new OutsideDomain("A value with an imaginary part has no sign.");
  return signOfSum(x.terms);
}

/** The sign of x − y, both real. @throws OutsideDomain otherwise */
export function compare(x: Exact, y: Exact): -1 | 0 | 1 {
  return sign(subtract(x, y));
}

/** |x| of a real value. */
export function absolute(x: Exact): Exact {
  return sign(x) < 0 ? negate(x) : x;
}

/** Digits of the longest number in x: a measure of the work that an operation on it costs. */
export function digitsOf(x: Exact): number {
  const longest = (n: bigint) => Math.ceil(n.toString(16).length * 1.21);
  return Math.max(
    1,
    ...x.terms.map((t) => Math.max(longest(t.coefficient.n), longest(t.coefficient.d), longest(t.radicand))),
  );
}

function limit(x: Exact, y: Exact, terms: number): void {
  if (terms > EXACT_LIMITS.terms)
    throw new TooCostly("This expression has too many different roots to be worked out.");
  const long = (t: Term) =>
    t.coefficient.n >= TOO_LONG || t.coefficient.d >= TOO_LONG || t.radicand >= TOO_LONG;
  if (x.terms.some(long) || y.terms.some(long)) {
    throw new TooCostly(
      `This expression has a number of more than ${EXACT_LIMITS.digits.toLocaleString("en-GB")} digits.`,
    );
  }
}

function gcd(a: bigint, b: bigint): bigint {
  while (b) [a, b] = [b, a % b];
  return a;
}
