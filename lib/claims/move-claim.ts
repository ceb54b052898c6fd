import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { swapNeighbours } from "@/lib/problems/order";
import { transact } from "@/lib/transact";
import { Claim, Problem } from "@/models";
import { findClaim } from "./find-claim";
import type { MoveClaim } from "./schema";

/**
 * Moves a claim one place within its problem. At either end nothing happens.
 * @throws AppError not_found; forbidden
 */
export async function moveClaim(input: MoveClaim, user: SessionUser): Promise<{ moved: boolean }> {
  const { claim } = await findClaim(input.workId, input.claimId, user);
  return transact(async (transaction) => {
    // The problem is locked, so that two people who order at once do it one after the other.
    const problem = await Problem.findByPk(claim.problemId, { lock: transaction.LOCK.UPDATE, transaction });
    if (!problem) throw notFound();
    await gate(user, "claim.edit", input.workId, { chapterId: problem.chapterId }, transaction);
    const rows = await Claim.findAll({
      attributes: ["id", "ref", "position"],
      where: { problemId: problem.id },
      order: [
        ["position", "ASC"],
        ["id", "ASC"],
      ],
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    const changed = swapNeighbours(rows, claim.id, input.to);
    for (const { id, position } of changed)
      await Claim.update({ position }, { where: { id }, silent: true, transaction });
    if (changed.length > 0)
      await audit(transaction, {
        workId: input.workId,
        actorId: user.id,
        action: "claim.move",
        subjectType: "claim",
        subjectId: claim.id,
        before: { order: rows.map(({ ref }) => ref).slice(0, 200) },
        after: { ref: claim.ref, to: input.to },
      });
    return { moved: changed.length > 0 };
  });
}
