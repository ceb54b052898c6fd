import type { Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate, notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Problem } from "@/models";
import { labelTaken } from "./add-problem";
import type { EditProblem } from "./schema";

/** What stands in the store now, for somebody whose own text is still in their form. */
export type StoredProblem = { version: number; label: string; statement: string };

/**
 * Locks a problem for a change, after the gate.
 * @throws AppError not_found; forbidden
 */
export async function lockProblem(
  workId: string,
  problemId: string,
  user: SessionUser,
  transaction: Transaction,
): Promise<Problem> {
  await gate(user, "chapter.read", workId, {}, transaction);
  const problem = await Problem.findOne({
    where: { id: problemId, workId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!problem) throw notFound();
  await gate(user, "chapter.edit", workId, { chapterId: problem.chapterId }, transaction);
  return problem;
}

/**
 * Changes a problem's label or statement.
 * @throws AppError not_found; forbidden; conflict with details.stored; invalid with fields.label
 */
export async function editProblem(
  input: EditProblem,
  user: SessionUser,
): Promise<{ id: string; version: number }> {
  return transact(async (transaction) => {
    const problem = await lockProblem(input.workId, input.problemId, user, transaction);
    const { label, statement } = input;
    if (problem.label === label && problem.statement === statement)
      return { id: problem.id, version: problem.version };
    if (problem.version !== input.version) {
      const stored: StoredProblem = {
        version: problem.version,
        label: problem.label,
        statement: problem.statement,
      };
      throw new AppError(
        "conflict",
        `Problem ${problem.label} was changed while you were looking at it. Your text is kept here; beside it stands what is stored now.`,
        { details: { stored } },
      );
    }
    const before = { label: problem.label, statement: problem.statement };
    await problem.update({ label, statement }, { transaction }).catch((error: unknown) => {
      throw isDuplicate(error) ? labelTaken(label) : error;
    });
    await audit(transaction, {
      workId: problem.workId,
      actorId: user.id,
      action: "problem.edit",
      subjectType: "problem",
      subjectId: problem.id,
      before,
      after: { label, statement },
    });
    return { id: problem.id, version: problem.version };
  });
}
