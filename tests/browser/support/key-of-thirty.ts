import { toText } from "@/lib/symbols/exact-print";
import { multiply, negate, type Exact } from "@/lib/symbols/exact";
import { twice } from "@/lib/symbols/half";
import { evaluate, type Quantity } from "@/lib/symbols/quantity";
import { quantityText } from "@/lib/symbols/quantity-print";

type Row = { ref: string; quantity: string; claimed: string; problem: string };

/** All 3j symbols (j1 j2 j3; m1 m2 m3) of a triad that do not vanish, in the order of their projections. */
function symbols(j1: number, j2: number, j3: number): Quantity[] {
  const list: Quantity[] = [];
  for (let m1 = -j1; m1 <= j1; m1++)
    for (let m2 = -j2; m2 <= j2; m2++) {
      const m3 = -m1 - m2;
      if (Math.abs(m3) > j3) continue;
      const quantity: Quantity = { kind: "3j", args: [j1, j2, j3, m1, m2, m3].map(twice) };
      if (evaluate(quantity).terms.length > 0) list.push(quantity);
    }
  return list;
}

/**
 * Thirty claims over two triads, computed here by the engine; five of them are made wrong: three signs, one square for
 * the value, one digit. The references of the wrong ones are given back as well.
 */
export function keyOfThirty(): { csv: string; rows: Row[]; wrong: string[] } {
  const wrong = new Map<number, (value: Exact) => Exact>([
    [2, negate],
    [8, (value) => multiply(value, value)],
    [13, negate],
    [21, negate],
    [26, (value) => multiply(value, value)],
  ]);
  const rows = [...symbols(2, 2, 3), ...symbols(2, 3, 4)].slice(0, 30).map((quantity, i): Row => {
    const exact = evaluate(quantity);
    const value = wrong.get(i)?.(exact) ?? exact;
    const problem = `4.${2 + Math.floor(i / 10)}`;
    return {
      ref: `${problem}(${String.fromCharCode(97 + (i % 10))})`,
      quantity: quantityText(quantity, "j1m1j2m2"),
      claimed: toText(value),
      problem,
    };
  });
  const csv = [
    "ref,quantity,claimed,problem",
    ...rows.map((row) => `${row.ref},${row.quantity},${row.claimed},${row.problem}`),
  ];
  return { csv: csv.join("\r\n") + "\r\n", rows, wrong: [...wrong.keys()].map((i) => rows[i]!.ref) };
}
