import { col, fn, Op } from "sequelize";
import { Chapter, Finding, Run, User } from "@/models";
import { can } from "@/lib/auth/permissions";
import { gate, visibleChapters } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import type { Verdict } from "@/models/finding";
import type { RunState } from "@/models/run";
import { noCounts, type Counts } from "./run-progress";

export const RUNS_PER_PAGE = 25;

export type RunLine = {
  id: string;
  chapter: { number: number; title: string } | null;
  state: RunState;
  startedBy: string;
  createdAt: string;
  total: number;
  counts: Counts;
};

export type RunList = {
  work: { id: string; title: string };
  runs: RunLine[];
  page: number;
  pages: number;
  total: number;
  may: { start: boolean };
};

/**
 * The runs of a work that this person may read, newest first.
 * @throws AppError not_found
 */
export async function listRuns(workId: string, user: SessionUser, page = 1): Promise<RunList> {
  const access = await gate(user, "chapter.read", workId);
  const where = { workId, ...visibleChapters(access) };
  const { rows, count } = await Run.findAndCountAll({
    where,
    order: [
      ["createdAt", "DESC"],
      ["id", "ASC"],
    ],
    limit: RUNS_PER_PAGE,
    offset: (Math.max(1, page) - 1) * RUNS_PER_PAGE,
  });
  const [chapters, people, counts] = await Promise.all([
    Chapter.findAll({ where: { id: ids(rows.map(({ chapterId }) => chapterId)) } }),
    User.findAll({
      attributes: ["id", "name"],
      where: { id: ids(rows.map(({ startedById }) => startedById)) },
    }),
    countsOf(rows.map(({ id }) => id)),
  ]);
  const chapterById = new Map(chapters.map((chapter) => [chapter.id, chapter]));
  const nameById = new Map(people.map(({ id, name }) => [id, name]));
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  return {
    work: { id: access.work.id, title: access.work.title },
    runs: rows.map((run) => {
      const chapter = run.chapterId ? chapterById.get(run.chapterId) : undefined;
      return {
        id: run.id,
        chapter: chapter ? { number: chapter.number, title: chapter.title } : null,
        state: run.state,
        startedBy: nameById.get(run.startedById) ?? "somebody who has left",
        createdAt: run.createdAt.toISOString(),
        total: run.total,
        counts: counts.get(run.id) ?? noCounts(),
      };
    }),
    page: Math.max(1, page),
    pages: Math.max(1, Math.ceil(count / RUNS_PER_PAGE)),
    total: count,
    may: { start: can(person, "run.start") },
  };
}

const ids = (list: (string | null)[]) => [...new Set(list.flatMap((id) => id ?? []))];

async function countsOf(runIds: string[]): Promise<Map<string, Counts>> {
  const rows = (await Finding.findAll({
    attributes: ["runId", "verdict", [fn("COUNT", col("id")), "count"]],
    where: { runId: runIds, verdict: { [Op.not]: null } },
    group: ["runId", "verdict"],
    raw: true,
  })) as unknown as { runId: string; verdict: Verdict; count: number | string }[];
  const counts = new Map<string, Counts>();
  for (const { runId, verdict, count } of rows) {
    const own = counts.get(runId) ?? noCounts();
    own[verdict] = Number(count);
    counts.set(runId, own);
  }
  return counts;
}
