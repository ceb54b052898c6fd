import { keyOf } from "./text";

/**
 * A free reference for the next claim of a problem: the letter after the last one used, as 7.3(c) after 7.3(b);
 * the label itself when the problem has no claim and the label is free.
 * @param label the problem's label
 * @param refs those of the problem in their order
 * @param taken whether the work has this ref already
 */
export function proposeRef(
  label: string,
  refs: readonly string[],
  taken: (key: string) => boolean = () => false,
): string {
  const used = new Set(refs.map(keyOf));
  const free = (ref: string) => !used.has(keyOf(ref)) && !taken(keyOf(ref));
  const letters = refs.flatMap((ref) => /\(([a-z])\)$/i.exec(ref)?.[1]?.toLowerCase() ?? []);
  const last = letters.length > 0 ? Math.max(...letters.map((letter) => letter.charCodeAt(0) - 96)) : 0;
  for (let number = last + 1; number < last + 2_000; number++) {
    const ref = `${label}(${letterOf(number)})`;
    if (free(ref)) return ref;
  }
  return `${label}(?)`;
}

/** 1 → a, 26 → z, 27 → aa. */
function letterOf(number: number): string {
  const rest = Math.floor((number - 1) / 26);
  return (rest > 0 ? letterOf(rest) : "") + String.fromCharCode(97 + ((number - 1) % 26));
}

/** The label of the problem that a ref belongs to by its look: 7.3 of 7.3(a), 7.3(a)(ii) and 7.3a. */
export function leadingLabel(ref: string): string {
  const bare = ref
    .trim()
    .replace(/(?:\s*\([^()]{1,8}\))+$/, "")
    .replace(/(?<=\d)[a-z]{1,2}$/i, "")
    .trim();
  return bare === "" ? ref.trim() : bare;
}
