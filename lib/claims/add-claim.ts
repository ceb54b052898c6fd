import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate, notFound } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { transact } from "@/lib/transact";
import { Claim, ClaimVersion, Problem } from "@/models";
import { orbitKeyOf } from "./reading";
import type { NewClaim } from "./schema";

export const refTaken = (ref: string) =>
  new AppError("invalid", `This work already has a claim ${ref}.`, {
    fields: { ref: [`This work already has a claim ${ref}. Choose another reference.`] },
  });

/**
 * Adds a claim at the end of its problem, whatever the verifier thinks of it: it is judged by the next run.
 * @throws AppError not_found; forbidden; invalid with fields.ref when the ref is taken
 */
export async function addClaim(input: NewClaim, user: SessionUser): Promise<{ id: string; ref: string }> {
  await gate(user, "chapter.read", input.workId);
  return transact(async (transaction) => {
    // The lock on the problem keeps two new claims from taking the same place.
    const problem = await Problem.findOne({
      where: { id: input.problemId, workId: input.workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!problem) throw notFound();
    const { workId, chapterId } = problem;
    const access = await gate(user, "claim.edit", workId, { chapterId }, transaction);
    const conventions = await conventionsAt(workId, access.work.conventionsVersion, transaction);
    const { ref, quantity, claimed, note, page } = input;
    if (await Claim.findOne({ attributes: ["id"], where: { workId, ref }, transaction })) throw refTaken(ref);
    const last = await Claim.max<number | null, Claim>("position", {
      where: { problemId: problem.id },
      transaction,
    });
    const claim = await Claim.create(
      {
        workId,
        chapterId,
        problemId: problem.id,
        ref,
        position: (last ?? -1) + 1,
        quantity,
        claimed,
        note,
        page,
        claimantId: user.id,
        orbitKey: orbitKeyOf(quantity, conventions),
      },
      { transaction },
    ).catch((error: unknown) => {
      throw isDuplicate(error) ? refTaken(ref) : error;
    });
    await ClaimVersion.create(
      {
        workId,
        claimId: claim.id,
        number: 1,
        quantity,
        claimed,
        note,
        page,
        authorId: user.id,
        origin: "typed",
      },
      { transaction },
    );
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "claim.add",
      subjectType: "claim",
      subjectId: claim.id,
      after: { ref, quantity, claimed, note, page },
    });
    return { id: claim.id, ref };
  });
}
