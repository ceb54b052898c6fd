import { Op } from "sequelize";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Claim, ConventionsSheet, Run, Work } from "@/models";
import { readConventions, type ConventionsChange } from "./schema";

/**
 * Writes the next version of the conventions sheet. Verdicts were reached under the old one, so every claim of the
 * work becomes unchecked, and runs under way are cancelled; nothing else about a claim changes, and findings stay.
 * @returns the version now in force and how many claims lost their verdict; a sheet that says the same changes nothing
 * @throws AppError not_found; forbidden; conflict when somebody else has changed the sheet meanwhile
 */
export async function changeConventions(
  input: ConventionsChange,
  user: SessionUser,
): Promise<{ version: number; due: number }> {
  const { workId, conventions } = input;
  return transact(async (transaction) => {
    await gate(user, "conventions.edit", workId, {}, transaction);
    const work = await Work.findByPk(workId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
      rejectOnEmpty: true,
    });
    if (work.conventionsVersion !== input.version)
      throw new AppError(
        "conflict",
        `Somebody else has changed the sheet in the meantime: version ${work.conventionsVersion} is in force. Your choices are still here; look at theirs before you save again.`,
        { details: { version: work.conventionsVersion } },
      );
    const sheet = await ConventionsSheet.findOne({
      where: { workId, version: work.conventionsVersion },
      transaction,
      rejectOnEmpty: true,
    });
    const before = readConventions(sheet.choices);
    if (JSON.stringify(before) === JSON.stringify(readConventions(conventions)))
      return { version: work.conventionsVersion, due: 0 };
    const version = work.conventionsVersion + 1;
    await ConventionsSheet.create(
      { workId, version, choices: conventions, createdById: user.id },
      { transaction },
    );
    await work.update({ conventionsVersion: version }, { transaction });
    // First the runs, as their workers lock them: none can write a verdict of the old sheet after this.
    await Run.update(
      { state: "cancelled", endedAt: new Date() },
      { where: { workId, state: { [Op.in]: ["queued", "running"] } }, transaction },
    );
    const [due] = await Claim.update(
      { verdict: null, findingId: null },
      { where: { workId, verdict: { [Op.not]: null } }, transaction },
    );
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "conventions.change",
      subjectType: "work",
      subjectId: workId,
      before: { version: version - 1, ...before },
      after: { version, ...conventions },
    });
    return { version, due };
  });
}
