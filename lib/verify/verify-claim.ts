import { divide, isZero, type Exact } from "@/lib/symbols/exact";
import { toDecimal, toDecimalPlaces, toLatex, toText } from "@/lib/symbols/exact-print";
import { RouteDisagreement, TooCostly } from "@/lib/symbols/failures";
import {
  checked,
  orbit,
  quantityText,
  variants,
  whyZero,
  type Quantity,
  type VanishingReason,
} from "@/lib/symbols/quantity";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import { BUDGET } from "./budget";
import type { Conventions } from "./conventions";
import { diagnose } from "./diagnose";
import type { ClaimText, Finding } from "./finding";
import { HOUSE_FORMS, houseFormOf, inHouseForm } from "./house-form";
import { agrees, rightUnder } from "./other-conventions";
import { readQuantity } from "./read-quantity";
import { readValue, type ClaimedValue } from "./read-value";
import { judgeDecimal } from "./rounding-slips";

export { publicFinding, type Finding, type PublicFinding, type Verdict } from "./finding";

export type VerifyOptions = {
  /** Largest j that is worked out; the engine's own limit when left out. Above it the claim is undecided. */
  largestJ?: number;
  /** Whether slips are looked for in a wrong value. */
  slips?: boolean;
};

/** Significant digits of the decimal beside an exact value. */
const DIGITS = 20;

/**
 * Reads one claim, recomputes it by two routes and its symmetry-related symbols each by itself, compares exactly, and says
 * what is wrong and how it came to be wrong.
 * @throws RouteDisagreement when routes or symmetries differ: an alarm about this program, never a verdict
 */
export function verifyClaim(
  claim: ClaimText,
  conventions: Conventions,
  options: VerifyOptions = {},
): Finding {
  const { ref, quantity: quantityTyped, claimed: claimedTyped } = claim;
  const quantity = readQuantity(quantityTyped, conventions);
  const claimed = readValue(claimedTyped, conventions);
  const base: Finding = {
    ref,
    quantity: quantityTyped,
    claimed: claimedTyped,
    verdict: "unreadable",
    exact: null,
    slips: [],
    place: null,
    reason: "",
    reading:
      quantity.ok && claimed.ok ? { quantityLatex: quantity.latex, claimedLatex: claimed.latex } : null,
    errors: [],
    houseForm: null,
    orbitKey: null,
    canonicalClaim: null,
    rightUnder: null,
    zero: [],
    engine: ENGINE_VERSION,
  };
  if (!quantity.ok) base.errors.push({ field: "quantity", ...quantity.error });
  if (!claimed.ok) base.errors.push({ field: "claimed", ...claimed.error });
  const computed = quantity.ok ? compute(quantity.quantity, options) : null;
  if (computed && "value" in computed && quantity.ok) {
    base.exact = printed(computed.value);
    base.houseForm = houseFormOf(computed.value, conventions);
    base.orbitKey = orbit(quantity.quantity).key;
    base.zero = isZero(computed.value) ? whyZero(quantity.quantity) : [];
  }
  if (!quantity.ok || !claimed.ok) {
    const pastLimit = base.errors.every((error) => error.limit);
    return { ...base, verdict: pastLimit ? "undecided" : "unreadable", reason: readingReason(base) };
  }
  if (!computed || !("value" in computed)) {
    return { ...base, verdict: "undecided", reason: computed?.tooCostly ?? "" };
  }
  return judge(
    base,
    { quantity: quantity.quantity, claimed: claimed.value, truth: computed.value },
    conventions,
    options,
  );
}

type Matter = { quantity: Quantity; claimed: ClaimedValue; truth: Exact };

function judge(base: Finding, matter: Matter, conventions: Conventions, options: VerifyOptions): Finding {
  const { quantity, claimed, truth } = matter;
  const right = agrees(claimed, truth);
  const finding = { ...base, canonicalClaim: canonicalClaim(quantity, right ? truth : claimed.exact) };
  if (right) {
    const atHome = inHouseForm(claimed, truth, conventions);
    const verdict = atHome ? "confirmed" : "confirmed-not-house-form";
    return { ...finding, verdict, reason: rightReason(finding, matter, atHome, conventions) };
  }
  const other = rightUnder(base, quantity, conventions);
  const slips = options.slips === false ? [] : diagnose(quantity, claimed, conventions, base.claimed, truth);
  return {
    ...finding,
    verdict: "discrepant",
    slips,
    rightUnder: other,
    reason: wrongReason({ ...finding, slips, rightUnder: other }, matter, conventions),
  };
}

function compute(quantity: Quantity, options: VerifyOptions): { value: Exact } | { tooCostly: string } {
  const largest = Math.max(...quantity.args.map(Math.abs)) / 2;
  if (options.largestJ !== undefined && largest > options.largestJ) {
    return {
      tooCostly: `Here entries up to ${options.largestJ} are worked out, and this symbol has ${largest}.`,
    };
  }
  try {
    const { value } = checked(quantity);
    checkVariants(quantity, value);
    return { value };
  } catch (error) {
    if (error instanceof TooCostly) return { tooCostly: error.message };
    throw error;
  }
}

/**
 * Recomputes every symmetry-related symbol directly and compares it through its phase, while the entries are small.
 * @throws RouteDisagreement naming the first symmetry that does not hold
 */
function checkVariants(quantity: Quantity, value: Exact): void {
  if (quantity.args.some((entry) => Math.abs(entry) > BUDGET.variantsTwice)) return;
  const odd = variants(quantity).find((variant) => !variant.agrees);
  if (!odd) return;
  throw new RouteDisagreement(
    quantityText(quantity, "j1m1j2m2"),
    [
      { name: "directly", text: toText(value) },
      { name: `through “${odd.name}”`, text: toText(odd.value) },
    ],
    ENGINE_VERSION,
  );
}

function printed(value: Exact): { text: string; latex: string; decimal: string } {
  return { text: toText(value), latex: toLatex(value), decimal: toDecimal(value, DIGITS) };
}

/** What the claim says of the canonical symbol of its orbit, so that two claims of one orbit can be compared. */
function canonicalClaim(quantity: Quantity, claimed: Exact): string | null {
  try {
    const text = toText(divide(claimed, orbit(quantity).factor));
    return text.length <= BUDGET.text ? text : null;
  } catch (error) {
    if (error instanceof TooCostly) return null;
    throw error;
  }
}

function readingReason({ errors }: Finding): string {
  return errors
    .map(({ field, at, says }) => {
      const where = `${field === "quantity" ? "In the quantity" : "In the claimed value"}, at character ${at + 1}`;
      return `${where}: ${says}`;
    })
    .join(" ");
}

function rightReason(
  finding: Finding,
  { quantity, claimed, truth }: Matter,
  atHome: boolean,
  conventions: Conventions,
): string {
  const name = quantityText(quantity, conventions.cgOrder);
  const zero = isZero(truth) ? ` ${zeroReason(finding.zero)}` : "";
  if (claimed.kind === "decimal" && judgeDecimal(claimed, truth) === "rounded") {
    const count = claimed.places === 1 ? "1 decimal" : `${claimed.places} decimals`;
    const how = claimed.cut ? `are its first ${count}` : `is that value correctly rounded to ${count}`;
    const house = atHome ? "" : ` ${houseReason(finding, conventions)}`;
    return `The value of ${name} is ${valueText(finding, truth)}, and ${finding.claimed.trim()} ${how}.${house}`;
  }
  if (atHome) return `The value of ${name} is ${valueText(finding, truth)}, as claimed.${zero}`;
  return `The value of ${name} is right.${zero} ${houseReason(finding, conventions)}`;
}

function houseReason({ houseForm }: Finding, conventions: Conventions): string {
  return `In house form, ${HOUSE_FORMS[conventions.houseForm]}, it is ${houseForm?.text ?? ""}.`;
}

function wrongReason(
  finding: Finding,
  { quantity, claimed, truth }: Matter,
  conventions: Conventions,
): string {
  const name = quantityText(quantity, conventions.cgOrder);
  const zero = isZero(truth) ? ` ${zeroReason(finding.zero)}` : "";
  const decimal =
    claimed.kind === "decimal" && !isZero(truth)
      ? ` (${toDecimalPlaces(truth, Math.max(claimed.places, 4))}…)`.replace("…)", ")")
      : "";
  const said =
    claimed.kind === "exact" && claimed.rootUnderstood
      ? `${finding.claimed.trim()} with its root understood`
      : finding.claimed.trim();
  const claimedShort = said.length > 60 ? "the claimed value" : said;
  const other = finding.rightUnder === null ? "" : ` The claim is right ${finding.rightUnder.says}.`;
  return `The value of ${name} is ${valueText(finding, truth)}${decimal}, not ${claimedShort}.${zero}${other}`;
}

function valueText({ exact }: Finding, truth: Exact): string {
  const text = exact?.text ?? toText(truth);
  return text.length > 80 ? toDecimal(truth, DIGITS) : text;
}

function zeroReason(zero: readonly VanishingReason[]): string {
  const [first] = zero;
  if (!first) return "";
  return `It vanishes: ${/[.!]$/.test(first.says) ? first.says : `${first.says}.`}`;
}
