import { Op } from "sequelize";
import { Run } from "@/models";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { GOING } from "./going";
import type { ThisRun } from "./schema";

/**
 * Stops a run. What it has judged stays with the claims; it raises no flags.
 * @throws AppError not_found, forbidden; conflict when it is no longer going
 */
export async function cancelRun({ workId, runId }: ThisRun, user: SessionUser): Promise<void> {
  await transact(async (transaction) => {
    const run = await Run.findOne({ where: { id: runId, workId }, transaction });
    if (!run) {
      await gate(user, "chapter.read", workId, {}, transaction);
      throw notFound();
    }
    await gate(user, "run.cancel", workId, { chapterId: run.chapterId }, transaction);
    const [stopped] = await Run.update(
      { state: "cancelled", endedAt: new Date() },
      { where: { id: runId, state: { [Op.in]: [...GOING] } }, transaction },
    );
    if (stopped === 0)
      throw new AppError("conflict", "This run is over already; there was nothing left to cancel.");
    await audit(transaction, {
      workId,
      actorId: user.id,
      action: "run.cancel",
      subjectType: "run",
      subjectId: runId,
      before: { state: run.state },
      after: { state: "cancelled" },
    });
  });
}
