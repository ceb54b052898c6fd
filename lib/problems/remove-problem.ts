import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Claim } from "@/models";
import { lockProblem } from "./edit-problem";
import type { RemoveProblem } from "./schema";

/**
 * Removes a problem that has no claim, not even a withdrawn one: a claim's history is never thrown away.
 * @throws AppError not_found; forbidden; conflict when it has claims
 */
export async function removeProblem(input: RemoveProblem, user: SessionUser): Promise<{ id: string }> {
  return transact(async (transaction) => {
    const problem = await lockProblem(input.workId, input.problemId, user, transaction);
    if (
      await Claim.findOne({
        attributes: ["id"],
        where: { problemId: problem.id },
        lock: transaction.LOCK.SHARE,
        transaction,
      })
    )
      throw new AppError(
        "conflict",
        `Problem ${problem.label} has claims. Withdraw them instead; their history is kept.`,
      );
    await audit(transaction, {
      workId: problem.workId,
      actorId: user.id,
      action: "problem.remove",
      subjectType: "problem",
      subjectId: problem.id,
      before: { label: problem.label, statement: problem.statement },
    });
    await problem.destroy({ transaction });
    return { id: problem.id };
  });
}
