import fc from "fast-check";
import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import {
  add,
  asRational,
  compare,
  divide,
  equals,
  I,
  integer,
  isReal,
  isZero,
  multiply,
  negate,
  ONE,
  PI,
  power,
  rational,
  root,
  sign,
  squareRoot,
  subtract,
  ZERO,
  type Exact,
} from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { OutsideDomain, TooCostly } from "@/lib/symbols/failures";
import { squareFree } from "@/lib/symbols/square-free";

const rationals = fc
  .tuple(fc.integer({ min: -60, max: 60 }), fc.integer({ min: 1, max: 40 }))
  .map(([n, d]) => rational(n, d));
const radicals = fc.constantFrom(1, 2, 3, 5, 6, 10, 12, 15, 30, 75).map((n) => root(n));
const powersOfPi = fc.constantFrom(ONE, ONE, ONE, PI, squareRoot(PI), divide(ONE, PI));
const turns = fc.constantFrom(ONE, ONE, ONE, I);

/** Sums of up to three terms. */
const values: fc.Arbitrary<Exact> = fc
  .array(fc.tuple(rationals, radicals, powersOfPi, turns), { minLength: 0, maxLength: 3 })
  .map((terms) => terms.map((t) => t.reduce((x, y) => multiply(x, y))).reduce((x, y) => add(x, y), ZERO));
/** The same without π: a field. */
const surds: fc.Arbitrary<Exact> = fc
  .array(fc.tuple(rationals, radicals, turns), { minLength: 0, maxLength: 3 })
  .map((terms) => terms.map((t) => t.reduce((x, y) => multiply(x, y))).reduce((x, y) => add(x, y), ZERO));

const same = (x: Exact, y: Exact) => expect(toText(subtract(x, y))).toBe("0");

describe("exact values", () => {
  it("obey the laws of a commutative ring", () => {
    fc.assert(
      fc.property(values, values, values, (x, y, z) => {
        same(add(x, y), add(y, x));
        same(add(add(x, y), z), add(x, add(y, z)));
        same(multiply(x, y), multiply(y, x));
        same(multiply(multiply(x, y), z), multiply(x, multiply(y, z)));
        same(multiply(x, add(y, z)), add(multiply(x, y), multiply(x, z)));
        same(add(x, negate(x)), ZERO);
        same(multiply(x, ONE), x);
      }),
    );
  });

  it("divide back by every sum of surds", () => {
    fc.assert(
      fc.property(values, surds, (x, y) => {
        fc.pre(!isZero(y));
        same(multiply(divide(x, y), y), x);
      }),
      { numRuns: 60 },
    );
  });

  it("divide by a sum of powers of π where the quotient stays inside, and say so where it does not", () => {
    fc.assert(
      fc.property(values, values, (x, y) => {
        fc.pre(!isZero(y));
        same(divide(multiply(x, y), y), x);
      }),
      { numRuns: 60 },
    );
    expect(() => divide(ONE, add(PI, ONE))).toThrow(OutsideDomain);
    expect(() => divide(add(multiply(PI, PI), ONE), add(PI, ONE))).toThrow(OutsideDomain);
  });

  it("are canonical: equal exactly when the difference is zero", () => {
    fc.assert(
      fc.property(values, values, (x, y) => {
        expect(equals(x, y)).toBe(isZero(subtract(x, y)));
        expect(equals(add(subtract(x, y), y), x)).toBe(true);
      }),
    );
    expect(equals(root(8), multiply(integer(2), root(2)))).toBe(true);
    expect(equals(root(new Fraction(2, 15)), divide(root(30), integer(15)))).toBe(true);
    expect(equals(root(2), root(3))).toBe(false);
  });

  it.each([
    ["√2 + √3 against √10", subtract(add(root(2), root(3)), root(10)), -1],
    ["√2 + √3 against π", subtract(add(root(2), root(3)), PI), 1],
    ["355/113 against π", subtract(rational(355, 113), PI), 1],
    ["√2 + √5 against √3 + 2", subtract(add(root(2), root(5)), add(root(3), integer(2))), -1],
    ["√1000001 + √999999 against 2000", subtract(add(root(1000001), root(999999)), integer(2000)), -1],
    ["π^(3/2) against 5.568", subtract(multiply(PI, squareRoot(PI)), rational(5568, 1000)), 1],
    ["1/√π against 0.5642", subtract(divide(ONE, squareRoot(PI)), rational(5642, 10000)), -1],
    ["0", ZERO, 0],
  ] as const)("sign of %s", (_, value, expected) => {
    expect(sign(value)).toBe(expected);
  });

  it("tells a long near miss apart: a convergent of √2 that is off by 10^-60", () => {
    let [p, q] = [1n, 1n];
    while (q < 10n ** 30n) [p, q] = [p + 2n * q, p + q];
    const difference = p * p - 2n * q * q;
    expect(compare(rational(p, q), root(2))).toBe(difference > 0n ? 1 : -1);
  });

  it("is right where the difference is below the first precision tried: √k + √(k+3) < √(k+1) + √(k+2) for k near 10^14", () => {
    for (let k = 10n ** 14n; k < 10n ** 14n + 40n; k++) {
      expect(compare(add(root(k), root(k + 3n)), add(root(k + 1n), root(k + 2n)))).toBe(-1);
    }
  });

  it("has no sign of an imaginary value", () => {
    expect(() => sign(I)).toThrow(OutsideDomain);
    expect(isReal(multiply(I, I))).toBe(true);
    expect(equals(multiply(I, I), integer(-1))).toBe(true);
  });

  it("takes square roots that stay inside", () => {
    fc.assert(
      fc.property(values, (x) => {
        let result: Exact;
        try {
          result = squareRoot(x);
        } catch (error) {
          expect(error).toBeInstanceOf(OutsideDomain);
          return;
        }
        same(multiply(result, result), x);
      }),
    );
    expect(toText(squareRoot(add(integer(3), root(8))))).toBe("1 + sqrt(2)");
    expect(toText(squareRoot(subtract(integer(3), root(8))))).toBe("-1 + sqrt(2)");
    expect(toText(squareRoot(subtract(root(8), integer(3))))).toBe("-i + i*sqrt(2)");
    expect(toText(squareRoot(add(integer(-3), multiply(integer(4), I))))).toBe("1 + 2*i");
    expect(toText(squareRoot(subtract(integer(-3), multiply(integer(4), I))))).toBe("1 - 2*i");
    expect(toText(squareRoot(integer(-4)))).toBe("2*i");
    expect(toText(squareRoot(I))).toBe("sqrt(2)/2 + i*sqrt(2)/2");
    expect(toText(squareRoot(divide(integer(15), multiply(integer(4), PI))))).toBe("sqrt(15)/(2*sqrt(pi))");
    expect(() => squareRoot(root(2))).toThrow(OutsideDomain);
    expect(() => squareRoot(add(ONE, root(2)))).toThrow(OutsideDomain);
    expect(() => squareRoot(add(PI, ONE))).toThrow(OutsideDomain);
    expect(() => squareRoot(squareRoot(PI))).toThrow(OutsideDomain);
  });

  it("takes powers", () => {
    fc.assert(
      fc.property(surds, fc.integer({ min: 0, max: 4 }), fc.integer({ min: 0, max: 4 }), (x, m, n) => {
        same(multiply(power(x, m), power(x, n)), power(x, m + n));
      }),
      { numRuns: 50 },
    );
    expect(toText(power(root(2), -3))).toBe("sqrt(2)/4");
    expect(toText(power(integer(2), new Fraction(-1, 2)))).toBe("sqrt(2)/2");
    expect(toText(power(integer(-1), 10n ** 30n + 1n))).toBe("-1");
    expect(toText(power(I, 10n ** 30n + 3n))).toBe("-i");
    expect(toText(power(ZERO, 0))).toBe("1");
    expect(() => power(integer(2), new Fraction(1, 3))).toThrow(OutsideDomain);
    expect(() => power(ZERO, -1)).toThrow(OutsideDomain);
    expect(() => power(integer(10), 10n ** 9n)).toThrow(TooCostly);
    expect(() => power(power(integer(10), 1500), 1500)).toThrow(TooCostly);
  });

  it("refuses to divide by zero", () => {
    expect(() => divide(ONE, ZERO)).toThrow(OutsideDomain);
    expect(() => divide(ONE, subtract(root(8), multiply(integer(2), root(2))))).toThrow(OutsideDomain);
    expect(() => rational(1, 0)).toThrow(OutsideDomain);
  });

  it("knows the rational ones", () => {
    expect(asRational(multiply(root(2), root(8)))?.toFraction()).toBe("4");
    expect(asRational(root(2))).toBeNull();
    expect(asRational(PI)).toBeNull();
  });

  it("refuses numbers that grow too long, step by step or at once", () => {
    const long = power(integer(10), 1999);
    let x = long;
    expect(() => {
      for (let n = 0; n < 100; n++) x = multiply(x, long);
    }).toThrow(TooCostly);
    expect(() => add(x, ONE)).toThrow(/digits/);
  });

  it("refuses a denominator of too many roots before it works", () => {
    const many = [2, 3, 5, 7, 11, 13, 17, 19].map((p) => root(p)).reduce((x, y) => add(x, y));
    expect(() => divide(ONE, many)).toThrow(TooCostly);
  });
});

describe("the square-free part of a radicand", () => {
  it("agrees with its definition for small numbers", () => {
    for (let n = 1; n <= 3000; n++) {
      let [outside, inside] = [1, n];
      for (let d = 2; d * d <= inside; d++)
        while (inside % (d * d) === 0) [inside, outside] = [inside / (d * d), outside * d];
      expect(squareFree(BigInt(n))).toEqual({ outside: BigInt(outside), inside: BigInt(inside) });
    }
  });

  it("finds large squares and large primes, and products of two primes above the trial limit", () => {
    const [p, q] = [1_000_003n, 1_000_033n];
    expect(squareFree(p * p)).toEqual({ outside: p, inside: 1n });
    expect(squareFree(12n * p * p)).toEqual({ outside: 2n * p, inside: 3n });
    expect(squareFree(p * q)).toEqual({ outside: 1n, inside: p * q });
    expect(squareFree((p * q) ** 2n * 18n)).toEqual({ outside: 3n * p * q, inside: 2n });
    const primorial = [2n, 3n, 5n, 7n, 11n, 13n, 17n, 19n, 23n, 29n, 31n, 37n, 41n, 43n, 47n].reduce(
      (a, b) => a * b,
    );
    expect(squareFree(primorial)).toEqual({ outside: 1n, inside: primorial });
    expect(squareFree(primorial ** 3n)).toEqual({ outside: primorial, inside: primorial });
  });

  it("refuses at a bounded cost what it would have to factor", () => {
    const [p, q, r] = [1_000_003n, 1_000_033n, 1_000_037n];
    expect(() => squareFree(p * q * r)).toThrow(TooCostly);
    expect(() => root(new Fraction(p * p * q * r, 7n))).toThrow(TooCostly);
    expect(() => squareFree(10n ** 30_000n)).toThrow(TooCostly);
  });
});
