import { plainKey } from "@/lib/keys/plain-key";
import type { Conventions } from "@/lib/verify/conventions";
import { placeOf } from "./decode";
import { escapePointer, scanJson, type JsonPlaces } from "./json-scan";
import { KEY_FILE_LIMITS, type KeyFileError, type KeyRow } from "./key-file";
import { keySchema, type KeyInput } from "./key-schema";

export type JsonKey = { key: KeyInput | null; errors: KeyFileError[]; places: JsonPlaces };

/**
 * A JSON key checked against its contract, or the JSON of a frozen key; each error with its JSON Pointer, line and column.
 * @throws UnusableFile when the text is not well-formed JSON, nests too deep, or repeats a key
 */
export function parseKey(text: string, mostClaims: number): JsonKey {
  const places = scanJson(text);
  const parsed = keySchema(mostClaims).safeParse(plainKey(JSON.parse(text)));
  const errors = parsed.success
    ? []
    : parsed.error.issues.map((issue) => {
        const extra = issue.code === "unrecognized_keys" ? issue.keys.slice(0, 1) : [];
        const pointer = [...issue.path, ...extra].map((part) => `/${escapePointer(String(part))}`).join("");
        return { ...placeOf(text, placeAt(places, pointer)), says: issue.message, pointer };
      });
  return { key: parsed.success ? parsed.data : null, errors, places };
}

/** The offset of a pointer's value, or of the nearest value around it. */
function placeAt(places: JsonPlaces, pointer: string): number {
  for (let at = pointer; ; at = at.slice(0, Math.max(0, at.lastIndexOf("/")))) {
    const offset = places.get(at);
    if (offset !== undefined) return offset;
    if (at === "") return 0;
  }
}

/** The rows of a JSON key, and an error for each claim that cannot be used. */
export function readJson(text: string): {
  conventions: Partial<Conventions> | null;
  rows: KeyRow[];
  errors: KeyFileError[];
} {
  const { key, errors, places } = parseKey(text, KEY_FILE_LIMITS.rows);
  if (!key) return { conventions: null, rows: [], errors };
  const lines = lineFinder(text);
  const rows: KeyRow[] = [];
  const seen = new Map<string, number>();
  key.claims.forEach((claim, n) => {
    const { line, column } = lines(places.get(`/claims/${n}/quantity`) ?? 0);
    const ref = claim.ref.trim();
    const before = seen.get(ref);
    if (before !== undefined) {
      const place = lines(places.get(`/claims/${n}/ref`) ?? 0);
      errors.push({
        ...place,
        says: `The ref “${ref.slice(0, 40)}” is already that of claim ${before + 1}; each claim has a ref of its own.`,
        pointer: `/claims/${n}/ref`,
      });
      return;
    }
    seen.set(ref, n);
    const { quantity, claimed, note, problem, page } = claim;
    rows.push({
      ref,
      quantity,
      claimed,
      note: note ?? null,
      problem: problem ?? null,
      page: page ?? null,
      line,
      column,
    });
  });
  return { conventions: withoutHoles(key.conventions), rows, errors };
}

/** The stated conventions, without the entries that were left out. */
export function withoutHoles(conventions: KeyInput["conventions"]): Partial<Conventions> | null {
  if (!conventions) return null;
  return Object.fromEntries(Object.entries(conventions).filter(([, value]) => value !== undefined));
}

/** Line and column of offsets, for many of them in one text. */
function lineFinder(text: string): (offset: number) => { line: number; column: number } {
  const starts = [0];
  for (let n = text.indexOf("\n"); n >= 0; n = text.indexOf("\n", n + 1)) starts.push(n + 1);
  return (offset) => {
    let [low, high] = [0, starts.length];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((starts[middle] ?? 0) <= offset) low = middle;
      else high = middle;
    }
    return { line: low + 1, column: offset - (starts[low] ?? 0) + 1 };
  };
}
