import { describe, expect, it } from "vitest";
import { fromTwice, halfLatex, readHalf, showHalf, twice } from "@/lib/symbols/half";

describe("half-integers", () => {
  it.each([
    ["2", 4],
    ["3/2", 3],
    ["1.5", 3],
    ["1.50", 3],
    ["2.0", 4],
    ["2.", 4],
    [".5", 1],
    ["½", 1],
    ["1½", 3],
    ["-1/2", -1],
    ["−½", -1],
    ["−1½", -3],
    ["+1", 2],
    ["- 1", -2],
    ["4/2", 4],
    ["3/1", 6],
    ["0", 0],
    ["-0", 0],
    [" 7/2 ", 7],
  ])("reads %s", (text, doubled) => {
    expect(readHalf(text)).toBe(doubled);
  });

  it.each([
    "",
    "-",
    "1/3",
    "0.3",
    "1.25",
    "x",
    "1 1/2",
    "1/0",
    "--1",
    "1e3",
    "½½",
    "/2",
    "9999999",
    "0x1",
    ".",
  ])("does not read %s", (text) => {
    expect(readHalf(text)).toBeNull();
  });

  it("writes what it reads", () => {
    for (let doubled = -9; doubled <= 9; doubled++) {
      const entry = fromTwice(doubled);
      expect(readHalf(showHalf(entry))).toBe(entry);
    }
    expect(showHalf(twice(-0.5))).toBe("-1/2");
    expect(halfLatex(twice(-1.5))).toBe("-\\tfrac{3}{2}");
    expect(halfLatex(twice(2))).toBe("2");
  });

  it.each([0.25, Number.NaN, Number.POSITIVE_INFINITY, 1e9])("refuses %s", (n) => {
    expect(() => twice(n)).toThrow(RangeError);
  });
});
