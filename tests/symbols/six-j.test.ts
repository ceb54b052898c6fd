import fc from "fast-check";
import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import {
  add,
  divide,
  equals,
  integer,
  isZero,
  multiply,
  negate,
  ONE,
  root,
  ZERO,
  type Exact,
} from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { fromTwice, readHalf, type Twice } from "@/lib/symbols/half";
import { racahW, sixJ, sixJArray, sixJFromThreeJ, type SixJ } from "@/lib/symbols/six-j";
import {
  racahOrbit,
  racahVariants,
  SIX_J_ELEMENTS,
  sixJKey,
  sixJOfKey,
  sixJRules,
  sixJStabiliser,
  sixJVariants,
  whyZeroRacah,
  whyZeroSixJ,
} from "@/lib/symbols/six-j-symmetries";
import { exactOf, rows } from "./data";
import { triad } from "./generators";

const entriesOf = (args: readonly string[]) => args.map((t) => readHalf(t) as Twice) as unknown as SixJ;
const six = (text: string) => entriesOf(text.split(" "));
const doubled = (...n: number[]) => n.map((d) => fromTwice(d)) as unknown as SixJ;
const same = (x: Exact, y: Exact, says: string) =>
  expect(equals(x, y), `${says}: ${toText(x)} and ${toText(y)}`).toBe(true);
const sum = (list: Exact[]) => list.reduce((x, y) => add(x, y), ZERO);

function range(from: number, to: number): number[] {
  return Array.from({ length: Math.max(0, (to - from) / 2 + 1) }, (_, k) => from + 2 * k);
}

/** An allowed 6j: a triad above, and l's that close the other three. */
function allowedSixJ(mostJ: number): fc.Arbitrary<SixJ> {
  return fc
    .tuple(triad(mostJ), fc.nat({ max: 2 * mostJ }), fc.nat(), fc.nat())
    .map(([[a, b, c], d, x, y]) => {
      // l1 free; l2 with (l1 l2 j3), then l3 with (j1 l2 l3) and (l1 j2 l3).
      const seconds = range(Math.abs(d - c), d + c);
      const e = seconds[x % seconds.length] as number;
      const thirds = range(Math.abs(a - e), a + e).filter(
        (f) => f >= Math.abs(d - b) && f <= d + b && (d + b + f) % 2 === 0,
      );
      return thirds.length ? doubled(a, b, c, d, e, thirds[y % thirds.length] as number) : null;
    })
    .filter((entries): entries is SixJ => entries !== null);
}

describe("published and oracle values of 6j and Racah W", () => {
  it.each([
    ["published.jsonl", "6j", 184],
    ["oracle-open.jsonl", "6j", 700],
    ["published.jsonl", "racah", 3],
    ["oracle-open.jsonl", "racah", 350],
  ] as const)("%s, %s: all %i rows, every fifth by both routes", (file, kind, count) => {
    const list = rows(file, kind);
    expect(list).toHaveLength(count);
    const differing = list.filter((row, n) => {
      const entries = entriesOf(row.args);
      const expected = exactOf(row.value);
      const first = kind === "6j" ? sixJ(entries) : racahW(entries);
      if (!equals(first, expected)) return true;
      if (n % 5) return false; // the second route on every fifth row
      return !equals(kind === "6j" ? sixJFromThreeJ(entries) : racahW(entries, sixJFromThreeJ), expected);
    });
    expect(differing).toEqual([]);
  });

  it("shows the one misprint to be one: {1/2 1/2 0; 1/2 1/2 1} with the exponent j1+j2 for j1+j2+j12", () => {
    const slips = rows("published.jsonl", "6j").filter((r) => r.match === false);
    expect(slips).toHaveLength(1);
    for (const row of slips)
      expect(equals(sixJ(entriesOf(row.args)), exactOf(row.printed ?? row.value))).toBe(false);
  });

  it("has the values that references give for all j equal (SymPy's tests): {5^6} = 1/52, {8^6} = −12219/965770", () => {
    expect(toText(sixJ(six("5 5 5 5 5 5")))).toBe("1/52");
    expect(toText(sixJ(six("8 8 8 8 8 8")))).toBe("-12219/965770");
  });

  it("keeps W and 6j apart: {1 1 1; 2 1 1} = 1/6 and W(1112; 11) = −1/6", () => {
    expect(toText(sixJ(six("1 1 1 2 1 1")))).toBe("1/6");
    expect(toText(racahW(six("1 1 1 2 1 1")))).toBe("-1/6");
  });
});

describe("closed forms of NIST DLMF 34.5", () => {
  const whole = (n: number) => BigInt(n / 2); // of a doubled number
  const signed = (J: number, n: bigint, d: bigint) => {
    const size = n === 0n ? ZERO : root(new Fraction(n, d));
    return (J / 2) % 2 === 0 ? size : negate(size);
  };

  it("34.5.1, 34.5.2, 34.5.3 and 34.5.7, j ≤ 6", () => {
    for (let b = 0; b <= 12; b++)
      for (let c = 0; c <= 12; c++)
        for (const a of range(Math.abs(b - c), Math.min(b + c, 12))) {
          const J = a + b + c;
          const [B, C] = [BigInt(b), BigInt(c)];
          same(sixJ(doubled(a, b, c, 0, c, b)), signed(J, 1n, (B + 1n) * (C + 1n)), "34.5.1");
          if (c > 0) {
            const up = whole(a + c - b) * (whole(a + b - c) + 1n);
            same(
              sixJ(doubled(a, b, c, 1, c - 1, b + 1)),
              signed(J, up, (B + 1n) * (B + 2n) * C * (C + 1n)),
              "34.5.2",
            );
          }
          if (b > 0 && c > 0) {
            const up = whole(b + c - a) * (whole(J) + 1n);
            same(
              sixJ(doubled(a, b, c, 1, c - 1, b - 1)),
              signed(J, up, B * (B + 1n) * C * (C + 1n)),
              "34.5.3",
            );
            // 2(j2(j2+1) + j3(j3+1) − j1(j1+1)), with j(j+1) = n(n+2)/4 for n = 2j
            const cosine = (BigInt(b * (b + 2) + c * (c + 2) - a * (a + 2)) * 2n) / 4n;
            const below = root(B * (B + 1n) * (B + 2n) * C * (C + 1n) * (C + 2n));
            const value = divide(integer(cosine), below);
            same(sixJ(doubled(a, b, c, 2, c, b)), (J / 2) % 2 === 0 ? negate(value) : value, "34.5.7");
          }
        }
  });
});

describe("laws of the 6j, exact", () => {
  it("both routes agree, j ≤ 12", () => {
    fc.assert(
      fc.property(allowedSixJ(12), (s) => {
        same(sixJ(s), sixJFromThreeJ(s), s.join(" "));
      }),
      { numRuns: 60 },
    );
  });

  it("orthogonality: Σ (2j3+1)(2l3+1){j1 j2 j3; l1 l2 l3}{j1 j2 j3; l1 l2 l3'} = δ (DLMF 34.5.14), j ≤ 30", () => {
    fc.assert(
      fc.property(allowedSixJ(30), fc.constantFrom(0, 2, -2), ([a, b, , d, e, f], step) => {
        const other = f + step;
        fc.pre(other >= Math.max(Math.abs(a - e), Math.abs(d - b)) && other <= Math.min(a + e, d + b));
        const thirds = range(Math.max(Math.abs(a - b), Math.abs(d - e)), Math.min(a + b, d + e));
        const total = sum(
          thirds.map((c) =>
            multiply(
              integer((c + 1) * (f + 1)),
              multiply(sixJ(doubled(a, b, c, d, e, f)), sixJ(doubled(a, b, c, d, e, other))),
            ),
          ),
        );
        same(total, step === 0 ? ONE : ZERO, `${a} ${b} ${d} ${e} ${f} ${other}`);
      }),
      { numRuns: 50 },
    );
  });

  it("Racah's back-coupling (DLMF 34.5.15), j ≤ 15", () => {
    fc.assert(
      fc.property(allowedSixJ(15), ([a, b, , c, d, p]) => {
        // Σ_j (−1)^(j+j'+j'')(2j+1){j1 j2 j; j3 j4 j'}{j1 j2 j; j4 j3 j''} = {j1 j4 j'; j2 j3 j''}
        const seconds = range(Math.max(Math.abs(a - c), Math.abs(d - b)), Math.min(a + c, d + b));
        for (const q of seconds.slice(0, 2)) {
          const all = range(Math.max(Math.abs(a - b), Math.abs(c - d)), Math.min(a + b, c + d));
          const terms = all.map((j) => {
            const term = multiply(
              integer(j + 1),
              multiply(sixJ(doubled(a, b, j, c, d, p)), sixJ(doubled(a, b, j, d, c, q))),
            );
            return ((j + p + q) / 2) % 2 === 0 ? term : negate(term);
          });
          same(sum(terms), sixJ(doubled(a, d, p, b, c, q)), `${a} ${b} ${c} ${d} ${p} ${q}`);
        }
      }),
      { numRuns: 50 },
    );
  });
});

describe("symmetries of the 6j", () => {
  it("are 144 named ones, all different for a generic symbol", () => {
    expect(SIX_J_ELEMENTS).toHaveLength(144);
    expect(new Set(SIX_J_ELEMENTS.map((e) => e.name)).size).toBe(144);
    expect(new Set(SIX_J_ELEMENTS.map((e) => e.does)).size).toBe(144);
    const generic = six("6 15/2 19/2 5 11/2 13/2");
    expect(new Set(SIX_J_ELEMENTS.map((e) => e.image(generic).join(" "))).size).toBe(144);
    expect(sixJStabiliser(generic).map((e) => e.name)).toEqual(["identity"]);
  });

  it("leave the value, and the key, of every image, j ≤ 30", () => {
    fc.assert(
      fc.property(allowedSixJ(30), (s) => {
        const list = sixJVariants(s);
        expect(list.filter((v) => !v.agrees)).toEqual([]);
        const key = sixJKey(s);
        expect(key.length).toBeLessThanOrEqual(191);
        for (const v of list) expect(sixJKey(v.entries)).toBe(key);
        same(sixJ(sixJOfKey(key)), sixJ(s), key);
        expect(sixJKey(sixJOfKey(key))).toBe(key);
      }),
      { numRuns: 12 },
    );
  });

  it("include DLMF 34.5.9 and 34.5.10 as they are printed", () => {
    fc.assert(
      fc.property(allowedSixJ(20), (s) => {
        const [a, b, c, d, e, f] = s as readonly number[] as [number, number, number, number, number, number];
        const half = (...n: number[]) => n.map((x) => fromTwice(x / 2)) as unknown as SixJ;
        const first = half(2 * a, b + e + c - f, b - e + c + f, 2 * d, b + e - c + f, -b + e + c + f);
        const second = half(
          b + e + c - f,
          a - d + c + f,
          a + d + b - e,
          b + e - c + f,
          -a + d + c + f,
          a + d - b + e,
        );
        for (const image of [first, second]) {
          same(sixJ(image), sixJ(s), image.join(" "));
          expect(sixJKey(image)).toBe(sixJKey(s));
          expect(sixJVariants(s).some((v) => v.entries.join(" ") === image.join(" "))).toBe(true);
        }
      }),
      { numRuns: 30 },
    );
  });

  it("give the orbits of all 6j with j ≤ 3/2 different keys", () => {
    const orbits = new Map<string, Set<string>>();
    const most = 3;
    for (let a = 0; a <= most; a++)
      for (let b = 0; b <= most; b++)
        for (const c of range(Math.abs(a - b), Math.min(a + b, most)))
          for (let d = 0; d <= most; d++)
            for (const e of range(Math.abs(d - c), Math.min(d + c, most)))
              for (const f of range(Math.abs(a - e), Math.min(a + e, most))) {
                const s = doubled(a, b, c, d, e, f);
                if (!sixJArray(s)) continue;
                const members = new Set(SIX_J_ELEMENTS.map((element) => element.image(s).join(" ")));
                const known = orbits.get(sixJKey(s));
                if (known) expect(members).toEqual(known);
                else orbits.set(sixJKey(s), members);
              }
    const all = [...orbits.values()].flatMap((set) => [...set]);
    expect(new Set(all).size).toBe(all.length);
  });

  it("carry over to Racah's W with the sign between", () => {
    fc.assert(
      fc.property(allowedSixJ(12), ([a, b, e, d, c, f]) => {
        const w: SixJ = [a, b, c, d, e, f];
        const list = racahVariants(w);
        expect(list).toHaveLength(144);
        expect(list.filter((v) => !v.agrees)).toEqual([]);
        const { key, factor } = racahOrbit(w);
        same(racahW(w), multiply(factor, sixJ(sixJOfKey(key))), key);
      }),
      { numRuns: 20 },
    );
  });
});

describe("why a 6j is 0", () => {
  it.each([
    ["1 1 3 1 1 1", ["triangle", "triangle"], "j3 = 3 > j1 + j2 = 2"],
    [
      "1 1 1 1 1 5/2",
      ["triangle", "triangle", "sum-not-integer", "sum-not-integer"],
      "l3 = 5/2 > j1 + l2 = 2",
    ],
    ["1 1/2 1 1 1 1", ["sum-not-integer", "sum-not-integer"], "j1 + j2 + j3 = 5/2 is not an integer"],
    ["-1 1 1 1 1 1", ["triangle", "triangle"], "j1 = −1 is negative"],
    ["2 2 2 3/2 3/2 3/2", ["accidental"], "= 0"], // VMK Table 9.10
    ["3 2 2 1 2 2", ["accidental"], "= 0"], // VMK Table 9.11
    ["5 5 3 3 3 3", ["accidental"], "= 0"], // the G2 zero, Racah 1949
    ["1 1 1 1 1 1", [], ""],
  ])("{%s}: %j", (text, rules, says) => {
    const s = six(text);
    expect(whyZeroSixJ(s).map((r) => r.rule)).toEqual(rules);
    expect(
      whyZeroSixJ(s)
        .map((r) => r.says)
        .join(" "),
    ).toContain(says);
    expect(isZero(sixJ(s))).toBe(rules.length > 0);
    expect(isZero(sixJFromThreeJ(s))).toBe(rules.length > 0);
    expect(sixJRules(s).some((r) => !r.holds)).toBe(sixJArray(s) === null);
  });

  it("has a reason exactly when the value is 0, stretched triads and the oracle's zeros included", () => {
    for (const row of [...rows("oracle-open.jsonl", "6j"), ...rows("published.jsonl", "6j")]) {
      expect(whyZeroSixJ(entriesOf(row.args)).length > 0, row.args.join(" ")).toBe(row.value.sign === 0);
    }
    fc.assert(
      fc.property(allowedSixJ(8), (s) => {
        expect(whyZeroSixJ(s).length > 0).toBe(isZero(sixJ(s)));
        expect(sixJRules(s).every((r) => r.holds)).toBe(true);
      }),
    );
  });

  it("speaks Racah's letters for W", () => {
    expect(whyZeroRacah(six("1 1 1 1 3 1")).map((r) => r.says)[0]).toBe(
      "A triangle is broken: e = 3 > a + b = 2.",
    );
    expect(sixJVariants(six("1 1 3 1 1 1"))).toHaveLength(24);
    expect(sixJKey(six("1 1 3 1 1 1"))).toBe("6j none 2 2 6 2 2 2");
  });

  it("has exactly the twelve classes of accidental zeros with all entries ≤ 5 that references F7 list", () => {
    const listed = [
      "2 2 2 3/2 3/2 3/2",
      "3 2 2 1 2 2",
      "7/2 3 3/2 1 3/2 3",
      "7/2 7/2 3 5/2 3/2 3",
      "4 3 3 2 3 2",
      "4 7/2 5/2 2 5/2 5/2",
      "5 9/2 5/2 2 3/2 9/2",
      "5 5 2 2 2 4",
      "5 4 4 3 4 2",
      "5 5 3 3 3 3",
      "5 9/2 9/2 7/2 3 3",
      "5 5 4 7/2 3/2 9/2",
    ];
    const classical = SIX_J_ELEMENTS.filter((e) => e.classical);
    const classOf = (s: SixJ) =>
      classical
        .map((e) =>
          e
            .image(s)
            .map((n) => String.fromCharCode(65 + n))
            .join(""),
        )
        .sort()[0] as string;
    const found = new Set<string>();
    const most = 10;
    for (let a = 0; a <= most; a++)
      for (let b = 0; b <= a; b++)
        for (const c of range(a - b, Math.min(b, a + b)))
          // an order of columns with j1 ≥ j2 ≥ j3 always exists
          for (let d = 0; d <= a; d++)
            // and one with j1 the largest of all six
            for (const e of range(Math.abs(d - c), Math.min(d + c, a)))
              for (const f of range(Math.abs(a - e), Math.min(a + e, a))) {
                const s = doubled(a, b, c, d, e, f);
                if (sixJArray(s) && isZero(sixJ(s))) found.add(classOf(s));
              }
    expect(found).toEqual(new Set(listed.map((text) => classOf(six(text)))));
  }, 60_000);
});
