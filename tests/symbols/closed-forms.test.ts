import Fraction from "fraction.js";
import { describe, expect, it } from "vitest";
import { equals, multiply, rational, root, ZERO, type Exact } from "@/lib/symbols/exact";
import { fromTwice, showHalf, type Twice } from "@/lib/symbols/half";
import { evaluate } from "@/lib/symbols/quantity";

/** The 3j symbol with these doubled entries. */
const threeJ = (...doubled: number[]) => evaluate({ kind: "3j", args: doubled.map((n) => fromTwice(n)) });

/** sign·rational·√(n/d), with (−1)^(half of the doubled exponent). */
function value(doubledExponent: number, factor: bigint | number, n: bigint, d: bigint): Exact {
  const size = multiply(rational(BigInt(factor)), n === 0n ? ZERO : root(new Fraction(n, d)));
  return (doubledExponent / 2) % 2 === 0 ? size : multiply(rational(-1), size);
}

function expectSame(found: Exact, expected: Exact, doubled: number[]): void {
  expect(equals(found, expected), doubled.map((n) => showHalf(n as Twice)).join(" ")).toBe(true);
}

/** n! of half of a doubled number. */
function f(doubled: number): bigint {
  let result = 1n;
  for (let k = 2n; k <= BigInt(doubled / 2); k++) result *= k;
  return result;
}

function* triads(most: number): Generator<[number, number, number]> {
  for (let a = 0; a <= most; a++)
    for (let b = 0; b <= most; b++)
      for (let c = Math.abs(a - b); c <= Math.min(a + b, most); c += 2) yield [a, b, c];
}

describe("special closed forms of NIST DLMF 34.3", () => {
  it("34.3.1: (j j 0; m −m 0) = (−1)^(j−m)/√(2j+1), j ≤ 15", () => {
    for (let j = 0; j <= 30; j++)
      for (let m = -j; m <= j; m += 2) {
        expectSame(threeJ(j, j, 0, m, -m, 0), value(j - m, 1, 1n, BigInt(j + 1)), [j, m]);
      }
  });

  it("34.3.2: (j j 1; m −m 0) = (−1)^(j−m) 2m/√(2j(2j+1)(2j+2)), j ≤ 15", () => {
    for (let j = 1; j <= 30; j++)
      for (let m = -j; m <= j; m += 2) {
        const below = BigInt(j) * BigInt(j + 1) * BigInt(j + 2);
        expectSame(threeJ(j, j, 2, m, -m, 0), value(j - m, m, 1n, below), [j, m]);
      }
  });

  it("34.3.3: (j j 1; m −m−1 1) = (−1)^(j−m) √(2(j−m)(j+m+1)/(2j(2j+1)(2j+2))), j ≤ 15", () => {
    for (let j = 1; j <= 30; j++)
      for (let m = -j; m <= j - 2; m += 2) {
        const above = 2n * BigInt((j - m) / 2) * BigInt((j + m) / 2 + 1);
        const below = BigInt(j) * BigInt(j + 1) * BigInt(j + 2);
        expectSame(threeJ(j, j, 2, m, -m - 2, 2), value(j - m, 1, above, below), [j, m]);
      }
  });

  it("34.3.5: (j1 j2 j3; 0 0 0), j ≤ 9", () => {
    for (const [a, b, c] of triads(18)) {
      if (a % 2 || b % 2 || c % 2) continue;
      const J = a + b + c; // doubled
      const found = threeJ(a, b, c, 0, 0, 0);
      if (J % 4) expectSame(found, ZERO, [a, b, c]);
      else {
        const factor = f(J / 2) / (f(J / 2 - a) * f(J / 2 - b) * f(J / 2 - c));
        const above = f(J - 2 * a) * f(J - 2 * b) * f(J - 2 * c);
        expectSame(found, value(J / 2, factor, above, f(J + 2)), [a, b, c]);
      }
    }
  });

  it("34.3.6: (j1 j2 j1+j2; m1 m2 −m1−m2), j ≤ 4", () => {
    for (let a = 0; a <= 8; a++)
      for (let b = 0; b <= 8; b++)
        for (let x = -a; x <= a; x += 2)
          for (let y = -b; y <= b; y += 2) {
            const above = f(2 * a) * f(2 * b) * f(a + b + x + y) * f(a + b - x - y);
            const below = f(2 * (a + b) + 2) * f(a + x) * f(a - x) * f(b + y) * f(b - y);
            expectSame(threeJ(a, b, a + b, x, y, -x - y), value(a - b + x + y, 1, above, below), [
              a,
              b,
              x,
              y,
            ]);
          }
  });

  it("34.3.7: (j1 j2 j3; j1 −j1−m3 m3) with the phase (−1)^(j1−j2−m3) of the corrected printing, j ≤ 5", () => {
    for (const [a, b, c] of triads(10))
      for (let z = -c; z <= c; z += 2) {
        if (Math.abs(a + z) > b) continue;
        const above = f(2 * a) * f(b + c - a) * f(a + b + z) * f(c - z);
        const below = f(a + b + c + 2) * f(a - b + c) * f(a + b - c) * f(b - a - z) * f(c + z);
        // The published form reads (−j1+j2−m3)! below and (j1+j2+m3)! above, with m2 = −j1−m3.
        expectSame(threeJ(a, b, c, a, -a - z, z), value(a - b - z, 1, above, below), [a, b, c, z]);
      }
  });
});
