import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { transact } from "@/lib/transact";
import { ConventionsSheet, Membership, Work } from "@/models";
import type { NewWork } from "./schema";

/** Makes a work with the first version of its conventions sheet; whoever makes it leads it. */
export async function createWork(input: NewWork, user: SessionUser): Promise<{ id: string }> {
  const { conventions, ...facts } = input;
  return transact(async (transaction) => {
    const { id } = await Work.create({ ...facts, createdById: user.id }, { transaction });
    await ConventionsSheet.create(
      { workId: id, version: 1, choices: conventions, createdById: user.id },
      { transaction },
    );
    await Membership.create({ workId: id, userId: user.id, role: "lead" }, { transaction });
    await audit(transaction, {
      workId: id,
      actorId: user.id,
      action: "work.create",
      subjectType: "work",
      subjectId: id,
      after: { ...facts, conventions },
    });
    return { id };
  });
}
