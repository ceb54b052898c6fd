import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { findFlag } from "@/lib/flags/lock-flag";
import type { AddMessage } from "@/lib/flags/schema";
import { transact } from "@/lib/transact";
import { Message } from "@/models";

/**
 * Adds to the discussion of a flag, open or settled.
 * @throws AppError not_found; forbidden for a referee whom the flag is not assigned to
 */
export async function addMessage(input: AddMessage, user: SessionUser): Promise<{ messageId: string }> {
  const flag = await findFlag(input.workId, input.flagId, user);
  return transact(async (transaction) => {
    const subject = { chapterId: flag.chapterId, claimantId: flag.claimantId, assigneeId: flag.assigneeId };
    await gate(user, "flag.discuss", flag.workId, subject, transaction);
    const message = await Message.create(
      { workId: flag.workId, flagId: flag.id, authorId: user.id, body: input.body },
      { transaction },
    );
    await audit(transaction, {
      workId: flag.workId,
      actorId: user.id,
      action: "flag.message",
      subjectType: "flag",
      subjectId: flag.id,
      after: { messageId: message.id },
    });
    return { messageId: message.id };
  });
}
