import Fraction from "fraction.js";
import { BUDGET } from "./budget";
import type { Conventions } from "./conventions";
import { quoted, refuse } from "./read-error";

export type Token = { at: number; end: number } & (
  | { type: "number"; text: string; value: Fraction; places: number | null }
  | { type: "sign"; text: "+" | "-" | "*" | "/" | "^" }
  | { type: "open" | "close" | "root" | "pi" | "i" | "dots" }
);

/** Fractions that are one character; the value of ½ stands for itself, 1½ is read as 3/2. */
const VULGAR: Record<string, [number, number]> = {
  "½": [1, 2],
  "⅓": [1, 3],
  "⅔": [2, 3],
  "¼": [1, 4],
  "¾": [3, 4],
  "⅕": [1, 5],
  "⅖": [2, 5],
  "⅗": [3, 5],
  "⅘": [4, 5],
  "⅙": [1, 6],
  "⅚": [5, 6],
  "⅐": [1, 7],
  "⅛": [1, 8],
  "⅜": [3, 8],
  "⅝": [5, 8],
  "⅞": [7, 8],
  "⅑": [1, 9],
  "⅒": [1, 10],
};
const SIGNS: Record<string, "+" | "-" | "*" | "/" | "^"> = {
  "+": "+",
  "-": "-",
  "−": "-",
  "–": "-",
  "‐": "-",
  "*": "*",
  "×": "*",
  "·": "*",
  "⋅": "*",
  "∙": "*",
  "/": "/",
  "÷": "/",
  "⁄": "/",
  "∕": "/",
  "^": "^",
};
const RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹";
const NUMBER = /(?:\d+(?:[.,]\d+)?|\.\d+)(?:[eE][+\-−]?\d{1,4})?/y;
const WORD = /[\p{L}_]+/uy;
const SPACE = /\s/u;

/** What is said of characters that authors do type but that are no part of one exact value. */
const REFUSED: Record<string, [expected: string, says: string]> = {
  "=": ["one value", "A claimed value is one value, without an equals sign."],
  "≈": ["one value", "A claimed value is one value; for a decimal, type its digits alone."],
  "~": ["one value", "A claimed value is one value; for a decimal, type its digits alone."],
  ":": ["one value", "A ratio such as 5 : 3 : 1 is a kind of claim that this edition does not judge."],
  "±": ["one sign", "A claimed value has one sign; ± stands for two values."],
  "∓": ["one sign", "A claimed value has one sign; ∓ stands for two values."],
  "%": ["a plain number", "A percentage is not read; type the value as a fraction or a decimal."],
  "!": ["a plain number", "Factorials are not read; type the number itself."],
  "|": ["a value", "Bars are not part of a value; for a quantity there is the field beside this one."],
  "[": ["round parentheses", "Values are grouped by round parentheses ( )."],
  "]": ["round parentheses", "Values are grouped by round parentheses ( )."],
  "{": ["round parentheses", "Values are grouped by round parentheses ( )."],
  "}": ["round parentheses", "Values are grouped by round parentheses ( )."],
  ";": ["one value", "A claimed value is one value; put each value in a claim of its own."],
  "<": ["a value", "A comparison is not a value."],
  ">": ["a value", "A comparison is not a value."],
  "\\": ["typed notation", "This field reads the typed notation, not LaTeX: write sqrt(2/15) or -1/2."],
  '"': ["a value without quotation marks", "Type the value without quotation marks."],
  "'": ["a value without quotation marks", "Type the value without quotation marks."],
};

/**
 * The tokens of a claimed value with their places, each number with its exact digits.
 * @throws Unreadable at the first character that is no part of a value
 */
export function tokensOf(text: string, { decimalMark }: Pick<Conventions, "decimalMark">): Token[] {
  const tokens: Token[] = [];
  let digits = 0;
  for (let at = 0; at < text.length;) {
    const c = text[at] as string;
    if (SPACE.test(c)) {
      at += 1;
      continue;
    }
    if (tokens.length >= BUDGET.tokens) {
      refuse(
        text,
        at,
        1,
        `at most ${BUDGET.tokens} numbers and signs`,
        `The value has more than ${BUDGET.tokens} numbers and signs, and is not read further.`,
        { limit: true },
      );
    }
    if (/[\d.]/.test(c) || c in VULGAR) {
      const token = numberAt(text, at, decimalMark);
      if (token.type === "number") digits += token.end - token.at;
      if (digits > BUDGET.digits) {
        refuse(
          text,
          at,
          token.end - at,
          `at most ${BUDGET.digits} digits`,
          `The numbers of this value have more than ${BUDGET.digits} digits together, and are not read.`,
          { limit: true },
        );
      }
      tokens.push(token);
      at = token.end;
    } else if (c in SIGNS) {
      const doubled = c === "*" && text[at + 1] === "*";
      if (doubled) refuseDoubleStar(text, at);
      tokens.push({ type: "sign", text: SIGNS[c] as "+", at, end: at + 1 });
      at += 1;
    } else if (RAISED.includes(c) || c === "⁻" || c === "⁺") {
      at = pushRaised(text, at, tokens);
    } else if (c === "(" || c === "（" || c === ")" || c === "）") {
      tokens.push({ type: c === "(" || c === "（" ? "open" : "close", at, end: at + 1 });
      at += 1;
    } else if (c === "√") {
      tokens.push({ type: "root", at, end: at + 1 });
      at += 1;
    } else if (c === "…") {
      tokens.push({ type: "dots", at, end: at + 1 });
      at += 1;
    } else {
      const token = wordAt(text, at);
      tokens.push(token);
      at = token.end;
    }
  }
  return tokens;
}

function numberAt(text: string, at: number, decimalMark: "." | ","): Token {
  if (text.startsWith("...", at)) return { type: "dots", at, end: at + 3 };
  const vulgar = VULGAR[text[at] as string];
  if (vulgar)
    return { type: "number", text: "½", value: new Fraction(...vulgar), places: null, at, end: at + 1 };
  NUMBER.lastIndex = at;
  let spelt = NUMBER.exec(text)?.[0];
  if (spelt === undefined) {
    refuse(text, at, 1, "digits", "A decimal mark stands before digits.");
  }
  const comma = spelt.indexOf(",");
  if (comma > 0 && decimalMark !== ",") {
    refuse(
      text,
      at + comma,
      1,
      "a decimal point",
      `A comma stands in ${quoted(spelt)}; the conventions write decimals with a point.`,
      {
        suggestion: `${text.slice(0, at + comma)}.${text.slice(at + comma + 1)}`,
      },
    );
  }
  const end = at + spelt.length;
  const next = VULGAR[text[end] ?? ""];
  if (spelt.length > BUDGET.digitsOfNumber) {
    refuse(
      text,
      at,
      spelt.length,
      `at most ${BUDGET.digitsOfNumber} digits`,
      `This number has ${spelt.length} characters; numbers up to ${BUDGET.digitsOfNumber} digits are read.`,
      { limit: true },
    );
  }
  spelt = spelt.replace(",", ".").replace("−", "-");
  if (next && /^\d+$/.test(spelt)) {
    const [above, below] = next;
    const value = new Fraction(BigInt(spelt) * BigInt(below) + BigInt(above), BigInt(below));
    return { type: "number", text: "½", value, places: null, at, end: end + 1 };
  }
  const [mantissa = "", exponent = "0"] = spelt.toLowerCase().split("e");
  if (Math.abs(Number(exponent)) > BUDGET.exponent) {
    refuse(
      text,
      at,
      end - at,
      `a power of ten up to ${BUDGET.exponent}`,
      `The power of ten in ${quoted(text.slice(at, end))} is larger than ${BUDGET.exponent}.`,
      { limit: true },
    );
  }
  const [whole = "", decimals = ""] = mantissa.split(".");
  const places = decimals.length - Number(exponent);
  const scale = 10n ** BigInt(Math.abs(places));
  const plain = BigInt(whole + decimals);
  const value = places >= 0 ? new Fraction(plain, scale) : new Fraction(plain * scale);
  const isInteger = /^\d+$/.test(spelt);
  return { type: "number", text: spelt, value, places: isInteger ? null : places, at, end };
}

function wordAt(text: string, at: number): Token {
  WORD.lastIndex = at;
  const word = WORD.exec(text)?.[0];
  if (word === undefined) {
    const character = String.fromCodePoint(text.codePointAt(at) ?? 0);
    const known = REFUSED[character];
    if (known) refuse(text, at, 1, ...known, suggestFor(text, character));
    if (character === ",") {
      refuse(
        text,
        at,
        1,
        "one value",
        "A comma is not part of a value; put each value in a claim of its own.",
      );
    }
    refuse(
      text,
      at,
      character.length,
      "a number, sqrt, π or i",
      `${quoted(character)} is not part of a value.`,
    );
  }
  const end = at + word.length;
  if (word === "sqrt") return { type: "root", at, end };
  if (word === "pi" || word === "π") return { type: "pi", at, end };
  if (word === "i") return { type: "i", at, end };
  const near = NEAR[word.toLowerCase()];
  const more = near ? { suggestion: text.slice(0, at) + near + text.slice(end) } : {};
  const what = /^\s*\(/.test(text.slice(end, end + 8))
    ? `The function ${quoted(word)} is not read; the only one is sqrt( ).`
    : `${quoted(word)} is not read in a value; only the names sqrt, pi and i are.`;
  refuse(text, at, word.length, "a number, sqrt, π or i", what, more);
}

/** Other spellings of the three names; offered, never taken. */
const NEAR: Record<string, string> = {
  sqrt: "sqrt",
  root: "sqrt",
  surd: "sqrt",
  wurzel: "sqrt",
  pi: "pi",
  i: "i",
  j: "i",
  ı: "i",
};

function suggestFor(text: string, character: string): { suggestion?: string } {
  const trimmed = text.trim();
  if (character === "=" || character === "≈" || character === "~") {
    return trimmed.startsWith(character) && trimmed.length > 1 ? { suggestion: trimmed.slice(1).trim() } : {};
  }
  if ("[]{}".includes(character) && !text.includes("\\")) {
    return { suggestion: trimmed.replace(/[[{]/g, "(").replace(/[\]}]/g, ")") };
  }
  if (character === '"' || character === "'") return { suggestion: trimmed.replace(/["']/g, "") };
  if (character === "\\") {
    const plain = trimmed
      .replace(/\\[dt]?frac\s*\{([^{}\\]*)\}\s*\{([^{}\\]*)\}/g, "$1/$2")
      .replace(/\\sqrt\s*\{([^{}\\]*)\}/g, "sqrt($1)")
      .replace(/\\pi\b/g, "pi");
    return plain.includes("\\") || plain.includes("{") ? {} : { suggestion: plain };
  }
  return {};
}

function refuseDoubleStar(text: string, at: number): never {
  refuse(text, at, 2, "^ before an exponent", "A power is written with ^, as in 30^(-1/2).", {
    suggestion: `${text.slice(0, at)}^${text.slice(at + 2)}`,
  });
}

/** A raised number such as ² or ⁻¹ is read as ^ followed by it. */
function pushRaised(text: string, at: number, tokens: Token[]): number {
  const start = at;
  tokens.push({ type: "sign", text: "^", at, end: at + 1 });
  if (text[at] === "⁻" || text[at] === "⁺") {
    if (text[at] === "⁻") tokens.push({ type: "sign", text: "-", at, end: at + 1 });
    at += 1;
  }
  let digits = "";
  while (at < text.length && RAISED.includes(text[at] as string)) {
    digits += String(RAISED.indexOf(text[at] as string));
    at += 1;
  }
  if (digits === "") refuse(text, start, 1, "a raised number", "A raised sign stands before raised digits.");
  if (digits.length > 9) {
    refuse(
      text,
      start,
      at - start,
      `an exponent up to ${BUDGET.exponent}`,
      `Exponents up to ${BUDGET.exponent} are worked out; this one is larger.`,
      { limit: true },
    );
  }
  tokens.push({
    type: "number",
    text: digits,
    value: new Fraction(BigInt(digits)),
    places: null,
    at: start,
    end: at,
  });
  return at;
}
