import Fraction from "fraction.js";
import { asRational, sign, type Exact } from "@/lib/symbols/exact";
import { OutsideDomain, TooCostly } from "@/lib/symbols/failures";
import { bitLength, enclose, MOST_BITS } from "@/lib/symbols/interval";

/**
 * What is done with the digits that are left off. "half-even" and "half-away" are the two roundings in use and differ only
 * on exact ties, which only rational values can have; "truncate" drops the digits.
 */
export type Rounding = "half-even" | "half-away" | "truncate";

/** Most decimal digits that are worked out. */
export const MOST_DIGITS = 10_000;

/**
 * x·10^places rounded to an integer, for a real x: exactly decided, ties included. Negative places round before the
 * decimal mark.
 * @throws OutsideDomain when x is not real, TooCostly when more than MOST_DIGITS are asked for
 */
export function roundScaled(x: Exact, places: number, rounding: Rounding = "half-even"): bigint {
  if (!Number.isInteger(places) || Math.abs(places) > MOST_DIGITS) {
    throw new TooCostly(`At most ${MOST_DIGITS.toLocaleString("en-GB")} decimal digits are worked out.`);
  }
  const ten = new Fraction(10n ** BigInt(Math.abs(places)));
  const scale = places < 0 ? ten.inverse() : ten;
  const scaled: Exact = { terms: x.terms.map((t) => ({ ...t, coefficient: t.coefficient.mul(scale) })) };
  const q = asRational(scaled);
  const size = q ? roundRational(q.n, q.d, rounding) : roundIrrational(scaled, rounding);
  return sign(x) < 0 ? -size : size;
}

function roundRational(n: bigint, d: bigint, rounding: Rounding): bigint {
  const whole = n / d;
  const twice = 2n * (n % d);
  const up =
    rounding !== "truncate" &&
    (twice > d || (twice === d && (rounding === "half-away" || whole % 2n === 1n)));
  return up ? whole + 1n : whole;
}

/** An irrational value is never a tie, so both ends of a fine enough interval round alike. */
function roundIrrational(x: Exact, rounding: Rounding): bigint {
  if (x.terms.some((t) => t.i))
    throw new OutsideDomain("A value with an imaginary part cannot be rounded as one number.");
  const start =
    64 +
    Math.max(...x.terms.map((t) => Math.max(0, bitLength(t.coefficient.d) - bitLength(t.coefficient.n))));
  for (let bits = start; bits <= MOST_BITS; bits *= 2) {
    const { low, high } = enclose(x.terms, bits);
    if (low <= 0n && high >= 0n) continue;
    const [near, far] = low > 0n ? [low, high] : [-high, -low];
    const half = rounding === "truncate" ? 0n : 1n << BigInt(bits - 1);
    const a = (near + half) >> BigInt(bits);
    if (a === (far + half) >> BigInt(bits)) return a;
  }
  throw new TooCostly(
    "This value lies too close to a rounding boundary to be rounded within the stated precision.",
  );
}

/** The exponent e with 10^e ≤ |x| < 10^(e+1), for a real x ≠ 0. */
export function decimalExponent(x: Exact): number {
  for (let places = 0; places <= MOST_DIGITS; places = places ? 2 * places : 20) {
    const digits = roundScaled(x, places, "truncate").toString().replace("-", "");
    if (digits !== "0") return digits.length - 1 - places;
  }
  throw new TooCostly("This value is too small for its decimal digits to be worked out.");
}

/** x rounded to so many significant digits: digits (no sign) and the exponent of the first one. Null for 0. */
export function roundSignificant(
  x: Exact,
  significant: number,
  rounding: Rounding = "half-even",
): { digits: string; exponent: number } | null {
  if (!Number.isInteger(significant) || significant < 1) {
    throw new RangeError("The number of significant digits is a positive integer.");
  }
  if (x.terms.length === 0) return null;
  const exponent = decimalExponent(x);
  const digits = roundScaled(x, significant - 1 - exponent, rounding)
    .toString()
    .replace("-", "");
  // 0.9996 to three digits becomes 1000 of the last place: one digit more, and a zero at its end.
  return digits.length > significant
    ? { digits: digits.slice(0, significant), exponent: exponent + 1 }
    : { digits, exponent };
}
