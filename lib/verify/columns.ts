import type { Quantity } from "@/lib/symbols/quantity";
import { showHalf, type Twice } from "@/lib/symbols/half";

/** A symbol in the six doubled numbers of its 3j symbol, with m3 = −M for a CG coefficient. */
export type Columns = { j: [number, number, number]; m: [number, number, number] };

export function columnsOf({ kind, args }: Quantity): Columns {
  const [a, b, c, d, e, f] = args as readonly number[] as readonly [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return kind === "3j" ? { j: [a, b, c], m: [d, e, f] } : { j: [a, c, e], m: [b, d, -f] };
}

export function fromColumns(kind: Quantity["kind"], { j, m }: Columns): Quantity {
  const [a, b, c] = j;
  const [d, e, f] = m;
  const args = kind === "3j" ? [a, b, c, d, e, f] : [a, d, b, e, c, -f];
  return { kind, args: args.map((x) => (x === 0 ? 0 : x) as Twice) };
}

export const odd = (doubled: number) => Math.abs(doubled) % 4 === 2;
export const show = (doubled: number) => showHalf(doubled as Twice);
/** A number inside an exponent such as 1-1-(-1). */
export const inside = (doubled: number) => (doubled < 0 ? `(${show(doubled)})` : show(doubled));
