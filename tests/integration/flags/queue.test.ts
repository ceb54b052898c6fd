import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

import { AppError } from "@/lib/errors";
import { addMessage } from "@/lib/flags/add-message";
import { assignFlag, takeFlag } from "@/lib/flags/assign-flag";
import { FlagQuery, flagQueryText, readFlagQuery } from "@/lib/flags/flag-query";
import { getFlag } from "@/lib/flags/get-flag";
import { listFlagFilters, listFlags } from "@/lib/flags/list-flags";
import { settleFlag } from "@/lib/flags/settle-flag";
import { sequelize } from "@/models";
import { buildChapter, buildClaim, buildFinding, buildFlag, buildMember } from "../../factories";
import { buildStage, buildWrong, settling, type Stage } from "./stage";

const ask = (given: Record<string, unknown> = {}) => FlagQuery.parse(given);

const codeOf = async (promise: Promise<unknown>): Promise<string> =>
  promise.then(
    () => "ok",
    (error: unknown) => (error instanceof AppError ? error.code : `bug: ${String(error)}`),
  );

let stage: Stage;
beforeAll(async () => {
  stage = await buildStage();
});
afterAll(() => sequelize.close());

describe("the list", () => {
  it("pages, counts and sorts in the database, and is the same list whatever the page", async () => {
    const here = await buildStage();
    for (let i = 0; i < 30; i++) await buildWrong(here);
    const first = await listFlags(here.work.id, ask(), here.second);
    const second = await listFlags(here.work.id, ask({ page: "2" }), here.second);
    expect(first).toMatchObject({ total: 30, pages: 2, page: 1, open: 30 });
    expect(first.rows).toHaveLength(25);
    expect(second.rows).toHaveLength(5);
    const down = await listFlags(here.work.id, ask({ order: "descending" }), here.second);
    const up = [...first.rows, ...second.rows].map(({ id }) => id);
    expect(new Set(up).size).toBe(30);
    expect(down.rows.map(({ id }) => id)).toEqual(up.reverse().slice(0, 25));
  });

  it("narrows by state, verdict, chapter, person and slip", async () => {
    const here = await buildStage();
    const other = await buildChapter({ workId: here.work.id });
    const { flag } = await buildWrong(here, { assigneeId: here.second.id });
    const claim = await buildClaim({ chapterId: other.id, claimantId: here.claimant.id, claimed: "(" });
    const finding = await buildFinding({
      claimId: claim.id,
      verdict: "unreadable",
      slips: [{ causes: ["overall-sign"], says: "The sign.", formulaLatex: "", certainty: "likely" }],
    });
    const unread = await buildFlag({ claimId: claim.id, findingId: finding.id });
    const settled = await buildWrong(here);
    await settleFlag(settling(settled.flag, "stet"), here.second);
    const found = async (query: Record<string, unknown>) =>
      (await listFlags(here.work.id, ask(query), here.second)).rows.map(({ id }) => id);
    expect(await found({ state: "settled" })).toEqual([settled.flag.id]);
    expect(await found({ verdict: "unreadable" })).toEqual([unread.id]);
    expect(await found({ chapter: other.id })).toEqual([unread.id]);
    expect(await found({ assignee: "me" })).toEqual([flag.id]);
    expect(await found({ assignee: "nobody" })).toEqual([unread.id]);
    expect(await found({ slip: "overall-sign" })).toEqual([unread.id]);
    expect(await found({ slip: "overall" })).toEqual([]);
    expect(await found({ state: "all" })).toHaveLength(3);
  });

  it("shows a referee their chapters only, and offers no others", async () => {
    const here = await buildStage();
    const other = await buildChapter({ workId: here.work.id, title: "A secret chapter" });
    await buildWrong(here);
    const claim = await buildClaim({ chapterId: other.id, claimantId: here.claimant.id });
    const hidden = await buildFlag({ claimId: claim.id });
    const list = await listFlags(here.work.id, ask({ state: "all" }), here.referee);
    expect(list).toMatchObject({ total: 1, open: 1 });
    const filters = await listFlagFilters(here.work.id, here.referee);
    expect(JSON.stringify(filters)).not.toContain("secret");
    expect(await codeOf(getFlag(here.work.id, hidden.id, ask(), here.referee))).toBe("not_found");
    expect((await listFlags(here.work.id, ask({ chapter: other.id }), here.referee)).total).toBe(0);
  });

  const addresses: [Record<string, string | string[] | undefined>, string][] = [
    [{}, ""],
    [
      { state: "settled", sort: "age", order: "descending", page: "3" },
      "?state=settled&sort=age&order=descending&page=3",
    ],
    [{ state: ["open", "all"], page: ["1", "2"] }, ""],
    [{ state: "'; drop table flags; --", sort: "version", page: "-1" }, ""],
    [{ page: "1e3", order: "up" }, ""],
    [{ page: "99999999999999999999" }, ""],
    [{ chapter: "../../etc/passwd", assignee: "%27", slip: "a%b_c" }, ""],
    [{ assignee: "me", slip: "cg-for-3j" }, "?assignee=me&slip=cg-for-3j"],
  ];
  for (const [params, expected] of addresses)
    it(`reads ${JSON.stringify(params)} as ${expected || "the whole list"}`, () => {
      const query = readFlagQuery(params);
      expect(flagQueryText(query, { page: query.page })).toBe(expected);
    });
});

describe("a flag of another work", () => {
  it("is not there for a stranger, a member of another work, or production; nor through the right work's address", async () => {
    const { flag } = await buildWrong(stage);
    const elsewhere = await buildStage();
    const outside = [stage.stranger, elsewhere.lead, stage.production];
    for (const user of outside) {
      const codes = await Promise.all([
        codeOf(listFlags(stage.work.id, ask(), user)),
        codeOf(listFlagFilters(stage.work.id, user)),
        codeOf(getFlag(stage.work.id, flag.id, ask(), user)),
        codeOf(settleFlag(settling(flag, "stet"), user)),
        codeOf(takeFlag({ workId: stage.work.id, flagId: flag.id, version: 0 }, user)),
        codeOf(assignFlag({ workId: stage.work.id, flagId: flag.id, version: 0, assigneeId: user.id }, user)),
        codeOf(addMessage({ workId: stage.work.id, flagId: flag.id, body: "hello" }, user)),
      ]);
      expect(new Set(codes)).toEqual(new Set(["not_found"]));
    }
    expect(await codeOf(getFlag(elsewhere.work.id, flag.id, ask(), elsewhere.lead))).toBe("not_found");
    expect(
      await codeOf(settleFlag({ ...settling(flag, "stet"), workId: elsewhere.work.id }, elsewhere.lead)),
    ).toBe("not_found");
    expect(await codeOf(getFlag(stage.work.id, randomUUID(), ask(), stage.lead))).toBe("not_found");
    expect((await flag.reload()).state).toBe("open");
  });
});

describe("assigning", () => {
  it("a lead gives it to anybody but the claimant, strangers, production and referees of other chapters", async () => {
    const { flag } = await buildWrong(stage);
    const elsewhere = await buildMember(stage.work, "referee", { chapterIds: [] });
    const give = async (assigneeId: string | null, user = stage.lead) =>
      codeOf(
        assignFlag(
          { workId: flag.workId, flagId: flag.id, version: (await flag.reload()).version, assigneeId },
          user,
        ),
      );
    expect(await give(stage.claimant.id)).toBe("invalid");
    expect(await give(stage.stranger.id)).toBe("invalid");
    expect(await give(stage.production.id)).toBe("invalid");
    expect(await give(elsewhere.id)).toBe("invalid");
    expect(await give(stage.second.id, stage.second)).toBe("forbidden");
    expect(await give(stage.referee.id)).toBe("ok");
    expect((await flag.reload()).assigneeId).toBe(stage.referee.id);
    expect(await give(null)).toBe("ok");
  });

  it("an author takes it; the claimant and a referee do not", async () => {
    const { flag } = await buildWrong(stage);
    const take = (user = stage.second) =>
      codeOf(takeFlag({ workId: flag.workId, flagId: flag.id, version: 0 }, user));
    expect(await take(stage.claimant)).toBe("forbidden");
    expect(await take(stage.referee)).toBe("forbidden");
    expect(await take()).toBe("ok");
    expect(await take(stage.lead)).toBe("conflict");
  });
});

describe("the page of a flag", () => {
  it("holds both values, evidence, all 72 relatives, the orbit, discussion and history", async () => {
    const here = await buildStage();
    const { flag, claim } = await buildWrong(here, { assigneeId: here.second.id });
    await claim.update({ orbitKey: "k" });
    const relative = await buildClaim({
      chapterId: here.chapter.id,
      quantity: "(1 2 1; 0 0 0)",
      orbitKey: "k",
    });
    await addMessage({ workId: flag.workId, flagId: flag.id, body: "Is the root too short?" }, here.claimant);
    await settleFlag(settling(flag, "correct", { reason: undefined }), here.second);
    const view = await getFlag(here.work.id, flag.id, ask({ state: "all" }), here.lead);
    expect(view).toMatchObject({
      claimed: { text: "sqrt(2)/15", decimal: "0.094280904158206336587" },
      exact: { text: "sqrt(30)/15" },
      state: "settled",
      neighbours: { position: 1, of: 1, previous: null, next: null },
      settlement: { word: "correct", by: { name: here.second.name }, now: { text: "sqrt(30)/15" } },
      may: { settle: false, undo: true },
    });
    expect(view.proof?.variants).toHaveLength(72);
    expect(view.proof?.variants?.every(({ agrees }) => agrees)).toBe(true);
    expect(view.proof?.evidence?.reggeSquare).toHaveLength(3);
    expect(view.orbit.claims.map(({ id }) => id)).toEqual([relative.id]);
    expect(view.messages.map(({ body }) => body)).toEqual(["Is the root too short?"]);
    expect(view.history.map(({ who, says }) => `${who} ${says}`)).toEqual([
      `${here.claimant.name} wrote in the discussion`,
      `${here.second.name} settled it: correct, from sqrt(2)/15 to sqrt(30)/15`,
    ]);
  });

  it("shows an unreadable quantity as it was typed", async () => {
    const { flag } = await buildWrong(stage, { quantity: "(1 1 2; 0 0", claimed: "1" });
    const view = await getFlag(stage.work.id, flag.id, ask(), stage.second);
    expect(view.quantity).toEqual({ text: "(1 1 2; 0 0", latex: null });
    expect(view.proof).toBeNull();
  });
});
