import Fraction from "fraction.js";
import { accidentalReason } from "@/lib/symbols/accidental";
import { divide, equals, isZero, negate, ONE, root, type Exact } from "@/lib/symbols/exact";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import type { Rule, VanishingReason } from "@/lib/symbols/kinds";
import { nineJ, nineJAllowed, nineJTerms, NINE_J_TRIADS, type NineJ } from "@/lib/symbols/nine-j";
import { applyElement, ELEMENTS, type Element } from "@/lib/symbols/regge";
import { sixJKey } from "@/lib/symbols/six-j-symmetries";
import { brokenTriads, triadRules, triadsOf } from "@/lib/symbols/triads";

const NAMES = ["j11", "j12", "j13", "j21", "j22", "j23", "j31", "j32", "j33"] as const;

/** One of the 72 symmetries of a 9j symbol: the same permutations of a 3×3 array as for the Regge square, here of the entries themselves. */
export type NineJElement = { name: string; does: string; element: Element };

/** All 72, the identity first: perhaps transposed, then rows and columns in another order; an odd permutation brings (−1)^(sum of the nine). */
export const NINE_J_ELEMENTS: readonly NineJElement[] = ELEMENTS.map((element) => {
  const plain = (order: readonly number[]) => order.every((n, place) => n === place);
  const list = (order: readonly number[]) => order.map((n) => n + 1);
  const names = [
    element.transpose ? "transposed" : "",
    plain(element.rows) ? "" : `rows ${list(element.rows).join("")}`,
    plain(element.columns) ? "" : `columns ${list(element.columns).join("")}`,
  ].filter(Boolean);
  const sentences = [
    element.transpose ? "rows and columns change places" : "",
    plain(element.rows) ? "" : `rows are written in the order ${list(element.rows).join(" ")}`,
    plain(element.columns) ? "" : `columns are written in the order ${list(element.columns).join(" ")}`,
  ].filter(Boolean);
  const does = sentences.join("; then ");
  return {
    name: names.join(", ") || "identity",
    does: does ? `${does.charAt(0).toUpperCase()}${does.slice(1)}.` : "The symbol as it is.",
    element,
  };
});

function imageOf(e: NineJElement, entries: NineJ): NineJ {
  return applyElement(e.element, entries).map((n) => fromTwice(n)) as unknown as NineJ;
}

/** Half of the doubled sum: whole for every allowed symbol. */
function sumOf(entries: NineJ): number {
  return entries.reduce((sum, j) => sum + j, 0) / 2;
}

function phaseOf(e: NineJElement, sum: number): 1 | -1 {
  return e.element.odd && sum % 2 === 1 ? -1 : 1;
}

export type NineJVariant = {
  name: string;
  does: string;
  phase: 1 | -1;
  entries: NineJ;
  value: Exact;
  agrees: boolean;
};

/** The 72 symbols that symmetries make of a 9j, each recomputed from its own entries: value = phase · value of the variant. */
export function nineJVariants(entries: NineJ): NineJVariant[] {
  const value = nineJ(entries);
  return NINE_J_ELEMENTS.map((e) => {
    const image = imageOf(e, entries);
    const found = nineJ(image);
    const phase = phaseOf(e, sumOf(entries));
    const agrees = equals(value, phase === 1 ? found : negate(found));
    return { name: e.name, does: e.does, phase, entries: image, value: found, agrees };
  });
}

/** The symmetries that map a symbol to itself. */
export function nineJStabiliser(entries: NineJ): NineJElement[] {
  return NINE_J_ELEMENTS.filter((e) => imageOf(e, entries).every((j, n) => j === entries[n]));
}

/**
 * The orbit of a 9j: value = factor · value of the key's symbol. A 9j with an entry 0 has the key of the 6j that it reduces to (DLMF 34.7.1), so that
 * the two are compared; another one the least of its 72 images; a forbidden one its own entries.
 */
export function nineJOrbit(entries: NineJ): { key: string; factor: Exact; zero: boolean } {
  if (!nineJAllowed(entries)) return { key: `9j none ${entries.join(" ")}`, factor: ONE, zero: true };
  const zero = isZero(nineJ(entries));
  const reduced = reductions(entries)[0];
  if (reduced) return { ...reduced, zero };
  let least: readonly number[] = entries;
  let by = NINE_J_ELEMENTS[0] as NineJElement;
  for (const e of NINE_J_ELEMENTS) {
    const image = applyElement(e.element, entries);
    const place = image.findIndex((n, k) => n !== least[k]);
    if (place >= 0 && (image[place] as number) < (least[place] as number)) [least, by] = [image, e];
  }
  return {
    key: `9j ${least.join(" ")}`,
    factor: phaseOf(by, sumOf(entries)) === 1 ? ONE : negate(ONE),
    zero,
  };
}

/**
 * The 6j symbols that a 9j with entries 0 reduces to, the least key first (several zeros allow several reductions):
 * {j11 j12 j13; j21 j22 j13; j31 j31 0} = (−1)^(j12+j21+j13+j31)/√((2j13+1)(2j31+1)) {j11 j12 j13; j22 j21 j31} (DLMF 34.7.1).
 */
function reductions(entries: NineJ): { key: string; factor: Exact }[] {
  return NINE_J_ELEMENTS.flatMap((element) => {
    const [a, b, c, d, e, , g, , corner] = imageOf(element, entries);
    if (corner !== 0) return [];
    const size = divide(ONE, root(new Fraction((c + 1) * (g + 1))));
    const odd = ((b + d + c + g) / 2) % 2 !== 0;
    const sign = phaseOf(element, sumOf(entries)) * (odd ? -1 : 1);
    return [{ key: sixJKey([a, b, c, e, d, g]), factor: sign === 1 ? size : negate(size) }];
  }).sort((x, y) => (x.key < y.key ? -1 : x.key > y.key ? 1 : 0));
}

/** The selection rules of a 9j in order, with the numbers put in. */
export function nineJRules(entries: NineJ): Rule[] {
  return triadRules(triadsOf(NINE_J_TRIADS, NAMES, entries));
}

/** Every reason why a 9j is 0, in the order in which an author checks them; [] when it is not 0. */
export function whyZeroNineJ(entries: NineJ): VanishingReason[] {
  const reasons = brokenTriads(triadsOf(NINE_J_TRIADS, NAMES, entries));
  const sum = sumOf(entries);
  const odd = nineJStabiliser(entries).find((e) => phaseOf(e, sum) === -1);
  if (odd) {
    const does = odd.does.replace(/\.$/, "");
    reasons.push({
      rule: "parity",
      says: `${does}; this gives the same symbol again times (−1)^${sum} = −1, where ${sum} is the sum of the nine j's, so it equals its own negative.`,
    });
  }
  if (reasons.length > 0) return reasons;
  const terms = nineJTerms(entries);
  return isZero(nineJ(entries))
    ? [accidentalReason("the sum over three 6j symbols", wholeTerms(terms.map((t) => t.value)))]
    : [];
}

/** The terms in their common unit, as whole numbers without a common factor: they all are rational multiples of one root. */
function wholeTerms(values: readonly Exact[]): bigint[] {
  const coefficients = values.map((v) => v.terms[0]?.coefficient ?? new Fraction(0n));
  const denominator = coefficients.reduce((lcm, q) => (lcm / gcd(lcm, q.d)) * q.d, 1n);
  const whole = coefficients.map((q) => q.s * q.n * (denominator / q.d));
  const common = whole.reduce((x, y) => gcd(x, y < 0n ? -y : y), 0n) || 1n;
  return whole.map((n) => n / common);
}

function gcd(a: bigint, b: bigint): bigint {
  while (b) [a, b] = [b, a % b];
  return a;
}

/** The canonical symbol of a 9j key that is no 6j's. @throws RangeError if it is not one */
export function nineJOfKey(key: string): NineJ {
  const numbers = key
    .replace(/^9j (none )?/, "")
    .split(" ")
    .map(Number);
  if (!key.startsWith("9j ") || numbers.length !== 9)
    throw new RangeError("This is not the key of a 9j's orbit.");
  return numbers.map((n): Twice => fromTwice(n)) as unknown as NineJ;
}
