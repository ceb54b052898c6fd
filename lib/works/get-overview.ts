import { Op } from "sequelize";
import { gate, visibleChapterRows, visibleChapters, type Access } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { Chapter, Claim, FrozenKey, Membership, Run } from "@/models";
import type { Verdict } from "@/models/finding";
import type { RunState } from "@/models/run";
import { addCounts, countOpenFlags, countVerdicts, type VerdictCounts } from "./counts";
import { nextStep, type NextStep } from "./next-step";

/** Strips are drawn claim by claim up to this many claims a chapter, and this many a page. */
const CELLS_A_CHAPTER = 400;
const CELLS_A_PAGE = 4_000;

export type ChapterView = {
  id: string;
  number: number;
  title: string;
  counts: VerdictCounts;
  openFlags: number;
  /** null when there are too many claims for a strip */
  cells: { id: string; ref: string; verdict: Verdict | null }[] | null;
  lastRun: { id: string; state: RunState; at: string } | null;
};

export type Overview = {
  chapters: ChapterView[];
  counts: VerdictCounts;
  openFlags: number;
  lastKey: { number: number; at: string } | null;
  next: NextStep | null;
};

/**
 * The chapters of a work at a glance, those that this person may read, and what to do next.
 * @throws AppError not_found, also for production, which sees no drafts
 */
export async function getOverview(workId: string, user: SessionUser): Promise<Overview> {
  const access = await gate(user, "chapter.read", workId);
  const [chapters, counts, flags, runs, lastKey, people] = await Promise.all([
    Chapter.findAll({ where: { workId, ...visibleChapterRows(access) }, order: [["number", "ASC"]] }),
    countVerdicts("chapterId", { workId, ...visibleChapters(access) }),
    countOpenFlags("chapterId", { workId, ...visibleChapters(access) }),
    Run.findAll({ where: { workId }, order: [["createdAt", "DESC"]], limit: 100 }),
    lastKeyOf(access, user),
    Membership.count({ where: { workId } }),
  ]);
  const cells = await cellsOf(chapters, counts);
  const views = chapters.map(({ id, number, title }) => ({
    id,
    number,
    title,
    counts: counts.get(id) ?? { unchecked: 0, total: 0 },
    openFlags: flags.get(id) ?? 0,
    cells: cells.get(id) ?? null,
    lastRun: lastRunOf(id, runs),
  }));
  const sum = addCounts(counts.values());
  const openFlags = [...flags.values()].reduce((a, b) => a + b, 0);
  return {
    chapters: views,
    counts: sum,
    openFlags,
    lastKey,
    next: nextStep({
      workId,
      access,
      chapters: views,
      counts: sum,
      openFlags,
      people,
      hasKey: lastKey !== null,
    }),
  };
}

async function lastKeyOf(access: Access, user: SessionUser): Promise<Overview["lastKey"]> {
  if (!can({ ...access, isAdmin: user.isAdmin }, "key.read")) return null;
  const key = await FrozenKey.findOne({
    where: { workId: access.work.id },
    attributes: ["number", "createdAt"],
    order: [["number", "DESC"]],
  });
  return key && { number: key.number, at: key.createdAt.toISOString() };
}

function lastRunOf(chapterId: string, runs: readonly Run[]): ChapterView["lastRun"] {
  const run = runs.find((one) => one.chapterId === null || one.chapterId === chapterId);
  return run ? { id: run.id, state: run.state, at: (run.endedAt ?? run.createdAt).toISOString() } : null;
}

/** The claims of the chapters that are small enough to be drawn, in the order of the chapter. */
async function cellsOf(chapters: readonly Chapter[], counts: ReadonlyMap<string, VerdictCounts>) {
  const drawn: string[] = [];
  let left = CELLS_A_PAGE;
  for (const { id } of chapters) {
    const total = counts.get(id)?.total ?? 0;
    if (total > CELLS_A_CHAPTER || total > left) continue;
    left -= total;
    drawn.push(id);
  }
  const claims = await Claim.findAll({
    where: { chapterId: { [Op.in]: drawn }, withdrawnAt: null },
    attributes: ["id", "chapterId", "ref", "verdict"],
    order: [
      ["chapterId", "ASC"],
      ["position", "ASC"],
    ],
  });
  const cells = new Map<string, NonNullable<ChapterView["cells"]>>(drawn.map((id) => [id, []]));
  for (const { id, chapterId, ref, verdict } of claims) cells.get(chapterId)?.push({ id, ref, verdict });
  return cells;
}
