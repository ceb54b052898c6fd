/** Why a text could not be read, with the place in the author's own text (UTF-16 offsets). */
export type ReadError = {
  at: number;
  length: number;
  found: string;
  expected: string;
  says: string;
  /** A reading that the person may accept; it is never taken by itself. */
  suggestion?: string;
  /** A second reading, where two are equally possible. */
  alternative?: string;
  /** True when a stated limit was passed: the claim is then undecided rather than unreadable. */
  limit?: true;
};

/** Thrown inside a reader and turned into a value at its edge, so that nothing leaves it as an exception. */
export class Unreadable extends Error {
  readonly error: ReadError;
  constructor(error: ReadError) {
    super(error.says);
    this.error = error;
  }
}

/** One visible piece of text for a message: shortened, with control and direction characters spelt out. */
export function quoted(text: string): string {
  const cut = text.length > 24 ? `${text.slice(0, 23)}…` : text;
  return `“${cut.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu, (c) => `U+${codePoint(c)}`)}”`;
}

function codePoint(c: string): string {
  return (c.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0");
}

/** Throws an Unreadable for the piece of `text` at the offset, kept inside the text. */
export function refuse(
  text: string,
  at: number,
  length: number,
  expected: string,
  says: string,
  more: { suggestion?: string; alternative?: string; limit?: true } = {},
): never {
  const start = Math.max(0, Math.min(at, text.length));
  const size = Math.max(0, Math.min(length, text.length - start));
  const found = size === 0 ? "the end of the text" : quoted(text.slice(start, start + size));
  throw new Unreadable({ at: start, length: size, found, expected, says, ...more });
}

/** Runs a reader; an Unreadable becomes { ok: false }, anything else is a bug and goes on. */
export function reading<T extends object>(
  read: () => T,
): ({ ok: true } & T) | { ok: false; error: ReadError } {
  try {
    return { ok: true, ...read() };
  } catch (error) {
    if (error instanceof Unreadable) return { ok: false, error: error.error };
    throw error;
  }
}
