import { describe, expect, it } from "vitest";
import { showHalf } from "@/lib/symbols/half";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";

function read(typed: string, change: Partial<Conventions> = {}): string {
  const reading = readQuantity(typed, { ...DEFAULT_CONVENTIONS, ...change });
  if (!reading.ok) return reading.error.says;
  return `${reading.quantity.kind} ${reading.quantity.args.map((t) => showHalf(t)).join(" ")}`;
}

const READINGS: readonly [typed: string, tree: string][] = [
  ["(1 1 2; 0 0 0)", "3j 1 1 2 0 0 0"],
  ["(1,1,2;0,0,0)", "3j 1 1 2 0 0 0"],
  ["(1, 1, 2; 0, 0, 0)", "3j 1 1 2 0 0 0"],
  ["  (1 1 2;0 0 0)  ", "3j 1 1 2 0 0 0"],
  ["( 1 1 2 ; 0 0 0 )", "3j 1 1 2 0 0 0"],
  ["(1\t1\t2;\n0 0 0)", "3j 1 1 2 0 0 0"],
  ["（1 1 2；0 0 0）", "3j 1 1 2 0 0 0"],
  ["(1 1 2; 1 -1 0)", "3j 1 1 2 1 -1 0"],
  ["(1 1 2; 1 −1 0)", "3j 1 1 2 1 -1 0"],
  ["(1 1 2; 1 –1 0)", "3j 1 1 2 1 -1 0"],
  ["(1 1 2; +1 -1 0)", "3j 1 1 2 1 -1 0"],
  ["(1 1 2; 1,-1,0)", "3j 1 1 2 1 -1 0"],
  ["(1/2 1/2 1; 1/2 -1/2 0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(½ ½ 1; ½ -½ 0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(½ ½ 1; ½ −½ 0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(½,½,1;½,-½,0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(0.5 .5 1; 0.5 -0.5 0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(0.5 .5 1.0; 0.5 -.5 0.0)", "3j 1/2 1/2 1 1/2 -1/2 0"],
  ["(1½ 1 ½; ½ 0 -½)", "3j 3/2 1 1/2 1/2 0 -1/2"],
  ["(3/2 1 1/2; 1/2 0 -1/2)", "3j 3/2 1 1/2 1/2 0 -1/2"],
  ["(3⁄2 1 1⁄2; 1⁄2 0 -1⁄2)", "3j 3/2 1 1/2 1/2 0 -1/2"],
  ["(1.5 1 0.5; 0.5 0 -0.5)", "3j 3/2 1 1/2 1/2 0 -1/2"],
  ["(4/2 1 1; 0 0 0)", "3j 2 1 1 0 0 0"],
  ["(2/1 1 1; 0 0 0)", "3j 2 1 1 0 0 0"],
  ["(2 1 1; -0 0 0)", "3j 2 1 1 0 0 0"],
  ["(02 1 1; 0 0 0)", "3j 2 1 1 0 0 0"],
  ["(30 30 30; 15 -30 15)", "3j 30 30 30 15 -30 15"],
  ["(1 1 9; 0 0 0)", "3j 1 1 9 0 0 0"],
  ["(1 1 1; 1/2 0 0)", "3j 1 1 1 1/2 0 0"],
  ["(1 1 1; 5 -5 0)", "3j 1 1 1 5 -5 0"],
  ["(0 0 0; 0 0 0)", "3j 0 0 0 0 0 0"],
  ["<1 0 1 0 | 2 0>", "cg 1 0 1 0 2 0"],
  ["<1 0 1 0|2 0>", "cg 1 0 1 0 2 0"],
  ["<1,0,1,0|2,0>", "cg 1 0 1 0 2 0"],
  ["<1 0, 1 0 | 2 0>", "cg 1 0 1 0 2 0"],
  ["<1 0; 1 0 | 2 0>", "cg 1 0 1 0 2 0"],
  ["<1, 0; 1, 0 | 2, 0>", "cg 1 0 1 0 2 0"],
  ["⟨1 0 1 0 | 2 0⟩", "cg 1 0 1 0 2 0"],
  ["⟨1 0 1 0 ∣ 2 0⟩", "cg 1 0 1 0 2 0"],
  ["〈1 0 1 0|2 0〉", "cg 1 0 1 0 2 0"],
  ["<1/2 1/2 1/2 -1/2 | 0 0>", "cg 1/2 1/2 1/2 -1/2 0 0"],
  ["<½ ½ ½ −½ | 0 0>", "cg 1/2 1/2 1/2 -1/2 0 0"],
  ["<½ ½; ½ −½ | 0 0>", "cg 1/2 1/2 1/2 -1/2 0 0"],
  ["<3/2 -1/2 1 1 | 5/2 1/2>", "cg 3/2 -1/2 1 1 5/2 1/2"],
  ["<1.5 -.5 1 1 | 2.5 .5>", "cg 3/2 -1/2 1 1 5/2 1/2"],
  ["<1 0 1 0 | 1 1 2 0>", "cg 1 0 1 0 2 0"],
  ["<1 0; 1 0 | 1 1; 2 0>", "cg 1 0 1 0 2 0"],
  ["<1 0 2 1 | 1 2 3 1>", "cg 1 0 2 1 3 1"],
  ["<1/2 1/2 1 0 | 1/2 1 3/2 1/2>", "cg 1/2 1/2 1 0 3/2 1/2"],
  ["<2 2 1 -1 | 2 1>", "cg 2 2 1 -1 2 1"],
  ["<2 2 1 -1 | 9 1>", "cg 2 2 1 -1 9 1"],
];

const OTHER_ORDER: readonly [typed: string, tree: string][] = [
  ["<1 1 0 0 | 2 0>", "cg 1 0 1 0 2 0"],
  ["<1 1; 0 0 | 2 0>", "cg 1 0 1 0 2 0"],
  ["⟨1 2 0 1 | 3 1⟩", "cg 1 0 2 1 3 1"],
  ["<1 2 0 1 | 1 2 3 1>", "cg 1 0 2 1 3 1"],
  ["<1/2 1 1/2 -1 | 1/2 -1/2>", "cg 1/2 1/2 1 -1 1/2 -1/2"],
  ["(1 1 2; 0 0 0)", "3j 1 1 2 0 0 0"],
];

const COMMA: readonly [typed: string, tree: string][] = [
  ["(1,5 1 0,5; 0,5 0 -0,5)", "3j 3/2 1 1/2 1/2 0 -1/2"],
  ["(1, 1, 2; 0, 0, 0)", "3j 1 1 2 0 0 0"],
  ["<0,5 0,5 0,5 -0,5 | 0 0>", "cg 1/2 1/2 1/2 -1/2 0 0"],
  ["(1.5 1 0.5; 0.5 0 -0.5)", "3j 3/2 1 1/2 1/2 0 -1/2"],
];

describe("typed quantities", () => {
  it.each(READINGS)("%s is %s", (typed, tree) => expect(read(typed)).toBe(tree));
  it.each(OTHER_ORDER)("%s in the order j1 j2 m1 m2 is %s", (typed, tree) =>
    expect(read(typed, { cgOrder: "j1j2m1m2" })).toBe(tree),
  );
  it.each(COMMA)("%s with a decimal comma is %s", (typed, tree) =>
    expect(read(typed, { decimalMark: "," })).toBe(tree),
  );
  it("has at least sixty of them", () =>
    expect(READINGS.length + OTHER_ORDER.length + COMMA.length).toBeGreaterThanOrEqual(60));

  it("prints the symbol as it is set in type, in the order of the sheet", () => {
    const reading = readQuantity("<1 2 0 1 | 3 1>", { ...DEFAULT_CONVENTIONS, cgOrder: "j1j2m1m2" });
    expect(reading.ok && reading.latex).toBe("\\left\\langle 1\\,2\\,0\\,1 \\middle| 3\\,1 \\right\\rangle");
  });
});
