import { Op } from "sequelize";
import { Claim, Finding, Flag } from "@/models";
import type { Verdict } from "@/models/finding";
import { typeset } from "@/lib/typeset/typeset";

/** How many of what turned up a run's page lists; the rest is in the review queue. */
export const MOST_FOUND = 200;

/** Verdicts that need a second author. */
export const WRONG: Verdict[] = ["discrepant", "contradicted", "unreadable"];

/** Something that a run turned up, ready to be drawn. */
export type Found = {
  /** of the finding */
  id: string;
  claimId: string;
  ref: string;
  verdict: Verdict;
  /** null when it could not be read: the text is shown instead */
  quantityHtml: string | null;
  claimedHtml: string | null;
  exactHtml: string | null;
  quantity: string;
  claimed: string;
  /** the likeliest slip in one sentence, or why it cannot be read */
  says: string;
  flagId: string | null;
};

/** Everything wrong that a run has found since a moment, in the order in which it turned up. */
export async function foundSince(
  runId: string,
  since: Date | null,
  skip: ReadonlySet<string>,
): Promise<Found[]> {
  const findings = await Finding.findAll({
    attributes: { exclude: ["evidence"] },
    where: { runId, verdict: { [Op.in]: WRONG }, ...(since && { judgedAt: { [Op.gte]: since } }) },
    include: [{ model: Claim, as: "claim", attributes: ["ref", "quantity", "claimed", "current"] }],
    order: [
      ["judgedAt", "ASC"],
      ["id", "ASC"],
    ],
    limit: MOST_FOUND,
  });
  const fresh = findings.filter(({ id }) => !skip.has(id));
  // A claim that an earlier run found wrong has its flag from then.
  const flags = await Flag.findAll({
    attributes: ["id", "findingId", "claimId"],
    where: {
      [Op.or]: [
        { findingId: fresh.map(({ id }) => id) },
        { openClaimId: fresh.map(({ claimId }) => claimId) },
      ],
    },
    order: [["createdAt", "ASC"]],
  });
  const flagOf = new Map(flags.map((flag) => [flag.claimId, flag.id]));
  return fresh.map((finding) =>
    view(finding as Finding & { claim: Claim }, flagOf.get(finding.claimId) ?? null),
  );
}

type Details = { reading?: { quantityLatex: string; claimedLatex: string } | null } | null;

function view(finding: Finding & { claim: Claim }, flagId: string | null): Found {
  const { claim } = finding;
  const reading = (finding.details as Details)?.reading ?? null;
  const [slip] = (finding.slips as { says: string }[] | null) ?? [];
  return {
    id: finding.id,
    claimId: finding.claimId,
    ref: claim.ref,
    verdict: finding.verdict ?? "undecided",
    quantityHtml: reading && typeset(reading.quantityLatex),
    claimedHtml: reading && typeset(reading.claimedLatex),
    exactHtml: finding.exactLatex === null ? null : typeset(finding.exactLatex, { own: true }),
    quantity: claim.quantity.slice(0, 200),
    claimed: claim.claimed.slice(0, 200),
    says: slip?.says ?? finding.reason ?? "",
    flagId,
  };
}
