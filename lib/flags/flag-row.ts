import { readClaim } from "@/lib/claims/reading";
import { readDetails, readSlips } from "@/lib/flags/finding-details";
import { typeset } from "@/lib/typeset/typeset";
import type { Conventions } from "@/lib/verify/conventions";
import type { Chapter, Claim, Finding, Flag, Settlement, User } from "@/models";
import type { SettleWord } from "@/models/settlement";

type Loaded = Flag & {
  chapter: Chapter;
  claim: Claim;
  finding: Finding;
  claimant: User;
  assignee: User | null;
};

const set = (latex: string | null) => (latex === null ? null : typeset(latex, { own: true }));

/** One line of the queue: plain data with its formulas already typeset, for the page and for its refreshing. */
export function toFlagRow(
  flag: Flag,
  active: Settlement | undefined,
  userId: string,
  conventions: Conventions,
) {
  const { chapter, claim, finding, claimant, assignee } = flag as Loaded;
  // A finding keeps a reading only when both sides could be read; here the side that can is printed all the same.
  const reading =
    readDetails(finding.details).reading ?? readClaim(claim.quantity, claim.claimed, conventions);
  const first = readSlips(finding.slips)[0];
  const settled: SettleWord | null = active?.word ?? null;
  return {
    id: flag.id,
    state: flag.state,
    settled,
    ref: claim.ref,
    chapter: { number: chapter.number, title: chapter.title },
    verdict: finding.verdict as "discrepant" | "contradicted" | "unreadable",
    quantity: claim.quantity,
    claimed: claim.claimed,
    quantityHtml: set(reading.quantityLatex),
    claimedHtml: set(reading.claimedLatex),
    exactHtml: set(finding.exactLatex),
    says: first?.says ?? finding.reason ?? "",
    certainty: first?.certainty ?? null,
    claimant: { id: claimant.id, name: claimant.name },
    assignee: assignee ? { id: assignee.id, name: assignee.name } : null,
    isMine: assignee?.id === userId,
    isOwnClaim: claimant.id === userId,
    raisedAt: flag.createdAt.toISOString(),
  };
}
export type FlagRow = ReturnType<typeof toFlagRow>;
