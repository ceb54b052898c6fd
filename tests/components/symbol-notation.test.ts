import { describe, expect, it } from "vitest";

import {
  cellAfter,
  cellAt,
  cellNames,
  cellsOf,
  kindOf,
  negated,
  notationOf,
} from "@/components/symbol-notation";

describe("cells and typed notation", () => {
  it.each([
    ["3j", "(1 1 2; 0 0 0)", ["1", "1", "2", "0", "0", "0"]],
    ["3j", "(1/2,1/2,1;1/2,-1/2,0)", ["1/2", "1/2", "1", "1/2", "-1/2", "0"]],
    ["3j", "(½ 1½ 2; −½ ½ 0)", ["1/2", "3/2", "2", "-1/2", "1/2", "0"]],
    ["3j", "\\begin{pmatrix} 1 & 1 & 2 \\\\ 0 & 0 & 0 \\end{pmatrix}", ["1", "1", "2", "0", "0", "0"]],
    [
      "3j",
      "\\left(\\begin{matrix}\\frac{3}{2}&\\tfrac12&1\\\\ -\\frac32&\\frac12&1\\end{matrix}\\right)",
      ["3/2", "1/2", "1", "-3/2", "1/2", "1"],
    ],
    ["cg", "<1 0 1 0 | 2 0>", ["1", "0", "1", "0", "2", "0"]],
    ["cg", "⟨1/2 1/2 1/2 −1/2 | 0 0⟩", ["1/2", "1/2", "1/2", "-1/2", "0", "0"]],
    ["cg", "\\langle 1\\,0\\,1\\,0\\,|\\,2\\,0\\rangle", ["1", "0", "1", "0", "2", "0"]],
  ] as const)("%s reads %s", (kind, text, cells) => {
    expect(cellsOf(kind, text)).toEqual(cells);
    expect(kindOf(text)).toBe(kind);
  });

  it.each(["", "(1 1; 0 0)", "(1 1 2 0 0 0)", "<1 0 1 0 2 0>", "sqrt(2)", "(1 1 2; 0 0 0 0)"])(
    "does not read %s",
    (text) => {
      expect(cellsOf("3j", text)).toBeNull();
      expect(cellsOf("cg", text)).toBeNull();
    },
  );

  it("prints what it read", () => {
    expect(notationOf("3j", ["1", "1", "2", "0", "0", "0"])).toBe("(1 1 2; 0 0 0)");
    expect(notationOf("cg", ["1", "0", "1", "0", "2", "0"])).toBe("<1 0 1 0 | 2 0>");
    expect(notationOf("cg", ["", "", "", "", "", ""])).toBe("");
  });

  it("finds the cell of every offset it printed", () => {
    for (const kind of ["3j", "cg"] as const) {
      const cells = ["1/2", "3/2", "21", "-1/2", "0", "-3"];
      const text = notationOf(kind, cells);
      cells.forEach((cell, i) => {
        const at = cells.slice(0, i).reduce((from, before) => text.indexOf(before, from) + before.length, 0);
        expect(cellAt(kind, cells, text.indexOf(cell, at))).toBe(i);
      });
      expect(cellAt(kind, cells, 0)).toBeNull();
    }
  });

  it("names the cells by the order of the work", () => {
    expect(cellNames("cg", "j1m1j2m2")).toEqual(["j1", "m1", "j2", "m2", "J", "M"]);
    expect(cellNames("cg", "j1j2m1m2")).toEqual(["j1", "j2", "m1", "m2", "J", "M"]);
  });
});

describe("one cell", () => {
  it.each([
    ["", "/", "1/2"],
    ["3", "3/", "3/2"],
    ["-", "-/", "-1/2"],
    ["3/2", "3/22", "3/2"],
    ["3/2", "3/", "3"],
    ["1", "1.5", "3/2"],
    ["", ".5", "1/2"],
    ["-0", "-0.5", "-1/2"],
    ["", "½", "1/2"],
    ["1", "1½", "3/2"],
    ["", "−1", "-1"],
    ["1", "1x", "1"],
    ["1", "12", "12"],
    ["1", "", ""],
  ])("holding %j, after %j is typed, holds %j", (before, typed, after) => {
    expect(cellAfter(before, typed)).toBe(after);
  });

  it("changes its sign and back", () => {
    expect(negated("1/2")).toBe("-1/2");
    expect(negated("-1/2")).toBe("1/2");
  });
});
