import { describe, expect, it } from "vitest";
import { equals, negate, ZERO } from "@/lib/symbols/exact";
import { toForm } from "@/lib/symbols/exact-print";
import { readHalf, showHalf, type Twice } from "@/lib/symbols/half";
import { evaluate } from "@/lib/symbols/quantity";
import { exactOf, symbol } from "./data";
import { PDG } from "./pdg-tables";

type Entry = { m1: string; m2: string; J: string; M: string; printed: string };

/** Every entry of a block, as printed. */
function entries(lines: readonly string[]): Entry[] {
  return lines.flatMap((line) => {
    const [M, Js, body] = line.split("|").map((part) => part.trim()) as [string, string, string];
    return body.split(";").flatMap((row) => {
      const [projections, values] = row.split(":") as [string, string];
      const [m1, m2] = projections.trim().split(" ") as [string, string];
      const list = values.trim().split(" ");
      return Js.split(" ").map((J, n) => ({ m1, m2, J, M, printed: list[n] ?? "missing" }));
    });
  });
}

const half = (text: string) => readHalf(text) as Twice;
const reversed = (text: string) => showHalf((half(text) === 0 ? 0 : -half(text)) as Twice);
const printedValue = (printed: string) =>
  printed === "0"
    ? ZERO
    : exactOf({ sign: printed.startsWith("-") ? -1 : 1, square: printed.replace("-", "") });

describe("Particle Data Group tables of Clebsch-Gordan coefficients", () => {
  it.each(Object.entries(PDG))("%s", (block, lines) => {
    const [j1, j2] = block.split(" ") as [string, string];
    for (const e of entries(lines)) {
      const exact = evaluate(symbol("cg", [j1, e.m1, j2, e.m2, e.J, e.M]));
      const where = `<${j1} ${e.m1} ${j2} ${e.m2} | ${e.J} ${e.M}>`;
      expect(toForm(exact, "signed-square", "text"), where).toBe(e.printed);
      // The lower half of the block, by the symmetry printed at the table's foot.
      const mirror = evaluate(symbol("cg", [j1, reversed(e.m1), j2, reversed(e.m2), e.J, reversed(e.M)]));
      const odd = (half(e.J) - half(j1) - half(j2)) % 4 !== 0;
      const expected = printedValue(e.printed);
      expect(equals(mirror, odd ? negate(expected) : expected), `mirror of ${where}`).toBe(true);
    }
  });

  it("are complete: every J and every pair of projections of each M ≥ 0, 321 entries with the mirrored ones", () => {
    let count = 0;
    for (const [block, lines] of Object.entries(PDG)) {
      const [a, b] = block.split(" ").map(half) as [Twice, Twice];
      const expected = new Set<string>();
      for (let M = (a + b) % 2; M <= a + b; M += 2) {
        for (let x = -a; x <= a; x += 2) {
          if (Math.abs(M - x) > b) continue;
          for (let J = Math.max(Math.abs(a - b), M); J <= a + b; J += 2) {
            expected.add([x, M - x, J, M].map((n) => showHalf(n as Twice)).join(" "));
          }
        }
      }
      const typed = entries(lines).map((e) => [e.m1, e.m2, e.J, e.M].join(" "));
      expect(new Set(typed)).toEqual(expected);
      expect(typed).toHaveLength(expected.size);
      count += entries(lines).reduce((n, e) => n + (e.M === "0" ? 1 : 2), 0);
    }
    expect(count).toBe(321);
  });
});
