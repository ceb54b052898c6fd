import { readDetails, readSlips } from "@/lib/flags/finding-details";
import { typeset } from "@/lib/typeset/typeset";
import type { Chapter, Claim, Finding, Flag, Settlement, User } from "@/models";
import type { SettleWord } from "@/models/settlement";

type Loaded = Flag & {
  chapter: Chapter;
  claim: Claim;
  finding: Finding;
  claimant: User;
  assignee: User | null;
};

/** One line of the queue: plain data with its formulas already typeset, for the page and for its refreshing. */
export function toFlagRow(flag: Flag, active: Settlement | undefined, userId: string) {
  const { chapter, claim, finding, claimant, assignee } = flag as Loaded;
  const { reading } = readDetails(finding.details);
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
    quantityHtml: reading ? typeset(reading.quantityLatex, { own: true }) : null,
    claimedHtml: reading ? typeset(reading.claimedLatex, { own: true }) : null,
    exactHtml: finding.exactLatex === null ? null : typeset(finding.exactLatex, { own: true }),
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
