import { absolute, compare, isReal, rational, sign, subtract, type Exact } from "@/lib/symbols/exact";
import { toDecimalPlaces } from "@/lib/symbols/exact-print";
import type { ClaimedValue } from "./read-value";

type Decimal = ClaimedValue & { kind: "decimal" };

/** How a decimal stands to the true value. */
export type DecimalJudgement = "equal" | "rounded" | "cut-off" | "rounded-wrongly" | "different";

/**
 * Compares a decimal with the true value by exact arithmetic. Ties may be rounded either way. Digits that the author
 * ended with dots are right when they are the first digits of the value, or its rounding.
 */
export function judgeDecimal(claimed: Decimal, truth: Exact): DecimalJudgement {
  if (!isReal(truth)) return "different";
  const difference = absolute(subtract(claimed.exact, truth));
  if (difference.terms.length === 0) return "equal";
  // Zeros alone claim that the value vanishes; they are no rounding of a value that does not.
  if (claimed.digits === 0) return "different";
  const unit = rational(1n, 10n ** BigInt(claimed.places));
  const half = rational(1n, 2n * 10n ** BigInt(claimed.places));
  if (compare(difference, half) <= 0) return "rounded";
  const sameSide = sign(claimed.exact) === sign(truth) || sign(claimed.exact) === 0;
  const short = sameSide && compare(absolute(claimed.exact), absolute(truth)) < 0;
  if (compare(difference, unit) < 0) return short ? (claimed.cut ? "rounded" : "cut-off") : "rounded-wrongly";
  return compare(difference, unit) === 0 ? "rounded-wrongly" : "different";
}

/** The true value with as many decimals as were claimed. */
export function asClaimedDecimal(claimed: Decimal, truth: Exact): string {
  return toDecimalPlaces(truth, claimed.places);
}
