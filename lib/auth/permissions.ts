/** Who may do what. Pure: the gate reads the membership and asks here; pages ask here what to offer. */

export const ROLES = ["lead", "author", "referee", "production"] as const;
export type Role = (typeof ROLES)[number];

export const ACTIONS = [
  "work.read",
  "work.manage",
  "people.manage",
  "conventions.edit",
  "chapter.read",
  "chapter.edit",
  "claim.edit",
  "source.upload",
  "run.start",
  "run.cancel",
  "flag.read",
  "flag.assign",
  "flag.settle",
  "flag.discuss",
  "settlement.undo",
  "waiver.name",
  "key.read",
  "key.freeze",
  "site.administer",
] as const;
export type Action = (typeof ACTIONS)[number];

export type Person = {
  userId: string;
  isAdmin: boolean;
  /** null: not a member of the work */
  role: Role | null;
  /** for a referee, the chapters they read; null means all */
  chapterIds: string[] | null;
};

/** What the action is done to. Leave out what does not apply. */
export type Subject = {
  chapterId?: string | null;
  claimantId?: string | null;
  assigneeId?: string | null;
  /** who settled the flag, for undoing it */
  settlerId?: string | null;
};

const WRITERS: readonly Role[] = ["lead", "author"];
const READERS: readonly Role[] = ["lead", "author", "referee"];
const LEAD: readonly Role[] = ["lead"];

/** The roles that may ever do it; `can` narrows this by subject. */
const ALLOWED: Record<Action, readonly Role[]> = {
  "work.read": ROLES,
  "work.manage": LEAD,
  "people.manage": LEAD,
  "conventions.edit": LEAD,
  "chapter.read": READERS,
  "chapter.edit": WRITERS,
  "claim.edit": WRITERS,
  "source.upload": WRITERS,
  "run.start": WRITERS,
  "run.cancel": WRITERS,
  "flag.read": READERS,
  "flag.assign": LEAD,
  "flag.settle": READERS,
  "flag.discuss": READERS,
  "settlement.undo": READERS,
  "waiver.name": LEAD,
  "key.read": ["lead", "author", "production"],
  "key.freeze": LEAD,
  "site.administer": [],
};

/**
 * Whether this person may do this. A referee is held to their chapters, and to the flags assigned to them when
 * they settle or discuss; nobody settles a flag on their own claim; a settlement is undone by its settler or a lead.
 * Without a subject the answer is whether the action is open to them at all, except that a referee is then refused
 * what needs an assignment, and anybody but a lead is refused an undo.
 */
export function can(person: Person, action: Action, subject: Subject = {}): boolean {
  if (action === "site.administer") return person.isAdmin;
  if (person.role === null || !ALLOWED[action].includes(person.role)) return false;
  const referee = person.role === "referee";
  if (referee && subject.chapterId && person.chapterIds && !person.chapterIds.includes(subject.chapterId))
    return false;
  if (action === "flag.settle" && subject.claimantId === person.userId) return false;
  if (action === "flag.settle" || action === "flag.discuss")
    return !referee || subject.assigneeId === person.userId;
  if (action === "settlement.undo") return person.role === "lead" || subject.settlerId === person.userId;
  return true;
}
