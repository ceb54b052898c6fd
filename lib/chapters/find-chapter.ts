import type { Transaction } from "sequelize";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { Chapter } from "@/models";

/** Whether there is such a chapter for this person. @throws AppError not_found */
export async function requireChapter(workId: string, chapterId: string, user: SessionUser): Promise<void> {
  await gate(user, "chapter.read", workId, { chapterId });
  const there = isId(chapterId) && (await Chapter.count({ where: { id: chapterId, workId } })) > 0;
  if (!there) throw notFound();
}

/** The chapter, locked, when it is of this work. @throws AppError not_found */
export async function lockChapter(
  transaction: Transaction,
  workId: string,
  chapterId: string,
): Promise<Chapter> {
  const chapter = await Chapter.findOne({
    where: { id: chapterId, workId },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!chapter) throw notFound();
  return chapter;
}
