import { readDetails, readSlips } from "@/lib/flags/finding-details";
import { typeset } from "@/lib/typeset/typeset";
import type { Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { readValue } from "@/lib/verify/read-value";
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

/** A finding keeps a reading only when both sides could be read; here the one side that can is printed all the same. */
function readAgain({ quantity, claimed }: Claim, conventions: Conventions) {
  const left = readQuantity(quantity, conventions);
  const right = readValue(claimed, conventions);
  return { quantityLatex: left.ok ? left.latex : null, claimedLatex: right.ok ? right.latex : null };
}

/** One line of the queue: plain data with its formulas already typeset, for the page and for its refreshing. */
export function toFlagRow(
  flag: Flag,
  active: Settlement | undefined,
  userId: string,
  conventions: Conventions,
) {
  const { chapter, claim, finding, claimant, assignee } = flag as Loaded;
  const reading = readDetails(finding.details).reading ?? readAgain(claim, conventions);
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
