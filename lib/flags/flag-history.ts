import { AuditEvent, User } from "@/models";

type Change = { before: Record<string, unknown>; after: Record<string, unknown> };

export type HistoryLine = { id: number; who: string; says: string; at: string };

const text = (value: unknown): string => (typeof value === "string" ? value : "");

/** What an audit event of a flag says in words. Names of people are looked up by id. */
const SENTENCES: Record<string, (change: Change, name: (id: unknown) => string) => string> = {
  "flag.raise": ({ after }, name) =>
    after.assigneeId
      ? `raised by a run, ${text(after.verdict)}, and given to ${name(after.assigneeId)}`
      : `raised by a run, ${text(after.verdict)}`,
  "flag.assign": ({ after }, name) =>
    after.assigneeId ? `gave it to ${name(after.assigneeId)}` : "took it from everybody",
  "flag.take": () => "took it",
  "flag.settle": ({ before, after }) =>
    after.word === "correct"
      ? `settled it: correct, from ${text(before.claimed)} to ${text(after.claimed)}`
      : `settled it: ${text(after.word)}`,
  "flag.undo": ({ before }) => `undid the settlement (${text(before.word)})`,
  "flag.supersede": () => "closed: the claim was changed or confirmed since",
  "flag.message": () => "wrote in the discussion",
};

/** The audit events of one flag, oldest first. */
export async function flagHistory(flagId: string): Promise<HistoryLine[]> {
  const events = await AuditEvent.findAll({
    where: { subjectType: "flag", subjectId: flagId },
    order: [["id", "ASC"]],
    limit: 200,
  });
  const ids = new Set<string>();
  for (const { actorId, after } of events) {
    if (actorId) ids.add(actorId);
    const given = (after as Record<string, unknown> | null)?.assigneeId;
    if (typeof given === "string") ids.add(given);
  }
  const people = await User.findAll({ attributes: ["id", "name"], where: { id: [...ids] } });
  const names = new Map(people.map(({ id, name }) => [id, name]));
  const name = (id: unknown) => names.get(text(id)) ?? "somebody";
  return events.flatMap(({ id, actorId, action, before, after, createdAt }) => {
    const sentence = SENTENCES[action];
    if (!sentence) return [];
    const change = { before: (before ?? {}) as Change["before"], after: (after ?? {}) as Change["after"] };
    return [
      {
        id,
        who: actorId ? name(actorId) : "Surdmark",
        says: sentence(change, name),
        at: createdAt.toISOString(),
      },
    ];
  });
}
