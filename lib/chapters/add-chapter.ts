import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Chapter } from "@/models";
import type { NewChapter } from "./schema";

/** The refusal when the number is in use. */
export const takenNumber = (number: number) =>
  new AppError("conflict", `This work has a chapter ${number} already.`, {
    fields: { number: [`There is a chapter ${number} already.`] },
  });

/** Adds a chapter. @throws AppError not_found; forbidden; conflict when the number is taken */
export async function addChapter(
  { workId, number, title }: NewChapter,
  user: SessionUser,
): Promise<{ id: string }> {
  try {
    return await transact(async (transaction) => {
      await gate(user, "chapter.edit", workId, {}, transaction);
      const { id } = await Chapter.create({ workId, number, title }, { transaction });
      await audit(transaction, {
        workId,
        actorId: user.id,
        action: "chapter.add",
        subjectType: "chapter",
        subjectId: id,
        after: { number, title },
      });
      return { id };
    });
  } catch (error) {
    if (isDuplicate(error)) throw takenNumber(number);
    throw error;
  }
}
