import { setImmediate } from "node:timers/promises";

import { AppError } from "@/lib/errors";
import { settledNow, type ClaimState } from "@/lib/keys/key-claims";
import type { Conventions } from "@/lib/verify/conventions";
import { verifyClaim, type Finding } from "@/lib/verify/verify-claim";

/** What each claim of a key was found to be, by its id. */
export type Recheck = {
  conventions: Conventions;
  byText: Map<string, Finding>;
  byClaim: Map<string, Finding>;
};

const textOf = ({ quantity, claimed }: { quantity: string; claimed: string }) =>
  `${quantity}\u0000${claimed}`;

/**
 * Recomputes every claim that will stand in the key. A key rests on no stored verdict: what a run confirmed must be
 * confirmed again by the program that freezes it.
 * @param known an earlier pass, so that little is left to do while the claims are locked
 * @throws AppError conflict naming the claims that are no longer confirmed
 */
export async function recheckAll(
  states: readonly ClaimState[],
  conventions: Conventions,
  known?: Recheck,
): Promise<Recheck> {
  const usable = known && JSON.stringify(known.conventions) === JSON.stringify(conventions);
  const byText = usable ? known.byText : new Map<string, Finding>();
  const byClaim = new Map<string, Finding>();
  const fallen: string[] = [];
  let fresh = 0;
  for (const state of states) {
    const { claim } = state;
    if (claim.withdrawnAt !== null) continue;
    const text = textOf(claim);
    const finding =
      byText.get(text) ??
      verifyClaim({ ref: claim.ref, quantity: claim.quantity, claimed: claim.claimed }, conventions, {
        slips: false,
      });
    if (!byText.has(text)) {
      byText.set(text, finding);
      fresh += 1;
      if (fresh % 20 === 0) await setImmediate();
    }
    byClaim.set(claim.id, finding);
    if (known && needsConfirming(state) && !isConfirmed(finding)) fallen.push(claim.ref);
  }
  if (fallen.length > 0)
    throw new AppError(
      "conflict",
      `Recomputed for this key, ${fallen.slice(0, 5).join(", ")}${fallen.length > 5 ? " and others" : ""} ${fallen.length === 1 ? "is" : "are"} no longer confirmed. Start a run and settle what it finds.`,
      { details: { refs: fallen.slice(0, 50) } },
    );
  return { conventions, byText, byClaim };
}

function needsConfirming(state: ClaimState): boolean {
  return state.claim.verdict !== "undecided" && settledNow(state)?.settlement.word !== "stet";
}

const isConfirmed = ({ verdict }: Finding) =>
  verdict === "confirmed" || verdict === "confirmed-not-house-form";
