import { z } from "zod";
import { audit } from "@/lib/audit";
import { endAllSessions } from "@/lib/auth/sessions";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { User } from "@/models";
import { administer } from "./administer";

export const AccountSwitch = z.object({ userId: z.uuid(), enabled: z.boolean() });

/**
 * Disables an account, which ends its sessions at once, or enables it again. What the person wrote stays.
 * @throws AppError not_found; conflict for one's own account
 */
export async function setAccountEnabled(
  { userId, enabled }: z.output<typeof AccountSwitch>,
  user: SessionUser,
): Promise<void> {
  administer(user);
  if (userId === user.id) throw new AppError("conflict", "You cannot disable your own account.");
  await transact(async (transaction) => {
    const account = await User.findByPk(userId, { transaction, lock: transaction.LOCK.UPDATE });
    if (!account) throw notFound();
    if ((account.disabledAt === null) === enabled) return;
    await account.update({ disabledAt: enabled ? null : new Date() }, { transaction });
    if (!enabled) await endAllSessions(userId, transaction);
    await audit(transaction, {
      actorId: user.id,
      action: enabled ? "account.enable" : "account.disable",
      subjectType: "user",
      subjectId: userId,
    });
  });
}
