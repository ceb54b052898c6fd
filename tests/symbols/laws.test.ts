import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  add,
  equals,
  integer,
  multiply,
  ONE,
  rational,
  root,
  subtract,
  ZERO,
  type Exact,
} from "@/lib/symbols/exact";
import { toDecimal, toText } from "@/lib/symbols/exact-print";
import { fromTwice, type Twice } from "@/lib/symbols/half";
import { checked, evaluate, orbit, quantityText, variants, type Quantity } from "@/lib/symbols/quantity";
import { ELEMENTS, orbitSymbols, stabiliser, symbolOfKey, threeJEntries } from "@/lib/symbols/regge";
import { allowedCg, allowedThreeJ, projection, triad } from "./generators";
import { readPrinted } from "./printed-value";
import { roundScaled } from "@/lib/symbols/rounding";

const threeJ = (...doubled: number[]) => evaluate({ kind: "3j", args: doubled.map((n) => fromTwice(n)) });
const cg = (...doubled: number[]) => evaluate({ kind: "cg", args: doubled.map((n) => fromTwice(n)) });
const sum = (list: Exact[]) => list.reduce((x, y) => add(x, y), ZERO);
const same = (x: Exact, y: Exact, says: string) =>
  expect(equals(x, y), `${says}: ${toText(x)} and ${toText(y)}`).toBe(true);

/** The doubled numbers from, from+2, …, to. */
function range(from: number, to: number): number[] {
  return Array.from({ length: Math.max(0, (to - from) / 2 + 1) }, (_, k) => from + 2 * k);
}

describe("orthogonality, exact, j ≤ 30", () => {
  it("in the projections: Σ (2j3+1)(j1 j2 j3; m1 m2 m3)(j1 j2 j3'; m1 m2 m3) = δ (DLMF 34.3.16)", () => {
    const pairs = triad(30).chain(([a, b, c]) =>
      fc.tuple(fc.constant([a, b, c] as const), projection(c), fc.integer({ min: -2, max: 2 })),
    );
    fc.assert(
      fc.property(pairs, ([[a, b, c], z, step]) => {
        const other = c + 2 * step;
        fc.pre(other >= Math.max(Math.abs(a - b), Math.abs(z)) && other <= a + b);
        const terms = range(-a, a)
          .filter((x) => Math.abs(x + z) <= b)
          .map((x) => multiply(threeJ(a, b, c, x, -x - z, z), threeJ(a, b, other, x, -x - z, z)));
        same(multiply(integer(c + 1), sum(terms)), step === 0 ? ONE : ZERO, `${a} ${b} ${c} ${other} ${z}`);
      }),
      { numRuns: 120 },
    );
  });

  it("in the coupled angular momentum: Σ ⟨m1 m2|J M⟩⟨m1' m2'|J M⟩ = δ (DLMF 34.3.17)", () => {
    const four = triad(30).chain(([a, b]) =>
      fc.tuple(fc.constant([a, b] as const), projection(a), projection(b), fc.integer({ min: -2, max: 2 })),
    );
    fc.assert(
      fc.property(four, ([[a, b], x, y, step]) => {
        const [x2, y2] = [x + 2 * step, y - 2 * step];
        fc.pre(Math.abs(x2) <= a && Math.abs(y2) <= b);
        const terms = range(Math.max(Math.abs(a - b), Math.abs(x + y)), a + b).map((c) =>
          multiply(cg(a, x, b, y, c, x + y), cg(a, x2, b, y2, c, x + y)),
        );
        same(sum(terms), step === 0 ? ONE : ZERO, `${a} ${x} ${b} ${y} ${step}`);
      }),
      { numRuns: 120 },
    );
  });

  it("all together: the squares of a triad's symbols add up to 1 (DLMF 34.3.18)", () => {
    fc.assert(
      fc.property(triad(9), ([a, b, c]) => {
        const squares = range(-a, a).flatMap((x) =>
          range(-b, b)
            .filter((y) => Math.abs(x + y) <= c)
            .map((y) => threeJ(a, b, c, x, y, -x - y)),
        );
        same(sum(squares.map((v) => multiply(v, v))), ONE, `${a} ${b} ${c}`);
      }),
      { numRuns: 40 },
    );
  });
});

describe("recursions, exact, j ≤ 30", () => {
  it("lowering M by the ladder operator J− (VMK section 8.6)", () => {
    const lowered = allowedCg(30);
    fc.assert(
      fc.property(lowered, (q) => {
        const [a, x, b, y, c, z] = q.args as [Twice, Twice, Twice, Twice, Twice, Twice];
        fc.pre(z + 2 <= c);
        // √((J+M+1)(J−M)) ⟨m1 m2|J M⟩ = √((j1−m1)(j1+m1+1)) ⟨m1+1 m2|J M+1⟩ + √((j2−m2)(j2+m2+1)) ⟨m1 m2+1|J M+1⟩
        const step = (j: number, m: number) => root(BigInt((j - m) / 2) * BigInt((j + m) / 2 + 1));
        const left = multiply(step(c, z), evaluate(q));
        const first = x + 2 <= a ? multiply(step(a, x), cg(a, x + 2, b, y, c, z + 2)) : ZERO;
        const second = y + 2 <= b ? multiply(step(b, y), cg(a, x, b, y + 2, c, z + 2)) : ZERO;
        same(left, add(first, second), quantityText(q));
      }),
      { numRuns: 300 },
    );
  });

  it("three terms in j (Schulten and Gordon 1975; VMK section 8.6), between neighbours j3−1, j3, j3+1", () => {
    fc.assert(
      fc.property(allowedThreeJ(30), (q) => {
        const [a, b, c, x, y, z] = q.args as [Twice, Twice, Twice, Twice, Twice, Twice];
        fc.pre(c >= 2 && c - 2 >= Math.abs(z) && c - 2 >= Math.abs(a - b) && c + 2 <= a + b);
        // j A(j+1) f(j+1) + (j+1) A(j) f(j−1) = B(j) f(j), with
        // A(j)² = (j² − (j1−j2)²)((j1+j2+1)² − j²)(j² − m3²) and
        // B(j) = (2j+1){[j1(j1+1) − j2(j2+1)]m3 − j(j+1)(m2 − m1)}; all entries are doubled here.
        const A = (n: number) =>
          root(BigInt(n * n - (a - b) ** 2) * BigInt((a + b + 2) ** 2 - n * n) * BigInt(n * n - z * z));
        const casimir = (n: number) => n * (n + 2);
        const B = (c + 1) * ((casimir(a) - casimir(b)) * z - casimir(c) * (y - x));
        const value = sum([
          multiply(
            multiply(rational(c, 2), multiply(A(c + 2), rational(1, 8))),
            threeJ(a, b, c + 2, x, y, z),
          ),
          multiply(
            multiply(rational(c + 2, 2), multiply(A(c), rational(1, 8))),
            threeJ(a, b, c - 2, x, y, z),
          ),
        ]);
        const middle = multiply(rational(B, 8), threeJ(a, b, c, x, y, z));
        same(value, middle, quantityText(q));
      }),
      { numRuns: 200 },
    );
  });
});

describe("two routes", () => {
  it("agree on every allowed symbol with j ≤ 2", () => {
    for (let a = 0; a <= 4; a++)
      for (let b = 0; b <= 4; b++)
        for (const c of range(Math.abs(a - b), Math.min(a + b, 4)))
          for (const x of range(-a, a))
            for (const y of range(-b, b)) {
              if (Math.abs(x + y) > c) continue;
              expect(
                checked({ kind: "3j", args: [a, b, c, x, y, -x - y].map((n) => fromTwice(n)) }).routes,
              ).toHaveLength(2);
              expect(
                checked({ kind: "cg", args: [a, x, b, y, c, x + y].map((n) => fromTwice(n)) }).routes,
              ).toHaveLength(2);
            }
  });

  it("agree up to j = 30", () => {
    fc.assert(
      fc.property(fc.oneof(allowedThreeJ(30), allowedCg(30)), (q) => void checked(q)),
      { numRuns: 600 },
    );
  });

  it("give Condon and Shortley's sign: ⟨j1 j1 j2 J−j1|J J⟩ > 0", () => {
    fc.assert(
      fc.property(triad(30), ([a, b, c]) => {
        expect(toDecimal(cg(a, a, b, c - a, c, c), 3)).toMatch(/^[0-9]/);
      }),
    );
  });

  it("agree at j = 200, 500 and 1,000", () => {
    for (const entries of [
      [400, 401, 399, 3, -8, 5],
      [1000, 1000, 1000, 0, 0, 0],
      [2000, 2000, 2000, 20, 40, -60],
      [2000, 2000, 0, 6, -6, 0],
    ]) {
      expect(checked({ kind: "3j", args: entries.map((n) => fromTwice(n)) }).routes).toHaveLength(2);
    }
  });
});

describe("symmetries, j ≤ 30", () => {
  it("are 72 named elements, a group of permutations of the square", () => {
    expect(ELEMENTS).toHaveLength(72);
    expect(new Set(ELEMENTS.map((e) => e.name)).size).toBe(72);
    expect(new Set(ELEMENTS.map((e) => e.does)).size).toBe(72);
    expect(ELEMENTS[0]?.name).toBe("identity");
    expect(ELEMENTS.filter((e) => e.classical)).toHaveLength(12);
    expect(ELEMENTS.filter((e) => e.odd)).toHaveLength(36);
  });

  it("all 72 variants, computed from their own entries, agree with the phase", () => {
    fc.assert(
      fc.property(fc.oneof(allowedThreeJ(30), allowedCg(30)), (q) => {
        const list = variants(q);
        expect(list).toHaveLength(72);
        expect(list.filter((v) => !v.agrees).map((v) => `${quantityText(q)} ${v.name}`)).toEqual([]);
      }),
      { numRuns: 100 },
    );
  });

  it("do what their words say, for the plain ones", () => {
    const list = variants({ kind: "3j", args: [4, 6, 8, 2, -4, 2].map((n) => fromTwice(n)) });
    const named = (name: string) => quantityText(list.find((v) => v.name === name)?.quantity as Quantity);
    expect(named("identity")).toBe("(2 3 4; 1 -2 1)");
    expect(named("projections reversed")).toBe("(2 3 4; -1 2 -1)");
    expect(named("columns 213")).toBe("(3 2 4; -2 1 1)");
    expect(named("columns 231")).toBe("(3 4 2; -2 1 1)");
    // j1 stays; (j2+j3±m1)/2 = 4, 3 (DLMF 34.3.11 up to the order of columns)
    expect(named("Regge, j1 kept")).toBe("(2 3 4; 1 -2 1)");
    // A symbol whose square is not its own transpose: (3 4 5; 2 1 -3).
    const other = variants({ kind: "3j", args: [6, 8, 10, 4, 2, -6].map((n) => fromTwice(n)) });
    const image = (name: string) => quantityText(other.find((v) => v.name === name)?.quantity as Quantity);
    // j1 = 3 stays, the other two become (j2+j3±m1)/2 = 11/2 and 7/2: DLMF 34.3.11 as printed
    expect(image("Regge, j1 kept, columns 132, projections reversed")).toBe("(3 11/2 7/2; -1 5/2 -3/2)");
    // j2 = 4 comes first, then (j3+j1∓m2)/2 = 7/2 and 9/2
    expect(image("Regge, j2 kept")).toBe("(4 7/2 9/2; 2 3/2 -7/2)");
    // each j becomes (sum of the other two − its m)/2
    expect(image("Regge, second row on top")).toBe("(7/2 7/2 5; 5/2 1/2 -3)");
  });

  it("are 72 different symbols for a generic one", () => {
    const q: Quantity = { kind: "3j", args: [12, 15, 19, 2, 5, -7].map((n) => fromTwice(n)) };
    expect(new Set(variants(q).map((v) => quantityText(v.quantity))).size).toBe(72);
    expect(orbitSymbols(q)).toHaveLength(72);
    expect(stabiliser(q).map((e) => e.name)).toEqual(["identity"]);
  });

  it("include those of DLMF 34.3.8 to 34.3.12 as they are printed, with the same key", () => {
    fc.assert(
      fc.property(allowedThreeJ(30), (q) => {
        const [a, b, c, x, y, z] = q.args as [Twice, Twice, Twice, Twice, Twice, Twice];
        const half = (...n: number[]) => n.map((doubled) => fromTwice(doubled / 2));
        const odd = ((a + b + c) / 2) % 2 !== 0;
        const printed: [string, Twice[], boolean][] = [
          ["34.3.8", [b, c, a, y, z, x], false],
          ["34.3.9", [b, a, c, y, x, z], odd],
          ["34.3.10", [a, b, c, fromTwice(-x), fromTwice(-y), fromTwice(-z)], odd],
          [
            "34.3.11",
            half(2 * a, b + c + x, b + c - x, 2 * (b - c), c - b + x + 2 * y, c - b + x + 2 * z),
            false,
          ],
          [
            "34.3.12",
            half(a + b - z, b + c - x, a + c - y, 2 * c - a - b - z, 2 * a - b - c - x, 2 * b - a - c - y),
            false,
          ],
        ];
        const list = new Set(variants(q).map((v) => quantityText(v.quantity)));
        for (const [equation, args, changes] of printed) {
          const image: Quantity = { kind: "3j", args };
          expect(list.has(quantityText(image)), `${equation} of ${quantityText(q)}`).toBe(true);
          expect(orbit(image).key).toBe(orbit(q).key);
          same(
            evaluate(image),
            changes ? subtract(ZERO, evaluate(q)) : evaluate(q),
            `${equation} of ${quantityText(q)}`,
          );
        }
      }),
      { numRuns: 60 },
    );
  });

  it("are the 12 classical ones, all zero, for a forbidden symbol", () => {
    const list = variants({ kind: "3j", args: [2, 2, 6, 0, 0, 0].map((n) => fromTwice(n)) });
    expect(list).toHaveLength(12);
    expect(list.every((v) => v.agrees && v.value.terms.length === 0)).toBe(true);
  });

  it("give all symbols of an orbit the same key, whose symbol times the factor is the value", () => {
    fc.assert(
      fc.property(fc.oneof(allowedThreeJ(30), allowedCg(30)), (q) => {
        const { key, factor } = orbit(q);
        expect(key.length).toBeLessThanOrEqual(191);
        expect(key).toMatch(/^[\x20-\x7e]+$/);
        same(evaluate(q), multiply(factor, evaluate(symbolOfKey(key))), quantityText(q));
        for (const v of variants(q)) expect(orbit(v.quantity).key).toBe(key);
        const [a, b, c, x, y, z] = threeJEntries(q);
        expect(orbit({ kind: "3j", args: [a, b, c, x, y, z] }).key).toBe(key);
        expect(orbitSymbols(q).length * stabiliser(q).length).toBe(72);
      }),
      { numRuns: 30 },
    );
  });

  it("give different orbits different keys: exhaustively, for j ≤ 5/2", () => {
    // Two symbols share a key exactly when one is among the variants of the other.
    const orbits = new Map<string, Set<string>>();
    const all: Quantity[] = [];
    for (let a = 0; a <= 5; a++)
      for (let b = 0; b <= 5; b++)
        for (const c of range(Math.abs(a - b), Math.min(a + b, 5)))
          for (const x of range(-a, a))
            for (const y of range(-b, b))
              if (Math.abs(x + y) <= c)
                all.push({ kind: "3j", args: [a, b, c, x, y, -x - y].map((n) => fromTwice(n)) });
    for (const q of all) {
      const members = new Set(orbitSymbols(q).map((s) => quantityText(s)));
      const { key } = orbit(q);
      const known = orbits.get(key);
      if (known) expect(members).toEqual(known);
      else orbits.set(key, members);
    }
    const members = [...orbits.values()].flatMap((set) => [...set]);
    expect(new Set(members).size).toBe(members.length); // no symbol belongs to two orbits
  });

  it("join a CG to its 3j with √(2J+1) and the phase", () => {
    fc.assert(
      fc.property(allowedCg(12), (q) => {
        const entries = threeJEntries(q);
        const plain: Quantity = { kind: "3j", args: [...entries] };
        const [mine, theirs] = [orbit(q), orbit(plain)];
        expect(mine.key).toBe(theirs.key);
        const ratio = multiply(theirs.factor, root(entries[2] + 1));
        const [a, b, , , , z] = entries;
        same(mine.factor, ((a - b - z) / 2) % 2 === 0 ? ratio : subtract(ZERO, ratio), quantityText(q));
      }),
    );
  });

  it("give a forbidden symbol a key of its own entries", () => {
    const key = (args: number[]) => orbit({ kind: "3j", args: args.map((n) => fromTwice(n)) });
    expect(key([2, 2, 6, 0, 0, 0])).toMatchObject({ key: "3j none 2 2 6 0 0 0", zero: true });
    expect(key([2, 2, 6, 0, 2, -2]).key).not.toBe(key([2, 2, 6, 0, 0, 0]).key);
    expect(symbolOfKey("3j none 2 2 6 0 0 0").args).toEqual([2, 2, 6, 0, 0, 0]);
    expect(() => symbolOfKey("6j 1")).toThrow(RangeError);
    expect(key([2, 2, 2, 0, 0, 0])).toMatchObject({ key: "3j 1 1 1 1 1 1 1 1 1", zero: true });
  });
});

describe("printing of symbol values, j ≤ 30", () => {
  it("reads back as the value that the decimal shows", () => {
    fc.assert(
      fc.property(fc.oneof(allowedThreeJ(30), allowedCg(30)), (q) => {
        const value = evaluate(q);
        const [real] = readPrinted(toText(value));
        const off = real / 10n ** 20n - roundScaled(value, 40, "truncate");
        expect(off >= -1n && off <= 1n).toBe(true);
        expect(Math.abs(Number(toDecimal(value, 20)) - Number(real) / 1e60)).toBeLessThanOrEqual(1e-15);
      }),
    );
  });
});
