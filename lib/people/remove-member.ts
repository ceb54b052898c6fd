import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { transact } from "@/lib/transact";
import { lockMember, refuseLastLead, releaseFlags } from "./members";

/**
 * Takes somebody off a work, or leaves it oneself. What they wrote stays with their name; they see nothing of the
 * work from their next request on; flags assigned to them wait for somebody else.
 * @throws AppError not_found; forbidden; conflict for the last lead
 */
export async function removeMember(
  { workId, userId }: { workId: string; userId: string },
  user: SessionUser,
): Promise<void> {
  const action = userId === user.id ? "work.read" : "people.manage";
  await transact(async (transaction) => {
    await gate(user, action, workId);
    const member = await lockMember(transaction, workId, userId);
    await gate(user, action, workId, {}, transaction);
    await refuseLastLead(transaction, member);
    await releaseFlags(transaction, member, true);
    await member.destroy({ transaction });
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: userId === user.id ? "member.leave" : "member.remove",
      subjectType: "user",
      subjectId: userId,
      before: { role: member.role, chapterIds: member.chapterIds },
    });
  });
}
