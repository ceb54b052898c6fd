import { accidentalReason } from "@/lib/symbols/accidental";
import { showHalf, type Twice } from "@/lib/symbols/half";
import type { Kind, Quantity, Rule, VanishingReason } from "@/lib/symbols/kinds";
import { quantityText } from "@/lib/symbols/quantity-print";
import {
  applyElement,
  classicalImage,
  ELEMENTS,
  phaseOf,
  quantityOf,
  threeJEntries,
  type Element,
} from "@/lib/symbols/regge";
import { racahParts, reggeSquare, type ThreeJ } from "@/lib/symbols/three-j";

const NAMES: Record<Kind, { j: readonly string[]; m: readonly string[] }> = {
  "3j": { j: ["j1", "j2", "j3"], m: ["m1", "m2", "m3"] },
  cg: { j: ["j1", "j2", "J"], m: ["m1", "m2", "M"] },
};

/** The projections as they are written: the last one of a CG is M = −m3. */
function written(kind: Kind, [, , , x, y, z]: ThreeJ): Twice[] {
  return [x, y, kind === "3j" ? z : (-z as Twice)];
}

/** Whether |m| ≤ j, with the numbers put in. */
function rangeRules(kind: Kind, entries: ThreeJ): Rule[] {
  const { j: jn, m: mn } = NAMES[kind];
  return written(kind, entries).map((m, n) => {
    const j = entries[n] as Twice;
    const holds = Math.abs(m) <= Math.abs(j);
    return { holds, says: `|${mn[n]}| = ${show(Math.abs(m))} ${holds ? "≤" : ">"} ${jn[n]} = ${show(j)}` };
  });
}

function kindRules(kind: Kind, entries: ThreeJ): Rule[] {
  const { j: jn, m: mn } = NAMES[kind];
  return written(kind, entries).map((m, n) => {
    const j = entries[n] as Twice;
    const holds = (j - m) % 2 === 0;
    return {
      holds,
      says: `${jn[n]} − ${mn[n]} = ${show(j - m)} is ${holds ? "an integer" : "not an integer"}`,
    };
  });
}

function sumRule(kind: Kind, entries: ThreeJ): Rule {
  const [x, y, z] = written(kind, entries) as [Twice, Twice, Twice];
  if (kind === "3j") {
    const holds = x + y + z === 0;
    return { holds, says: `m1 + m2 + m3 = ${show(x + y + z)}${holds ? "" : ", not 0"}` };
  }
  const holds = x + y === z;
  return { holds, says: `m1 + m2 = ${show(x + y)} ${holds ? "=" : "≠"} M = ${show(z)}` };
}

function triangleRules(kind: Kind, entries: ThreeJ): Rule[] {
  const jn = NAMES[kind].j;
  const [a, b, c] = entries;
  const negative = [a, b, c].flatMap((j, n): Rule[] =>
    j < 0 ? [{ holds: false, says: `${jn[n]} = ${show(j)} is negative, which no angular momentum is` }] : [],
  );
  if (negative.length > 0) return negative;
  const side = (n: number, one: number, two: number): Rule => {
    const [j, k, l] = [entries[n], entries[one], entries[two]] as [Twice, Twice, Twice];
    const holds = j <= k + l;
    return {
      holds,
      says: `${jn[n]} = ${show(j)} ${holds ? "≤" : ">"} ${jn[one]} + ${jn[two]} = ${show(k + l)}`,
    };
  };
  return [side(0, 1, 2), side(1, 0, 2), side(2, 0, 1)];
}

function integerRule(kind: Kind, [a, b, c]: ThreeJ): Rule {
  const holds = (a + b + c) % 2 === 0;
  return {
    holds,
    says: `${NAMES[kind].j.join(" + ")} = ${show(a + b + c)} is ${holds ? "an integer" : "not an integer"}`,
  };
}

/** The selection rules in the order in which an author checks them, with the numbers put in. */
export function selectionRules(q: Quantity): Rule[] {
  const entries = threeJEntries(q);
  return [
    ...rangeRules(q.kind, entries),
    ...kindRules(q.kind, entries),
    sumRule(q.kind, entries),
    ...triangleRules(q.kind, entries),
    integerRule(q.kind, entries),
  ];
}

/**
 * Every reason why a symbol is 0, in the order in which an author checks them; [] when it is not 0. Parity by one of the 12 classical
 * symmetries is named before parity that only a Regge symmetry shows; "accidental" stands alone, with the terms that cancel.
 */
export function whyZero(q: Quantity): VanishingReason[] {
  const { kind } = q;
  const entries = threeJEntries(q);
  const broken = (rule: VanishingReason["rule"], rules: Rule[], says: (r: Rule) => string) =>
    rules.filter((r) => !r.holds).map((r): VanishingReason => ({ rule, says: says(r) }));
  const reasons: VanishingReason[] = [
    ...broken(
      "projection-range",
      rangeRules(kind, entries),
      (r) => `A projection is out of range: ${r.says}.`,
    ),
    ...broken(
      "projection-kind",
      kindRules(kind, entries),
      (r) => `A projection does not belong to its j: ${r.says}.`,
    ),
    ...broken("projection-sum", [sumRule(kind, entries)], (r) => `The projections do not add up: ${r.says}.`),
    ...broken("triangle", triangleRules(kind, entries), (r) => `The triangle is broken: ${r.says}.`),
    ...broken(
      "sum-not-integer",
      [integerRule(kind, entries)],
      (r) => `The j's do not fit together: ${r.says}.`,
    ),
  ];
  const parity = parityReason(q, entries);
  if (parity) reasons.push(parity);
  if (reasons.length > 0) return reasons;
  const parts = racahParts(reggeSquare(entries) as number[]);
  return parts.total === 0n ? [accidentalReason("Racah's sum", parts.terms)] : [];
}

function parityReason(q: Quantity, entries: ThreeJ): VanishingReason | null {
  const [a, b, c] = entries;
  if ((a + b + c) % 4 !== 2) return null; // the sum of the j's is not an odd integer
  const sum = (a + b + c) / 2;
  const square = reggeSquare(entries);
  const fixes = (e: Element) =>
    e.classical
      ? classicalImage(e, entries).every((n, k) => n === entries[k])
      : square !== null && applyElement(e, square).every((n, k) => n === square[k]);
  const odd = BY_SIMPLICITY.find((e) => phaseOf(e, sum) === -1 && fixes(e));
  if (!odd) return null;
  const read =
    q.kind === "3j"
      ? ""
      : `This is the 3j symbol ${quantityText(quantityOf("3j", entries))} times a factor. `;
  const sumName = NAMES["3j"].j.join("+");
  return {
    rule: odd.classical ? "parity" : "regge-parity",
    says: `${read}${odd.does.replace(/\.$/, "")}; this gives the same symbol again times (−1)^(${sumName}) = (−1)^${sum} = −1, so it equals its own negative.`,
  };
}

/** The plainest symmetry explains best: reversal alone, then one exchange of columns, then both, then Regge's. */
const BY_SIMPLICITY: readonly Element[] = [...ELEMENTS].sort((a, b) => plainness(a) - plainness(b));

function plainness(e: Element): number {
  return e.name === "projections reversed" ? 0 : (e.classical ? 1 : 1_000) + e.name.length;
}

function show(doubled: number): string {
  return showHalf(doubled as Twice).replace("-", "−");
}
