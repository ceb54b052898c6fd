import { twice, type Twice } from "@/lib/symbols/half";
import { BUDGET } from "./budget";
import type { Conventions } from "./conventions";
import { quoted, refuse } from "./read-error";

/** One entry of a symbol with its place in the author's text. */
export type Entry = { at: number; length: number; value: Twice };
export type Mark = { at: number; length: number; text: string };
/** What stands between two separators; `after` is the separator that ends it (null before the closing bracket). */
export type Part = { entries: Entry[]; after: Mark | null };
/** A typed symbol taken apart, before anything is known of its kind. */
export type Shape = { text: string; open: Mark; close: Mark; parts: Part[]; spelt: string[] };

const BRACKETS: Record<string, string> = { "(": ")", "<": ">", "{": "}", "[": "]" };
/** Other spellings of the brackets and marks, read like their ASCII forms. */
const SAME: Record<string, string> = {
  "⟨": "<",
  "〈": "<",
  "⟩": ">",
  "〉": ">",
  "∣": "|",
  "│": "|",
  "‖": "||",
  "∥": "||",
  "（": "(",
  "）": ")",
  "；": ";",
  "，": ",",
};
const MINUS = "-−–‐";
const NUMBER = /[+\-−–‐]?(?:\d+(?:[.,]\d+)?½?(?:[/⁄]\d*)?|½|[.]\d+)/uy;
const OTHER_FRACTION = /[¼¾⅐-⅞]/u;

/** The character as it is read: typographic brackets and bars become their ASCII forms. */
export function plainMark(character: string): string {
  return SAME[character] ?? character;
}

/**
 * Takes a typed symbol apart into its brackets, separators and entries.
 * @throws Unreadable with the place of the first thing that is not part of the notation
 */
export function readShape(text: string, conventions: Conventions): Shape {
  let at = skipSpace(text, 0);
  const first = plainMark(text[at] ?? "");
  const closing = BRACKETS[first];
  if (!closing) refuseStart(text, at);
  const open = { at, length: 1, text: first };
  at += 1;
  const parts: Part[] = [{ entries: [], after: null }];
  const spelt: string[] = [];
  let comma: Mark | null = null;
  for (;;) {
    at = skipSpace(text, at);
    const part = parts[parts.length - 1] as Part;
    const c = plainMark(text[at] ?? "");
    if (c === closing) {
      if (comma) refuseEmptyPlace(text, comma);
      endOfText(text, at + 1);
      return { text, open, close: { at, length: 1, text: c }, parts, spelt };
    }
    if (c === "") {
      const bracket = closing === ">" ? "closing bracket >" : `closing bracket ${closing}`;
      refuse(text, text.length, 0, bracket, `The ${bracket} is missing at the end.`, {
        suggestion: `${text.trimEnd()}${closing}`,
      });
    }
    if (c === ",") {
      if (comma || part.entries.length === 0) refuseEmptyPlace(text, { at, length: 1, text: c });
      comma = { at, length: 1, text: c };
      at += 1;
      continue;
    }
    if (c === ";" || c === "|" || c === "||") {
      if (comma) refuseEmptyPlace(text, comma);
      const double = c === "|" && plainMark(text[at + 1] ?? "") === "|";
      part.after = { at, length: double ? 2 : 1, text: double ? "||" : c };
      parts.push({ entries: [], after: null });
      at += part.after.length;
      continue;
    }
    const entry = readEntry(text, at, conventions);
    const previous = part.entries[part.entries.length - 1];
    if (previous && !comma && previous.at + previous.length === at) refuseTouching(text, previous, entry);
    part.entries.push(entry);
    spelt.push(text.slice(entry.at, entry.at + entry.length));
    comma = null;
    at += entry.length;
  }
}

function readEntry(text: string, at: number, conventions: Conventions): Entry {
  NUMBER.lastIndex = at;
  const match = NUMBER.exec(text)?.[0];
  if (match === undefined) refuseEntry(text, at);
  let spelt = match;
  // A comma belongs to the number only where the sheet makes it the decimal mark.
  const comma = spelt.indexOf(",");
  if (comma > 0 && conventions.decimalMark !== ",") spelt = spelt.slice(0, comma);
  const value = halfOf(text, at, spelt);
  return { at, length: spelt.length, value };
}

/** The entry as a doubled integer; refuses thirds, quarters and numbers too long to be meant. */
function halfOf(text: string, at: number, spelt: string): Twice {
  const negative = MINUS.includes(spelt[0] as string);
  const body = spelt
    .replace(/^[+\-−–‐]/u, "")
    .replace("⁄", "/")
    .replace(",", ".");
  if (body.replace(/\D/g, "").length > BUDGET.digitsOfEntry) {
    refuse(
      text,
      at,
      spelt.length,
      "a short number",
      `The entry ${quoted(spelt)} is far larger than any j or m that is worked out here.`,
      {
        limit: true,
      },
    );
  }
  const [above = "", below] = body.split("/");
  const mixed = above.endsWith("½");
  if (below === "" || (mixed && below !== undefined)) {
    refuse(
      text,
      at,
      spelt.length,
      "an integer or a half such as 3/2",
      `The entry ${quoted(spelt)} is not complete: a half is written 3/2.`,
    );
  }
  const whole = mixed ? Number(above.slice(0, -1) || "0") + 0.5 : Number(above);
  const doubled = (2 * whole) / Number(below ?? "1");
  if (!Number.isInteger(doubled)) {
    refuse(
      text,
      at,
      spelt.length,
      "an integer or a half such as 3/2",
      below !== undefined && Number(below) === 0
        ? `The entry ${quoted(spelt)} divides by zero.`
        : `The entry ${quoted(spelt)} is neither an integer nor a half; every j and m is one of them.`,
    );
  }
  return twice((negative && doubled !== 0 ? -doubled : doubled) / 2);
}

function refuseStart(text: string, at: number): never {
  const expected = "a symbol such as (1 1 2; 0 0 0) or <1 0 1 0 | 2 0>";
  if (text.trim() === "") {
    refuse(
      text,
      text.length,
      0,
      expected,
      "The quantity is empty; type a symbol such as (1 1 2; 0 0 0) or <1 0 1 0 | 2 0>.",
    );
  }
  if (text[at] === "\\") {
    refuse(
      text,
      at,
      1,
      expected,
      "This field reads the typed notation, not LaTeX: write (1 1 2; 0 0 0) or <1 0 1 0 | 2 0>.",
    );
  }
  const next = text.slice(at).search(/[(<{[⟨〈]/u);
  const rest = next > 0 ? text.slice(at + next).trim() : undefined;
  refuse(
    text,
    at,
    next > 0 ? next : Math.min(1, text.length - at),
    expected,
    "A quantity begins with its bracket: ( for a 3j symbol, < for a Clebsch-Gordan coefficient.",
    rest === undefined ? {} : { suggestion: rest },
  );
}

function refuseEntry(text: string, at: number): never {
  const rest = text.slice(at);
  const character = String.fromCodePoint(rest.codePointAt(0) ?? 0);
  const expected = "an integer or a half such as 3/2";
  if (/^[+\-−–‐]\s+[\d½.]/u.test(rest)) {
    const gap = /^[+\-−–‐]\s+/u.exec(rest)?.[0].length ?? 1;
    refuse(text, at, gap, expected, "A sign stands directly before its number, without a space.", {
      suggestion: `${text.slice(0, at)}${text[at] as string}${text.slice(at + gap)}`,
    });
  }
  const word = /^[\p{L}_][\p{L}\p{N}_']*/u.exec(rest)?.[0];
  if (word) {
    refuse(
      text,
      at,
      word.length,
      expected,
      `The entry ${quoted(word)} is a letter; this edition verifies symbols whose entries are all numbers.`,
    );
  }
  if (OTHER_FRACTION.test(character)) {
    refuse(
      text,
      at,
      1,
      expected,
      `The entry ${quoted(character)} is neither an integer nor a half; every j and m is one of them.`,
    );
  }
  if (plainMark(character) in BRACKETS || ")>}]⟩".includes(character)) {
    refuse(
      text,
      at,
      1,
      "an entry or the closing bracket that matches",
      `The bracket ${quoted(character)} does not match the one that opens the symbol.`,
    );
  }
  if (character === "\\") {
    refuse(
      text,
      at,
      1,
      expected,
      "This field reads the typed notation, not LaTeX: write (1 1 2; 0 0 0) or <1 0 1 0 | 2 0>.",
    );
  }
  refuse(text, at, character.length, expected, `Expected ${expected}, but found ${quoted(character)}.`);
}

function refuseTouching(text: string, left: Entry, right: Entry): never {
  refuse(
    text,
    right.at,
    right.length,
    "a space or a comma between two entries",
    `The entries ${quoted(text.slice(left.at, right.at + right.length))} touch; put a space between them.`,
    { suggestion: `${text.slice(0, right.at)} ${text.slice(right.at)}` },
  );
}

function refuseEmptyPlace(text: string, comma: Mark): never {
  refuse(
    text,
    comma.at,
    1,
    "an entry on both sides of the comma",
    "There is no entry on one side of this comma.",
  );
}

function endOfText(text: string, at: number): void {
  const rest = skipSpace(text, at);
  if (rest < text.length) {
    refuse(
      text,
      rest,
      text.length - rest,
      "the end of the quantity",
      `Nothing is expected after the symbol, but ${quoted(text.slice(rest))} follows; one claim is one symbol.`,
      { suggestion: text.slice(0, at).trim() },
    );
  }
}

function skipSpace(text: string, at: number): number {
  while (at < text.length && /\s/u.test(text[at] as string)) at += 1;
  return at;
}
