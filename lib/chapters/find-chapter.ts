import type { Transaction } from "sequelize";
import { notFound } from "@/lib/errors";
import { Chapter } from "@/models";

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
