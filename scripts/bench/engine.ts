import { fromTwice } from "@/lib/symbols/half";
import { checked, evaluate, variants, type Quantity } from "@/lib/symbols/quantity";
import { time, type Timed } from "./timing";

export type { Timed };

/** Every 3j symbol with j ≤ 6, integer and half-integer, that the selection rules allow; all orders and projections. */
export function allUpToSix(): Quantity[] {
  const list: Quantity[] = [];
  for (let a = 0; a <= 12; a++)
    for (let b = 0; b <= 12; b++)
      for (let c = Math.abs(a - b); c <= Math.min(12, a + b); c += 2)
        for (let x = -a; x <= a; x += 2)
          for (let y = -b; y <= b; y += 2)
            if (Math.abs(x + y) <= c) list.push({ kind: "3j", args: [a, b, c, x, y, -x - y].map(fromTwice) });
  return list;
}

/** The engine's rows of the table, and a sample to be compared with another program. */
export function benchEngine(): { timed: Timed[]; sample: Quantity[]; sampleSeconds: number } {
  const all = allUpToSix();
  const sample = all.filter((_, i) => i % 170 === 0);
  const cg = all.map(({ args: [a, b, c, x, y, z] }): Quantity => ({
    kind: "cg",
    args: [a!, x!, b!, y!, c!, fromTwice(-z!)],
  }));
  const few = sample.slice(0, 40);
  const large: Quantity = { kind: "3j", args: [2000, 2000, 2000, 2, -4, 2].map(fromTwice) };
  return {
    timed: [
      time("3j, j ≤ 6, one route", all.length, () => all.forEach(evaluate)),
      time("Clebsch-Gordan, the same, one route", cg.length, () => cg.forEach(evaluate)),
      time("3j, j ≤ 6, both routes compared", sample.length, () => sample.forEach(checked)),
      time("3j, j ≤ 6, its 72 variants", few.length, () => few.forEach(variants), 5),
      time("3j, j = 1000, one route", 1, () => void evaluate(large), 5),
    ],
    sample,
    sampleSeconds: time("sample", sample.length, () => sample.forEach(evaluate)).median,
  };
}
