import { describe, expect, it } from "vitest";
import {
  ACTIONS,
  ROLES,
  can,
  type Action,
  type Person,
  type Role,
  type Subject,
} from "@/lib/auth/permissions";

const ME = "me";
const HERE = "chapter-here";

/**
 * Who may do what, as one table: + yes, - no, in the order lead, author, referee, production.
 * `own` is a subject of this person's own (their claim, a flag assigned to them, a settlement of theirs, a chapter they
 * read); `other` is somebody else's in a chapter they read; `foreign` is in a chapter that the referee does not read.
 */
const TABLE: Record<Exclude<Action, "site.administer">, { own: string; other: string; foreign: string }> = {
  "work.read": { own: "++++", other: "++++", foreign: "++-+" },
  "work.manage": { own: "+---", other: "+---", foreign: "+---" },
  "people.manage": { own: "+---", other: "+---", foreign: "+---" },
  "conventions.edit": { own: "+---", other: "+---", foreign: "+---" },
  "chapter.read": { own: "+++-", other: "+++-", foreign: "++--" },
  "chapter.edit": { own: "++--", other: "++--", foreign: "++--" },
  "claim.edit": { own: "++--", other: "++--", foreign: "++--" },
  "source.upload": { own: "++--", other: "++--", foreign: "++--" },
  "run.start": { own: "++--", other: "++--", foreign: "++--" },
  "run.cancel": { own: "++--", other: "++--", foreign: "++--" },
  "flag.read": { own: "+++-", other: "+++-", foreign: "++--" },
  "flag.assign": { own: "+---", other: "+---", foreign: "+---" },
  "flag.settle": { own: "+++-", other: "++--", foreign: "++--" },
  "flag.discuss": { own: "+++-", other: "++--", foreign: "++--" },
  "settlement.undo": { own: "+++-", other: "+---", foreign: "+---" },
  "waiver.name": { own: "+---", other: "+---", foreign: "+---" },
  "key.read": { own: "++-+", other: "++-+", foreign: "++-+" },
  "key.freeze": { own: "+---", other: "+---", foreign: "+---" },
};

const SUBJECTS: Record<"own" | "other" | "foreign", Subject> = {
  own: { chapterId: HERE, claimantId: "somebody", assigneeId: ME, settlerId: ME },
  other: { chapterId: HERE, claimantId: "somebody", assigneeId: "another", settlerId: "another" },
  foreign: { chapterId: "elsewhere", claimantId: "somebody", assigneeId: "another", settlerId: "another" },
};

const person = (role: Role | null, isAdmin = false): Person => ({
  userId: ME,
  isAdmin,
  role,
  chapterIds: role === "referee" ? [HERE] : null,
});

const cases = Object.entries(TABLE).flatMap(([action, row]) =>
  (Object.entries(row) as ["own" | "other" | "foreign", string][]).flatMap(([whose, marks]) =>
    ROLES.map((role, i) => ({ action: action as Action, whose, role, allowed: marks[i] === "+" })),
  ),
);

describe("the permission table", () => {
  it("has a row for every action", () => {
    expect(Object.keys(TABLE).sort()).toEqual(
      ACTIONS.filter((action) => action !== "site.administer").sort(),
    );
  });

  it.each(cases)("$role, $action, $whose: $allowed", ({ action, whose, role, allowed }) => {
    expect(can(person(role), action, SUBJECTS[whose])).toBe(allowed);
  });

  it.each(ACTIONS)("gives %s to nobody outside the work, an administrator included", (action) => {
    expect(can(person(null), action, SUBJECTS.own)).toBe(false);
    expect(can(person(null, true), action, SUBJECTS.own)).toBe(action === "site.administer");
  });

  it.each(ROLES)("lets no %s settle a flag on their own claim, assigned or not", (role) => {
    expect(can(person(role), "flag.settle", { chapterId: HERE, claimantId: ME, assigneeId: ME })).toBe(false);
  });

  it("lets a referee of all chapters read each of them", () => {
    expect(can({ ...person("referee"), chapterIds: null }, "chapter.read", { chapterId: "elsewhere" })).toBe(
      true,
    );
  });
});
