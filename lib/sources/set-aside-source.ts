import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, notFound } from "@/lib/errors";
import { transact } from "@/lib/transact";
import { Source } from "@/models";
import type { SourceState } from "@/models/source";
import { findSource } from "./find-source";
import type { SourceAt } from "./schema";

async function change(
  input: SourceAt,
  to: "set-aside" | "received",
  user: SessionUser,
): Promise<{ state: SourceState }> {
  await findSource(input.workId, input.sourceId, user);
  return transact(async (transaction) => {
    const source = await Source.findOne({
      attributes: { exclude: ["bytes"] },
      where: { id: input.sourceId, workId: input.workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!source) throw notFound();
    await gate(user, "source.upload", source.workId, { chapterId: source.chapterId }, transaction);
    if (source.state === to) return { state: to };
    if (to === "set-aside" && source.state === "accepted")
      throw new AppError(
        "conflict",
        "This source was accepted in the meantime; its claims are in the chapter.",
      );
    const before = { state: source.state, acceptedRows: source.acceptedRows };
    await source.update(
      { state: to, acceptedRows: null, acceptedAt: null, acceptedById: null },
      { transaction },
    );
    await audit(transaction, {
      workId: source.workId,
      actorId: user.id,
      action: to === "set-aside" ? "source.set-aside" : "source.take-up",
      subjectType: "source",
      subjectId: source.id,
      before,
      after: { state: to },
    });
    return { state: to };
  });
}

/**
 * Puts a source away without letting anything in; its bytes are kept.
 * @throws AppError not_found; forbidden; conflict when it was accepted
 */
export const setAsideSource = (input: SourceAt, user: SessionUser) => change(input, "set-aside", user);

/**
 * Opens a source that was set aside or accepted once more: its preview is compared with the chapter as it is now.
 * @throws AppError not_found; forbidden
 */
export const takeUpSource = (input: SourceAt, user: SessionUser) => change(input, "received", user);
