import { Op, type Transaction } from "sequelize";
import { AppError, notFound } from "@/lib/errors";
import { Flag, Membership, Work } from "@/models";

/**
 * The membership, with the work's row locked: changes to the people of one work come one after the other, so that
 * two leads cannot remove each other.
 * @throws AppError not_found
 */
export async function lockMember(
  transaction: Transaction,
  workId: string,
  userId: string,
): Promise<Membership> {
  await Work.findByPk(workId, { attributes: ["id"], transaction, lock: transaction.LOCK.UPDATE });
  const member = await Membership.findOne({
    where: { workId, userId },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!member) throw notFound();
  return member;
}

/** @throws AppError conflict when nobody would lead the work */
export async function refuseLastLead(transaction: Transaction, member: Membership): Promise<void> {
  if (member.role !== "lead") return;
  const others = await Membership.findAll({
    where: { workId: member.workId, role: "lead", userId: { [Op.ne]: member.userId } },
    attributes: ["id"],
    transaction,
    lock: transaction.LOCK.SHARE,
  });
  if (others.length === 0)
    throw new AppError("conflict", "A work needs a lead author. Make somebody else lead first.");
}

/** Open flags assigned to somebody who may not settle them any more wait for somebody else again. */
export async function releaseFlags(
  transaction: Transaction,
  member: Membership,
  removed = false,
): Promise<void> {
  const { workId, userId, role, chapterIds } = member;
  if (!removed && (role === "lead" || role === "author")) return;
  if (!removed && role === "referee" && chapterIds === null) return;
  const kept = !removed && role === "referee" && chapterIds ? { chapterId: { [Op.notIn]: chapterIds } } : {};
  await Flag.update(
    { assigneeId: null },
    { where: { workId, assigneeId: userId, state: "open", ...kept }, transaction },
  );
}
