import {
  asRational,
  equals,
  imaginaryPart,
  isReal,
  negate,
  realPart,
  isZero,
  type Exact,
} from "@/lib/symbols/exact";
import { toLatex } from "@/lib/symbols/exact-print";
import { evaluate, quantityLatex, type Quantity } from "@/lib/symbols/quantity";
import { BUDGET } from "./budget";
import type { Conventions } from "./conventions";
import { digitSlip } from "./digit-slips";
import { elementOptions } from "./element-slips";
import { asClaimedDecimal, judgeDecimal } from "./rounding-slips";
import type { ClaimedValue } from "./read-value";
import { asSignedRoot, keyOf, type SignedRoot } from "./signed-root";
import type { Option } from "./slip-option";
import { SLIPS, type Slip, type SlipId } from "./slips";
import { valueOptions } from "./value-slips";

/** An explanation is called likely only when at most so many of such matches would come about by accident. */
const ACCIDENTS = 0.012;
/** How much rarer two slips at once are than their priors say. */
const TOGETHER = 0.05;
/** A pair is not offered at all when it would match a random value more often than this. */
const WORTH_TELLING = 0.2;
const MOST_OFFERED = 3;

type Found = { options: Option[]; weight: number; pair: boolean };

/**
 * Which known slips turn the true value of the quantity into the claimed one: each alone, then in pairs. At most three,
 * the most probable first; an empty list is a good answer. `text` is the claimed value as typed, for misprinted digits.
 */
export function diagnose(
  quantity: Quantity,
  claimed: ClaimedValue,
  conventions: Conventions,
  text = "",
  truth: Exact = evaluate(quantity),
): Slip[] {
  const rounding = roundingSlip(quantity, claimed, conventions, truth);
  if (rounding) return [rounding];
  const context: Context = { quantity, claimed, conventions, text, truth };
  const value = asSignedRoot(truth);
  const matches = matcher(claimed);
  if (!value || !matches) return [...underRoot(context), ...misprint(context, 0)].slice(0, MOST_OFFERED);

  const setting = { quantity, value, conventions };
  const small = quantity.args.every((arg) => Math.abs(arg) <= BUDGET.diagnosedTwice);
  const elements = small ? elementOptions(setting) : [];
  const laws = valueOptions(setting);
  const alone = [...laws, ...elements].sort((x, y) => y.weight - x.weight);
  const found: Found[] = [];
  const direct = alone.filter((option) => matches(option.value));
  const [best] = direct;
  if (best) found.push({ options: direct, weight: best.weight, pair: false });
  const lottery = numberOfValues(claimed);
  const slips: Slip[] = found.map((each) => tell(context, each, accidents(alone, each.weight, lottery)));

  const digit = misprint(context, direct.length === 0 ? alone.length : 0);
  const [first] = slips;
  if (first && digit[0]) first.causes.push("digit-slip");
  else slips.push(...digit);
  if (slips[0]?.certainty === "likely") return slips;

  const pairs = pairsOf(setting, laws, elements).sort((x, y) => y.weight - x.weight);
  const together = pairs.filter(({ value }) => matches(value));
  for (const pair of distinct(together).slice(0, MOST_OFFERED)) {
    const expected = (pairs.indexOf(pair) + alone.length) / lottery;
    if (expected > WORTH_TELLING) break;
    slips.push(tell(context, { options: pair.options, weight: pair.weight, pair: true }, expected));
  }
  return slips.slice(0, MOST_OFFERED);
}

type Context = {
  quantity: Quantity;
  claimed: ClaimedValue;
  conventions: Conventions;
  text: string;
  truth: Exact;
};
type Pair = { options: [Option, Option]; weight: number; value: SignedRoot };

function pairsOf(
  setting: { quantity: Quantity; value: SignedRoot; conventions: Conventions },
  laws: readonly Option[],
  elements: readonly Option[],
): Pair[] {
  const pairs: Pair[] = [];
  const push = (first: Option, quantity: Quantity) => {
    for (const second of valueOptions({ ...setting, quantity, value: first.value })) {
      if (second.family === first.family || first.family === "print" || first.family === "sign") continue;
      pairs.push({
        options: [first, second],
        weight: first.weight * second.weight * TOGETHER,
        value: second.value,
      });
    }
  };
  for (const law of laws) push(law, setting.quantity);
  // Where the symbol itself vanishes, only a misread symbol is worth a second slip.
  const misread =
    setting.value.sign === 0 ? elements.filter(({ ids }) => ids[0] !== "neighbour-entry") : elements;
  for (const element of misread) push(element, element.element ?? setting.quantity);
  return pairs;
}

/** One pair for each combination of slips; the order of the two does not make them different. */
function distinct(pairs: readonly Pair[]): Pair[] {
  const seen = new Set<string>();
  return pairs.filter(({ options }) => {
    const key = options
      .map((option) => option.ids[0])
      .sort()
      .join("+");
    return !seen.has(key) && seen.add(key);
  });
}

/** How many of the candidates that were at least as probable would match a random simple value by accident. */
function accidents(candidates: readonly Option[], weight: number, lottery: number): number {
  const keys = new Set(candidates.filter((each) => each.weight >= weight).map((each) => keyOf(each.value)));
  return keys.size / lottery;
}

/**
 * Among how many values a random wrong one is drawn: signed roots of fractions with numerator and denominator up to the
 * larger of those claimed (their number grows as 1.2·H²), or decimals of so many places between −1 and 1.
 */
function numberOfValues(claimed: ClaimedValue): number {
  if (claimed.kind === "decimal") return 2 * 10 ** Math.min(claimed.places, 12);
  const square = asSignedRoot(claimed.exact);
  if (!square || square.sign === 0) return 50;
  const height = Number(square.n > square.d ? square.n : square.d);
  return Math.max(1_500, 1.2 * height * height);
}

/** Tests whether a candidate is the claimed value; null when the claimed value is no signed root. */
function matcher(claimed: ClaimedValue): ((value: SignedRoot) => boolean) | null {
  if (claimed.kind === "exact") {
    const own = asSignedRoot(claimed.exact);
    if (!own) return null;
    const key = keyOf(own);
    return (value) => keyOf(value) === key;
  }
  const q = asRational(claimed.exact);
  if (!q) return null;
  const sign = q.n === 0n ? 0 : Number(q.s);
  const scale = 2n * 10n ** BigInt(claimed.places);
  const middle = (q.n * scale) / q.d;
  const [low, high] = [middle - 1n, middle + (claimed.cut ? 2n : 1n)];
  return ({ sign: s, n, d }) => {
    if (s !== sign || s === 0) return false;
    const size = n * scale * scale;
    return size >= low * low * d && size <= high * high * d;
  };
}

function tell(context: Context, { options, pair }: Found, expected: number): Slip {
  const [first, second] = options as [Option, Option | undefined];
  const start = quantityLatex(context.quantity, context.conventions.cgOrder);
  const ids = [...new Set(options.flatMap((option) => option.ids))];
  const certainty = expected <= ACCIDENTS ? "likely" : "possible";
  const claimed = claimedLatex(context.claimed);
  if (pair && second) {
    const inner = first.relation(start);
    const whole =
      first.whole && !second.whole
        ? `${inner},\\quad ${second.relation("\\,\\cdot\\,")}`
        : second.relation(inner);
    return {
      causes: ids,
      says: `Two slips together give this value: ${brief(first)}, and ${brief(second)}.`,
      formulaLatex: second.whole ? whole : `${whole} ${claimed}`,
      certainty,
    };
  }
  const others = ids.filter((id) => !first.ids.includes(id));
  const also =
    others.length === 0
      ? ""
      : `; the same value also comes from: ${others.map((id) => SLIPS[id].name).join(", ")}`;
  return {
    causes: ids,
    says: `${capital(first.clause())}${also}.`,
    formulaLatex: first.whole ? first.relation(start) : `${first.relation(start)} ${claimed}`,
    certainty,
  };
}

const brief = (option: Option) => (option.brief ?? option.clause)();

/** "= √…", or "≈ 0.36…" for a decimal. */
function claimedLatex(claimed: ClaimedValue): string {
  return claimed.kind === "decimal" ? `\\approx ${decimalText(claimed)}` : `= ${toLatex(claimed.exact)}`;
}

function decimalText(claimed: ClaimedValue & { kind: "decimal" }): string {
  const minus = claimed.tree.type === "negative" ? "-" : "";
  const leaf = claimed.tree.type === "negative" ? claimed.tree.of : claimed.tree;
  return minus + (leaf.type === "number" ? leaf.text : "");
}

function roundingSlip(
  quantity: Quantity,
  claimed: ClaimedValue,
  { cgOrder }: Conventions,
  truth: Exact,
): Slip | null {
  if (claimed.kind !== "decimal" || isZero(truth)) return null;
  const judged = judgeDecimal(claimed, truth);
  if (judged !== "cut-off" && judged !== "rounded-wrongly") return null;
  if (claimed.digits < 2 && judged === "rounded-wrongly") return null;
  const right = asClaimedDecimal(claimed, truth);
  const causes: SlipId[] = judged === "cut-off" ? ["cut-off", "rounded-wrongly"] : ["rounded-wrongly"];
  return {
    causes,
    says:
      judged === "cut-off"
        ? `The digits were cut off; rounded to ${places(claimed.places)} the value is ${right}.`
        : `The last digit is rounded wrongly; rounded to ${places(claimed.places)} the value is ${right}.`,
    formulaLatex: `${quantityLatex(quantity, cgOrder)} = ${toLatex(truth)} \\approx ${right} \\ne ${decimalText(claimed)}`,
    certainty: claimed.digits >= 3 ? "likely" : "possible",
  };
}

function places(count: number): string {
  return count === 1 ? "1 decimal" : `${count} decimals`;
}

/** √(−a) where −√a belongs: the claimed value is ±i times the size of the true one. */
function underRoot({ quantity, claimed, conventions, truth }: Context): Slip[] {
  if (isReal(claimed.exact) || !isZero(realPart(claimed.exact))) return [];
  const size = imaginaryPart(claimed.exact);
  if (!equals(size, truth) && !equals(size, negate(truth))) return [];
  return [
    {
      causes: ["sign-under-root"],
      says: "The minus sign stands under the root, which makes the value imaginary; every coefficient is real, and the sign belongs before the root.",
      formulaLatex: `${quantityLatex(quantity, conventions.cgOrder)} = ${toLatex(truth)} \\ne ${toLatex(claimed.exact)}`,
      certainty: "likely",
    },
  ];
}

/** One digit of the claimed value put right gives the true value. */
function misprint({ quantity, claimed, conventions, text, truth }: Context, others: number): Slip[] {
  if (isZero(truth) || text === "") return [];
  const slip = digitSlip(text, claimed, truth);
  if (!("meant" in slip)) return [];
  const expected = (slip.tried + others) / numberOfValues(claimed);
  return [
    {
      causes: ["digit-slip"],
      says: `One digit is wrong: with ${slip.meant} in place of ${slip.typed} the value is right.`,
      formulaLatex: `${quantityLatex(quantity, conventions.cgOrder)} = ${toLatex(truth)} \\ne ${claimedLatex(claimed).replace(/^\S+ /, "")}`,
      certainty: expected <= ACCIDENTS ? "likely" : "possible",
    },
  ];
}

/** Capitalises a sentence, unless it begins with a name such as m3. */
function capital(sentence: string): string {
  if (/^[jm]\d/.test(sentence)) return sentence;
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}
