/** Between the cells of a drawn symbol and its typed notation. Reading here is lenient: the verifier has the last word. */

export type SymbolKind = "3j" | "cg";
export type CgOrder = "j1m1j2m2" | "j1j2m1m2";

/** The names of the six cells, in the order in which they are typed. */
export function cellNames(kind: SymbolKind, cgOrder: CgOrder): readonly string[] {
  if (kind === "3j") return ["j1", "j2", "j3", "m1", "m2", "m3"];
  return cgOrder === "j1m1j2m2" ? ["j1", "m1", "j2", "m2", "J", "M"] : ["j1", "j2", "m1", "m2", "J", "M"];
}

export const EMPTY_CELLS: readonly string[] = ["", "", "", "", "", ""];

const FRAME: Record<SymbolKind, { open: string; middle: string; close: string; first: number }> = {
  "3j": { open: "(", middle: "; ", close: ")", first: 3 },
  cg: { open: "<", middle: " | ", close: ">", first: 4 },
};

/** Typed notation of the cells; "" when nothing is filled in yet. */
export function notationOf(kind: SymbolKind, cells: readonly string[]): string {
  if (cells.every((cell) => cell.trim() === "")) return "";
  const { open, middle, close, first } = FRAME[kind];
  return open + cells.slice(0, first).join(" ") + middle + cells.slice(first).join(" ") + close;
}

/** The cell whose text holds the offset of `notationOf(kind, cells)`, or null where the offset is on a bracket. */
export function cellAt(kind: SymbolKind, cells: readonly string[], offset: number): number | null {
  const { open, middle, first } = FRAME[kind];
  let at = open.length;
  for (let i = 0; i < cells.length; i += 1) {
    if (i > 0) at += i === first ? middle.length : 1;
    const end = at + (cells[i] ?? "").length;
    if (offset >= at && offset <= end) return i;
    at = end;
  }
  return null;
}

/** LaTeX fractions and spaces, printed signs and brackets, as they are typed. */
function plain(text: string): string {
  return text
    .replace(/\\[dt]?frac\s*\{?\s*(-?\d+)\s*\}?\s*\{?\s*(\d+)\s*\}?/g, "$1/$2")
    .replace(/\\begin\{p?matrix\}|\\left|\\right|\\big[lr]?|\\Big[lr]?|\$/g, " ")
    .replace(/\\end\{p?matrix\}/g, " ")
    .replace(/\\langle|⟨|〈/g, "<")
    .replace(/\\rangle|⟩|〉/g, ">")
    .replace(/\\vert|\\mid|∣/g, "|")
    .replace(/\\\\/g, ";")
    .replace(/\\[,;:! ]|~|&/g, " ")
    .replace(/[−–]/g, "-")
    .replace(/(\d)½/g, (_, whole: string) => `${2 * Number(whole) + 1}/2`)
    .replace(/½/g, "1/2")
    .trim();
}

/** Which kind of symbol a pasted text looks like, or null. */
export function kindOf(text: string): SymbolKind | null {
  const typed = plain(text);
  if (typed.includes("<") && typed.includes("|")) return "cg";
  if (/^\(|;/.test(typed)) return "3j";
  return null;
}

/** The six entries of a typed or LaTeX symbol of this kind; null when it is not one (or has another number of entries). */
export function cellsOf(kind: SymbolKind, text: string): string[] | null {
  if (kindOf(text) !== kind) return null;
  const typed = plain(text);
  const halves = (kind === "3j" ? typed.replace(/[()]/g, " ") : typed.replace(/[<>]/g, " ")).split(
    kind === "3j" ? ";" : "|",
  );
  if (halves.length !== 2) return null;
  const [top, bottom] = halves.map((half) => half.split(/[\s,]+/).filter((entry) => entry !== ""));
  const { first } = FRAME[kind];
  if (top?.length !== first || bottom?.length !== 6 - first) return null;
  return [...top, ...bottom];
}

/**
 * What a cell holds after a change. A slash makes a half at once (3/ becomes 3/2, / alone 1/2), taking the 2 away takes
 * the slash with it, a decimal half becomes a fraction, printed signs become typed ones.
 */
export function cellAfter(before: string, typed: string): string {
  const text = typed.replace(/[−–]/g, "-").replace(/[^\d./½-]/g, "");
  if (text === "½") return "1/2";
  if (text === "-½") return "-1/2";
  const mixed = /^(-?)(\d+)½$/.exec(text) ?? /^(-?)(\d*)\.5$/.exec(text);
  if (mixed) return `${mixed[1] ?? ""}${2 * Number(mixed[2] === "" ? 0 : mixed[2]) + 1}/2`;
  if (/\/2\/?2$/.test(text)) return text.replace(/\/2\/?2$/, "/2");
  if (text.endsWith("/")) {
    if (before === `${text}2`) return text.slice(0, -1);
    const top = text.slice(0, -1);
    return top === "" || top === "-" ? `${top}1/2` : top.includes("/") ? top : `${top}/2`;
  }
  return text;
}

/** Minus becomes plus and the other way round. */
export function negated(cell: string): string {
  return cell.startsWith("-") ? cell.slice(1) : `-${cell}`;
}
