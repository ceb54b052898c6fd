import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { add, equals, integer, isZero, multiply, negate, ONE, ZERO, type Exact } from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { fromTwice, readHalf, type Twice } from "@/lib/symbols/half";
import { nineJ, nineJAllowed, nineJFromThreeJ, type NineJ } from "@/lib/symbols/nine-j";
import {
  NINE_J_ELEMENTS,
  nineJOfKey,
  nineJOrbit,
  nineJRules,
  nineJStabiliser,
  nineJVariants,
  whyZeroNineJ,
} from "@/lib/symbols/nine-j-symmetries";
import { sixJ } from "@/lib/symbols/six-j";
import { sixJOfKey } from "@/lib/symbols/six-j-symmetries";
import { exactOf, rows, type Row } from "./data";
import { triad } from "./generators";

const entriesOf = (args: readonly string[]) => args.map((t) => readHalf(t) as Twice) as unknown as NineJ;
const nine = (text: string) => entriesOf(text.split(" "));
const same = (x: Exact, y: Exact, says: string) =>
  expect(equals(x, y), `${says}: ${toText(x)} and ${toText(y)}`).toBe(true);

function range(from: number, to: number): number[] {
  return Array.from({ length: Math.max(0, (to - from) / 2 + 1) }, (_, k) => from + 2 * k);
}

/** An allowed 9j: two rows, then columns and a last row that close. */
function allowedNineJ(mostJ: number): fc.Arbitrary<NineJ> {
  return fc
    .tuple(triad(mostJ), triad(mostJ), fc.nat(), fc.nat(), fc.nat())
    .map(([[a, b, c], [d, e, f], x, y, z]) => {
      const pick = (list: number[], n: number) => list[n % list.length] as number;
      const g = pick(range(Math.abs(a - d), a + d), x);
      const h = pick(range(Math.abs(b - e), b + e), y);
      const last = range(Math.abs(c - f), c + f).filter(
        (i) => i >= Math.abs(g - h) && i <= g + h && (g + h + i) % 2 === 0,
      );
      return last.length
        ? ([a, b, c, d, e, f, g, h, pick(last, z)].map((n) => fromTwice(n)) as unknown as NineJ)
        : null;
    })
    .filter((entries): entries is NineJ => entries !== null);
}

describe("published and oracle values of the 9j", () => {
  const differing = (list: Row[]) =>
    list.filter((row) => !equals(nineJ(entriesOf(row.args)), exactOf(row.value)));

  it("agrees with all 111 published rows, every second by both routes", () => {
    const list = rows("published.jsonl", "9j");
    expect(list).toHaveLength(111);
    expect(differing(list)).toEqual([]);
    expect(list.filter((row) => !equals(nineJFromThreeJ(entriesOf(row.args)), exactOf(row.value)))).toEqual(
      [],
    );
  });

  it("agrees with all 400 oracle rows, every eighth by both routes", () => {
    const list = rows("oracle-open.jsonl", "9j");
    expect(list).toHaveLength(400);
    expect(differing(list)).toEqual([]);
    const second = list.filter(
      (row, n) => n % 8 === 0 && !equals(nineJFromThreeJ(entriesOf(row.args)), exactOf(row.value)),
    );
    expect(second).toEqual([]);
  });

  it("agrees with all 500 rows up to j = 30", () => {
    const list = rows("oracle-extra-9j-j30.jsonl", "9j");
    expect(list).toHaveLength(500);
    expect(differing(list)).toEqual([]);
  }, 60_000);
});

describe("laws of the 9j, exact", () => {
  it("both routes agree, j ≤ 5", () => {
    fc.assert(
      fc.property(allowedNineJ(5), (s) => {
        same(nineJ(s), nineJFromThreeJ(s), s.join(" "));
      }),
      { numRuns: 60 },
    );
  });

  it("reduces to a 6j where an entry is 0 (DLMF 34.7.1), j ≤ 10", () => {
    fc.assert(
      fc.property(triad(10), triad(10), fc.nat(), ([a, b, c], [g], n) => {
        const all = range(Math.abs(a - g), a + g);
        const d = all[n % all.length] as number;
        const seconds = range(Math.abs(d - c), d + c).filter(
          (e) => e >= Math.abs(b - g) && e <= b + g && (b + g + e) % 2 === 0,
        );
        fc.pre(seconds.length > 0);
        const e = seconds[n % seconds.length] as number;
        const s = [a, b, c, d, e, c, g, g, 0].map((k) => fromTwice(k)) as unknown as NineJ;
        const reduced = sixJ([a, b, c, fromTwice(e), fromTwice(d), g]);
        const squared = multiply(nineJ(s), nineJ(s));
        same(multiply(squared, integer((c + 1) * (g + 1))), multiply(reduced, reduced), s.join(" "));
        const { key, factor } = nineJOrbit(s);
        expect(key.startsWith("6j ")).toBe(true);
        same(nineJ(s), multiply(factor, sixJ(sixJOfKey(key))), s.join(" "));
      }),
    );
  });

  it("orthogonality: the unitary 9j for fixed j12, j34 (DLMF 34.7.2), j ≤ 6", () => {
    fc.assert(
      fc.property(allowedNineJ(6), ([a, b, c, d, e, f, , , i]) => {
        // Σ over j13 (column 1) and j24 (column 2) of (2j12+1)(2j34+1)(2j13+1)(2j24+1){}² = 1
        let total = ZERO;
        for (const g of range(Math.abs(a - d), a + d))
          for (const h of range(Math.abs(b - e), b + e)) {
            const value = nineJ([a, b, c, d, e, f, fromTwice(g), fromTwice(h), i]);
            total = add(
              total,
              multiply(integer((c + 1) * (f + 1) * (g + 1) * (h + 1)), multiply(value, value)),
            );
          }
        same(total, ONE, `${a} ${b} ${c} ${d} ${e} ${f} ${i}`);
      }),
      { numRuns: 25 },
    );
  });
});

describe("symmetries of the 9j", () => {
  it("are 72 named ones that keep the value up to the sign (−1)^(sum of the nine)", () => {
    expect(new Set(NINE_J_ELEMENTS.map((e) => e.name)).size).toBe(72);
    expect(new Set(NINE_J_ELEMENTS.map((e) => e.does)).size).toBe(72);
    fc.assert(
      fc.property(allowedNineJ(8), (s) => {
        const list = nineJVariants(s);
        expect(list).toHaveLength(72);
        expect(list.filter((v) => !v.agrees)).toEqual([]);
        const { key, factor } = nineJOrbit(s);
        expect(key.length).toBeLessThanOrEqual(191);
        for (const v of list) expect(nineJOrbit(v.entries).key).toBe(key);
        const canonical = key.startsWith("6j") ? sixJ(sixJOfKey(key)) : nineJ(nineJOfKey(key));
        same(nineJ(s), multiply(factor, canonical), s.join(" "));
      }),
      { numRuns: 12 },
    );
  });

  it("rows exchanged once bring the sign of the sum of the nine", () => {
    const s = nine("1 1 1 1 2 1 2 1 2");
    const value = nineJ(s);
    expect(isZero(value)).toBe(false);
    same(nineJ(nine("1 2 1 1 1 1 2 1 2")), value, "sum 12 is even");
    const t = nine("1 1 1 1 2 2 2 1 2");
    same(nineJ(nine("1 2 2 1 1 1 2 1 2")), negate(nineJ(t)), "sum 13 is odd");
  });
});

describe("why a 9j is 0", () => {
  it.each([
    ["1 1 1 1 1 1 1 1 1", ["parity"], "Rows are written in the order"],
    ["1 1 3 1 1 1 1 1 1", ["triangle", "triangle", "parity"], "j13 = 3 > j11 + j12 = 2"],
    ["1 1/2 1 1 1 1 1 1 1", ["sum-not-integer", "sum-not-integer"], "j11 + j12 + j13 = 5/2"],
    ["1 1 2 1 1 2 2 2 4", [], ""],
  ])("{%s}: %j", (text, rules, says) => {
    const s = nine(text);
    expect(whyZeroNineJ(s).map((r) => r.rule)).toEqual(rules);
    expect(
      whyZeroNineJ(s)
        .map((r) => r.says)
        .join(" "),
    ).toContain(says);
    expect(isZero(nineJ(s))).toBe(rules.length > 0);
    expect(nineJRules(s).some((r) => !r.holds)).toBe(!nineJAllowed(s));
  });

  it("has a reason exactly when the value is 0, the oracle's zeros included", () => {
    const list = rows("oracle-open.jsonl", "9j");
    for (const row of list) {
      const s = entriesOf(row.args);
      expect(whyZeroNineJ(s).length > 0, row.args.join(" ")).toBe(row.value.sign === 0);
    }
    const accidental = list.filter((row) => whyZeroNineJ(entriesOf(row.args))[0]?.rule === "accidental");
    for (const row of accidental) {
      const [reason] = whyZeroNineJ(entriesOf(row.args));
      const terms =
        /: (.*) = 0\./
          .exec(reason?.says ?? "")?.[1]
          ?.replaceAll("−", "-")
          .replaceAll(/([+-]) /g, "$1")
          .split(" ") ?? [];
      if (!reason?.says.includes("…"))
        expect(terms.reduce((x, t) => x + BigInt(t.replace("+", "")), 0n)).toBe(0n);
      expect(nineJStabiliser(entriesOf(row.args)).length).toBeGreaterThan(0);
    }
  });
});
