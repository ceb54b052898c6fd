import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Problem, Run, Source } from "@/models";
import { lockChapter } from "./find-chapter";

/** Removes a chapter that holds nothing yet. @throws AppError not_found; forbidden; conflict when something is in it */
export async function removeChapter(
  { workId, chapterId }: { workId: string; chapterId: string },
  user: SessionUser,
): Promise<void> {
  await transact(async (transaction) => {
    await gate(user, "chapter.edit", workId, { chapterId }, transaction);
    const chapter = await lockChapter(transaction, workId, chapterId);
    const where = { chapterId };
    const held = await Promise.all([
      Problem.count({ where, transaction }),
      Source.count({ where, transaction }),
      Run.count({ where, transaction }),
    ]);
    if (held.some((count) => count > 0))
      throw new AppError(
        "conflict",
        "Only an empty chapter can be removed: this one holds problems, sources or runs, which are kept for the record.",
      );
    await chapter.destroy({ transaction });
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "chapter.remove",
      subjectType: "chapter",
      subjectId: chapterId,
      before: { number: chapter.number, title: chapter.title },
    });
  });
}
