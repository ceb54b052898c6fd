import { describe, expect, it } from "vitest";
import { galleyPages } from "@/lib/claims/galley-pages";
import { leadingLabel, proposeRef } from "@/lib/claims/propose-ref";
import { swapNeighbours } from "@/lib/problems/order";

describe("the pages of a galley", () => {
  const problems = (...counts: number[]) => counts.map((claims, i) => ({ id: `p${i}`, claims }));
  const heights = (pages: ReturnType<typeof galleyPages>) =>
    pages.map((page) => page.reduce((sum, { from, to }) => sum + Math.max(1, to - from), 0));

  it("keep a problem whole where it fits, and never hold more lines than a page has", () => {
    const pages = galleyPages(problems(5, 4, 3, 0, 9), 10);
    expect(pages.map((page) => page.map(({ problemId }) => problemId))).toEqual([
      ["p0", "p1"],
      ["p2", "p3"],
      ["p4"],
    ]);
    expect(Math.max(...heights(pages))).toBeLessThanOrEqual(10);
  });

  it("let a long problem go on over the next page and lose none of its claims", () => {
    const pages = galleyPages(problems(2, 25, 1), 10);
    const stretches = pages.flat().filter(({ problemId }) => problemId === "p1");
    expect(stretches).toEqual([
      { problemId: "p1", from: 0, to: 10 },
      { problemId: "p1", from: 10, to: 20 },
      { problemId: "p1", from: 20, to: 25 },
    ]);
  });

  it("are one for an empty chapter", () => expect(galleyPages([])).toEqual([[]]));

  it("hold every claim of any chapter once and in order", () => {
    for (let round = 0; round < 50; round++) {
      const given = problems(...Array.from({ length: round % 9 }, (_, i) => (round * 7 + i * 13) % 31));
      const seen = galleyPages(given, 10).flat();
      for (const { id, claims } of given) {
        const own = seen.filter(({ problemId }) => problemId === id);
        expect(own.flatMap(({ from, to }) => Array.from({ length: to - from }, (_, i) => from + i))).toEqual(
          Array.from({ length: claims }, (_, i) => i),
        );
      }
    }
  });
});

describe("the next reference", () => {
  it.each([
    ["7.3", [], "7.3(a)"],
    ["7.3", ["7.3(a)"], "7.3(b)"],
    ["7.3", ["7.3(a)", "7.3(c)"], "7.3(d)"],
    ["7.3", ["7.3"], "7.3(a)"],
    ["7.3", ["7.3(z)"], "7.3(aa)"],
  ])("of %s after %j is %s", (label, refs, expected) => expect(proposeRef(label, refs)).toBe(expected));

  it("passes over what another problem has taken", () =>
    expect(proposeRef("7.3", [], (key) => key === "7.3(a)")).toBe("7.3(b)"));

  it.each([
    ["7.3(a)", "7.3"],
    ["7.3 (a)", "7.3"],
    ["7.3(a)(ii)", "7.3"],
    ["7.3a", "7.3"],
    ["7.3", "7.3"],
    ["A", "A"],
    ["(a)", "(a)"],
  ])("%s belongs to problem %s", (ref, label) => expect(leadingLabel(ref)).toBe(label));
});

describe("changing places", () => {
  const rows = [0, 1, 2].map((position) => ({ id: "abc"[position] ?? "", position }));
  it("swaps two neighbours and mends gaps on the way", () => {
    expect(swapNeighbours(rows, "b", "earlier")).toEqual([
      { id: "b", position: 0 },
      { id: "a", position: 1 },
    ]);
    expect(
      swapNeighbours(
        rows.map((row) => ({ ...row, position: row.position * 5 })),
        "a",
        "later",
      ),
    ).toEqual([
      { id: "b", position: 0 },
      { id: "a", position: 1 },
      { id: "c", position: 2 },
    ]);
  });
  it("does nothing past an end or for a stranger", () => {
    expect(swapNeighbours(rows, "a", "earlier")).toEqual([]);
    expect(swapNeighbours(rows, "c", "later")).toEqual([]);
    expect(swapNeighbours(rows, "x", "later")).toEqual([]);
  });
});
