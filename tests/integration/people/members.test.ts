import { afterAll, expect, it } from "vitest";
import {
  asUser,
  buildChapter,
  buildClaim,
  buildFlag,
  buildMember,
  buildUser,
  buildWork,
  leadOf,
} from "../../factories";
import { gate, visibleChapters } from "@/lib/auth/gate";
import { changeRole } from "@/lib/people/change-role";
import { listPeople } from "@/lib/people/list-people";
import { removeMember } from "@/lib/people/remove-member";
import { getConventions } from "@/lib/works/get-conventions";
import { getDesk } from "@/lib/works/get-desk";
import { getOverview } from "@/lib/works/get-overview";
import { getWork } from "@/lib/works/get-work";
import { Flag, Membership, sequelize } from "@/models";

afterAll(() => sequelize.close());

const NOWHERE = "00000000-0000-4000-8000-000000000000";

it("answers a stranger, an administrator and an unknown work alike", async () => {
  const work = await buildWork();
  const strangers = [asUser(await buildUser()), asUser(await buildUser({ isAdmin: true }))];
  const reads = [getWork, getOverview, getConventions, listPeople];
  for (const stranger of strangers)
    for (const read of reads) {
      const closed = await read(work.id, stranger).catch((error: unknown) => error);
      const unknown = await read(NOWHERE, stranger).catch((error: unknown) => error);
      expect(closed).toMatchObject({ code: "not_found" });
      expect(closed).toEqual(unknown);
    }
  expect(await getDesk(strangers[0]!)).toMatchObject({
    works: [],
    flags: { total: 0 },
    returned: { total: 0 },
  });
});

it("takes no id that is not text of an id", async () => {
  const user = asUser(await buildUser());
  for (const id of ["", "1", "' or 1=1 --", "x".repeat(5000), "\u0000"])
    await expect(gate(user, "work.read", id)).rejects.toMatchObject({ code: "not_found" });
});

it("shows production no drafts, and a referee their chapters only", async () => {
  const work = await buildWork();
  const [mine, other] = [await buildChapter({ workId: work.id }), await buildChapter({ workId: work.id })];
  await buildClaim({ chapterId: mine.id });
  await buildClaim({ chapterId: other.id });
  const production = await buildMember(work, "production");
  await expect(getOverview(work.id, production)).rejects.toMatchObject({ code: "not_found" });
  await expect(getConventions(work.id, production)).rejects.toMatchObject({ code: "not_found" });
  expect((await getDesk(production)).works).toMatchObject([{ counts: null, openFlags: null }]);
  const referee = await buildMember(work, "referee", { chapterIds: [mine.id] });
  const overview = await getOverview(work.id, referee);
  expect(overview.chapters.map(({ id }) => id)).toEqual([mine.id]);
  expect(overview.counts.total).toBe(1);
  expect((await getDesk(referee)).works).toMatchObject([{ counts: { total: 1 } }]);
  const access = await gate(referee, "chapter.read", work.id, { chapterId: mine.id });
  expect(visibleChapters(access)).not.toEqual({});
  await expect(gate(referee, "chapter.read", work.id, { chapterId: other.id })).rejects.toMatchObject({
    code: "not_found",
  });
  await expect(gate(referee, "claim.edit", work.id, { chapterId: other.id })).rejects.toMatchObject({
    code: "not_found",
  });
  await expect(gate(referee, "claim.edit", work.id, { chapterId: mine.id })).rejects.toMatchObject({
    code: "forbidden",
  });
});

it("says nobody's address to those who do not manage people", async () => {
  const work = await buildWork();
  const author = await buildMember(work, "author");
  const lead = await leadOf(work);
  const seen = await listPeople(work.id, author);
  expect(JSON.stringify(seen)).not.toContain(lead.email);
  expect(seen.members.map(({ name }) => name)).toContain(lead.name);
  expect(JSON.stringify(await listPeople(work.id, lead))).toContain(author.email);
});

it("keeps at least one lead, whoever tries, at once too", async () => {
  const work = await buildWork();
  const first = await leadOf(work);
  await expect(removeMember({ workId: work.id, userId: first.id }, first)).rejects.toMatchObject({
    code: "conflict",
  });
  await expect(
    changeRole({ workId: work.id, userId: first.id, role: "author", chapterIds: null }, first),
  ).rejects.toMatchObject({ code: "conflict" });
  for (let round = 0; round < 5; round++) {
    const leads = await Membership.findAll({ where: { workId: work.id, role: "lead" } });
    const second = leads.length > 1 ? undefined : await buildMember(work, "lead");
    const now = (await Membership.findAll({ where: { workId: work.id, role: "lead" } })).map(
      ({ userId }) => userId,
    );
    const users = now.map((id) => ({ id, name: "", email: "", isAdmin: false, sessionId: "" }));
    expect(second === undefined || users.length === 2).toBe(true);
    const ends = await Promise.allSettled(
      users.map((user, i) => removeMember({ workId: work.id, userId: users[1 - i]?.id ?? "" }, user)),
    );
    expect(ends.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    expect(await Membership.count({ where: { workId: work.id, role: "lead" } })).toBe(1);
  }
});

it("lets nobody raise themselves, and acts on the very next request", async () => {
  const work = await buildWork();
  const lead = await leadOf(work);
  const author = await buildMember(work, "author");
  await expect(
    changeRole({ workId: work.id, userId: author.id, role: "lead", chapterIds: null }, author),
  ).rejects.toMatchObject({ code: "forbidden" });
  expect(await getOverview(work.id, author)).toBeTruthy();
  await changeRole({ workId: work.id, userId: author.id, role: "production", chapterIds: null }, lead);
  await expect(getOverview(work.id, author)).rejects.toMatchObject({ code: "not_found" });
  await removeMember({ workId: work.id, userId: author.id }, lead);
  await expect(getWork(work.id, author)).rejects.toMatchObject({ code: "not_found" });
});

it("gives flags back to the queue when their assignee leaves or may not see them", async () => {
  const work = await buildWork();
  const lead = await leadOf(work);
  const chapter = await buildChapter({ workId: work.id });
  const claim = await buildClaim({ chapterId: chapter.id });
  const referee = await buildMember(work, "referee");
  const flag = await buildFlag({ claimId: claim.id, assigneeId: referee.id });
  const other = await buildChapter({ workId: work.id });
  await changeRole({ workId: work.id, userId: referee.id, role: "referee", chapterIds: [chapter.id] }, lead);
  expect(await Flag.findByPk(flag.id)).toMatchObject({ assigneeId: referee.id });
  await changeRole({ workId: work.id, userId: referee.id, role: "referee", chapterIds: [other.id] }, lead);
  expect(await Flag.findByPk(flag.id)).toMatchObject({ assigneeId: null, state: "open" });
});
