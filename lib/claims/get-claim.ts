import { gate } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { proofOf, type Proof } from "@/lib/flags/proof";
import type { Conventions } from "@/lib/verify/conventions";
import { Chapter, Claim, ClaimVersion, Finding, Problem, Source, User } from "@/models";
import type { ClaimOrigin } from "@/models/claim-version";
import type { Verdict } from "@/models/finding";
import { findClaim } from "./find-claim";
import { FINDING_COLUMNS, toFindingShown, type FindingShown } from "./finding-view";
import { newestFlags, type FlagShown } from "./get-galley";
import { readClaim, type ClaimReading } from "./reading";

/** How much history one page shows, newest first. */
const MOST = 100;

export type VersionShown = {
  number: number;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  author: string;
  origin: ClaimOrigin;
  source: { id: string; name: string } | null;
  at: string;
  reading: ClaimReading;
};

export type ClaimView = {
  work: { id: string; title: string };
  chapter: { id: string; number: number; title: string };
  problem: { id: string; label: string; statement: string };
  conventions: Conventions;
  may: { edit: boolean; readFlags: boolean; readSources: boolean };
  claim: {
    id: string;
    ref: string;
    version: number;
    current: number;
    quantity: string;
    claimed: string;
    note: string | null;
    page: string | null;
    withdrawnAt: string | null;
    claimant: string;
    own: boolean;
    verdict: Verdict | null;
    reading: ClaimReading;
  };
  finding: FindingShown | null;
  proof: Proof | null;
  flag: FlagShown | null;
  versions: VersionShown[];
  /** findings of runs, newest first; those of older versions too */
  findings: FindingShown[];
};

/**
 * One claim with all that is known of it: its finding with evidence, its flag, its versions, its findings over runs.
 * @throws AppError not_found
 */
export async function getClaim(workId: string, claimId: string, user: SessionUser): Promise<ClaimView> {
  const { claim, access } = await findClaim(workId, claimId, user);
  await gate(user, "chapter.read", workId, { chapterId: claim.chapterId });
  const [conventions, chapter, problem, claimant, finding, flags, versions, findings] = await Promise.all([
    conventionsAt(workId, access.work.conventionsVersion),
    Chapter.findByPk(claim.chapterId),
    Problem.findByPk(claim.problemId),
    User.findByPk(claim.claimantId, { attributes: ["name"] }),
    claim.findingId ? Finding.findByPk(claim.findingId) : null,
    newestFlags([claim.id]),
    ClaimVersion.findAll({
      where: { claimId },
      include: [{ model: User, as: "author", attributes: ["name"] }],
      order: [["number", "DESC"]],
      limit: MOST,
    }) as Promise<(ClaimVersion & { author?: User })[]>,
    Finding.findAll({
      attributes: [...FINDING_COLUMNS],
      where: { claimId },
      order: [["createdAt", "DESC"]],
      limit: MOST,
    }),
  ]);
  if (!chapter || !problem) throw notFound();
  const sources = await sourcesOf(versions);
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  const subject = { chapterId: claim.chapterId };
  return {
    work: { id: workId, title: access.work.title },
    chapter: { id: chapter.id, number: chapter.number, title: chapter.title },
    problem: { id: problem.id, label: problem.label, statement: problem.statement },
    conventions,
    may: {
      edit: can(person, "claim.edit", subject),
      readFlags: can(person, "flag.read", subject),
      readSources: can(person, "source.upload", subject),
    },
    claim: toClaim(claim, claimant?.name ?? "", user, conventions),
    finding: toFindingShown(finding),
    proof: finding?.verdict ? proofOf(claim.quantity, conventions, finding.evidence) : null,
    flag: flags.get(claim.id) ?? null,
    versions: versions.map((version) => ({
      number: version.number,
      quantity: version.quantity,
      claimed: version.claimed,
      note: version.note,
      page: version.page,
      author: version.author?.name ?? "",
      origin: version.origin,
      source: (version.sourceId && sources.get(version.sourceId)) || null,
      at: version.createdAt.toISOString(),
      reading: readClaim(version.quantity, version.claimed, conventions),
    })),
    findings: findings.flatMap((row) => toFindingShown(row) ?? []),
  };
}

function toClaim(
  claim: Claim,
  claimant: string,
  user: SessionUser,
  conventions: Conventions,
): ClaimView["claim"] {
  const { id, ref, version, current, quantity, claimed, note, page, verdict } = claim;
  return {
    id,
    ref,
    version,
    current,
    quantity,
    claimed,
    note,
    page,
    withdrawnAt: claim.withdrawnAt?.toISOString() ?? null,
    claimant,
    own: claim.claimantId === user.id,
    verdict,
    reading: readClaim(quantity, claimed, conventions),
  };
}

async function sourcesOf(
  versions: readonly ClaimVersion[],
): Promise<Map<string, { id: string; name: string }>> {
  const ids = [...new Set(versions.flatMap(({ sourceId }) => sourceId ?? []))];
  const rows = ids.length > 0 ? await Source.findAll({ attributes: ["id", "name"], where: { id: ids } }) : [];
  return new Map(rows.map(({ id, name }) => [id, { id, name }]));
}
