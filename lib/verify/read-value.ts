import { create, parseDependencies, type FactoryFunctionMap, type MathNode } from "mathjs/number";
import { absolute, isZero, negate, sign, squareRoot, type Exact } from "@/lib/symbols/exact";
import { BUDGET } from "./budget";
import { rootsAreImplied, type Conventions } from "./conventions";
import { hasWrittenRoot, valueOf, type Expression } from "./expression";
import { latexOf } from "./expression-latex";
import { reading, refuse, type ReadError } from "./read-error";
import { checkGrammar, halfPowerAt, productUnderstood } from "./value-grammar";
import { tokensOf, type Token } from "./value-tokens";

/**
 * A claimed value as it was read. `exact` is the value itself; for a decimal, the rational number that its digits
 * spell, `places` the decimals that were given and `digits` the significant ones. `cut` marks a decimal that the author ended with dots.
 */
export type ClaimedValue =
  | { kind: "exact"; exact: Exact; tree: Expression; rootUnderstood: boolean }
  | { kind: "decimal"; exact: Exact; digits: number; places: number; cut: boolean; tree: Expression };
export type ValueReading = { ok: true; value: ClaimedValue; latex: string } | { ok: false; error: ReadError };

const { parse } = create(parseDependencies as FactoryFunctionMap);

/**
 * Reads a claimed value: integers, fractions, surds, sums, products and powers of them, π, i, decimals. With a root
 * understood (conventions), a plain fraction stands for the signed root of its size. Never throws; an error carries
 * the place, what was found and what was expected.
 */
export function readValue(text: string, conventions: Conventions): ValueReading {
  return reading(() => {
    if (text.length > BUDGET.text) {
      refuse(
        text,
        BUDGET.text,
        1,
        `at most ${BUDGET.text} characters`,
        `The value is ${text.length} characters long; at most ${BUDGET.text} are read.`,
        { limit: true },
      );
    }
    if (text.trim() === "") {
      refuse(
        text,
        text.length,
        0,
        "a value such as sqrt(2/15)",
        "The claimed value is empty; type a value such as sqrt(2/15), -1/2 or 0.3651.",
      );
    }
    const tokens = tokensOf(text, conventions);
    checkGrammar(text, tokens);
    const cut = tokens[tokens.length - 1]?.type === "dots";
    const tree = treeOf(text, cut ? tokens.slice(0, -1) : tokens);
    const exact = valueOf(tree, text);
    const decimal = bareDecimal(tree);
    if (decimal) {
      const value: ClaimedValue = { kind: "decimal", exact, ...decimal, cut, tree };
      return { value, latex: latexOf(tree, conventions.decimalMark) + (cut ? "\\ldots" : "") };
    }
    const rootUnderstood = rootsAreImplied(conventions) && !hasWrittenRoot(tree) && !isZero(exact);
    const value: ClaimedValue = {
      kind: "exact",
      exact: rootUnderstood ? signedRoot(exact) : exact,
      tree,
      rootUnderstood,
    };
    const latex = latexOf(tree, conventions.decimalMark);
    return { value, latex: rootUnderstood ? rootOver(tree, conventions) : latex };
  });
}

/** sgn(x)·√|x| of a rational number. */
export function signedRoot(x: Exact): Exact {
  const size = squareRoot(absolute(x));
  return sign(x) < 0 ? negate(size) : size;
}

function rootOver(tree: Expression, { decimalMark }: Conventions): string {
  return tree.type === "negative"
    ? `-\\sqrt{${latexOf(tree.of, decimalMark)}}`
    : `\\sqrt{${latexOf(tree, decimalMark)}}`;
}

/** Places and significant digits when the whole value is one decimal with or without a sign. */
function bareDecimal(tree: Expression): { places: number; digits: number } | null {
  const leaf = tree.type === "negative" ? tree.of : tree;
  if (leaf.type !== "number" || leaf.places === null || leaf.places < 0) return null;
  const digits = leaf.text.replace(/e.*$/i, "").replace(".", "").replace(/^0+/, "").length;
  return { places: leaf.places, digits };
}

/**
 * The tree of checked tokens. The grammar of sums, products and powers is mathjs's; each leaf goes to it as a name of
 * its own, because its numbers would become doubles and its nodes know no places.
 */
function treeOf(text: string, tokens: readonly Token[]): Expression {
  const leaves: Expression[] = [];
  let source = "";
  let groupEnd = -1;
  tokens.forEach((token, n) => {
    const next = tokens[n + 1];
    if (productUnderstood(tokens[n - 1], token)) source += "*";
    switch (token.type) {
      case "open":
        source += "(";
        break;
      case "close":
        source += ")";
        break;
      case "root":
        source += "sqrt";
        break;
      case "sign": {
        source += token.text;
        const end = token.text === "^" ? halfPowerAt(text, tokens, n) : null;
        if (end !== null) {
          source += "(";
          groupEnd = end;
        }
        break;
      }
      default: {
        const leaf = leafOf(token);
        const name = `v${leaves.push(leaf) - 1}`;
        source += tokens[n - 1]?.type === "root" ? `(${name})` : name;
      }
    }
    if (n === groupEnd) source += ")";
    if (next === undefined) return;
  });
  return treeOfNode(parse(source), leaves);
}

function leafOf(token: Token): Expression {
  if (token.type === "number") return { ...token };
  if (token.type === "pi" || token.type === "i") return { type: token.type, at: token.at, end: token.end };
  throw new Error(`A token of the type ${token.type} is no leaf.`);
}

/** The parts of mathjs's nodes that are looked at; anything else is refused. */
type PlainNode = { type: string; name?: string; fn?: unknown; args?: MathNode[]; content?: MathNode };

const BINARY: Record<string, "sum" | "difference" | "product" | "quotient" | "power"> = {
  add: "sum",
  subtract: "difference",
  multiply: "product",
  divide: "quotient",
  pow: "power",
};

function treeOfNode(node: MathNode, leaves: readonly Expression[]): Expression {
  const { type, name, fn, args = [], content } = node as unknown as PlainNode;
  if (type === "ParenthesisNode" && content) return treeOfNode(content, leaves);
  if (type === "SymbolNode" && name) {
    const leaf = leaves[Number(name.slice(1))];
    if (leaf) return leaf;
  }
  const [first, second, ...more] = args.map((arg) => treeOfNode(arg, leaves));
  if (first && more.length === 0) {
    if (type === "OperatorNode" && second) {
      const operation = BINARY[String(fn)];
      if (operation) return { type: operation, left: first, right: second, at: first.at, end: second.end };
    }
    if (type === "OperatorNode" && !second && fn === "unaryPlus") return first;
    if (type === "OperatorNode" && !second && fn === "unaryMinus") {
      return { type: "negative", of: first, at: first.at, end: first.end };
    }
    if (type === "FunctionNode" && !second) return { type: "root", of: first, at: first.at, end: first.end };
  }
  throw new Error(`An expression of the type ${type} passed the grammar of values.`);
}
