import { accidentalReason } from "@/lib/symbols/accidental";
import { equals, negate, ONE, type Exact } from "@/lib/symbols/exact";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import type { Rule, VanishingReason } from "@/lib/symbols/kinds";
import { racahW, sixJ, sixJArray, sixJParts, SIX_J_TRIADS, type SixJ } from "@/lib/symbols/six-j";
import { brokenTriads, triadRules, triadsOf } from "@/lib/symbols/triads";

const NAMES = ["j1", "j2", "j3", "l1", "l2", "l3"] as const;
/** W(abcd; ef) = ±{a b e; d c f}: the names of Racah's entries at the places of the 6j. */
const RACAH_NAMES = ["a", "b", "e", "d", "c", "f"] as const;

/**
 * One of the 144 symmetries of a 6j symbol, none of which changes its sign: first one of Regge's six (identity included), then one of the 24 classical
 * ones, which permute columns and turn two of them upside down (DLMF 34.5.8 to 34.5.10).
 */
export type SixJElement = {
  name: string;
  does: string;
  classical: boolean;
  image: (entries: SixJ) => SixJ;
};

const ORDERS: readonly (readonly [number, number, number])[] = [
  [0, 1, 2],
  [1, 0, 2],
  [2, 1, 0],
  [0, 2, 1],
  [1, 2, 0],
  [2, 0, 1],
];

/** Which columns are turned upside down. */
const TURNS: readonly (readonly number[])[] = [[], [0, 1], [0, 2], [1, 2]];

/** The partner column of each column, whose entries go into the half-sum; null for a column that stays. */
type Partners = readonly [number | null, number | null, number | null];

const REGGE: readonly { partners: Partners; name: string; does: string }[] = [
  { partners: [null, null, null], name: "", does: "" },
  ...[0, 1, 2].map((kept) => {
    const [one, two] = [0, 1, 2].filter((n) => n !== kept) as [number, number];
    const partners = [0, 1, 2].map((n) => (n === kept ? null : n === one ? two : one)) as unknown as Partners;
    return {
      partners,
      name: `Regge, column ${kept + 1} kept`,
      does: `Column ${kept + 1} stays, and each entry of columns ${one + 1} and ${two + 1} becomes half of the sum of their four entries less the other entry of its column (DLMF 34.5.9)`,
    };
  }),
  {
    partners: [1, 2, 0],
    name: "Regge, each with the next",
    does: "Each entry becomes half of the sum of its column and the next one less the other entry of its column (DLMF 34.5.10)",
  },
  {
    partners: [2, 0, 1],
    name: "Regge, each with the last",
    does: "Each entry becomes half of the sum of its column and the one before less the other entry of its column (DLMF 34.5.10, turned about)",
  },
];

function reggeImage(partners: Partners, entries: SixJ): SixJ {
  const at = (n: number) => entries[n] as number;
  return entries.map((_, place) => {
    const column = place % 3;
    const partner = partners[column];
    if (partner === null || partner === undefined) return entries[place] as Twice;
    const sum = at(column) + at(column + 3) + at(partner) + at(partner + 3);
    return fromTwice(sum / 2 - at((place + 3) % 6));
  }) as unknown as SixJ;
}

function classicalImage(order: readonly number[], turned: readonly number[], entries: SixJ): SixJ {
  const rows = [0, 1].map((row) =>
    order.map((column) => entries[column + 3 * (turned.includes(column) ? 1 - row : row)] as Twice),
  );
  return rows.flat() as unknown as SixJ;
}

/** All 144, the identity first. */
export const SIX_J_ELEMENTS: readonly SixJElement[] = REGGE.flatMap((regge) =>
  ORDERS.flatMap((order) =>
    TURNS.map((turned): SixJElement => {
      const plain = order.every((n, place) => n === place);
      const columns = order.map((n) => n + 1);
      const upside = turned.map((n) => n + 1).join(" and ");
      const names = [
        regge.name,
        turned.length ? `columns ${upside} upside down` : "",
        plain ? "" : `columns ${columns.join("")}`,
      ];
      const sentences = [
        regge.does,
        turned.length ? `Columns ${upside} are turned upside down` : "",
        plain ? "" : `Columns are written in the order ${columns.join(" ")}`,
      ].filter(Boolean);
      return {
        name: names.filter(Boolean).join(", ") || "identity",
        does: sentences.length
          ? `${sentences.map((s, n) => (n === 0 ? s : s.charAt(0).toLowerCase() + s.slice(1))).join("; then ")}.`
          : "The symbol as it is.",
        classical: regge.name === "",
        image: (entries) => classicalImage(order, turned, reggeImage(regge.partners, entries)),
      };
    }),
  ),
);

export type SixJVariant = {
  name: string;
  does: string;
  phase: 1;
  entries: SixJ;
  value: Exact;
  agrees: boolean;
};

/** The symbols that symmetries make of a 6j, each recomputed from its own entries: all 144, or the 24 classical ones of a forbidden symbol. */
export function sixJVariants(entries: SixJ): SixJVariant[] {
  const value = sixJ(entries);
  const elements = sixJArray(entries) ? SIX_J_ELEMENTS : SIX_J_ELEMENTS.filter((e) => e.classical);
  return elements.map((e) => {
    const image = e.image(entries);
    const found = sixJ(image);
    return {
      name: e.name,
      does: e.does,
      phase: 1,
      entries: image,
      value: found,
      agrees: equals(found, value),
    };
  });
}

/** The symmetries that map an allowed symbol to itself. [] when forbidden. */
export function sixJStabiliser(entries: SixJ): SixJElement[] {
  if (!sixJArray(entries)) return [];
  return SIX_J_ELEMENTS.filter((e) => e.image(entries).every((j, n) => j === entries[n]));
}

/**
 * The key of a 6j's orbit: the least arrangement of the rows and columns of its 4×3 array, so that two symbols have the same key exactly when one
 * of the 144 symmetries joins them. A forbidden symbol gets a key of its own entries.
 */
export function sixJKey(entries: SixJ): string {
  const array = sixJArray(entries);
  if (!array) return `6j none ${entries.join(" ")}`;
  const arranged = ORDERS.map((order) =>
    [0, 1, 2, 3].map((row) => order.map((column) => array[3 * row + column] as number)).sort(compareNumbers),
  );
  const least = arranged.map((rows) => rows.flat()).sort(compareNumbers)[0] as number[];
  return `6j ${least.join(" ")}`;
}

/** The canonical symbol of a 6j key. @throws RangeError if it is not one */
export function sixJOfKey(key: string): SixJ {
  const numbers = key
    .replace(/^6j (none )?/, "")
    .split(" ")
    .map(Number);
  if (key.startsWith("6j none ") && numbers.length === 6)
    return numbers.map((n) => fromTwice(n)) as unknown as SixJ;
  if (!key.startsWith("6j ") || numbers.length !== 12)
    throw new RangeError("This is not the key of a 6j's orbit.");
  const at = (row: number, column: number) => numbers[3 * (row - 1) + column - 1] as number;
  // β1−α4 = j1+j2−j3 and so on: each doubled entry is a sum of two numbers of the array.
  const doubled = [
    at(4, 1) + at(3, 3),
    at(4, 1) + at(2, 2),
    at(2, 2) + at(3, 3),
    at(1, 1) + at(2, 3),
    at(1, 1) + at(3, 2),
    at(4, 2) + at(1, 3),
  ];
  return doubled.map((n) => fromTwice(n)) as unknown as SixJ;
}

/** The orbit of W(abcd; ef): the key of its 6j, and the sign between them. */
export function racahOrbit([a, b, c, d, e, f]: SixJ): { key: string; factor: Exact } {
  const sum = (a + b + c + d) / 2;
  return { key: sixJKey([a, b, e, d, c, f]), factor: sum % 2 === 0 || sum % 1 !== 0 ? ONE : negate(ONE) };
}

/** The selection rules of a 6j in order, with the numbers put in. */
export function sixJRules(entries: SixJ): Rule[] {
  return triadRules(triadsOf(SIX_J_TRIADS, NAMES, entries));
}

/** Every reason why a 6j is 0; [] when it is not. No symmetry of a 6j changes its sign, so parity forbids none. */
export function whyZeroSixJ(entries: SixJ): VanishingReason[] {
  return reasons(entries, NAMES);
}

/** The same for Racah's W(abcd; ef), in its own letters. */
export function whyZeroRacah([a, b, c, d, e, f]: SixJ): VanishingReason[] {
  return reasons([a, b, e, d, c, f], RACAH_NAMES);
}

function reasons(entries: SixJ, names: readonly string[]): VanishingReason[] {
  const broken = brokenTriads(triadsOf(SIX_J_TRIADS, names, entries));
  if (broken.length > 0) return broken;
  const parts = sixJParts(entries);
  return parts.total === 0n ? [accidentalReason("the single sum", parts.terms)] : [];
}

export type RacahVariant = {
  name: string;
  does: string;
  phase: 1 | -1;
  entries: SixJ;
  value: Exact;
  agrees: boolean;
};

/** The symbols W that the symmetries of its 6j make of one, each recomputed, with the sign between them. */
export function racahVariants(entries: SixJ): RacahVariant[] {
  const [a, b, c, d, e, f] = entries;
  const value = racahW(entries);
  const own: SixJ = [a, b, e, d, c, f];
  const elements = sixJArray(own) ? SIX_J_ELEMENTS : SIX_J_ELEMENTS.filter((element) => element.classical);
  return elements.map((element) => {
    const [p, q, r, s, t, u] = element.image(own);
    const image: SixJ = [p, q, t, s, r, u];
    const exponent = (a + b + c + d + p + q + s + t) / 2;
    const phase = exponent % 2 === 0 || exponent % 1 !== 0 ? 1 : -1;
    const found = racahW(image);
    const agrees = equals(value, phase === 1 ? found : negate(found));
    return { name: element.name, does: element.does, phase, entries: image, value: found, agrees };
  });
}

/** Lexicographic order of lists of numbers of one length. */
function compareNumbers(a: readonly number[], b: readonly number[]): number {
  const place = a.findIndex((n, k) => n !== b[k]);
  return place < 0 ? 0 : (a[place] as number) - (b[place] as number);
}
