import { Op, type Transaction, type WhereOptions } from "sequelize";
import { AppError, notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { Membership, Work } from "@/models";
import { can, type Action, type Role, type Subject } from "./permissions";

/** What the gate found out about somebody on one work. */
export type Access = {
  work: {
    id: string;
    title: string;
    kind: Work["kind"];
    confidential: boolean;
    conventionsVersion: number;
  };
  role: Role;
  /** for a referee, the chapters they read; null means all */
  chapterIds: string[] | null;
  userId: string;
};

/** Whatever is read answers like an unknown address when it is not for this person. */
const isReading = (action: Action) => action.endsWith(".read");

/**
 * The one gate: every use case calls it where it reads or writes.
 * @param transaction the caller's, so that the membership is the one in force when the change is committed
 * @throws AppError not_found when the work is unknown, the person is no member, the thing is outside what they may
 *   read, or a reading action is not theirs; forbidden when a member may see it but not do it
 */
export async function gate(
  user: { id: string; isAdmin?: boolean },
  action: Action,
  workId: string,
  subject: Subject = {},
  transaction?: Transaction,
): Promise<Access> {
  if (!isId(workId)) throw notFound();
  const member = await Membership.findOne({
    where: { workId, userId: user.id },
    transaction: transaction ?? null,
    ...(transaction && !isReading(action) && { lock: transaction.LOCK.SHARE }),
  });
  if (!member) throw notFound();
  const work = await Work.findByPk(workId, {
    attributes: ["id", "title", "kind", "confidential", "conventionsVersion"],
    transaction: transaction ?? null,
  });
  if (!work) throw notFound();
  const chapterIds = member.role === "referee" ? member.chapterIds : null;
  const person = { userId: user.id, isAdmin: user.isAdmin ?? false, role: member.role, chapterIds };
  if (!can(person, action, subject)) {
    const visible = subject.chapterId == null || can(person, "chapter.read", subject);
    if (isReading(action) || !visible) throw notFound();
    throw new AppError("forbidden", refusal(action, subject.claimantId === user.id));
  }
  const { id, title, kind, confidential, conventionsVersion } = work;
  return {
    work: { id, title, kind, confidential, conventionsVersion },
    role: member.role,
    chapterIds,
    userId: user.id,
  };
}

/** A `where` fragment for rows that carry `chapterId`: everything, or a referee's chapters. */
export const visibleChapters = (access: Pick<Access, "chapterIds">): WhereOptions<{ chapterId: string }> =>
  access.chapterIds === null ? {} : { chapterId: { [Op.in]: access.chapterIds } };

/** The same for the chapters themselves. */
export const visibleChapterRows = (access: Pick<Access, "chapterIds">): WhereOptions<{ id: string }> =>
  access.chapterIds === null ? {} : { id: { [Op.in]: access.chapterIds } };

function refusal(action: Action, ownClaim: boolean): string {
  if (action === "flag.settle" && ownClaim)
    return "This is your own claim. Somebody else has to settle its flag.";
  if (action === "flag.settle" || action === "flag.discuss") return "This flag is not assigned to you.";
  if (action === "settlement.undo")
    return "Only the person who settled this flag, or a lead author, can undo it.";
  return "Your role on this work does not include this.";
}
