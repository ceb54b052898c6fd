import { describe, expect, it } from "vitest";
import { toText } from "@/lib/symbols/exact-print";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";
import { readValue } from "@/lib/verify/read-value";

/** Typed value and the exact value that it is read as, in typed notation. */
const READINGS: readonly [typed: string, value: string][] = [
  ["0", "0"],
  ["1", "1"],
  ["-1", "-1"],
  ["+1", "1"],
  ["−1", "-1"],
  ["–1", "-1"],
  ["  7  ", "7"],
  ["007", "7"],
  ["1/2", "1/2"],
  ["-1/2", "-1/2"],
  ["1 / 2", "1/2"],
  ["2/4", "1/2"],
  ["1⁄2", "1/2"],
  ["1÷2", "1/2"],
  ["½", "1/2"],
  ["-½", "-1/2"],
  ["1½", "3/2"],
  ["⅔", "2/3"],
  ["2⅓", "7/3"],
  ["½ √3", "sqrt(3)/2"],
  ["1/2/3", "1/6"],
  ["sqrt(2/15)", "sqrt(30)/15"],
  ["√(2/15)", "sqrt(30)/15"],
  ["√2/15", "sqrt(2)/15"],
  ["sqrt( 2 / 15 )", "sqrt(30)/15"],
  ["-sqrt(2/15)", "-sqrt(30)/15"],
  ["sqrt(2)/sqrt(15)", "sqrt(30)/15"],
  ["√2/√15", "sqrt(30)/15"],
  ["sqrt(30)/15", "sqrt(30)/15"],
  ["(1/15)*sqrt(30)", "sqrt(30)/15"],
  ["1/15*sqrt(30)", "sqrt(30)/15"],
  ["2√2/3", "2*sqrt(2)/3"],
  ["2 sqrt(2)/3", "2*sqrt(2)/3"],
  ["2*sqrt(2)/3", "2*sqrt(2)/3"],
  ["2·√2/3", "2*sqrt(2)/3"],
  ["2×√2/3", "2*sqrt(2)/3"],
  ["(2)(3)", "6"],
  ["√2√3", "sqrt(6)"],
  ["√2 √3", "sqrt(6)"],
  ["√½", "sqrt(2)/2"],
  ["1/(2 sqrt(3))", "sqrt(3)/6"],
  ["1/(2√3)", "sqrt(3)/6"],
  ["-1/√3", "-sqrt(3)/3"],
  ["√5/(2√7)", "sqrt(35)/14"],
  ["2√2/√(3·7)", "2*sqrt(42)/21"],
  ["-47/(2·2·3·5·7)", "-47/420"],
  ["sqrt(8)", "2*sqrt(2)"],
  ["sqrt(4)", "2"],
  ["sqrt(0)", "0"],
  ["sqrt(-2)", "i*sqrt(2)"],
  ["sqrt(sqrt(16))", "2"],
  ["sqrt(3+2*sqrt(2))", "1 + sqrt(2)"],
  ["2^3", "8"],
  ["2^-1", "1/2"],
  ["2^(1/2)", "sqrt(2)"],
  ["2^1/2", "sqrt(2)"],
  ["30^-1/2", "sqrt(30)/30"],
  ["30^(-1/2)", "sqrt(30)/30"],
  ["30^(-½)", "sqrt(30)/30"],
  ["30^-½", "sqrt(30)/30"],
  ["30⁻¹", "1/30"],
  ["30⁻¹/2", "1/60"],
  ["2^3 / 2", "4"],
  ["2²", "4"],
  ["√2³", "2*sqrt(2)"],
  ["(2/3)^(3/2)", "2*sqrt(6)/9"],
  ["(-1)^(1-1-1) sqrt(5)", "-sqrt(5)"],
  ["-2^2", "-4"],
  ["(-2)^2", "4"],
  ["2*-3", "-6"],
  ["1+sqrt(2)", "1 + sqrt(2)"],
  ["1 - sqrt(2)/2", "1 - sqrt(2)/2"],
  ["(1+√2)(1−√2)", "-1"],
  ["1/(1+√2)", "-1 + sqrt(2)"],
  ["sqrt(2)+sqrt(8)", "3*sqrt(2)"],
  ["pi", "pi"],
  ["π", "pi"],
  ["sqrt(5/(4 pi))", "sqrt(5)/(2*sqrt(pi))"],
  ["1/√(4π)", "1/(2*sqrt(pi))"],
  ["2π", "2*pi"],
  ["i", "i"],
  ["-i/√2", "-i*sqrt(2)/2"],
  ["i^2", "-1"],
  ["2 i √3", "2*i*sqrt(3)"],
  ["0.5", "1/2"],
  [".5", "1/2"],
  ["-.030738", "-15369/500000"],
  ["1.000001", "1000001/1000000"],
  ["0.3651483717", "3651483717/10000000000"],
  ["3.65e-1", "73/200"],
  ["0.5*sqrt(2)", "sqrt(2)/2"],
  ["9007199254740993", "9007199254740993"],
  ["0.12345678901234567890123", "12345678901234567890123/100000000000000000000000"],
];

describe("typed values", () => {
  it.each(READINGS)("%s is %s", (typed, value) => {
    const read = readValue(typed, DEFAULT_CONVENTIONS);
    expect(read.ok ? toText(read.value.exact) : read.error.says).toBe(value);
  });

  it("has at least eighty of them", () => expect(READINGS.length).toBeGreaterThan(80));

  it("keeps the digits of a decimal", () => {
    const read = readValue("-0.0307", DEFAULT_CONVENTIONS);
    expect(read.ok && read.value).toMatchObject({ kind: "decimal", places: 4, digits: 3, cut: false });
    const dots = readValue("0.3651...", DEFAULT_CONVENTIONS);
    expect(dots.ok && dots.value).toMatchObject({ kind: "decimal", places: 4, cut: true });
  });

  it("prints the value in the form in which it was typed", () => {
    const latex = (typed: string) => {
      const read = readValue(typed, DEFAULT_CONVENTIONS);
      return read.ok ? read.latex : read.error.says;
    };
    expect(latex("sqrt(2/15)")).toBe("\\sqrt{\\frac{2}{15}}");
    expect(latex("-√2/2")).toBe("-\\frac{\\sqrt{2}}{2}");
    expect(latex("2 sqrt(3)/3")).toBe("\\frac{2 \\sqrt{3}}{3}");
    expect(latex("30^(-1/2)")).toBe("30^{-1/2}");
    expect(latex("2*3")).toBe("2 \\cdot 3");
    expect(latex("½")).toBe("\\frac{1}{2}");
    expect(latex("(1+√2)^2")).toBe("\\left(1 + \\sqrt{2}\\right)^{2}");
    expect(latex("0.3651...")).toBe("0.3651\\ldots");
  });
});

describe("values by the conventions", () => {
  const read = (typed: string, change: Partial<Conventions>) => {
    const reading = readValue(typed, { ...DEFAULT_CONVENTIONS, ...change });
    return reading.ok ? toText(reading.value.exact) : reading.error.says;
  };

  it("understands a root over plain fractions where the sheet says so", () => {
    expect(read("-8/15", { impliedRoot: true })).toBe("-2*sqrt(30)/15");
    expect(read("1/2", { impliedRoot: true })).toBe("sqrt(2)/2");
    expect(read("1", { impliedRoot: true })).toBe("1");
    expect(read("0", { impliedRoot: true })).toBe("0");
    expect(read("2/15", { houseForm: "signed-square" })).toBe("sqrt(30)/15");
  });

  it("takes a written root or a decimal as it stands", () => {
    expect(read("sqrt(2/15)", { impliedRoot: true })).toBe("sqrt(30)/15");
    expect(read("-0.5", { impliedRoot: true })).toBe("-1/2");
  });

  it("reads a decimal comma only where the sheet says so", () => {
    expect(read("0,3651", { decimalMark: "," })).toBe("3651/10000");
    expect(read("0.5", { decimalMark: "," })).toBe("1/2");
    expect(read("0,3651", {})).toContain("write decimals with a point");
  });
});
