import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Chapter } from "@/models";
import { lockMember, refuseLastLead, releaseFlags } from "./members";
import type { RoleChange } from "./schema";

/**
 * Gives a member another role, or a referee other chapters. It holds from their next request on; flags that they
 * may not settle any more go back to the queue.
 * @throws AppError not_found; conflict for the last lead; invalid when a chapter is not of this work
 */
export async function changeRole(input: RoleChange, user: SessionUser): Promise<void> {
  const { workId, userId, role, chapterIds } = input;
  await transact(async (transaction) => {
    await gate(user, "people.manage", workId);
    const member = await lockMember(transaction, workId, userId);
    // Checked again now that all leads are locked: two leads may be demoting each other.
    await gate(user, "people.manage", workId, {}, transaction);
    if (role !== "lead") await refuseLastLead(transaction, member);
    if (
      chapterIds &&
      (await Chapter.count({ where: { workId, id: chapterIds }, transaction })) !== chapterIds.length
    )
      throw new AppError("invalid", "One of these chapters is not part of this work any more.");
    const before = { role: member.role, chapterIds: member.chapterIds };
    await member.update({ role, chapterIds }, { transaction });
    await releaseFlags(transaction, member);
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "member.change",
      subjectType: "user",
      subjectId: userId,
      before,
      after: { role, chapterIds },
    });
  });
}
