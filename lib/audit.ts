import type { Transaction } from "sequelize";
import { AuditEvent } from "@/models";

/** Something somebody did. `before` and `after` hold what changed, never a password, token or e-mail text. */
export type Audited = {
  /** null for an event of the whole site */
  workId?: string | null;
  /** null for the program itself, or an unknown visitor */
  actorId?: string | null;
  /** subject and verb, such as flag.settle */
  action: string;
  subjectType: string;
  subjectId: string;
  before?: unknown;
  after?: unknown;
};

/** Writes the event in the transaction of the change itself: there is never one without the other. */
export async function audit(transaction: Transaction, event: Audited): Promise<void> {
  await AuditEvent.create(
    {
      workId: event.workId ?? null,
      actorId: event.actorId ?? null,
      action: event.action,
      subjectType: event.subjectType,
      subjectId: event.subjectId,
      before: event.before ?? null,
      after: event.after ?? null,
    },
    { transaction },
  );
}
