import type { Quantity } from "@/lib/symbols/quantity";
import { evaluate } from "@/lib/symbols/quantity";
import type { Twice } from "@/lib/symbols/half";
import { asSignedRoot, squarePart, type SignedRoot } from "@/lib/verify/signed-root";

/** A small generator with a seed, so that a failure can be repeated. */
export function randomFrom(seed: number) {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
  const whole = (low: number, high: number) => low + Math.floor(next() * (high - low + 1));
  const pick = <T>(items: readonly T[]): T => items[whole(0, items.length - 1)] as T;
  return { next, whole, pick };
}
export type Random = ReturnType<typeof randomFrom>;

/** A 3j symbol or CG coefficient with j ≤ largest that obeys all selection rules and does not vanish. */
export function nonZero(
  random: Random,
  largest: number,
  kind?: Quantity["kind"],
): { quantity: Quantity; value: SignedRoot } {
  for (;;) {
    const quantity = allowed(random, largest, kind ?? random.pick(["3j", "cg"] as const));
    const value = asSignedRoot(evaluate(quantity));
    if (value && value.sign !== 0) return { quantity, value };
  }
}

function allowed(random: Random, largest: number, kind: Quantity["kind"]): Quantity {
  const a = random.whole(0, 2 * largest);
  const b = random.whole(0, 2 * largest);
  const steps = (Math.min(a + b, 2 * largest) - Math.abs(a - b)) / 2;
  const c = Math.abs(a - b) + 2 * random.whole(0, Math.max(0, Math.floor(steps)));
  for (;;) {
    const x = -a + 2 * random.whole(0, a);
    const y = -b + 2 * random.whole(0, b);
    if (Math.abs(x + y) > c) continue;
    const args = kind === "3j" ? [a, b, c, x, y, -(x + y)] : [a, x, b, y, c, x + y];
    return { kind, args: args.map((n) => (n === 0 ? 0 : n) as Twice) };
  }
}

/** The value typed in one of many equal forms. */
export function anyForm(random: Random, value: SignedRoot): string {
  const { sign, n, d } = value;
  if (sign === 0) return random.pick(["0", "0/3", "-0", "0*sqrt(2)", "1-1", "0.0"]);
  const above = squarePart(n);
  const below = squarePart(d);
  const g = BigInt(random.whole(2, 9));
  const rational = above.inside === 1n && below.inside === 1n;
  const size = random.pick([
    () => `sqrt(${n}/${d})`,
    () => `sqrt(${n * g}/${d * g})`,
    () => `sqrt(${n})/sqrt(${d})`,
    () => `sqrt(${n * d})/${d}`,
    () => `${above.outside}*sqrt(${above.inside})/(${below.outside} sqrt(${below.inside}))`,
    () => `${above.outside} sqrt(${above.inside * below.inside}) / ${below.outside * below.inside}`,
    () => `(${n}/${d})^(1/2)`,
    () => `(${d}/${n})^(-1/2)`,
    () => `√(${n}/${d})`,
    () => `${g}*sqrt(${n}/${d * g * g})`,
    () => `(sqrt(${n}/${d}) + ${g})-${g}`,
    () => `1/√(${d}/${n})`,
    () => (rational ? `${above.outside}/${below.outside}` : `√${n} ÷ √${d}`),
    () => (rational ? `${above.outside * g}/${below.outside * g}` : `sqrt(${n}) · ${d}⁻¹ × √${d}`),
  ])();
  if (sign > 0) return size;
  const product = !/ [+-]|\)-/.test(size);
  return product && random.next() < 0.6 ? `${random.pick(["-", "−", "- "])}${size}` : `-(${size})`;
}
