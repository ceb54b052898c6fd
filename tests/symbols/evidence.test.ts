import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { toDecimal, toText } from "@/lib/symbols/exact-print";
import { RouteDisagreement, TooCostly } from "@/lib/symbols/failures";
import {
  agreed,
  costOf,
  evaluate,
  evidence,
  LIMITS,
  quantity,
  quantityLatex,
  quantityText,
  variants,
  whyZero,
} from "@/lib/symbols/quantity";
import { integer, multiply, ONE, rational, root } from "@/lib/symbols/exact";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import { symbol } from "./data";
import { allowedCg, allowedThreeJ, anyEntries } from "./generators";

const factorial = (text: string) => {
  let result = 1n;
  for (let k = 2n; k <= BigInt(text.replace("!", "")); k++) result *= k;
  return result;
};

describe("evidence", () => {
  it("is complete for (1 1 2; 0 0 0)", () => {
    const e = evidence(symbol("3j", "1 1 2 0 0 0"));
    expect(e.quantity.text).toBe("(1 1 2; 0 0 0)");
    expect(e.reggeSquare).toEqual([
      [2, 2, 0],
      [1, 1, 2],
      [1, 1, 2],
    ]);
    expect(e.sum).toBe(4);
    expect(e.terms.map((t) => t.value)).toEqual(["4"]);
    // √(1!⁴·2!²/(5!·0!·2!·2!)) = √(1/120)
    expect(e.prefactor).toEqual({
      primes: [
        [2, -3],
        [3, -1],
        [5, -1],
      ],
      latex: "\\frac{1}{2^{3}\\cdot 3\\cdot 5}",
    });
    expect(e.value).toEqual({
      text: "sqrt(30)/15",
      latex: "\\frac{\\sqrt{30}}{15}",
      decimal: "0.36514837167011074230",
    });
    expect(e.routes.map((r) => r.value)).toEqual(["sqrt(30)/15", "sqrt(30)/15"]);
    expect(e.rules.every((r) => r.holds)).toBe(true);
    expect(e.version).toBe(ENGINE_VERSION);
    expect(e.zero).toEqual([]);
    expect(e.steps.at(-1)).toContain("\\frac{\\sqrt{30}}{15}");
  });

  it("lets the value be worked out again from its terms alone", () => {
    fc.assert(
      fc.property(fc.oneof(allowedThreeJ(12), allowedCg(12)), (q) => {
        const e = evidence(q);
        const square = e.reggeSquare as number[][];
        for (const line of [...square, ...[0, 1, 2].map((c) => square.map((row) => row[c] as number))]) {
          expect(line.reduce((x, y) => x + y)).toBe(e.sum);
        }
        expect(e.terms.reduce((sum, t) => sum + BigInt(t.value), 0n).toString()).toBe(e.total);
        const [C, B, A] = (square[0] as number[]).map((n) => factorial(String(n))) as [
          bigint,
          bigint,
          bigint,
        ];
        for (const t of e.terms) {
          // the term as published, times A! B! C!, is the whole number
          expect(
            (BigInt(t.numerator) * A * B * C) / t.denominators.map(factorial).reduce((x, y) => x * y),
          ).toBe(BigInt(t.value));
          expect(BigInt(t.numerator) * t.binomials.reduce((x, b) => x * BigInt(b.value), 1n)).toBe(
            BigInt(t.value),
          );
        }
        const under = e.prefactor.primes.reduce(
          (x, [p, n]) =>
            multiply(x, n > 0 ? integer(BigInt(p) ** BigInt(n)) : rational(1n, BigInt(p) ** BigInt(-n))),
          ONE,
        );
        const [t] = under.terms;
        if (!t) throw new Error("the number under the root is not 0");
        const value = multiply(
          multiply(integer(BigInt(e.total)), root(t.coefficient)),
          integer(e.sign?.value ?? 1),
        );
        expect(toText(value)).toBe(e.value.text);
        expect(toText(value)).toBe(toText(evaluate(q)));
      }),
      { numRuns: 150 },
    );
  });

  it("survives JSON unchanged, whatever the entries", () => {
    fc.assert(
      fc.property(fc.oneof(anyEntries(8), allowedCg(10)), (q) => {
        const e = evidence(q);
        expect(JSON.parse(JSON.stringify(e))).toEqual(e);
        expect(e.zero).toEqual(whyZero(q));
        expect(e.zero.length > 0).toBe(e.value.text === "0");
        if (e.reggeSquare === null) expect(e.rules.some((r) => !r.holds)).toBe(true);
      }),
    );
  });

  it("summarises a sum of many terms", () => {
    const e = evidence(symbol("3j", "200 200 200 3 -5 2"));
    expect(e.terms).toEqual([]);
    expect(e.summary?.count).toBeGreaterThan(40);
    expect(e.summary?.first.k).toBe(0);
    expect(e.summary?.largest.value.length).toBeGreaterThan(e.summary?.first.value.length ?? 0);
  });

  it("says which rule fails, with the numbers put in", () => {
    const e = evidence(symbol("cg", "1 1 1 1 1 2"));
    expect(e.rules.filter((r) => !r.holds).map((r) => r.says)).toEqual(["|M| = 2 > J = 1"]);
    expect(e.reggeSquare).toBeNull();
    expect(e.value).toEqual({ text: "0", latex: "0", decimal: "0" });
  });
});

describe("limits and alarms", () => {
  it("are kept before any work is done, with a sentence", () => {
    const huge = symbol("3j", "6000 6000 6000 0 0 0");
    for (const work of [evaluate, evidence, variants, whyZero]) {
      expect(() => work(huge)).toThrow(TooCostly);
      expect(() => work(huge)).toThrow(/6,000/);
    }
    expect(LIMITS.largestCheckedJ).toBe(1000);
  });

  it("know the cost beforehand", () => {
    const q = symbol("3j", "300 299 300 10 -20 10");
    const { terms, digits } = costOf(q);
    const e = evidence(q);
    expect(terms).toBeGreaterThanOrEqual(e.summary?.count ?? Infinity);
    expect(digits).toBeGreaterThanOrEqual(e.summary?.largest.value.length ?? Infinity);
    expect(costOf(symbol("3j", "1 1 3 0 0 0"))).toEqual({ terms: 0, digits: 1 });
  });

  it("raise an alarm that names the entries, both values and the version when routes disagree", () => {
    const q = symbol("cg", "1 0 1 0 2 0");
    const act = () =>
      agreed(q, [
        { name: "one", value: root(2) },
        { name: "other", value: root(3) },
      ]);
    expect(act).toThrow(RouteDisagreement);
    expect(act).toThrow(/<1 0 1 0 \| 2 0>.*one: sqrt\(2\); other: sqrt\(3\).*surdmark-symbols/);
  });

  it("count the entries", () => {
    expect(() => quantity("3j", symbol("3j", "1 1 2 0 0 0").args.slice(1))).toThrow(RangeError);
  });
});

describe("typed and printed symbols", () => {
  it.each([
    ["3j", "1 3/2 1/2 0 1/2 -1/2", "(1 3/2 1/2; 0 1/2 -1/2)"],
    ["cg", "1 0 1/2 -1/2 3/2 -1/2", "<1 0 1/2 -1/2 | 3/2 -1/2>"],
  ] as const)("%s %s", (kind, entries, text) => {
    expect(quantityText(symbol(kind, entries))).toBe(text);
  });

  it("follow the order of the conventions sheet", () => {
    const q = symbol("cg", "1 0 1/2 -1/2 3/2 -1/2");
    expect(quantityText(q, "j1j2m1m2")).toBe("<1 1/2 0 -1/2 | 3/2 -1/2>");
    expect(quantityLatex(q, "j1j2m1m2")).toContain("1\\,\\tfrac{1}{2}\\,0\\,-\\tfrac{1}{2}");
    expect(quantityLatex(symbol("3j", "1 1 2 0 0 0"))).toBe(
      "\\begin{pmatrix} 1 & 1 & 2 \\\\ 0 & 0 & 0 \\end{pmatrix}",
    );
  });

  it("show twenty digits of a decimal", () => {
    expect(toDecimal(evaluate(symbol("cg", "1 0 1 0 2 0")), 20)).toBe("0.81649658092772603273"); // √(2/3)
  });
});
