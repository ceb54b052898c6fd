import { Op } from "sequelize";
import { Flag, Membership, User, Work } from "@/models";
import { env } from "@/lib/env";
import type { Payload } from "@/lib/jobs/definitions";
import { post } from "@/lib/jobs/outbox";
import type { Job } from "@/lib/jobs/work";
import { transact } from "@/lib/transact";
import { sendMail } from "./send-mail";
import { flagDigestMail } from "./templates";

/** Two posts with this key while the first is pending are one digest. */
export const digestKey = (workId: string, userId: string) => `flag-digest ${workId} ${userId}`;

/**
 * Tells a person once of all flags in a work that were assigned to them and that no digest has named. Flags that are
 * assigned while the mail is on its way get the next digest.
 */
export async function handleFlagDigest({ userId, workId }: Payload<"flag-digest">, job: Job): Promise<void> {
  const untold = { workId, assigneeId: userId, state: "open" as const, toldAt: null };
  const person = await recipient(userId, workId);
  if (!person) return;
  const told = (await Flag.findAll({ attributes: ["id"], where: untold })).map(({ id }) => id);
  if (told.length > 0) {
    const letter = flagDigestMail({ workId, workTitle: person.workTitle, flags: told.length });
    await sendMail(person.email, letter, job.id);
  }
  await transact(async (transaction) => {
    // First the row itself: this waits for everybody who is assigning flags under its key, so that the count below sees theirs.
    await job.done(transaction);
    await Flag.update(
      { toldAt: new Date() },
      { where: { id: { [Op.in]: told } }, silent: true, transaction },
    );
    if ((await Flag.count({ where: untold, transaction })) === 0) return;
    await post(transaction, {
      kind: "flag-digest",
      payload: { userId, workId },
      dedupeKey: digestKey(workId, userId),
      dueAt: new Date(Date.now() + env.DIGEST_DELAY_SECONDS * 1000),
    });
  });
}

/** The person's address and the work's name; null for somebody who has left the work or whose account is closed. */
async function recipient(
  userId: string,
  workId: string,
): Promise<{ email: string; workTitle: string } | null> {
  const [member, user, work] = await Promise.all([
    Membership.findOne({ attributes: ["id"], where: { userId, workId } }),
    User.findOne({ attributes: ["email"], where: { id: userId, disabledAt: null } }),
    Work.findByPk(workId, { attributes: ["title"] }),
  ]);
  return member && user && work ? { email: user.email, workTitle: work.title } : null;
}
