import { settledNow, type ClaimState } from "@/lib/keys/key-claims";

/** Why a claim still keeps the key from being frozen. */
export type Hindrance = "open-flag" | "reword" | "unchecked" | "old-conventions" | "unsettled" | "undecided";

export type SheetInForce = { version: number; since: Date };

/**
 * Whether a claim is fit for a key, or what hinders it: it is when it is withdrawn, confirmed as it now stands under the
 * conventions now in force, let stand by a stet on this version, or undecided with a waiver on this version.
 */
export function hindranceOf(state: ClaimState, sheet: SheetInForce): Hindrance | null {
  const { claim, openFlag, waiver } = state;
  if (claim.withdrawnAt !== null) return null;
  if (openFlag) return "open-flag";
  const settled = settledNow(state);
  if (settled?.settlement.word === "reword") return "reword";
  if (claim.verdict === null) return "unchecked";
  if (underOldConventions(state, sheet)) return "old-conventions";
  if (settled?.settlement.word === "stet") return null;
  if (claim.verdict === "undecided") return waiver ? null : "undecided";
  return claim.verdict === "confirmed" || claim.verdict === "confirmed-not-house-form" ? null : "unsettled";
}

/** A verdict of a run is as old as the sheet it used; one that settling gave, as old as the settlement. */
function underOldConventions(state: ClaimState, sheet: SheetInForce): boolean {
  if (state.judgedUnder !== null) return state.judgedUnder !== sheet.version;
  const settled = settledNow(state)?.settlement;
  return settled ? settled.createdAt < sheet.since : false;
}
