import Fraction from "fraction.js";

import {
  divide,
  multiply,
  negate,
  ONE,
  power,
  rational,
  root,
  squareRoot,
  type Exact,
} from "@/lib/symbols/exact";
import { toDecimalPlaces, toForm } from "@/lib/symbols/exact-print";
import { twice, type Twice } from "@/lib/symbols/half";
import { evaluate, quantity, type Quantity } from "@/lib/symbols/quantity";
import type { Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";

export type SlipRule =
  | "overall-sign"
  | "phase-omitted"
  | "coupling-order"
  | "odd-permutation"
  | "square-for-value"
  | "root-extent"
  | "upside-down"
  | "cg-for-3j"
  | "3j-for-cg"
  | "dimension-factor"
  | "digit-slip"
  | "rounded-wrongly"
  | "unreadable";

export const DEMO_CONVENTIONS: Conventions = {
  cgOrder: "j1m1j2m2",
  phase: "condon-shortley",
  houseForm: "rationalised",
  impliedRoot: false,
  decimalMark: ".",
};

const print = (x: Exact) => toForm(x, DEMO_CONVENTIONS.houseForm, "text");

/** The answer as the house prints it, computed by the engine; with a slip, what somebody who made it would have written. */
export function claimedValue(typed: string, places: number | undefined, slip: SlipRule | undefined): string {
  const read = readQuantity(typed, DEMO_CONVENTIONS);
  if (!read.ok) throw new Error(`The demo quantity ${typed} cannot be read.`);
  const truth = evaluate(read.quantity);
  const right = places === undefined ? print(truth) : toDecimalPlaces(truth, places);
  if (slip === undefined) return right;
  const wrong = slipped(slip, read.quantity, truth, right);
  if (wrong === right) throw new Error(`The slip ${slip} changes nothing in ${typed}.`);
  return wrong;
}

function slipped(slip: SlipRule, q: Quantity, truth: Exact, right: string): string {
  switch (slip) {
    case "overall-sign":
    case "phase-omitted":
    case "coupling-order":
    case "odd-permutation":
      // Each of them turns the sign here; the diagnosis says which it may have been.
      return print(negate(truth));
    case "square-for-value":
      return print(power(truth, new Fraction(2)));
    case "upside-down":
      return print(divide(ONE, truth));
    case "root-extent":
      return rootOverNumeratorOnly(truth);
    case "cg-for-3j":
      return print(evaluate(asCg(q)));
    case "3j-for-cg":
      return print(multiply(truth, root(new Fraction(1, largest(q) + 1))));
    case "dimension-factor":
      return print(divide(truth, squareRoot(rational(jOf(q) + 1))));
    case "digit-slip":
      return right.replace(/\d(?=\D*$)/, (digit) => String((Number(digit) + 1) % 10 || 1));
    case "rounded-wrongly":
      return right.replace(/\d$/, (digit) => String((Number(digit) + 9) % 10));
    case "unreadable":
      return `${right.replace(/\)$/, "")}(`;
  }
}

/** √(p/q) written with the bar over p alone: √p / q. */
function rootOverNumeratorOnly(truth: Exact): string {
  const square = toForm(truth, "signed-square", "text").replace("-", "");
  const [above = "1", below = "1"] = square.split("/");
  const value = multiply(root(new Fraction(above)), rational(new Fraction(1, Number(below))));
  return print(toForm(truth, "signed-square", "text").startsWith("-") ? negate(value) : value);
}

/** The doubled total J of a CG coefficient, or the doubled j3 of a 3j symbol. */
const jOf = (q: Quantity): number => (q.kind === "cg" ? (q.args[4] ?? 0) : (q.args[2] ?? 0));
const largest = (q: Quantity): number => q.args[2] ?? 0;

/** ⟨j1 m1 j2 m2 | j3 −m3⟩ of the same numbers. */
function asCg({ args }: Quantity): Quantity {
  const [a, b, c, d, e, f] = args as [Twice, Twice, Twice, Twice, Twice, Twice];
  return quantity("cg", [a, d, b, e, c, twice(-Number(f) / 2)]);
}
