import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate, notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Chapter, Problem } from "@/models";
import type { NewProblem } from "./schema";

export const labelTaken = (label: string) =>
  new AppError("invalid", `This chapter already has a problem ${label}.`, {
    fields: { label: [`This chapter already has a problem ${label}. Choose another label.`] },
  });

/**
 * Adds a problem at the end of its chapter.
 * @throws AppError not_found; forbidden; invalid with fields.label when the label is taken
 */
export async function addProblem(
  input: NewProblem,
  user: SessionUser,
): Promise<{ id: string; label: string }> {
  const { workId, chapterId, label, statement } = input;
  await gate(user, "chapter.read", workId, { chapterId });
  return transact(async (transaction) => {
    const chapter = await Chapter.findOne({
      where: { id: chapterId, workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!chapter) throw notFound();
    await gate(user, "chapter.edit", workId, { chapterId }, transaction);
    const last = await Problem.max<number | null, Problem>("position", { where: { chapterId }, transaction });
    const problem = await Problem.create(
      { workId, chapterId, label, statement, position: (last ?? -1) + 1 },
      { transaction },
    ).catch((error: unknown) => {
      throw isDuplicate(error) ? labelTaken(label) : error;
    });
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "problem.add",
      subjectType: "problem",
      subjectId: problem.id,
      after: { label, statement },
    });
    return { id: problem.id, label };
  });
}
