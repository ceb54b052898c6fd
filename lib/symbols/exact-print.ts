import Fraction from "fraction.js";
import { imaginaryPart, isReal, realPart, sign, type Exact } from "@/lib/symbols/exact";
import { roundScaled, roundSignificant, type Rounding } from "@/lib/symbols/rounding";
import type { Term } from "@/lib/symbols/term";

/**
 * How a house prints a value, here −√(2/15): "rationalised" −√30/15, "single-root" −√(2/15), "root-below" −√2/√15 (so that
 * 1/√6 keeps its root below), "signed-square" −2/15 with the root understood; "any" prescribes nothing.
 */
export type HouseForm = "rationalised" | "single-root" | "root-below" | "signed-square" | "any";

type Script = "text" | "latex";

/** The factors of one printed term, each in the script that is being written. */
type Factors = { negative: boolean; above: string[]; below: string[] };

/** Typed notation, rationalised: `sqrt(30)/15`, `-1/2`, `0`, `1 + 2*sqrt(2)/3`, `sqrt(15)/(2*sqrt(pi))`, `i/2`. */
export function toText(x: Exact): string {
  return toForm(x, "rationalised", "text");
}

/** LaTeX, rationalised: `\frac{\sqrt{30}}{15}`, `-\frac{1}{2}`. */
export function toLatex(x: Exact): string {
  return toForm(x, "rationalised", "latex");
}

/**
 * x in a house form. Each printed form reads back as the same value ("signed-square" where the root is understood). A sum of
 * several terms has no single root and no signed square, and an imaginary value has no signed square: they are printed rationalised.
 */
export function toForm(x: Exact, form: HouseForm, script: Script): string {
  const [only] = x.terms;
  if (!only) return "0";
  if (x.terms.length === 1 && form === "signed-square" && !only.i)
    return write(squareFactors(only, script), script);
  const inner = x.terms.length > 1 || form === "any" || form === "signed-square" ? "rationalised" : form;
  return x.terms
    .map((term, n) => {
      const factors = termFactors(term, inner, script);
      const joint = n === 0 ? (factors.negative ? "-" : "") : factors.negative ? " - " : " + ";
      return joint + write({ ...factors, negative: false }, script);
    })
    .join("");
}

/** Whether x has a form of that name of its own (otherwise toForm falls back on the rationalised one). */
export function hasForm(x: Exact, form: HouseForm): boolean {
  if (x.terms.length <= 1) return form !== "signed-square" || isReal(x);
  return form === "rationalised" || form === "any";
}

function termFactors(
  term: Term,
  form: "rationalised" | "single-root" | "root-below",
  script: Script,
): Factors {
  const { n, d, s } = term.coefficient;
  const above: string[] = [];
  const below: string[] = [];
  const odd = term.pi % 2 !== 0;
  if (form === "single-root" && (term.radicand !== 1n || odd)) {
    // Everything goes under the root; only the sign and i stay outside.
    const square = new Fraction(n * n * term.radicand, d * d);
    const top = [...whole(square.n), ...powerOfPi(2 * term.pi, script)];
    const bottom = [...whole(square.d), ...powerOfPi(-2 * term.pi, script)];
    above.push(rootOf(quotient(top, bottom, script), script));
  } else if (form === "root-below") {
    // √(u·v) with v the part shared with the denominator: p√(uv)/(v·q') = p√u/(q'√v).
    const v = gcd(term.radicand, d);
    const u = term.radicand / v;
    above.push(
      ...whole(n),
      ...(u === 1n ? [] : [rootOf(u.toString(), script)]),
      ...powerOfPi(term.pi, script),
    );
    below.push(
      ...whole(d / v),
      ...(v === 1n ? [] : [rootOf(v.toString(), script)]),
      ...powerOfPi(-term.pi, script),
    );
  } else {
    const surd = term.radicand === 1n ? [] : [rootOf(term.radicand.toString(), script)];
    above.push(...whole(n), ...surd, ...powerOfPi(term.pi, script));
    below.push(...whole(d), ...powerOfPi(-term.pi, script));
  }
  if (term.i) above.splice(/^\d/.test(above[0] ?? "") ? 1 : 0, 0, "i"); // 2i√3: after the number, before the root
  return { negative: s < 0n, above, below };
}

function squareFactors(term: Term, script: Script): Factors {
  const square = term.coefficient.mul(term.coefficient).mul(new Fraction(term.radicand));
  return {
    negative: term.coefficient.s < 0n,
    above: [...whole(square.n), ...powerOfPi(2 * term.pi, script)],
    below: [...whole(square.d), ...powerOfPi(-2 * term.pi, script)],
  };
}

function whole(n: bigint): string[] {
  return n === 1n ? [] : [n.toString()];
}

/** π^(half/2) for half > 0, as a factor; nothing for half ≤ 0 (then it belongs to the other side of the fraction). */
function powerOfPi(half: number, script: Script): string[] {
  if (half <= 0) return [];
  const pi = script === "text" ? "pi" : "\\pi";
  if (half === 1) return [rootOf(pi, script)];
  if (half === 2) return [pi];
  if (script === "latex") return [`\\pi^{${half % 2 ? `${half}/2` : half / 2}}`];
  return [half % 2 ? `pi^(${half}/2)` : `pi^${half / 2}`];
}

function rootOf(inside: string, script: Script): string {
  return script === "text" ? `sqrt(${inside})` : `\\sqrt{${inside}}`;
}

function write(factors: Factors, script: Script): string {
  return (factors.negative ? "-" : "") + quotient(factors.above, factors.below, script);
}

function quotient(above: string[], below: string[], script: Script): string {
  const top = product(above, script);
  if (below.length === 0) return top;
  if (script === "latex") return `\\frac{${top}}{${product(below, script)}}`;
  return below.length === 1 ? `${top}/${below[0]}` : `${top}/(${product(below, script)})`;
}

function product(factors: string[], script: Script): string {
  if (factors.length === 0) return "1";
  if (script === "text") return factors.join("*");
  // A number must not touch a letter-named command without its own end: "2\pi" and "2\sqrt{3}" are both unambiguous.
  return factors.join("");
}

/**
 * x as a decimal of so many significant digits, correctly rounded (ties to even; see Rounding), zeros written out: 1/8 to five
 * digits is "0.12500", 0 is "0". Below 1e-7 and from 1e21 in the form "1.25e-9". A value with an imaginary part gives "0.5 + 0.5*i".
 */
export function toDecimal(x: Exact, significantDigits: number, rounding: Rounding = "half-even"): string {
  if (!isReal(x)) return complexDecimal(x, (part) => toDecimal(part, significantDigits, rounding));
  const rounded = roundSignificant(x, significantDigits, rounding);
  if (!rounded) return "0";
  const minus = sign(x) < 0 ? "-" : "";
  const { digits, exponent } = rounded;
  if (exponent < -7 || exponent >= 21) {
    return `${minus}${digits.slice(0, 1)}${digits.length > 1 ? `.${digits.slice(1)}` : ""}e${exponent}`;
  }
  if (exponent < 0) return `${minus}0.${"0".repeat(-exponent - 1)}${digits}`;
  const padded = digits.padEnd(exponent + 1, "0");
  const decimals = padded.slice(exponent + 1);
  return minus + padded.slice(0, exponent + 1) + (decimals ? `.${decimals}` : "");
}

/** x with exactly so many decimal places (≥ 0), correctly rounded; a value that rounds to nothing is "0.00", without a sign. */
export function toDecimalPlaces(x: Exact, places: number, rounding: Rounding = "half-even"): string {
  if (places < 0) throw new RangeError("The number of decimal places is not negative.");
  if (!isReal(x)) return complexDecimal(x, (part) => toDecimalPlaces(part, places, rounding));
  const scaled = roundScaled(x, places, rounding);
  const digits = (scaled < 0n ? -scaled : scaled).toString().padStart(places + 1, "0");
  const point = digits.length - places;
  return `${scaled < 0n ? "-" : ""}${digits.slice(0, point)}${places ? `.${digits.slice(point)}` : ""}`;
}

function complexDecimal(x: Exact, print: (part: Exact) => string): string {
  const real = realPart(x);
  const imaginary = print(imaginaryPart(x));
  if (real.terms.length === 0) return `${imaginary}*i`;
  return imaginary.startsWith("-")
    ? `${print(real)} - ${imaginary.slice(1)}*i`
    : `${print(real)} + ${imaginary}*i`;
}

function gcd(a: bigint, b: bigint): bigint {
  while (b) [a, b] = [b, a % b];
  return a;
}
