import type { Transaction } from "sequelize";
import { Chapter, Run } from "@/models";
import { gate, type Access } from "@/lib/auth/gate";
import { notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { isGoing } from "./going";
import type { ThisRun } from "./schema";

export type ReadRun = { run: Run; chapter: Chapter | null; access: Access; going: boolean };

/**
 * A run for somebody who may read what it covers. A referee of some chapters sees the runs of these, and no run of the
 * whole work, which would tell about the others.
 * @throws AppError not_found
 */
export async function readRun(
  { workId, runId }: ThisRun,
  user: { id: string; isAdmin?: boolean },
  transaction?: Transaction,
): Promise<ReadRun> {
  if (!isId(workId) || !isId(runId)) throw notFound();
  const run = await Run.findOne({ where: { id: runId, workId }, transaction: transaction ?? null });
  const access = await gate(user, "chapter.read", workId, { chapterId: run?.chapterId ?? null }, transaction);
  if (!run || (run.chapterId === null && access.chapterIds !== null)) throw notFound();
  const chapter = run.chapterId
    ? await Chapter.findByPk(run.chapterId, { transaction: transaction ?? null })
    : null;
  return { run, chapter, access, going: isGoing(run.state) };
}
