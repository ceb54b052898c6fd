import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { isZero } from "@/lib/symbols/exact";
import { fromTwice } from "@/lib/symbols/half";
import {
  checked,
  evaluate,
  orbit,
  quantityText,
  whyZero,
  type Quantity,
  type VanishingRule,
} from "@/lib/symbols/quantity";
import { classicalImage, ELEMENTS, stabiliser, threeJEntries } from "@/lib/symbols/regge";
import { rows, symbol } from "./data";
import { allowedCg, anyEntries } from "./generators";

const rulesOf = (q: Quantity): VanishingRule[] => whyZero(q).map((r) => r.rule);

/** The least of the 12 images under column permutations and reversal: a key for these symmetries alone. */
function classicalKey(q: Quantity): string {
  const images = ELEMENTS.filter((e) => e.classical).map((e) =>
    classicalImage(e, threeJEntries(q)).join(" "),
  );
  return images.sort()[0] as string;
}

/** The list of VMK section 8.10, J ≤ 17. */
const list = rows("published.jsonl", "3j").filter((r) => r.source?.includes("Sec. 8.10"));

describe("the 116 vanishing 3j symbols of Varshalovich, Moskalev and Khersonskii, section 8.10", () => {
  it("all vanish, by both routes", () => {
    expect(list).toHaveLength(116);
    expect(list.filter((row) => !isZero(checked(symbol("3j", row.args)).value))).toEqual([]);
  });

  it("vanish 81 by a classical symmetry, 11 by a Regge symmetry only, 24 by accident", () => {
    const reasons = list.map((row) => rulesOf(symbol("3j", row.args)));
    expect(reasons.filter((r) => r.length !== 1)).toEqual([]);
    const count = (rule: VanishingRule) => reasons.filter((r) => r[0] === rule).length;
    expect([count("parity"), count("regge-parity"), count("accidental")]).toEqual([81, 11, 24]);
  });

  it("are all there are up to J = 17, but for (3 6 8; 1 2 -3), which the list omits", () => {
    const listed = new Set(list.map((row) => classicalKey(symbol("3j", row.args))));
    const omitted = new Set<string>();
    for (let c = 0; c <= 34; c++) {
      for (let b = 0; b <= c && b + c <= 34; b++) {
        for (let a = c - b; a <= b && a + b + c <= 34; a += 2) {
          for (let x = -a; x <= a; x += 2) {
            for (let y = -b; y <= b; y += 2) {
              if (Math.abs(x + y) > c) continue;
              const q: Quantity = { kind: "3j", args: [a, b, c, x, y, -x - y].map((n) => fromTwice(n)) };
              if (!isZero(evaluate(q))) continue;
              const key = classicalKey(q);
              if (!listed.has(key) && rulesOf(q)[0] === "accidental") omitted.add(key);
            }
          }
        }
      }
    }
    expect([...omitted]).toEqual([classicalKey(symbol("3j", "3 6 8 1 2 -3"))]);
    // Regge's symmetries would have given it away: it is one of the listed ones in disguise.
    const keys = list.map((row) => orbit(symbol("3j", row.args)).key);
    expect(keys).toContain(orbit(symbol("3j", "3 6 8 1 2 -3")).key);
  });
});

describe("why a symbol is 0", () => {
  it.each([
    ["3j", "1 1 2 2 -1 -1", ["projection-range"], "|m1| = 2 > j1 = 1"],
    ["3j", "1 1 1 1/2 -1/2 0", ["projection-kind", "projection-kind"], "j1 − m1 = 1/2 is not an integer"],
    ["3j", "1/2 1/2 1 0 0 0", ["projection-kind", "projection-kind"], "j1 − m1 = 1/2 is not an integer"],
    ["3j", "1 1 2 1 1 0", ["projection-sum"], "m1 + m2 + m3 = 2, not 0"],
    ["cg", "1 1 1 1 2 0", ["projection-sum"], "m1 + m2 = 2 ≠ M = 0"],
    ["3j", "1 1 3 0 1 -1", ["triangle"], "j3 = 3 > j1 + j2 = 2"],
    ["3j", "5 1 3 0 1 -1", ["triangle"], "j1 = 5 > j2 + j3 = 4"],
    ["cg", "1 0 4 1 2 1", ["triangle"], "j2 = 4 > j1 + J = 3"],
    [
      "3j",
      "1/2 1 1 1/2 0 -1/2",
      ["projection-kind", "sum-not-integer"],
      "j1 + j2 + j3 = 5/2 is not an integer",
    ],
    [
      "3j",
      "1 1 3 2 1/2 0",
      ["projection-range", "projection-kind", "projection-sum", "triangle"],
      "2 > j1 = 1",
    ],
    ["3j", "1 1 1 0 0 0", ["parity"], "All projections change sign"],
    ["3j", "2 2 1 1 1 -2", ["projection-range", "parity"], "Columns 1 and 2 change places"],
    ["3j", "2 2 3 1 1 -2", ["parity"], "(−1)^(j1+j2+j3) = (−1)^7"],
    ["3j", "1 2 2 0 1 -1", [], ""],
    ["cg", "1 0 1 0 1 0", ["parity"], "(1 1 1; 0 0 0)"],
    ["3j", "1 1 3 0 0 0", ["triangle", "parity"], "j3 = 3 > j1 + j2 = 2"],
    ["3j", "2 3 3 0 2 -2", ["accidental"], "−4 + 4 = 0"], // references F7: smallest structural zeros
    ["3j", "3/2 3 7/2 1/2 1 -3/2", ["accidental"], "= 0"],
    ["3j", "2 4 5 1 2 -3", ["accidental"], "= 0"],
    ["3j", "3/2 9/2 5 1/2 3/2 -2", ["accidental"], "= 0"],
    ["3j", "5/2 4 9/2 1/2 3 -7/2", ["accidental"], "= 0"],
    ["3j", "3 6 8 1 2 -3", ["accidental"], "1650 − 1650 = 0"],
    ["3j", "1 1 2 0 0 0", [], ""],
    ["3j", "-1 1 1 0 0 0", ["triangle", "parity"], "j1 = −1 is negative"],
  ] as const)("%s %s: %j", (kind, entries, rules, says) => {
    const q = symbol(kind, entries);
    expect(rulesOf(q)).toEqual(rules);
    expect(
      whyZero(q)
        .map((r) => r.says)
        .join(" "),
    ).toContain(says);
    expect(isZero(checked(q).value)).toBe(rules.length > 0);
  });

  it("names an element of the stabiliser for parity that only Regge's symmetries show", () => {
    const regge = list.map((row) => symbol("3j", row.args)).filter((q) => rulesOf(q)[0] === "regge-parity");
    for (const q of regge) {
      const odd = stabiliser(q).filter((e) => e.odd);
      expect(odd.length).toBeGreaterThan(0);
      expect(odd.every((e) => !e.classical)).toBe(true);
      expect(odd.some((e) => whyZero(q)[0]?.says.startsWith(e.does.replace(/\.$/, "")))).toBe(true);
    }
  });

  it("has a reason exactly when the value is 0, whatever the entries", () => {
    const broken = new Set<VanishingRule>([
      "projection-range",
      "projection-kind",
      "projection-sum",
      "triangle",
      "sum-not-integer",
    ]);
    fc.assert(
      fc.property(fc.oneof(anyEntries(7), allowedCg(8)), (q) => {
        const { value } = checked(q);
        const rules = rulesOf(q);
        expect(isZero(value), quantityText(q)).toBe(rules.length > 0);
        expect(orbit(q).zero).toBe(isZero(value));
        const [a, b, c, x, y, z] = threeJEntries(q);
        const allowed =
          [a, b, c].every((j) => j >= 0) &&
          [a - x, b - y, c - z, a + b + c].every((n) => n % 2 === 0) &&
          Math.abs(x) <= a &&
          Math.abs(y) <= b &&
          Math.abs(z) <= c &&
          x + y + z === 0 &&
          c <= a + b &&
          a <= b + c &&
          b <= a + c;
        expect(rules.some((r) => broken.has(r))).toBe(!allowed);
      }),
      { numRuns: 1500 },
    );
  });
});
