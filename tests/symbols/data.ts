import { readFileSync } from "node:fs";
import path from "node:path";
import Fraction from "fraction.js";
import { negate, root, ZERO, type Exact } from "@/lib/symbols/exact";
import { readHalf } from "@/lib/symbols/half";
import { quantity, type Kind, type Quantity } from "@/lib/symbols/quantity";

/** A value of the reference data: sign·√square. */
export type SignedSquare = { sign: -1 | 0 | 1; square: string };
export type Row = {
  kind: string;
  args: string[];
  value: SignedSquare;
  source?: string;
  match?: boolean;
  printed?: SignedSquare;
  note?: string;
};

/** The rows of a file of tests/reference-data whose kind is one of those named. */
export function rows(file: string, ...kinds: string[]): Row[] {
  const text = readFileSync(path.join(import.meta.dirname, "../reference-data", file), "utf8");
  const all = text
    .split("\n")
    .filter(Boolean)
    .map((line) => JSON.parse(line) as Row);
  return all.filter((row) => kinds.includes(row.kind));
}

export function exactOf({ sign, square }: SignedSquare): Exact {
  if (sign === 0) return ZERO;
  const value = root(new Fraction(square));
  return sign < 0 ? negate(value) : value;
}

/** A symbol from its entries as they are written: `symbol("3j", "1 1 2 0 0 0")`. */
export function symbol(kind: Kind, entries: string | readonly string[]): Quantity {
  const list = typeof entries === "string" ? entries.trim().split(/\s+/) : entries;
  return quantity(
    kind,
    list.map((text) => {
      const entry = readHalf(text);
      if (entry === null) throw new Error(`${text} is no entry of a symbol`);
      return entry;
    }),
  );
}

/** Repeatable random numbers in [0, 1) from a seed (a 32-bit generator is enough to choose symbols). */
export function randomFrom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}
