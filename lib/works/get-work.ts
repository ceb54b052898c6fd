import { gate, type Access } from "@/lib/auth/gate";
import { can, type Action, type Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";

export type WorkChrome = {
  id: string;
  title: string;
  kind: Access["work"]["kind"];
  confidential: boolean;
  role: Role;
  /** the parts of the work that are open to this person */
  parts: { chapters: boolean; flags: boolean; keys: boolean; people: boolean; conventions: boolean };
  may: { manage: boolean; editChapters: boolean; managePeople: boolean; editConventions: boolean };
};

/** The frame of every page of a work: its name, and what this person finds in it. @throws AppError not_found */
export async function getWork(workId: string, user: SessionUser): Promise<WorkChrome> {
  const access = await gate(user, "work.read", workId);
  const allowed = (action: Action) => can({ ...access, isAdmin: user.isAdmin }, action);
  const reads = allowed("chapter.read");
  return {
    id: access.work.id,
    title: access.work.title,
    kind: access.work.kind,
    confidential: access.work.confidential,
    role: access.role,
    parts: {
      chapters: reads,
      flags: allowed("flag.read"),
      keys: allowed("key.read"),
      people: true,
      conventions: reads,
    },
    may: {
      manage: allowed("work.manage"),
      editChapters: allowed("chapter.edit"),
      managePeople: allowed("people.manage"),
      editConventions: allowed("conventions.edit"),
    },
  };
}
