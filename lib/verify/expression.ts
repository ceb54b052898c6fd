import Fraction from "fraction.js";
import {
  add,
  digitsOf,
  divide,
  I,
  asRational,
  multiply,
  negate,
  PI,
  power,
  rational,
  squareRoot,
  subtract,
  type Exact,
} from "@/lib/symbols/exact";
import { OutsideDomain, TooCostly } from "@/lib/symbols/failures";
import { BUDGET } from "./budget";
import { quoted, refuse } from "./read-error";

type Span = { at: number; end: number };
/** A number as typed: its digits, and how many of them stand after the decimal mark (null for an integer or ½). */
export type NumberLeaf = Span & { type: "number"; text: string; value: Fraction; places: number | null };
/** The tree of a typed value. Every node knows the stretch of the author's text that it came from. */
export type Expression =
  | NumberLeaf
  | (Span & { type: "pi" })
  | (Span & { type: "i" })
  | (Span & { type: "negative" | "root"; of: Expression })
  | (Span & {
      type: "sum" | "difference" | "product" | "quotient" | "power";
      left: Expression;
      right: Expression;
    });

/**
 * The exact value of a tree. Sizes are estimated before each operation.
 * @throws Unreadable at the part that has no value, or that would pass a limit
 */
export function valueOf(tree: Expression, text: string): Exact {
  switch (tree.type) {
    case "number":
      return rational(tree.value);
    case "pi":
      return PI;
    case "i":
      return I;
    case "negative":
      return negate(valueOf(tree.of, text));
    case "root":
      return guarded(tree, text, valueOf(tree.of, text), null, squareRoot);
    case "power": {
      const exponent = exponentOf(tree.right, text);
      const base = valueOf(tree.left, text);
      const times = Number(exponent.n);
      if (
        base.terms.length ** Math.min(times, 8) > BUDGET.resultTerms ||
        digitsOf(base) * times > BUDGET.resultDigits
      ) {
        refuseSize(tree, text);
      }
      return guarded(tree, text, base, null, (x) => power(x, exponent));
    }
    case "sum":
      return binary(tree, text, add);
    case "difference":
      return binary(tree, text, subtract);
    case "product":
      return binary(tree, text, multiply);
    case "quotient":
      return binary(tree, text, divide);
  }
}

function binary(
  tree: Expression & { left: Expression; right: Expression },
  text: string,
  combine: (x: Exact, y: Exact) => Exact,
): Exact {
  return guarded(tree, text, valueOf(tree.left, text), valueOf(tree.right, text), combine);
}

function guarded<Y extends Exact | null>(
  tree: Expression,
  text: string,
  x: Exact,
  y: Y,
  combine: (x: Exact, y: Y) => Exact,
): Exact {
  const spread = tree.type === "sum" || tree.type === "difference" ? 1 : (y?.terms.length ?? 1);
  if (x.terms.length * spread > BUDGET.resultTerms) refuseSize(tree, text);
  if (digitsOf(x) + (y ? digitsOf(y) : 0) > BUDGET.resultDigits) refuseSize(tree, text);
  try {
    return combine(x, y);
  } catch (error) {
    if (error instanceof OutsideDomain) {
      return refuse(
        text,
        tree.at,
        tree.end - tree.at,
        "a finite sum of rational numbers times square roots and powers of π",
        error.message,
      );
    }
    if (error instanceof TooCostly) {
      return refuse(text, tree.at, tree.end - tree.at, "a smaller number", error.message, { limit: true });
    }
    throw error;
  }
}

function refuseSize(tree: Expression, text: string): never {
  refuse(
    text,
    tree.at,
    tree.end - tree.at,
    "a smaller number",
    `${quoted(text.slice(tree.at, tree.end))} grows past ${BUDGET.resultDigits} digits or ${BUDGET.resultTerms} different roots, and is not worked out.`,
    { limit: true },
  );
}

function exponentOf(tree: Expression, text: string): Fraction {
  const length = tree.end - tree.at;
  const exponent = asRational(valueOf(tree, text));
  if (exponent === null || exponent.d > 2n) {
    refuse(
      text,
      tree.at,
      length,
      "a whole or half number as exponent",
      "An exponent is a whole number or a half, such as 2, -1 or 1/2.",
    );
  }
  if (exponent.n > BigInt(BUDGET.exponent)) {
    refuse(
      text,
      tree.at,
      length,
      `an exponent up to ${BUDGET.exponent}`,
      `Exponents up to ${BUDGET.exponent} are worked out; this one is larger.`,
      { limit: true },
    );
  }
  return exponent;
}

/** Whether a root, a power, π or i is written out in it, so that no further root can be understood over it. */
export function hasWrittenRoot(tree: Expression): boolean {
  switch (tree.type) {
    case "number":
      return tree.places !== null;
    case "pi":
    case "i":
    case "root":
    case "power":
      return true;
    case "negative":
      return hasWrittenRoot(tree.of);
    default:
      return hasWrittenRoot(tree.left) || hasWrittenRoot(tree.right);
  }
}

/** The numbers typed in a tree, from left to right. */
export function numbersOf(tree: Expression): NumberLeaf[] {
  if (tree.type === "number") return [tree];
  if (tree.type === "pi" || tree.type === "i") return [];
  if ("of" in tree) return numbersOf(tree.of);
  return [...numbersOf(tree.left), ...numbersOf(tree.right)];
}

/** The same tree with one typed number replaced. */
export function withNumber(tree: Expression, old: NumberLeaf, value: Fraction): Expression {
  if (tree === old) return { ...old, value, text: value.toFraction() };
  if (tree.type === "number" || tree.type === "pi" || tree.type === "i") return tree;
  if ("of" in tree) return { ...tree, of: withNumber(tree.of, old, value) };
  return { ...tree, left: withNumber(tree.left, old, value), right: withNumber(tree.right, old, value) };
}

/**
 * What a tree looks like, apart from the order of factors and terms, factors of 1 and parentheses: two spellings of one
 * printed form give the same text (`sqrt(30)/15` and `(1/15)*sqrt(30)`), `2*sqrt(30)/30` another.
 */
export function shapeOf(tree: Expression): string {
  return terms(tree, 1).sort().join(" ");
}

function terms(tree: Expression, sign: 1 | -1): string[] {
  if (tree.type === "sum") return [...terms(tree.left, sign), ...terms(tree.right, sign)];
  if (tree.type === "difference")
    return [...terms(tree.left, sign), ...terms(tree.right, sign === 1 ? -1 : 1)];
  if (tree.type === "negative") return terms(tree.of, sign === 1 ? -1 : 1);
  const parts: Factors = { sign, above: [], below: [] };
  collect(tree, parts, false);
  const list = (factors: string[]) => factors.sort().join("·") || "1";
  return [`${parts.sign === 1 ? "+" : "-"}${list(parts.above)}:${list(parts.below)}`];
}

type Factors = { sign: 1 | -1; above: string[]; below: string[] };

function collect(tree: Expression, parts: Factors, inverse: boolean): void {
  if (tree.type === "product" || tree.type === "quotient") {
    collect(tree.left, parts, inverse);
    collect(tree.right, parts, tree.type === "quotient" ? !inverse : inverse);
    return;
  }
  if (tree.type === "negative") {
    parts.sign = parts.sign === 1 ? -1 : 1;
    collect(tree.of, parts, inverse);
    return;
  }
  const side = inverse ? parts.below : parts.above;
  if (tree.type === "number") {
    if (tree.text === "½") collectFraction(tree, parts, inverse);
    else if (tree.text !== "1") side.push(tree.text);
  } else if (tree.type === "root") side.push(`√(${shapeOf(tree.of)})`);
  else if (tree.type === "power") side.push(`(${shapeOf(tree.left)})^(${shapeOf(tree.right)})`);
  else if (tree.type === "pi" || tree.type === "i") side.push(tree.type);
  else side.push(`(${shapeOf(tree)})`);
}

function collectFraction(leaf: NumberLeaf, parts: Factors, inverse: boolean): void {
  const [above, below] = inverse ? [parts.below, parts.above] : [parts.above, parts.below];
  if (leaf.value.n !== 1n) above.push(String(leaf.value.n));
  below.push(String(leaf.value.d));
}
