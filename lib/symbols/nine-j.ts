import { add, divide, integer, multiply, negate, ZERO, type Exact } from "@/lib/symbols/exact";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import { sixJ, type SixJ } from "@/lib/symbols/six-j";
import { threeJ, type ThreeJ } from "@/lib/symbols/three-j";

/** The nine entries of a 9j symbol, doubled, row by row. */
export type NineJ = readonly [Twice, Twice, Twice, Twice, Twice, Twice, Twice, Twice, Twice];

/** The six triads of a 9j symbol, as places of its entries: three rows, then three columns. */
export const NINE_J_TRIADS = [
  [0, 1, 2],
  [3, 4, 5],
  [6, 7, 8],
  [0, 3, 6],
  [1, 4, 7],
  [2, 5, 8],
] as const;

/** Whether all six triads hold: no negative entry, whole sums, triangles closed. */
export function nineJAllowed(entries: NineJ): boolean {
  return (
    entries.every((j) => j >= 0) &&
    NINE_J_TRIADS.every(([x, y, z]) => {
      const [a, b, c] = [entries[x], entries[y], entries[z]];
      return (a + b + c) % 2 === 0 && a <= b + c && b <= a + c && c <= a + b;
    })
  );
}

/** One term of the sum over j: (−1)^(2j)(2j+1) times three 6j symbols. */
export type NineJTerm = { j: Twice; value: Exact };

/** The terms of DLMF 34.6.2 for an allowed symbol, for each doubled j that closes all triangles. */
export function nineJTerms(entries: NineJ): NineJTerm[] {
  const [a, b, c, d, e, f, g, h, i] = entries;
  const from = Math.max(Math.abs(a - i), Math.abs(d - h), Math.abs(b - f));
  const to = Math.min(a + i, d + h, b + f);
  const terms: NineJTerm[] = [];
  for (let doubled = from; doubled <= to; doubled += 2) {
    const j = fromTwice(doubled);
    const symbols: SixJ[] = [
      [a, d, g, h, i, j],
      [b, e, h, d, j, f],
      [c, f, i, j, a, b],
    ];
    const product = symbols.map((s) => sixJ(s)).reduce((x, y) => multiply(x, y));
    const weighted = multiply(integer(doubled + 1), product);
    terms.push({ j, value: doubled % 2 === 0 ? weighted : negate(weighted) });
  }
  return terms;
}

/** The 9j symbol by its sum over three 6j symbols (DLMF 34.6.2), and 0 when a triad is broken. */
export function nineJ(entries: NineJ): Exact {
  if (!nineJAllowed(entries)) return ZERO;
  return nineJTerms(entries).reduce((sum, t) => add(sum, t.value), ZERO);
}

/**
 * The same from 3j symbols, the second route (DLMF 34.6.1 summed against the 3j of the last column):
 *   {9j}(j13 j23 j33; m13 m23 m33) = Σ over m11, m21 of the 3j of the three rows and of the first two columns,
 * with m13 = j13 and m33 = −j33, where the 3j on the left is never 0; all other projections follow from m11 and m21.
 */
export function nineJFromThreeJ(entries: NineJ): Exact {
  if (!nineJAllowed(entries)) return ZERO;
  const [a, b, c, d, e, f, g, h, i] = entries;
  const [m13, m23, m33] = [c as number, i - c, -i];
  let sum = ZERO;
  for (let m11 = -a; m11 <= a; m11 += 2) {
    const m12 = -m11 - m13;
    if (Math.abs(m12) > b) continue;
    const first = three(a, b, c, m11, m12, m13);
    for (let m21 = -d; m21 <= d; m21 += 2) {
      const [m22, m31] = [-m21 - m23, -m11 - m21];
      const m32 = -m31 - m33;
      if (Math.abs(m22) > e || Math.abs(m31) > g || Math.abs(m32) > h) continue;
      const rest = [
        three(d, e, f, m21, m22, m23),
        three(g, h, i, m31, m32, m33),
        three(a, d, g, m11, m21, m31),
        three(b, e, h, m12, m22, m32),
      ];
      sum = add(
        sum,
        rest.reduce((x, y) => multiply(x, y), first),
      );
    }
  }
  return divide(sum, three(c, f, i, m13, m23, m33));
}

function three(...doubled: [number, number, number, number, number, number]): Exact {
  return threeJ(doubled.map((n) => fromTwice(n)) as unknown as ThreeJ);
}
