import { Op } from "sequelize";
import { gate } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { conventionsAt } from "@/lib/works/conventions-at";
import type { Conventions } from "@/lib/verify/conventions";
import { Chapter, Claim, Finding, Flag, Problem, Run, User } from "@/models";
import type { Verdict } from "@/models/finding";
import { FINDING_COLUMNS, toFindingShown, type FindingShown } from "./finding-view";
import { galleyPages, type Stretch } from "./galley-pages";
import { proposeRef } from "./propose-ref";
import { readClaim, type ClaimReading } from "./reading";
import { keyOf } from "./text";

export type GalleyClaim = {
  id: string;
  ref: string;
  version: number;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  withdrawn: boolean;
  claimant: string;
  reading: ClaimReading;
  verdict: Verdict | null;
  finding: FindingShown | null;
  flag: FlagShown | null;
};

export type FlagShown = { id: string; state: "open" | "settled"; assignee: string | null };

export type GalleyProblem = {
  id: string;
  label: string;
  statement: string;
  version: number;
  /** Whether the problem began on an earlier page. */
  continued: boolean;
  /** Whether it goes on over the next page. */
  continues: boolean;
  first: boolean;
  last: boolean;
  total: number;
  proposedRef: string;
  claims: GalleyClaim[];
};

export type Galley = {
  work: { id: string; title: string };
  chapter: { id: string; number: number; title: string };
  conventions: Conventions;
  may: { edit: boolean; upload: boolean; run: boolean; readFlags: boolean };
  strip: { id: string; ref: string; verdict: Verdict | null; page: number }[];
  withdrawn: number;
  unchecked: number;
  problems: GalleyProblem[];
  problemCount: number;
  page: number;
  pages: number;
  lastRun: { id: string; state: string; at: string } | null;
};

type LightClaim = Pick<Claim, "id" | "ref" | "problemId" | "verdict" | "withdrawnAt">;

/**
 * One page of a chapter's galley: its problems with their claims, each with the finding on its current version, and
 * the whole chapter as a strip. The number of queries does not depend on the number of claims.
 * @param wanted the page, from 1; what is out of range is brought into it
 * @throws AppError not_found
 */
export async function getGalley(
  workId: string,
  chapterId: string,
  user: SessionUser,
  wanted: number | { claimId: string } = 1,
): Promise<Galley> {
  const access = await gate(user, "chapter.read", workId, { chapterId });
  if (!isId(chapterId)) throw notFound();
  const chapter = await Chapter.findOne({ where: { id: chapterId, workId } });
  if (!chapter) throw notFound();
  const [conventions, problems, light, lastRun] = await Promise.all([
    conventionsAt(workId, access.work.conventionsVersion),
    Problem.findAll({
      attributes: ["id", "label", "version"],
      where: { chapterId },
      order: [
        ["position", "ASC"],
        ["id", "ASC"],
      ],
    }),
    Claim.findAll({
      attributes: ["id", "ref", "problemId", "verdict", "withdrawnAt"],
      where: { chapterId },
      order: [
        ["position", "ASC"],
        ["id", "ASC"],
      ],
      raw: true,
    }) as Promise<LightClaim[]>,
    Run.findOne({
      attributes: ["id", "state", "createdAt"],
      where: { workId, chapterId: { [Op.or]: [chapterId, null] } },
      order: [["createdAt", "DESC"]],
    }),
  ]);
  const byProblem = new Map<string, LightClaim[]>(problems.map(({ id }) => [id, []]));
  for (const claim of light) byProblem.get(claim.problemId)?.push(claim);
  const pages = galleyPages(problems.map(({ id }) => ({ id, claims: byProblem.get(id)?.length ?? 0 })));
  const pageOf = pagesByClaim(pages, byProblem);
  const asked = typeof wanted === "number" ? wanted : (pageOf.get(wanted.claimId) ?? 1);
  const page = Math.min(pages.length, Math.max(1, Math.trunc(asked) || 1));
  const stretches = pages[page - 1] ?? [];
  const shown = stretches.flatMap(({ problemId, from, to }) =>
    (byProblem.get(problemId) ?? []).slice(from, to),
  );
  const [statements, claims] = await Promise.all([
    statementsOf(stretches.map(({ problemId }) => problemId)),
    loadClaims(
      shown.map(({ id }) => id),
      conventions,
    ),
  ]);

  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  const subject = { chapterId };
  const standing = problems
    .flatMap(({ id }) => byProblem.get(id) ?? [])
    .filter((claim) => claim.withdrawnAt === null);
  const taken = new Set(light.map(({ ref }) => keyOf(ref)));
  return {
    work: { id: workId, title: access.work.title },
    chapter: { id: chapter.id, number: chapter.number, title: chapter.title },
    conventions,
    may: {
      edit: can(person, "claim.edit", subject),
      upload: can(person, "source.upload", subject),
      run: can(person, "run.start", subject),
      readFlags: can(person, "flag.read", subject),
    },
    strip: standing.map(({ id, ref, verdict }) => ({ id, ref, verdict, page: pageOf.get(id) ?? 1 })),
    withdrawn: light.length - standing.length,
    unchecked: standing.filter(({ verdict }) => verdict === null).length,
    problems: stretches.map(({ problemId, from, to }) => {
      const at = problems.findIndex(({ id }) => id === problemId);
      const { label = "", version = 0 } = problems[at] ?? {};
      const all = byProblem.get(problemId) ?? [];
      return {
        id: problemId,
        label,
        version,
        statement: statements.get(problemId) ?? "",
        continued: from > 0,
        continues: to < all.length,
        first: at === 0,
        last: at === problems.length - 1,
        total: all.length,
        proposedRef: proposeRef(
          label,
          all.map(({ ref }) => ref),
          (key) => taken.has(key),
        ),
        claims: all.slice(from, to).flatMap(({ id }) => claims.get(id) ?? []),
      };
    }),
    problemCount: problems.length,
    page,
    pages: pages.length,
    lastRun: lastRun && { id: lastRun.id, state: lastRun.state, at: lastRun.createdAt.toISOString() },
  };
}

function pagesByClaim(
  pages: readonly Stretch[][],
  byProblem: ReadonlyMap<string, LightClaim[]>,
): Map<string, number> {
  const found = new Map<string, number>();
  pages.forEach((stretches, i) => {
    for (const { problemId, from, to } of stretches)
      for (const { id } of (byProblem.get(problemId) ?? []).slice(from, to)) found.set(id, i + 1);
  });
  return found;
}

async function statementsOf(ids: string[]): Promise<Map<string, string>> {
  const rows = await Problem.findAll({ attributes: ["id", "statement"], where: { id: ids } });
  return new Map(rows.map(({ id, statement }) => [id, statement]));
}

type WithRelated = Claim & { finding?: Finding | null; claimant?: User };

/** The claims in full, by id, each with its finding and its newest flag. */
async function loadClaims(ids: string[], conventions: Conventions): Promise<Map<string, GalleyClaim>> {
  const [rows, flags] = await Promise.all([
    Claim.findAll({
      where: { id: ids },
      include: [
        { model: Finding, as: "finding", attributes: [...FINDING_COLUMNS] },
        { model: User, as: "claimant", attributes: ["name"] },
      ],
    }) as Promise<WithRelated[]>,
    newestFlags(ids),
  ]);
  return new Map(
    rows.map((row) => [
      row.id,
      {
        id: row.id,
        ref: row.ref,
        version: row.version,
        quantity: row.quantity,
        claimed: row.claimed,
        note: row.note,
        page: row.page,
        withdrawn: row.withdrawnAt !== null,
        claimant: row.claimant?.name ?? "",
        reading: readClaim(row.quantity, row.claimed, conventions),
        verdict: row.verdict,
        finding: toFindingShown(row.finding),
        flag: flags.get(row.id) ?? null,
      },
    ]),
  );
}

/** The newest open or settled flag of each claim. */
export async function newestFlags(claimIds: string[]): Promise<Map<string, FlagShown>> {
  const rows = (await Flag.findAll({
    attributes: ["id", "claimId", "state"],
    where: { claimId: claimIds, state: ["open", "settled"] },
    include: [{ model: User, as: "assignee", attributes: ["name"] }],
    order: [["createdAt", "ASC"]],
  })) as (Flag & { assignee?: User | null })[];
  return new Map(
    rows.map((flag) => [
      flag.claimId,
      {
        id: flag.id,
        state: flag.state === "open" ? "open" : "settled",
        assignee: flag.assignee?.name ?? null,
      },
    ]),
  );
}
