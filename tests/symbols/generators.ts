import fc from "fast-check";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import type { Quantity } from "@/lib/symbols/quantity";

/** A doubled j up to 2j = most, with 0, ½ and 1 more often than their share. */
export function someJ(most: number): fc.Arbitrary<number> {
  return fc.oneof(
    { weight: 1, arbitrary: fc.constantFrom(0, 1, 2) },
    { weight: 3, arbitrary: fc.integer({ min: 0, max: most }) },
  );
}

/** Doubled j1, j2, j3 that fit together; stretched (j3 = j1+j2 or |j1−j2|), equal and nearly forbidden ones are favoured. */
export function triad(mostJ: number): fc.Arbitrary<[Twice, Twice, Twice]> {
  const most = 2 * mostJ;
  const pair = fc.oneof(
    { weight: 1, arbitrary: someJ(most).map((a): [number, number] => [a, a]) },
    { weight: 3, arbitrary: fc.tuple(someJ(most), someJ(most)) },
  );
  return pair
    .chain(([a, b]) => {
      const low = Math.abs(a - b);
      const high = Math.min(a + b, 2 * Math.floor((most - ((a + b) % 2)) / 2) + ((a + b) % 2));
      const steps = Math.max(0, (high - low) / 2);
      const third = fc.oneof(
        { weight: 1, arbitrary: fc.constantFrom(0, steps, Math.min(1, steps), Math.max(0, steps - 1)) },
        { weight: 2, arbitrary: fc.integer({ min: 0, max: steps }) },
      );
      return fc.tuple(
        fc.constant([a, b]),
        third.map((k) => low + 2 * k),
        fc.nat({ max: 2 }),
      );
    })
    .map(([[a, b], c, turn]) => {
      const list = [a as number, b as number, c].map((n) => fromTwice(n));
      return [list[turn], list[(turn + 1) % 3], list[(turn + 2) % 3]] as [Twice, Twice, Twice];
    });
}

/** A doubled projection of j: the ends, and 0 or ±½, more often than their share. */
export function projection(j: number): fc.Arbitrary<number> {
  return fc.oneof(
    { weight: 1, arbitrary: fc.constantFrom(j, -j, j % 2, -(j % 2)) },
    { weight: 3, arbitrary: fc.integer({ min: 0, max: j }).map((k) => j - 2 * k) },
  );
}

/** An allowed 3j symbol with j up to mostJ: projections in range that add up, the parity of each right. */
export function allowedThreeJ(mostJ: number): fc.Arbitrary<Quantity> {
  return triad(mostJ)
    .chain(([a, b, c]) => {
      const m1 = projection(a);
      return m1.chain((x) => {
        // m2 such that |m1 + m2| ≤ j3
        const from = Math.max(-b, -c - x);
        const to = Math.min(b, c - x);
        const m2 = fc.oneof(
          { weight: 1, arbitrary: fc.constantFrom(from, to) },
          {
            weight: 2,
            arbitrary: fc.integer({ min: 0, max: Math.max(0, (to - from) / 2) }).map((k) => from + 2 * k),
          },
        );
        return m2.map((y) => ({ j: [a, b, c] as const, from, to, x, y }));
      });
    })
    .filter(({ from, to }) => from <= to)
    .map(({ j, x, y }) => ({ kind: "3j", args: [...j, fromTwice(x), fromTwice(y), fromTwice(-x - y)] }));
}

/** An allowed CG coefficient. */
export function allowedCg(mostJ: number): fc.Arbitrary<Quantity> {
  return allowedThreeJ(mostJ).map(({ args }) => {
    const [a, b, c, x, y, z] = args as [Twice, Twice, Twice, Twice, Twice, Twice];
    return { kind: "cg", args: [a, x, b, y, c, fromTwice(-z)] };
  });
}

/** Any six small entries, most of them forbidden in some way. */
export function anyEntries(most: number): fc.Arbitrary<Quantity> {
  const entry = fc.integer({ min: -most, max: most }).map((n) => fromTwice(n));
  const j = fc.integer({ min: 0, max: most }).map((n) => fromTwice(n));
  return fc.tuple(j, j, j, entry, entry, entry).map((args) => ({ kind: "3j", args }));
}
