import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { isDuplicate } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { takenNumber } from "./add-chapter";
import { lockChapter } from "./find-chapter";
import type { ChapterChange } from "./schema";

/** Gives a chapter another title or number. @throws AppError not_found; forbidden; conflict when the number is taken */
export async function changeChapter(input: ChapterChange, user: SessionUser): Promise<void> {
  const { workId, chapterId, number, title } = input;
  try {
    await transact(async (transaction) => {
      await gate(user, "chapter.edit", workId, { chapterId }, transaction);
      const chapter = await lockChapter(transaction, workId, chapterId);
      const before = { number: chapter.number, title: chapter.title };
      await chapter.update({ number, title }, { transaction });
      await audit(transaction, {
        workId,
        actorId: user.id,
        action: "chapter.change",
        subjectType: "chapter",
        subjectId: chapterId,
        before,
        after: { number, title },
      });
    });
  } catch (error) {
    if (isDuplicate(error)) throw takenNumber(number);
    throw error;
  }
}
