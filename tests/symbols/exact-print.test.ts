import fc from "fast-check";
import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import {
  add,
  divide,
  I,
  integer,
  multiply,
  negate,
  ONE,
  PI,
  power,
  rational,
  root,
  squareRoot,
  subtract,
  ZERO,
  type Exact,
} from "@/lib/symbols/exact";
import {
  hasForm,
  toDecimal,
  toDecimalPlaces,
  toForm,
  toLatex,
  toText,
  type HouseForm,
} from "@/lib/symbols/exact-print";
import { TooCostly } from "@/lib/symbols/failures";
import { roundScaled } from "@/lib/symbols/rounding";
import { readPrinted } from "./printed-value";

const coefficients = fc
  .tuple(fc.integer({ min: -500, max: 500 }), fc.integer({ min: 1, max: 300 }))
  .map(([n, d]) => rational(n, d));
const terms = fc
  .tuple(coefficients, fc.integer({ min: 1, max: 400 }), fc.integer({ min: -5, max: 5 }), fc.boolean())
  .map(([c, r, pi, i]) =>
    [c, root(r), power(squareRoot(PI), pi), i ? I : ONE].reduce((x, y) => multiply(x, y)),
  );
const sums = fc.array(terms, { minLength: 1, maxLength: 3 }).map((list) => list.reduce((x, y) => add(x, y)));
const FORMS: HouseForm[] = ["rationalised", "single-root", "root-below", "any"];

/** Both parts of a printed value and of the exact one, to 40 places, differ by at most one unit of the last place. */
function expectSame(printed: string, x: Exact): void {
  const [re, im] = readPrinted(printed).map((n) => n / 10n ** 20n) as [bigint, bigint];
  const real: Exact = { terms: x.terms.filter((t) => t.i === 0) };
  const imaginary = divide({ terms: x.terms.filter((t) => t.i === 1) }, I);
  for (const [read, exact] of [
    [re, roundScaled(real, 40, "truncate")],
    [im, roundScaled(imaginary, 40, "truncate")],
  ] as const) {
    const off = read - exact;
    expect(off >= -1n && off <= 1n, `${printed} is off by ${off}`).toBe(true);
  }
}

describe("printed forms", () => {
  it.each([
    [divide(root(30), integer(15)), "sqrt(30)/15", "sqrt(2/15)", "sqrt(2)/sqrt(15)", "2/15"],
    [negate(divide(root(30), integer(15))), "-sqrt(30)/15", "-sqrt(2/15)", "-sqrt(2)/sqrt(15)", "-2/15"],
    [root(new Fraction(1, 6)), "sqrt(6)/6", "sqrt(1/6)", "1/sqrt(6)", "1/6"],
    [rational(-1, 2), "-1/2", "-1/2", "-1/2", "-1/4"],
    [ZERO, "0", "0", "0", "0"],
    [ONE, "1", "1", "1", "1"],
    [root(12), "2*sqrt(3)", "sqrt(12)", "2*sqrt(3)", "12"],
    [root(new Fraction(3, 20)), "sqrt(15)/10", "sqrt(3/20)", "sqrt(3)/(2*sqrt(5))", "3/20"],
    [root(new Fraction(9, 20)), "3*sqrt(5)/10", "sqrt(9/20)", "3/(2*sqrt(5))", "9/20"],
    [
      squareRoot(divide(rational(15, 4), PI)),
      "sqrt(15)/(2*sqrt(pi))",
      "sqrt(15/(4*pi))",
      "sqrt(15)/(2*sqrt(pi))",
      "15/(4*pi)",
    ],
    [multiply(I, rational(1, 2)), "i/2", "i/2", "i/2", "i/2"],
    [PI, "pi", "pi", "pi", "pi^2"],
    [multiply(PI, squareRoot(PI)), "pi^(3/2)", "sqrt(pi^3)", "pi^(3/2)", "pi^3"],
  ])("case %#", (x, rationalised, singleRoot, rootBelow, square) => {
    expect(toText(x)).toBe(rationalised);
    expect(toForm(x, "single-root", "text")).toBe(singleRoot);
    expect(toForm(x, "root-below", "text")).toBe(rootBelow);
    expect(toForm(x, "signed-square", "text")).toBe(square);
    expect(toForm(x, "any", "text")).toBe(rationalised);
  });

  it("writes sums, and LaTeX", () => {
    expect(toText(add(rational(1, 2), multiply(rational(-2, 3), root(2))))).toBe("1/2 - 2*sqrt(2)/3");
    expect(toLatex(divide(root(30), integer(15)))).toBe("\\frac{\\sqrt{30}}{15}");
    expect(toLatex(rational(-1, 2))).toBe("-\\frac{1}{2}");
    expect(toForm(root(new Fraction(2, 15)), "single-root", "latex")).toBe("\\sqrt{\\frac{2}{15}}");
    expect(toForm(root(new Fraction(1, 6)), "root-below", "latex")).toBe("\\frac{1}{\\sqrt{6}}");
    expect(toLatex(squareRoot(divide(integer(15), multiply(integer(4), PI))))).toBe(
      "\\frac{\\sqrt{15}}{2\\sqrt{\\pi}}",
    );
  });

  it("read back as the same value in every form and both scripts", () => {
    fc.assert(
      fc.property(
        sums,
        fc.constantFrom(...FORMS),
        fc.constantFrom("text" as const, "latex" as const),
        (x, form, script) => {
          expectSame(toForm(x, form, script), x);
        },
      ),
      { numRuns: 300 },
    );
  });

  it("give the square with its sign where the root is understood", () => {
    fc.assert(
      fc.property(terms, (x) => {
        fc.pre(hasForm(x, "signed-square") && x.terms.length === 1);
        const square = multiply(x, x);
        const negative = toText(x).startsWith("-");
        expectSame(toForm(x, "signed-square", "text"), negative ? negate(square) : square);
      }),
    );
    expect(hasForm(I, "signed-square")).toBe(false);
    expect(hasForm(add(ONE, root(2)), "single-root")).toBe(false);
  });
});

describe("decimals", () => {
  it.each([
    [divide(root(30), integer(15)), 20, "0.36514837167011074230"],
    [rational(-1, 2), 20, "-0.50000000000000000000"],
    [ONE, 20, "1.0000000000000000000"],
    [ZERO, 20, "0"],
    [PI, 50, "3.1415926535897932384626433832795028841971693993751"],
    [root(2), 31, "1.414213562373095048801688724210"],
    [rational(2, 3), 3, "0.667"],
    [rational(99_999, 100_000), 3, "1.00"],
    [rational(-99_951, 100), 3, "-1000"],
    [integer(123_456), 3, "123000"],
    [rational(1, 10n ** 7n), 2, "0.00000010"],
    [rational(1, 10n ** 9n), 3, "1.00e-9"],
    [integer(10n ** 25n), 4, "1.000e25"],
    [integer(7), 1, "7"],
    [add(rational(1, 2), multiply(I, root(2))), 4, "0.5000 + 1.414*i"],
    [multiply(I, rational(-1, 3)), 4, "-0.3333*i"],
  ] as const)("case %#", (x, digits, expected) => {
    expect(toDecimal(x, digits)).toBe(expected);
  });

  it("decides ties exactly", () => {
    expect(toDecimalPlaces(rational(1, 8), 2)).toBe("0.12");
    expect(toDecimalPlaces(rational(3, 8), 2)).toBe("0.38");
    expect(toDecimalPlaces(rational(1, 8), 2, "half-away")).toBe("0.13");
    expect(toDecimalPlaces(rational(-1, 8), 2, "half-away")).toBe("-0.13");
    expect(toDecimalPlaces(rational(-1, 8), 2, "truncate")).toBe("-0.12");
    expect(toDecimalPlaces(rational(-1, 1000), 2)).toBe("0.00");
    expect(toDecimalPlaces(rational(5, 2), 0)).toBe("2");
    // One part in 10^40 above the tie.
    expect(toDecimalPlaces(add(rational(1, 8), rational(1, 10n ** 40n)), 2)).toBe("0.13");
    // √2·10^-60 beside the tie: irrational, and a hair away from it.
    const near = (step: bigint) => add(rational(1, 8), multiply(rational(step, 10n ** 60n), root(2)));
    expect(toDecimalPlaces(near(1n), 2)).toBe("0.13");
    expect(toDecimalPlaces(near(-1n), 2)).toBe("0.12");
  });

  it("agree with whole-number roots to any number of digits", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 10 ** 6 }),
        fc.integer({ min: 1, max: 10 ** 6 }),
        fc.integer({ min: 1, max: 60 }),
        (n, d, places) => {
          // |v·10^p − √(n/d)·10^p| ≤ 1/2, squared and cleared of the root: (2v−1)² d ≤ 4·n·10^2p ≤ (2v+1)² d
          const v = roundScaled(root(new Fraction(n, d)), places);
          const target = 4n * BigInt(n) * 10n ** BigInt(2 * places);
          expect((2n * v - 1n) ** 2n * BigInt(d) <= target || v === 0n).toBe(true);
          expect((2n * v + 1n) ** 2n * BigInt(d) >= target).toBe(true);
        },
      ),
    );
  });

  it("shorten consistently: a truncated decimal is the beginning of a longer one", () => {
    fc.assert(
      fc.property(sums, fc.integer({ min: 0, max: 30 }), (x, places) => {
        fc.pre(x.terms.every((t) => t.i === 0));
        const long = toDecimalPlaces(x, 60, "truncate").replace("-", "");
        const short = toDecimalPlaces(x, places, "truncate").replace("-", "");
        expect(long.startsWith(short)).toBe(true);
      }),
    );
  });

  it("refuse more digits than the stated limit", () => {
    expect(() => toDecimal(root(2), 20_000)).toThrow(TooCostly);
    expect(() => toDecimal(root(2), 0)).toThrow(RangeError);
    expect(() => toDecimalPlaces(root(2), -1)).toThrow(RangeError);
    expect(toDecimal(subtract(PI, rational(355, 113)), 5)).toBe("-0.00000026676");
  });
});
