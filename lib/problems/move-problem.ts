import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Chapter, Problem } from "@/models";
import { swapNeighbours } from "./order";
import type { MoveProblem } from "./schema";

/**
 * Moves a problem one place within its chapter. At either end nothing happens.
 * @throws AppError not_found; forbidden
 */
export async function moveProblem(input: MoveProblem, user: SessionUser): Promise<{ moved: boolean }> {
  await gate(user, "chapter.read", input.workId);
  return transact(async (transaction) => {
    const problem = await Problem.findOne({
      where: { id: input.problemId, workId: input.workId },
      transaction,
    });
    if (!problem) throw notFound();
    const { chapterId, workId } = problem;
    // The chapter is locked, so that two people who order at once do it one after the other.
    await Chapter.findByPk(chapterId, { lock: transaction.LOCK.UPDATE, transaction });
    await gate(user, "chapter.edit", workId, { chapterId }, transaction);
    const rows = await Problem.findAll({
      attributes: ["id", "label", "position"],
      where: { chapterId },
      order: [
        ["position", "ASC"],
        ["id", "ASC"],
      ],
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    const changed = swapNeighbours(rows, problem.id, input.to);
    for (const { id, position } of changed)
      await Problem.update({ position }, { where: { id }, silent: true, transaction });
    if (changed.length > 0)
      await audit(transaction, {
        workId,
        actorId: user.id,
        action: "problem.move",
        subjectType: "problem",
        subjectId: problem.id,
        before: { order: rows.map(({ label }) => label).slice(0, 200) },
        after: { label: problem.label, to: input.to },
      });
    return { moved: changed.length > 0 };
  });
}
