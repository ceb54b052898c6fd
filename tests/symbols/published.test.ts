import { describe, expect, it } from "vitest";
import { equals } from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { checked, variants, type Kind } from "@/lib/symbols/quantity";
import { exactOf, rows, symbol, type Row } from "./data";

/** What differs between a row and the engine, as lines of text; an empty list is expected. */
function differences(list: readonly Row[]): string[] {
  return list.flatMap((row) => {
    const { value } = checked(symbol(row.kind as Kind, row.args));
    const expected = exactOf(row.value);
    return equals(value, expected)
      ? []
      : [
          `${row.kind} ${row.args.join(" ")}: ${toText(value)}, ${row.source ?? "oracle"} has ${toText(expected)}`,
        ];
  });
}

describe("published 3j and CG values (handbooks, papers and manuals, named in each row)", () => {
  const published = rows("published.jsonl", "3j", "cg");

  it("has them all", () => {
    expect(published.filter((r) => r.kind === "3j")).toHaveLength(143);
    expect(published.filter((r) => r.kind === "cg")).toHaveLength(754);
  });

  it("agrees with every one, by both routes", () => {
    expect(differences(published)).toEqual([]);
  });

  it("shows the misprints to be misprints", () => {
    const slips = published.filter((r) => r.match === false);
    expect(slips.map((r) => `${r.kind} ${r.args.join(" ")}`)).toEqual([
      "cg 3/2 3/2 3/2 -3/2 0 0", // VMK Table 8.11, two rows merged by a transcription
      "cg 1/2 1/2 1 -1 1/2 -1/2", // courseshub.world 1.1, signs of the other order of coupling
      "cg 1/2 -1/2 1 0 1/2 -1/2", // the same page
      "3j 2 1 1 0 0 0", // worked example for ⟨2‖C¹‖1⟩, sign
    ]);
    for (const row of slips) {
      if (!row.printed) throw new Error("A misprint has a printed value.");
      const { value } = checked(symbol(row.kind as Kind, row.args));
      expect(equals(value, exactOf(row.printed)), row.args.join(" ")).toBe(false);
    }
  });

  it("gives the printed sign for the other order of coupling where that was the slip", () => {
    // PDG note: ⟨j1 j2 m1 m2|J M⟩ = (−1)^(J−j1−j2) ⟨j2 j1 m2 m1|J M⟩
    for (const row of published.filter((r) => r.match === false && r.note?.includes("order"))) {
      const [a, x, b, y, c, z] = row.args as [string, string, string, string, string, string];
      const swapped = checked(symbol("cg", [b, y, a, x, c, z])).value;
      expect(equals(swapped, exactOf(row.printed ?? row.value))).toBe(true);
    }
  });
});

describe("oracle rows (SymPy 1.11 exact, with GSL and an independent rational code)", () => {
  const open = rows("oracle-open.jsonl", "3j", "cg");

  it("agrees with all 700 3j and 500 CG, by both routes", () => {
    expect(open.filter((r) => r.kind === "3j")).toHaveLength(700);
    expect(open.filter((r) => r.kind === "cg")).toHaveLength(500);
    expect(differences(open)).toEqual([]);
  });

  it("agrees with itself on every symmetry of every tenth of them", () => {
    for (const row of open.filter((_, n) => n % 10 === 0)) {
      const list = variants(symbol(row.kind as Kind, row.args));
      expect(list.filter((v) => !v.agrees)).toEqual([]);
    }
  });
});
