import type { SessionUser } from "@/lib/auth/user";
import { AuditEvent, User } from "@/models";
import { administer } from "./administer";

const PAGE = 50;

export type EventView = {
  id: number;
  at: string;
  who: string;
  action: string;
  subject: string;
  /** what it says beside, in a few words */
  detail: string;
};

/** What happened to accounts, invitations and the outbox; events of works belong to their leads. @throws AppError not_found */
export async function listSiteEvents(
  { page = 1 }: { page?: number },
  user: SessionUser,
): Promise<{ rows: EventView[]; total: number; page: number; pages: number }> {
  administer(user);
  const { rows, count } = await AuditEvent.findAndCountAll({
    where: { workId: null },
    order: [["id", "DESC"]],
    limit: PAGE,
    offset: (page - 1) * PAGE,
  });
  const names = await namesOf(
    rows.flatMap(({ actorId, subjectType, subjectId }) => [
      actorId,
      subjectType === "user" ? subjectId : null,
    ]),
  );
  return {
    rows: rows.map((event) => ({
      id: event.id,
      at: event.createdAt.toISOString(),
      who: event.actorId ? (names.get(event.actorId) ?? "somebody") : "the program",
      action: event.action,
      subject:
        event.subjectType === "user" ? (names.get(event.subjectId) ?? "an account") : event.subjectType,
      detail: detailOf(event.after ?? event.before),
    })),
    total: count,
    page,
    pages: Math.max(1, Math.ceil(count / PAGE)),
  };
}

async function namesOf(ids: (string | null)[]): Promise<Map<string, string>> {
  const wanted = [...new Set(ids.filter((id): id is string => id !== null))];
  const people = await User.findAll({ where: { id: wanted }, attributes: ["id", "name"] });
  return new Map(people.map(({ id, name }) => [id, name]));
}

function detailOf(what: unknown): string {
  if (typeof what !== "object" || what === null) return "";
  const shown = Object.entries(what).filter(([key]) => key === "email" || key === "role" || key === "state");
  return shown.map(([, value]) => String(value)).join(", ");
}
