/** A half-integer j is held as the integer 2j, so that every test on it is integer arithmetic. */
export type Twice = number & { readonly unit: "twice" };

/** Largest 2j that is accepted as an entry at all; far above what is evaluated (see LIMITS in quantity.ts). */
const LARGEST = 2_000_000;

/**
 * The half-integer n as a doubled integer.
 * @throws RangeError unless 2n is an integer of reasonable size
 * @example twice(1.5) // 3
 */
export function twice(n: number): Twice {
  return fromTwice(2 * n);
}

/** A doubled integer that is already at hand (3 for 3/2), checked. @throws RangeError unless it is an integer */
export function fromTwice(doubled: number): Twice {
  if (!Number.isInteger(doubled) || Math.abs(doubled) > LARGEST) {
    throw new RangeError(`${doubled / 2} is not an integer or half-integer of a size that can be handled.`);
  }
  return (doubled === 0 ? 0 : doubled) as Twice; // no negative zero
}

const SPELLING = /^([+\-−–]?)\s*(?:(\d{1,6})\s*\/\s*([12])|(\d{0,6})½|(\d{1,6})(?:\.(0*|50*))?|\.(50*))$/;

/**
 * Reads one entry of a symbol: `2`, `3/2`, `1.5`, `½`, `1½`, `-1/2`, `−½`. Returns null for anything else
 * (`1/3`, `0.3`, an empty text); the caller says what was expected.
 */
export function readHalf(text: string): Twice | null {
  const match = SPELLING.exec(text.trim());
  if (!match) return null;
  const [, sign, numerator, denominator, whole, integer, decimals, bare] = match;
  const size =
    numerator !== undefined
      ? Number(numerator) * (denominator === "1" ? 2 : 1)
      : whole !== undefined
        ? 2 * Number(whole || 0) + 1
        : bare !== undefined
          ? 1
          : 2 * Number(integer) + (decimals?.startsWith("5") ? 1 : 0);
  if (size > LARGEST) return null;
  return fromTwice(sign && sign !== "+" ? -size : size);
}

/** "3/2", "-1/2", "2". */
export function showHalf(t: Twice): string {
  return t % 2 === 0 ? String(t / 2) : `${t}/2`;
}

/** `\tfrac{3}{2}`, `-\tfrac{1}{2}`, `2`. */
export function halfLatex(t: Twice): string {
  return t % 2 === 0 ? String(t / 2) : `${t < 0 ? "-" : ""}\\tfrac{${Math.abs(t)}}{2}`;
}
