import { describe, expect, it } from "vitest";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { readValue } from "@/lib/verify/read-value";

type Row = [typed: string, at: number, length: number, says: RegExp, suggestion?: string];

const QUANTITIES: readonly Row[] = [
  ["", 0, 0, /quantity is empty/],
  ["   ", 3, 0, /quantity is empty/],
  ["1 1 2; 0 0 0", 0, 1, /begins with its bracket/],
  ["3j(1 1 2; 0 0 0)", 0, 2, /begins with its bracket/, "(1 1 2; 0 0 0)"],
  ["C(1 0 1 0 2 0)", 0, 1, /begins with its bracket/, "(1 0 1 0 2 0)"],
  ["\\begin{pmatrix}1", 0, 1, /not LaTeX/],
  ["{1 1 1; 1 1 1}", 0, 14, /does not verify 6j and 9j/],
  ["W(1 1 1 1; 1 1)", 0, 15, /does not verify Racah W/],
  ["G(1 1 2; 0 0 0)", 0, 15, /does not verify Gaunt integrals/],
  ["c(2; 1 0, 1 0)", 0, 14, /does not verify Gaunt coefficients/],
  ["<1 || C(2) || 1>", 0, 16, /does not verify reduced matrix elements/],
  ["<2 1 | T(1 0) | 2 1>", 0, 20, /does not verify matrix elements of tensor/],
  ["|2 0> = |1 1>|1 -1>", 0, 19, /does not verify coupled states/],
  ["[1 1 2; 0 0 0]", 0, 1, /opens with \[/, "(1 1 2; 0 0 0)"],
  ["(1 1 2 0 0 0)", 7, 1, /semicolon between them/, "(1 1 2; 0 0 0)"],
  ["(1 1 2)", 6, 1, /semicolon between them/],
  ["(1 1 2; 0 0)", 11, 1, /bottom row has 2 entries/],
  ["(1 1; 0 0 0)", 4, 1, /top row has 2 entries/],
  ["(1 1 2 3; 0 0 0)", 7, 1, /top row has 4 entries/],
  ["(; 0 0 0)", 1, 1, /top row has no entry/],
  ["(1 1 2; 0 0 0; 1 1 1)", 13, 1, /has two rows, and this one has 3/],
  ["(1 1 2 | 0 0 0)", 7, 1, /separated by a semicolon/, "(1 1 2; 0 0 0)"],
  ["(1 0 1 0 | 2 0)", 9, 1, /typed in < >/, "<1 0 1 0 | 2 0>"],
  ["(1 1 2; 0 0 0", 13, 0, /closing bracket \) is missing/, "(1 1 2; 0 0 0)"],
  ["(1 1 2; 0 0 0]", 13, 1, /does not match/],
  ["(1 1 2; 0 0 0) = 3", 15, 3, /Nothing is expected after/, "(1 1 2; 0 0 0)"],
  ["(1,,1 2; 0 0 0)", 3, 1, /no entry on one side/],
  ["(1 1 2,; 0 0 0)", 6, 1, /no entry on one side/],
  ["(,1 1 2; 0 0 0)", 1, 1, /no entry on one side/],
  ["(1 1 2; 1-1 0)", 9, 2, /touch/, "(1 1 2; 1 -1 0)"],
  ["(1 1 2; - 1 1 0)", 8, 2, /without a space/, "(1 1 2; -1 1 0)"],
  ["(-1 1 2; 0 0 0)", 1, 2, /-1 is negative/],
  ["(1/3 1 2; 0 0 0)", 1, 3, /neither an integer nor a half/],
  ["(0.3 1 2; 0 0 0)", 1, 3, /neither an integer nor a half/],
  ["(1/0 1 2; 0 0 0)", 1, 3, /divides by zero/],
  ["(1/ 1 2; 0 0 0)", 1, 2, /not complete/],
  ["(⅓ 1 2; 0 0 0)", 1, 1, /neither an integer nor a half/],
  ["(j 1 2; 0 0 0)", 1, 1, /is a letter/],
  ["(1 1 2; m -m 0)", 8, 1, /is a letter/],
  ["(1 1 2; 0 0 ?)", 12, 1, /found “\?”/],
  ["(1 1 2; 0 0 \u202e0)", 12, 1, /U\+202E/],
  ["(12345678 1 1; 0 0 0)", 1, 8, /far larger/],
  ["<1 0 1 0 2 0>", 9, 1, /bar before J and M/, "<1 0 1 0 | 2 0>"],
  ["<1 0 1 | 2 0>", 7, 1, /Left of the bar there are 3/],
  ["<1 0 1 0 1 | 2 0>", 9, 1, /Left of the bar there are 5/],
  ["<1 0 1 0 | 2>", 12, 1, /Right of the bar there is 1/],
  ["<1 0 1 0 | 2 0 1>", 15, 1, /Right of the bar there are 3/],
  ["<1 0 1 0 | 2 | 0>", 13, 1, /a second one/],
  ["<2 0 | 1 0 1 0>", 0, 15, /coupled state stands on the left/, "<1 0 1 0 | 2 0>"],
  ["<1 0 1 0 | 1 2 2 0>", 13, 1, /repeats j2/],
  ["<1; 0 1 0 | 2 0>", 2, 1, /between two pairs/],
  ["<1 0 -1 0 | 2 0>", 5, 2, /-1 is negative/],
];

const VALUES: readonly Row[] = [
  ["", 0, 0, /value is empty/],
  ["1/2 sqrt(3)", 4, 7, /above or below the line/, "1/2*sqrt(3)"],
  ["1/2√3", 3, 2, /above or below the line/, "1/2*√3"],
  ["1/2pi", 3, 2, /above or below the line/, "1/2*pi"],
  ["1/2(3)", 3, 3, /above or below the line/, "1/2*(3)"],
  ["2^3/2", 1, 4, /belong to the exponent or not/, "2^(3/2)"],
  ["2^3^2", 2, 3, /power of a power/, "2^(3^2)"],
  ["1 1/2", 2, 1, /may mean 1 \+ 1\/2 or 1 · 1\/2/, "(1 + 1/2)"],
  ["1 ½", 2, 1, /write 1½/, "1½"],
  ["2 3", 2, 1, /a sign such as \* is missing/],
  ["sqrt 2", 5, 1, /in parentheses/, "sqrt(2)"],
  ["sqrt2/3", 4, 1, /in parentheses/, "sqrt(2)/3"],
  ["√-2", 1, 1, /After √ stands a number/],
  ["sqrt()", 5, 1, /nothing between/],
  ["()", 1, 1, /nothing between/],
  ["(1+2", 0, 1, /not closed/, "(1+2)"],
  ["1+2)", 3, 1, /no opening one/],
  ["1+", 2, 0, /not finished/],
  ["*2", 0, 1, /Before this \*/],
  ["2**3", 1, 2, /written with \^/, "2^3"],
  ["--2", 1, 1, /Two signs/],
  ["2//3", 2, 1, /Before this \//],
  ["1/0", 0, 3, /division by zero/],
  ["0^-1", 0, 4, /negative power/],
  ["2^0.3", 2, 3, /whole number or a half/],
  ["2^pi", 2, 2, /whole number or a half/],
  ["sqrt(1+sqrt(2))", 5, 8, /no finite sum/],
  ["x", 0, 1, /“x” is not read/],
  ["Sqrt(2)", 0, 4, /“Sqrt” is not read/, "sqrt(2)"],
  ["Pi", 0, 2, /“Pi” is not read/, "pi"],
  ["sin(2)", 0, 3, /only one is sqrt/],
  ["import(2)", 0, 6, /only one is sqrt/],
  ["a=2", 0, 1, /“a” is not read/],
  ["= 2", 0, 1, /without an equals sign/, "2"],
  ["≈0.37", 0, 1, /type its digits alone/, "0.37"],
  ["{a:1}", 0, 1, /round parentheses/, "(a:1)"],
  ["[1/2]", 0, 1, /round parentheses/, "(1/2)"],
  ["|2|", 0, 1, /Bars are not part/],
  ["±1/2", 0, 1, /± stands for two values/],
  ["5 : 3", 2, 1, /ratio/],
  ["50%", 2, 1, /percentage/],
  ["3!", 1, 1, /Factorials/],
  ["1;2", 1, 1, /a claim of its own/],
  ["0,5", 1, 1, /with a point/, "0.5"],
  ["1, 2", 1, 1, /a claim of its own/],
  ["'1/2'", 0, 1, /without quotation marks/, "1/2"],
  ["\\sqrt{2/15}", 0, 1, /not LaTeX/, "sqrt(2/15)"],
  ["\\frac{1}{2}", 0, 1, /not LaTeX/, "1/2"],
  ["0.5... + 1", 3, 3, /only at the end of a decimal/],
  ["½...", 1, 3, /only at the end of a decimal/],
  ["1.2.3", 3, 2, /a sign such as \* is missing/],
  [".", 0, 1, /before digits/],
  ["2⁺", 1, 1, /raised digits/],
  ["1\u00002", 1, 1, /U\+0000/],
  ["\ud8001", 0, 1, /U\+D800/],
];

const LIMITS: readonly [name: string, typed: string, says: RegExp][] = [
  ["a million digits", "1".repeat(1_000_000), /at most 4000 are read/],
  ["a million parentheses", "(".repeat(1_000_000), /at most 4000 are read/],
  ["a thousand digits", "1".repeat(1_000), /up to 200 digits/],
  ["a hundred parentheses", "(".repeat(100), /nested more than 40 deep/],
  ["five hundred terms", "1+".repeat(500) + "1", /more than 400 numbers and signs/],
  [
    "many long numbers",
    `${"9".repeat(150)}*${"9".repeat(150)}*${"9".repeat(150)}`,
    /more than 400 digits together/,
  ],
  ["2^(2^31)", "2^(2^31)", /Exponents up to 64/],
  ["9^(9^8)", "9^(9^8)", /Exponents up to 64/],
  ["towers of powers", "((9^64)^64)^64", /grows past/],
  ["1e999", "1e999", /larger than 64/],
  ["a sum of roots to a high power", "(sqrt(2)+sqrt(3)+sqrt(5)+sqrt(7)+sqrt(11))^60", /grows past/],
];

describe("quantities that cannot be read", () => {
  it.each(QUANTITIES)("%j at %i", (typed, at, length, says, suggestion) => {
    const read = readQuantity(typed, DEFAULT_CONVENTIONS);
    expect(read.ok).toBe(false);
    if (read.ok) return;
    expect(read.error.says).toMatch(says);
    expect([read.error.at, read.error.length]).toEqual([at, length]);
    expect(read.error.suggestion).toBe(suggestion);
  });
});

describe("values that cannot be read", () => {
  it.each(VALUES)("%j at %i", (typed, at, length, says, suggestion) => {
    const read = readValue(typed, DEFAULT_CONVENTIONS);
    expect(read.ok).toBe(false);
    if (read.ok) return;
    expect(read.error.says).toMatch(says);
    expect([read.error.at, read.error.length]).toEqual([at, length]);
    expect(read.error.suggestion).toBe(suggestion);
  });

  it("offers both readings where two are possible", () => {
    const read = readValue("1/2 sqrt(3)", DEFAULT_CONVENTIONS);
    expect(!read.ok && [read.error.suggestion, read.error.alternative]).toEqual([
      "1/2*sqrt(3)",
      "1/(2*sqrt(3))",
    ]);
    const power = readValue("2^3/2", DEFAULT_CONVENTIONS);
    expect(!power.ok && [power.error.suggestion, power.error.alternative]).toEqual(["2^(3/2)", "(2^3)/2"]);
  });

  it.each(LIMITS)("%s passes a stated limit", (_name, typed, says) => {
    const read = readValue(typed, DEFAULT_CONVENTIONS);
    expect(!read.ok && read.error.limit).toBe(true);
    expect(!read.ok && read.error.says).toMatch(says);
  });
});
