import { Op } from "sequelize";
import { Outbox } from "@/models";
import type { OutboxKind } from "@/models/outbox";
import { transact } from "@/lib/transact";
import { audit } from "@/lib/audit";
import { AppError, notFound } from "@/lib/errors";
import { MailPayload } from "./definitions";
import { dueRows } from "./due";
import { ring } from "./queue";

/** What an administrator may see of outgoing work: never a payload. */
export type OutboxView = {
  id: string;
  kind: OutboxKind;
  /** for a mail, which one and to whom */
  mail: { template: MailPayload["template"]; to: string } | null;
  state: "pending" | "dead";
  attempts: number;
  dueAt: string;
  createdAt: string;
  lastError: string | null;
};

/** What was given up, and what is being tried again: newest first. The caller has let the administrator in. */
export async function listTroubled(limit = 100): Promise<OutboxView[]> {
  const rows = await Outbox.findAll({
    where: { [Op.or]: [{ state: "dead" }, { state: "pending", lastError: { [Op.not]: null } }] },
    order: [["createdAt", "DESC"]],
    limit,
  });
  return rows.map((row) => {
    const mail = row.kind === "mail" ? MailPayload.safeParse(row.payload) : null;
    return {
      id: row.id,
      kind: row.kind,
      mail: mail?.success ? { template: mail.data.template, to: mail.data.to } : null,
      state: row.state === "dead" ? "dead" : "pending",
      attempts: row.attempts,
      dueAt: row.dueAt.toISOString(),
      createdAt: row.createdAt.toISOString(),
      lastError: row.lastError,
    };
  });
}

/** How many rows wait, how many were given up, and how old the longest-waiting due row is. */
export async function outboxDepth(): Promise<{ pending: number; dead: number; oldestDueSeconds: number }> {
  const [pending, dead, [oldest]] = await Promise.all([
    Outbox.count({ where: { state: "pending" } }),
    Outbox.count({ where: { state: "dead" } }),
    dueRows(1),
  ]);
  return { pending, dead, oldestDueSeconds: Math.max(0, Math.round((oldest?.waitingMs ?? 0) / 1000)) };
}

/**
 * Sends something that was given up once more, from its first attempt. The caller has let the administrator in.
 * @throws AppError not_found; conflict when it is no longer among the dead
 */
export async function tryAgain(id: string, actorId: string): Promise<void> {
  await transact(async (transaction) => {
    const row = await Outbox.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!row) throw notFound();
    if (row.state !== "dead")
      throw new AppError("conflict", "Somebody has already asked for another try of this.");
    const before = { state: row.state, attempts: row.attempts };
    await row.update(
      { state: "pending", attempts: 0, dueAt: new Date(), leasedUntil: null },
      { transaction },
    );
    await audit(transaction, {
      actorId,
      action: "outbox.retry",
      subjectType: "outbox",
      subjectId: id,
      before,
      after: { state: "pending" },
    });
  });
  await ring(id);
}
