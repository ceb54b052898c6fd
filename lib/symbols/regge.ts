import { divide, equals, multiply, negate, ONE, root } from "@/lib/symbols/exact";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import type { Kind, Orbit, Quantity, Variant } from "@/lib/symbols/kinds";
import { clebschGordan, reggeSquare, threeJ, type ThreeJ } from "@/lib/symbols/three-j";

type Order = readonly [number, number, number];

/**
 * One of the 72 symmetries of the Regge square: it may be transposed, then its rows and its columns are put in an order. The
 * symbol is multiplied by (−1)^(j1+j2+j3) when rows and columns together are permuted oddly (references: Regge 1958; VMK section 8.4).
 */
export type Element = {
  name: string;
  does: string;
  transpose: boolean;
  rows: Order;
  columns: Order;
  odd: boolean;
  /** One of the 12 that only permute columns and reverse projections. */
  classical: boolean;
};

const ORDERS: readonly Order[] = [
  [0, 1, 2],
  [1, 0, 2],
  [2, 1, 0],
  [0, 2, 1],
  [1, 2, 0],
  [2, 0, 1],
];

function oddOrder([a, b, c]: Order): boolean {
  const inversions = Number(a > b) + Number(a > c) + Number(b > c);
  return inversions % 2 === 1;
}

/** The six ways of choosing which three entries of the square become its top row; 2 and 3 below follow with or without a swap. */
const TOPS: readonly { transpose: boolean; top: number; name: string; does: string }[] = [
  { transpose: false, top: 0, name: "", does: "" },
  {
    transpose: false,
    top: 1,
    name: "Regge, second row on top",
    does: "Row 2 of the Regge square moves to the top: each j becomes half of the sum of the other two less its own m (as in DLMF 34.3.12)",
  },
  {
    transpose: false,
    top: 2,
    name: "Regge, third row on top",
    does: "Row 3 of the Regge square moves to the top: each j becomes half of the sum of the other two plus its own m",
  },
  ...[0, 1, 2].map((top) => {
    const [kept, one, two] = [top + 1, ((top + 1) % 3) + 1, ((top + 2) % 3) + 1];
    return {
      transpose: true,
      top,
      name: `Regge, j${kept} kept`,
      does: `Rows and columns of the Regge square change places, column ${kept} on top: j${kept} becomes the first j, and the other two become (j${one} + j${two} ± m${kept})/2 (DLMF 34.3.11)`,
    };
  }),
];

/** All 72, the identity first, the 12 classical ones before the 60 that Regge found. */
export const ELEMENTS: readonly Element[] = TOPS.flatMap((top) => {
  const others = [0, 1, 2].filter((n) => n !== top.top) as [number, number];
  return ORDERS.flatMap((columns) =>
    [false, true].map((swapped): Element => {
      const rows: Order = swapped ? [top.top, others[1], others[0]] : [top.top, others[0], others[1]];
      const names = [top.name, columnName(columns), swapped ? "projections reversed" : ""].filter(Boolean);
      const sentences = [
        top.does,
        columnSentence(columns),
        swapped ? "All projections change sign" : "",
      ].filter(Boolean);
      const does =
        sentences.length === 0
          ? "The symbol as it is."
          : `${sentences.map((s, n) => (n === 0 ? s : s.charAt(0).toLowerCase() + s.slice(1))).join("; then ")}.`;
      return {
        name: names.join(", ") || "identity",
        does,
        transpose: top.transpose,
        rows,
        columns,
        odd: oddOrder(rows) !== oddOrder(columns),
        classical: !top.transpose && top.top === 0,
      };
    }),
  );
});

function columnName([a, b, c]: Order): string {
  return a === 0 && b === 1 ? "" : `columns ${a + 1}${b + 1}${c + 1}`;
}

function columnSentence(order: Order): string {
  const [a, b, c] = order.map((n) => n + 1);
  if (a === 1 && b === 2) return "";
  if (!oddOrder(order)) return `Columns are written in the order ${a} ${b} ${c}`;
  const moved = order.flatMap((n, place) => (n === place ? [] : [place + 1]));
  return `Columns ${moved.join(" and ")} change places`;
}

/** The square (nine entries, row by row) after the symmetry. */
export function applyElement(e: Element, square: readonly number[]): number[] {
  return e.rows.flatMap((r) => e.columns.map((c) => square[e.transpose ? 3 * c + r : 3 * r + c] as number));
}

/** The 3j symbol that has this Regge square. */
export function symbolOfSquare(s: readonly number[]): ThreeJ {
  const [s11, s12, s13, s21, s22, s23, s31, s32, s33] = s as number[] as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return [s12 + s13, s11 + s13, s11 + s12, s21 - s31, s22 - s32, s23 - s33].map((n) =>
    fromTwice(n),
  ) as unknown as ThreeJ;
}

/** The sign that a symmetry brings, for a symbol whose j's add up to sum. */
export function phaseOf(e: Element, sum: number): 1 | -1 {
  return e.odd && sum % 2 !== 0 ? -1 : 1;
}

/** The 3j that a symbol is or, for a CG ⟨j1 m1 j2 m2|J M⟩, contains: (j1 j2 J; m1 m2 −M). */
export function threeJEntries({ kind, args }: Quantity): ThreeJ {
  if (args.length !== 6) throw new RangeError(`A ${kind} symbol has 6 entries; ${args.length} were given.`);
  const [a, b, c, d, e, f] = args as unknown as ThreeJ;
  return kind === "3j" ? [a, b, c, d, e, f] : [a, c, e, b, d, fromTwice(-f)];
}

/** The 3j or CG with these 3j entries. */
export function quantityOf(kind: Kind, [a, b, c, x, y, z]: ThreeJ): Quantity {
  return { kind, args: kind === "3j" ? [a, b, c, x, y, z] : [a, x, b, y, c, fromTwice(-z)] };
}

/** What a symbol is in terms of its 3j: ±1·√dimension, with dimension 1 for a 3j and 2J+1 for a CG. */
function relation(kind: Kind, [a, b, c, , , z]: ThreeJ): { phase: 1 | -1; dimension: number } {
  if (kind === "3j") return { phase: 1, dimension: 1 };
  const exponent = (a - b - z) / 2; // whole for every allowed symbol
  return { phase: exponent % 2 === 0 || exponent % 1 !== 0 ? 1 : -1, dimension: Math.max(1, c + 1) };
}

/**
 * The symbols that symmetries make of q: all 72 through the Regge square, or the 12 classical ones when a selection rule fails and
 * there is no square. Each is computed directly from its own entries, and agrees says whether value(q) = phase · factor · value holds.
 */
export function variants(q: Quantity): Variant[] {
  const entries = threeJEntries(q);
  const square = reggeSquare(entries);
  const [a, b, c] = entries;
  const sum = (a + b + c) / 2;
  const direct = q.kind === "3j" ? threeJ : clebschGordan;
  const own = relation(q.kind, entries);
  const value = direct(entries);
  const elements = square ? ELEMENTS : ELEMENTS.filter((e) => e.classical);
  return elements.map((e) => {
    const image = square ? symbolOfSquare(applyElement(e, square)) : classicalImage(e, entries);
    const theirs = relation(q.kind, image);
    const phase = (phaseOf(e, sum) * own.phase * theirs.phase) as 1 | -1;
    const factor =
      own.dimension === theirs.dimension ? ONE : divide(root(own.dimension), root(theirs.dimension));
    const found = direct(image);
    const product = multiply(factor, found);
    return {
      name: e.name,
      does: e.does,
      phase,
      factor,
      quantity: quantityOf(q.kind, image),
      value: found,
      agrees: equals(value, phase === 1 ? product : negate(product)),
    };
  });
}

/** A classical symmetry on the entries themselves, for symbols that have no Regge square. */
export function classicalImage(e: Element, entries: ThreeJ): ThreeJ {
  const reversed = e.rows[1] === 2;
  const j = e.columns.map((n) => entries[n] as Twice);
  const m = e.columns.map((n) => fromTwice((reversed ? -1 : 1) * (entries[n + 3] as Twice)));
  return [...j, ...m] as unknown as ThreeJ;
}

/** The least of the 72 images of a square, read row by row, with a symmetry that leads to it. */
function canonicalSquare(square: readonly number[]): { least: number[]; by: Element } {
  let least = [...square];
  let by = ELEMENTS[0] as Element;
  for (const e of ELEMENTS) {
    const image = applyElement(e, square);
    const difference = image.findIndex((n, k) => n !== least[k]);
    if (difference >= 0 && (image[difference] as number) < (least[difference] as number))
      [least, by] = [image, e];
  }
  return { least, by };
}

/**
 * The orbit of a symbol: two symbols (3j or CG) have the same key exactly when a symmetry joins them, and value(q) = factor · value(canonical
 * symbol). A forbidden symbol has no Regge square and gets a key of its own entries, as the 3j that it is or contains.
 */
export function orbit(q: Quantity): Orbit {
  const entries = threeJEntries(q);
  const square = reggeSquare(entries);
  const own = relation(q.kind, entries);
  const size = own.dimension === 1 ? ONE : root(own.dimension);
  if (!square)
    return { key: `3j none ${entries.join(" ")}`, factor: own.phase === 1 ? size : negate(size), zero: true };
  const { least, by } = canonicalSquare(square);
  const sum = (square[0] as number) + (square[1] as number) + (square[2] as number);
  const phase = phaseOf(by, sum) * own.phase;
  return {
    key: `3j ${least.join(" ")}`,
    factor: phase === 1 ? size : negate(size),
    zero: threeJ(entries).terms.length === 0,
  };
}

/** The canonical symbol of an orbit's key. @throws RangeError if it is not a key */
export function symbolOfKey(key: string): Quantity {
  const numbers = key
    .replace(/^3j (none )?/, "")
    .split(" ")
    .map(Number);
  if (key.startsWith("3j none ") && numbers.length === 6) {
    return { kind: "3j", args: numbers.map((n) => fromTwice(n)) };
  }
  if (!key.startsWith("3j ") || numbers.length !== 9)
    throw new RangeError("This is not the key of an orbit.");
  return quantityOf("3j", symbolOfSquare(numbers));
}

/** The symmetries that map an allowed symbol to itself; an odd one among them with j1+j2+j3 odd makes it vanish. [] when forbidden. */
export function stabiliser(q: Quantity): Element[] {
  const square = reggeSquare(threeJEntries(q));
  if (!square) return [];
  return ELEMENTS.filter((e) => applyElement(e, square).every((n, k) => n === square[k]));
}

/** The different symbols of an orbit, without repeats, as 3j symbols. */
export function orbitSymbols(q: Quantity): Quantity[] {
  const square = reggeSquare(threeJEntries(q));
  if (!square) return [];
  const images = new Map(
    ELEMENTS.map((e) => applyElement(e, square)).map((image) => [image.join(" "), image]),
  );
  return [...images.values()].map((image) => quantityOf("3j", symbolOfSquare(image)));
}
