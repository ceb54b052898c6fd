import type { VanishingReason } from "@/lib/symbols/quantity";
import type { OtherConvention } from "./other-conventions";
import type { ReadError } from "./read-error";
import type { Slip } from "./slips";

/** What can be said of a claim; the ids are fixed, they stand in files and answers. */
export const VERDICTS = [
  "confirmed",
  "confirmed-not-house-form",
  "discrepant",
  "contradicted",
  "unreadable",
  "undecided",
] as const;
export type Verdict = (typeof VERDICTS)[number];

export type ClaimText = { ref: string; quantity: string; claimed: string };

/** Everything that one verification says of one claim. Plain data, fit for JSON. */
export type Finding = ClaimText & {
  verdict: Verdict;
  /** The recomputed value; null when nothing could be computed. `decimal` has 20 correct significant digits. */
  exact: { text: string; latex: string; decimal: string } | null;
  slips: Slip[];
  place: { file: string; line: number; column: number } | null;
  /** A sentence for people. */
  reason: string;
  reading: { quantityLatex: string; claimedLatex: string } | null;
  errors: ({ field: "quantity" | "claimed" } & ReadError)[];
  houseForm: { text: string; latex: string } | null;
  /** Which orbit the quantity lies in, and what the claim says of that orbit's canonical symbol. */
  orbitKey: string | null;
  canonicalClaim: string | null;
  /** A convention under which a wrong claim would be right. */
  rightUnder: OtherConvention | null;
  zero: VanishingReason[];
  engine: string;
};

/** The part of a finding that the command line and the HTTP interface answer with: a fixed contract. */
export type PublicFinding = Pick<
  Finding,
  "ref" | "quantity" | "claimed" | "verdict" | "exact" | "place" | "reason"
> & {
  slips: Pick<Slip, "causes" | "says" | "certainty">[];
};

export function publicFinding(finding: Finding): PublicFinding {
  const { ref, quantity, claimed, verdict, exact, slips, place, reason } = finding;
  return {
    ref,
    quantity,
    claimed,
    verdict,
    exact,
    slips: slips.map(({ causes, says, certainty }) => ({ causes, says, certainty })),
    place,
    reason,
  };
}

/** Whether a verdict lets a claim stand. */
export function isConfirmed(verdict: Verdict): boolean {
  return verdict === "confirmed" || verdict === "confirmed-not-house-form";
}
