import { BUDGET } from "./budget";
import { refuse } from "./read-error";
import type { Token } from "./value-tokens";

const OPERAND = "a number, sqrt, π or i";

/** Whether a factor may begin, or has ended, with this token. */
const begins = (t: Token | undefined) =>
  t !== undefined &&
  (t.type === "number" || t.type === "pi" || t.type === "i" || t.type === "open" || t.type === "root");
const ends = (t: Token | undefined) =>
  t !== undefined && (t.type === "number" || t.type === "pi" || t.type === "i" || t.type === "close");
const isSign = (t: Token | undefined, signs: string) => t?.type === "sign" && signs.includes(t.text);

/**
 * Checks the order of the tokens, so that whatever passes is one well-formed expression, and refuses the spellings
 * that two people would read differently: 1/2 sqrt(3), 2^3/2, 2^3^2.
 * @throws Unreadable at the token that does not fit
 */
export function checkGrammar(text: string, tokens: readonly Token[]): void {
  const open: Token[] = [];
  tokens.forEach((token, n) => {
    const previous = tokens[n - 1];
    const length = token.end - token.at;
    switch (token.type) {
      case "open":
        open.push(token);
        if (open.length > BUDGET.depth) {
          refuse(
            text,
            token.at,
            1,
            `at most ${BUDGET.depth} parentheses inside each other`,
            `The parentheses are nested more than ${BUDGET.depth} deep.`,
            { limit: true },
          );
        }
        break;
      case "close":
        if (open.length === 0) {
          refuse(text, token.at, 1, "no closing parenthesis", "This closing parenthesis has no opening one.");
        }
        if (previous?.type === "open") {
          refuse(text, token.at, 1, OPERAND, "There is nothing between these parentheses.");
        }
        if (!ends(previous)) {
          refuse(text, token.at, 1, OPERAND, `Before this parenthesis ${OPERAND} is missing.`);
        }
        open.pop();
        break;
      case "root":
        checkRoot(text, tokens, n);
        break;
      case "dots":
        checkDots(text, tokens, n);
        break;
      case "sign":
        if (isSign(token, "*/^") && !ends(previous)) {
          refuse(
            text,
            token.at,
            length,
            OPERAND,
            `Before this ${text.slice(token.at, token.end)} ${OPERAND} is missing.`,
          );
        }
        if (isSign(token, "+-") && isSign(previous, "+-")) {
          refuse(text, token.at, length, OPERAND, "Two signs follow each other here.");
        }
        break;
      case "number":
        if (previous?.type === "number") refuseTwoNumbers(text, previous, token);
        break;
      case "pi":
      case "i":
        break;
    }
  });
  const last = tokens[tokens.length - 1];
  if (!ends(last) && last?.type !== "dots") {
    refuse(text, text.length, 0, OPERAND, `The value is not finished: ${OPERAND} is missing at the end.`);
  }
  const unclosed = open[open.length - 1];
  if (unclosed) {
    refuse(text, unclosed.at, 1, "a closing parenthesis", "This parenthesis is not closed.", {
      suggestion: text.trimEnd() + ")".repeat(open.length),
    });
  }
  tokens.forEach((token, n) => {
    if (isSign(token, "/")) checkAfterSlash(text, tokens, n);
    if (isSign(token, "^")) checkExponent(text, tokens, n);
  });
}

function checkRoot(text: string, tokens: readonly Token[], n: number): void {
  const token = tokens[n] as Token;
  const next = tokens[n + 1];
  if (next?.type === "open") return;
  const isWord = text[token.at] !== "√";
  if (!isWord && (next?.type === "number" || next?.type === "pi")) return;
  const simple = next?.type === "number" || next?.type === "pi" ? text.slice(next.at, next.end) : null;
  refuse(
    text,
    next?.at ?? text.length,
    next ? next.end - next.at : 0,
    isWord ? "( after sqrt" : "a number or ( after √",
    isWord
      ? "What stands under the root is put in parentheses: sqrt(2/15)."
      : "After √ stands a number, or parentheses: √(2/15).",
    simple === null || next === undefined
      ? {}
      : { suggestion: `${text.slice(0, token.end)}(${simple})${text.slice(next.end)}` },
  );
}

/** Dots end a decimal that was cut off, and stand nowhere else. */
function checkDots(text: string, tokens: readonly Token[], n: number): void {
  const token = tokens[n] as Token;
  const before = tokens[n - 1];
  const bare = n === tokens.length - 1 && (n === 1 || (n === 2 && isSign(tokens[0], "+-")));
  if (!bare || before?.type !== "number" || before.places === null) {
    refuse(
      text,
      token.at,
      token.end - token.at,
      "a value without dots",
      "Dots are read only at the end of a decimal, as in 0.3651...",
    );
  }
}

function refuseTwoNumbers(text: string, left: Token, right: Token): never {
  const between = text.slice(left.end, right.at);
  const a = text.slice(left.at, left.end);
  const b = text.slice(right.at, right.end);
  const rest = text.slice(right.end);
  if (/^\d+$/.test(a) && /[^\d.,]/.test(b)) {
    refuse(
      text,
      right.at,
      right.end - right.at,
      "a sign between two numbers",
      `${a} ${b} may mean a sum or a product; write ${a}${b} for the mixed number.`,
      {
        suggestion: `${text.slice(0, left.at)}${a}${b}${rest}`,
      },
    );
  }
  if (between !== "" && /^\s*\/\s*\d/.test(rest) && /^\d+$/.test(a + b)) {
    const below = /^\s*\/\s*(\d+)/.exec(rest) as RegExpExecArray;
    const tail = rest.slice(below[0].length);
    refuse(
      text,
      right.at,
      right.end - right.at,
      "a sign between two numbers",
      `${a} ${b}/${below[1] as string} may mean ${a} + ${b}/${below[1] as string} or ${a} · ${b}/${below[1] as string}; write out which.`,
      {
        suggestion: `${text.slice(0, left.at)}(${a} + ${b}/${below[1] as string})${tail}`,
        alternative: `${text.slice(0, left.at)}${a}*${b}/${below[1] as string}${tail}`,
      },
    );
  }
  refuse(
    text,
    right.at,
    right.end - right.at,
    "a sign between two numbers",
    `Between ${a} and ${b} a sign such as * is missing.`,
  );
}

/** The token after the factor (with its power) that begins at n. */
function afterFactor(tokens: readonly Token[], n: number): number {
  let at = n;
  while (isSign(tokens[at], "+-")) at += 1;
  if (tokens[at]?.type === "root") at += 1;
  if (tokens[at]?.type === "open") {
    let depth = 0;
    do {
      if (tokens[at]?.type === "open") depth += 1;
      if (tokens[at]?.type === "close") depth -= 1;
      at += 1;
    } while (depth > 0 && at < tokens.length);
  } else at += 1;
  return isSign(tokens[at], "^") ? afterFactor(tokens, at + 1) : at;
}

/** 1/2 sqrt(3): nobody can tell whether the root stands above or below. */
function checkAfterSlash(text: string, tokens: readonly Token[], slash: number): void {
  const first = tokens[slash + 1] as Token;
  let end = afterFactor(tokens, slash + 1);
  const second = tokens[end];
  if (!second || !begins(second)) return;
  while (begins(tokens[end])) end = afterFactor(tokens, end);
  const last = tokens[end - 1] as Token;
  const above = `${text.slice(0, second.at).trimEnd()}*${text.slice(second.at)}`;
  const below = `${text.slice(0, first.at)}(${text.slice(first.at, second.at).trimEnd()}*${text.slice(second.at, last.end)})${text.slice(last.end)}`;
  refuse(
    text,
    second.at,
    last.end - second.at,
    "a product sign or parentheses after the slash",
    `After a slash, ${JSON.stringify(text.slice(second.at, last.end)).slice(1, -1)} may belong above or below the line: write ${above} or ${below}.`,
    { suggestion: above, alternative: below },
  );
}

/** 2^3/2 and 2^3^2 need parentheses; ^1/2 and ^-1/2 are the half powers, which nobody writes for anything else. */
function checkExponent(text: string, tokens: readonly Token[], caret: number): void {
  const base = tokens[caret - 1] as Token;
  const first = tokens[caret + 1] as Token;
  const end = afterFactor(tokens, caret + 1);
  if (isSign(tokens[caret + 1], "+-") && !begins(tokens[caret + 2])) return;
  const exponent = tokens[isSign(first, "+-") ? caret + 2 : caret + 1];
  const chained = exponent && afterPlainFactor(tokens, caret + 1) < end;
  if (chained) {
    const inner = tokens[end - 1] as Token;
    const grouped = `${text.slice(0, first.at)}(${text.slice(first.at, inner.end)})${text.slice(inner.end)}`;
    refuse(
      text,
      first.at,
      inner.end - first.at,
      "parentheses around a power of a power",
      "A power of a power needs parentheses to show which is raised first.",
      { suggestion: grouped },
    );
  }
  if (halfPowerAt(text, tokens, caret) !== null) return;
  const slash = tokens[end];
  const below = tokens[end + 1];
  if (exponent?.type !== "number" || !isSign(slash, "/") || below?.type !== "number") return;
  if (slash?.at !== exponent.end || below.at !== slash.end || !/\d/.test(text[exponent.at] as string)) return;
  const asPower = `${text.slice(0, first.at)}(${text.slice(first.at, below.end)})${text.slice(below.end)}`;
  const asQuotient = `(${text.slice(startOfBase(tokens, caret), exponent.end)})${text.slice(slash.at)}`;
  const quotient = text.slice(0, startOfBase(tokens, caret)) + asQuotient;
  refuse(
    text,
    base.end,
    below.end - base.end,
    "parentheses around the exponent",
    `The slash may belong to the exponent or not: write ${asPower} or ${quotient}.`,
    {
      suggestion: asPower,
      alternative: quotient,
    },
  );
}

function afterPlainFactor(tokens: readonly Token[], n: number): number {
  let at = n;
  while (isSign(tokens[at], "+-")) at += 1;
  if (tokens[at]?.type === "root") at += 1;
  if (tokens[at]?.type !== "open") return at + 1;
  let depth = 0;
  do {
    if (tokens[at]?.type === "open") depth += 1;
    if (tokens[at]?.type === "close") depth -= 1;
    at += 1;
  } while (depth > 0 && at < tokens.length);
  return at;
}

/** The offset in the text at which the base of the power at this caret begins. */
function startOfBase(tokens: readonly Token[], caret: number): number {
  let at = caret - 1;
  if (tokens[at]?.type === "close") {
    let depth = 0;
    do {
      if (tokens[at]?.type === "close") depth += 1;
      if (tokens[at]?.type === "open") depth -= 1;
      at -= 1;
    } while (depth > 0 && at >= 0);
    at += 1;
  }
  if (tokens[at - 1]?.type === "root") at -= 1;
  return (tokens[at] as Token).at;
}

/** The index of the last token of an exponent typed as ^1/2 or ^-1/2 without spaces; null for any other exponent. */
export function halfPowerAt(text: string, tokens: readonly Token[], caret: number): number | null {
  const signed = isSign(tokens[caret + 1], "-") ? 1 : 0;
  const one = tokens[caret + 1 + signed];
  const slash = tokens[caret + 2 + signed];
  const two = tokens[caret + 3 + signed];
  const last = caret + 3 + signed;
  if (one?.type !== "number" || one.text !== "1" || text[one.at] !== "1") return null;
  if (!isSign(slash, "/") || two?.type !== "number" || two.text !== "2") return null;
  const touching = slash?.at === one.end && two.at === slash.end;
  return touching && !begins(tokens[last + 1]) && !isSign(tokens[last + 1], "^") ? last : null;
}

/** Whether a product sign is understood between two neighbouring tokens, as in 2 sqrt(3). */
export function productUnderstood(left: Token | undefined, right: Token): boolean {
  return ends(left) && begins(right);
}
