import { showHalf, type Twice } from "@/lib/symbols/half";
import type { Rule, VanishingReason } from "@/lib/symbols/kinds";

/** A triad of a 6j or 9j symbol: three angular momenta that couple, with the names of their entries. */
export type Triad = { names: readonly [string, string, string]; entries: readonly [Twice, Twice, Twice] };

/** Picks the triads of a symbol by the places of their entries. */
export function triadsOf(
  places: readonly (readonly [number, number, number])[],
  names: readonly string[],
  entries: readonly Twice[],
): Triad[] {
  return places.map(([x, y, z]) => ({
    names: [names[x] as string, names[y] as string, names[z] as string],
    entries: [entries[x] as Twice, entries[y] as Twice, entries[z] as Twice],
  }));
}

/** Whether the triangle of a triad closes, with the numbers put in. */
export function triangleRule({ names, entries }: Triad): Rule {
  const negative = entries.findIndex((j) => j < 0);
  if (negative >= 0) {
    return {
      holds: false,
      says: `${names[negative]} = ${show(entries[negative] as Twice)} is negative, which no angular momentum is`,
    };
  }
  const longest = entries.indexOf(Math.max(...entries) as Twice);
  const others = [0, 1, 2].filter((n) => n !== longest) as [number, number];
  const sum = (entries[others[0]] as number) + (entries[others[1]] as number);
  const holds = (entries[longest] as number) <= sum;
  const [a, b, c] = [names[longest], names[others[0]], names[others[1]]];
  return {
    holds,
    says: `${a} = ${show(entries[longest] as Twice)} ${holds ? "≤" : ">"} ${b} + ${c} = ${show(sum as Twice)}`,
  };
}

/** Whether the sum of a triad is whole, with the numbers put in. */
export function integerRule({ names, entries }: Triad): Rule {
  const sum = entries[0] + entries[1] + entries[2];
  const holds = sum % 2 === 0;
  return {
    holds,
    says: `${names.join(" + ")} = ${show(sum as Twice)} is ${holds ? "an integer" : "not an integer"}`,
  };
}

/** The rules of all triads: triangles first, then whole sums. */
export function triadRules(triads: readonly Triad[]): Rule[] {
  return [...triads.map(triangleRule), ...triads.map(integerRule)];
}

/** The broken ones among the rules of all triads, as reasons why the symbol is 0. */
export function brokenTriads(triads: readonly Triad[]): VanishingReason[] {
  const triangles = triads.map(triangleRule).filter((r) => !r.holds);
  const integers = triads.map(integerRule).filter((r) => !r.holds);
  return [
    ...triangles.map((r): VanishingReason => ({
      rule: "triangle",
      says: `A triangle is broken: ${r.says}.`,
    })),
    ...integers.map((r): VanishingReason => ({
      rule: "sum-not-integer",
      says: `The j's of a triad do not fit together: ${r.says}.`,
    })),
  ];
}

function show(doubled: Twice): string {
  return showHalf(doubled).replace("-", "−");
}
