import { Op } from "sequelize";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { transact } from "@/lib/transact";
import { Chapter } from "@/models";
import { lockChapter } from "./find-chapter";
import type { ChapterMove } from "./schema";

/** Chapters are numbered from 0; this one is free while two of them change places. */
const BETWEEN = -1;

/** Changes places with the chapter before or after; at the end it stays. @throws AppError not_found; forbidden */
export async function moveChapter(
  { workId, chapterId, direction }: ChapterMove,
  user: SessionUser,
): Promise<void> {
  const earlier = direction === "earlier";
  await transact(async (transaction) => {
    await gate(user, "chapter.edit", workId, { chapterId }, transaction);
    const chapter = await lockChapter(transaction, workId, chapterId);
    const other = await Chapter.findOne({
      where: { workId, number: earlier ? { [Op.lt]: chapter.number } : { [Op.gt]: chapter.number } },
      order: [["number", earlier ? "DESC" : "ASC"]],
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!other) return;
    const [from, to] = [chapter.number, other.number];
    await chapter.update({ number: BETWEEN }, { transaction });
    await other.update({ number: from }, { transaction });
    await chapter.update({ number: to }, { transaction });
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "chapter.move",
      subjectType: "chapter",
      subjectId: chapterId,
      before: { number: from },
      after: { number: to, changedPlacesWith: other.id },
    });
  });
}
