import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { transact } from "@/lib/transact";
import { Work } from "@/models";
import type { WorkChange } from "./schema";

/** Changes the title, the kind, or whether the work is confidential. @throws AppError not_found; forbidden */
export async function changeWork({ workId, ...facts }: WorkChange, user: SessionUser): Promise<void> {
  await transact(async (transaction) => {
    await gate(user, "work.manage", workId, {}, transaction);
    const work = await Work.findByPk(workId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    const before = { title: work.title, kind: work.kind, confidential: work.confidential };
    await work.update(facts, { transaction });
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "work.change",
      subjectType: "work",
      subjectId: workId,
      before,
      after: facts,
    });
  });
}
