import { afterAll, describe, expect, it } from "vitest";
import {
  asUser,
  buildChapter,
  buildClaim,
  buildFinding,
  buildMember,
  buildRun,
  buildUser,
  buildWork,
  leadOf,
} from "../../factories";
import { addChapter } from "@/lib/chapters/add-chapter";
import { changeChapter } from "@/lib/chapters/change-chapter";
import { moveChapter } from "@/lib/chapters/move-chapter";
import { removeChapter } from "@/lib/chapters/remove-chapter";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { changeConventions } from "@/lib/works/change-conventions";
import { createWork } from "@/lib/works/create-work";
import { getConventions } from "@/lib/works/get-conventions";
import { getOverview } from "@/lib/works/get-overview";
import { NewWork } from "@/lib/works/schema";
import { AuditEvent, Chapter, Claim, Finding, Run, sequelize } from "@/models";

afterAll(() => sequelize.close());

it("starts a work that its maker leads, from what a form sends", async () => {
  const user = asUser(await buildUser());
  const input = NewWork.parse({
    title: "  Angular momentum, second year ",
    kind: "exam",
    confidential: true,
    conventions: { ...DEFAULT_CONVENTIONS, cgOrder: "j1j2m1m2", impliedRoot: "true" },
  });
  const { id } = await createWork(input, user);
  const view = await getConventions(id, user);
  expect(view).toMatchObject({
    work: { title: "Angular momentum, second year" },
    version: 1,
    mayEdit: true,
    conventions: { cgOrder: "j1j2m1m2", impliedRoot: true },
  });
  expect(await AuditEvent.count({ where: { workId: id, action: "work.create" } })).toBe(1);
});

describe("a change of the conventions sheet", () => {
  const change = { ...DEFAULT_CONVENTIONS, cgOrder: "j1j2m1m2" as const };

  it("makes every claim unchecked, keeps findings, and cancels what runs", async () => {
    const work = await buildWork();
    const lead = await leadOf(work);
    const chapter = await buildChapter({ workId: work.id });
    const claims = [await buildClaim({ chapterId: chapter.id }), await buildClaim({ chapterId: chapter.id })];
    for (const { id } of claims) await buildFinding({ claimId: id, verdict: "confirmed" });
    const elsewhere = await buildFinding({ claimId: (await buildClaim()).id, verdict: "confirmed" });
    const going = await buildRun({ workId: work.id, state: "running", endedAt: null });
    expect(await changeConventions({ workId: work.id, version: 1, conventions: change }, lead)).toEqual({
      version: 2,
      due: 2,
    });
    expect(await Claim.count({ where: { workId: work.id, verdict: null } })).toBe(2);
    expect(await Finding.count({ where: { workId: work.id } })).toBe(2);
    expect(await Claim.findByPk(elsewhere.claimId)).toMatchObject({ verdict: "confirmed" });
    expect(await Run.findByPk(going.id)).toMatchObject({ state: "cancelled" });
    expect((await getConventions(work.id, lead)).history.map(({ version }) => version)).toEqual([2, 1]);
  });

  it("that says the same changes nothing", async () => {
    const work = await buildWork();
    const lead = await leadOf(work);
    expect(
      await changeConventions({ workId: work.id, version: 1, conventions: DEFAULT_CONVENTIONS }, lead),
    ).toEqual({ version: 1, due: 0 });
  });

  it("made by two at once is made by one; the other is told", async () => {
    const work = await buildWork();
    const lead = await leadOf(work);
    const ends = await Promise.allSettled(
      Array.from({ length: 8 }, () =>
        changeConventions({ workId: work.id, version: 1, conventions: change }, lead),
      ),
    );
    expect(ends.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    for (const end of ends)
      if (end.status === "rejected") expect(end.reason).toMatchObject({ code: "conflict" });
    expect((await getConventions(work.id, lead)).version).toBe(2);
  });

  it("is the lead's alone", async () => {
    const work = await buildWork();
    const author = await buildMember(work, "author");
    const input = { workId: work.id, version: 1, conventions: change };
    await expect(changeConventions(input, author)).rejects.toMatchObject({ code: "forbidden" });
    await expect(changeConventions(input, asUser(await buildUser()))).rejects.toMatchObject({
      code: "not_found",
    });
  });
});

describe("chapters", () => {
  const numbers = async (workId: string) =>
    (await Chapter.findAll({ where: { workId }, order: [["number", "ASC"]] })).map(
      ({ number, title }) => `${number} ${title}`,
    );

  it("are added, renamed, moved and, while empty, removed", async () => {
    const work = await buildWork();
    const author = await buildMember(work, "author");
    const one = await addChapter({ workId: work.id, number: 1, title: "One" }, author);
    const five = await addChapter({ workId: work.id, number: 5, title: "Five" }, author);
    await expect(addChapter({ workId: work.id, number: 5, title: "Again" }, author)).rejects.toMatchObject({
      code: "conflict",
      fields: { number: [expect.stringContaining("5")] as string[] },
    });
    await moveChapter({ workId: work.id, chapterId: five.id, direction: "earlier" }, author);
    expect(await numbers(work.id)).toEqual(["1 Five", "5 One"]);
    await moveChapter({ workId: work.id, chapterId: five.id, direction: "earlier" }, author);
    expect(await numbers(work.id)).toEqual(["1 Five", "5 One"]);
    await changeChapter({ workId: work.id, chapterId: one.id, number: 2, title: "Two" }, author);
    expect(await numbers(work.id)).toEqual(["1 Five", "2 Two"]);
    await expect(
      changeChapter({ workId: work.id, chapterId: one.id, number: 1, title: "Two" }, author),
    ).rejects.toMatchObject({ code: "conflict" });
    await buildClaim({ chapterId: one.id });
    await expect(removeChapter({ workId: work.id, chapterId: one.id }, author)).rejects.toMatchObject({
      code: "conflict",
    });
    await removeChapter({ workId: work.id, chapterId: five.id }, author);
    expect(await numbers(work.id)).toEqual(["2 Two"]);
  });

  it("of another work are out of reach, with the right of one's own work in hand", async () => {
    const mine = await buildWork();
    const lead = await leadOf(mine);
    const theirs = await buildChapter();
    const which = { workId: mine.id, chapterId: theirs.id };
    await expect(changeChapter({ ...which, number: 9, title: "Mine" }, lead)).rejects.toMatchObject({
      code: "not_found",
    });
    await expect(moveChapter({ ...which, direction: "later" }, lead)).rejects.toMatchObject({
      code: "not_found",
    });
    await expect(removeChapter(which, lead)).rejects.toMatchObject({ code: "not_found" });
  });
});

it("says what to do next, from an empty work to a key", async () => {
  const work = await buildWork();
  const lead = await leadOf(work);
  expect((await getOverview(work.id, lead)).next).toBeNull();
  const chapter = await buildChapter({ workId: work.id });
  expect((await getOverview(work.id, lead)).next?.says).toMatch(/No claims yet/);
  const claim = await buildClaim({ chapterId: chapter.id });
  expect((await getOverview(work.id, lead)).next?.says).toMatch(/not checked/);
  await buildFinding({ claimId: claim.id, verdict: "confirmed" });
  const overview = await getOverview(work.id, lead);
  expect(overview.next?.href).toBe(`/works/${work.id}/keys`);
  expect(overview.chapters[0]?.cells).toEqual([{ id: claim.id, ref: claim.ref, verdict: "confirmed" }]);
});
