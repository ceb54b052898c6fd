import { beforeAll, describe, expect, it } from "vitest";
import type { SessionUser } from "@/lib/auth/user";
import { AppError } from "@/lib/errors";
import { addProblem } from "@/lib/problems/add-problem";
import { editProblem } from "@/lib/problems/edit-problem";
import { moveProblem } from "@/lib/problems/move-problem";
import { removeProblem } from "@/lib/problems/remove-problem";
import { AuditEvent, Problem, type Chapter, type Work } from "@/models";
import { buildChapter, buildClaim, buildMember, buildWork } from "../../factories";

let work: Work;
let author: SessionUser;

beforeAll(async () => {
  work = await buildWork();
  author = await buildMember(work, "author");
});

const codeOf = (promise: Promise<unknown>) =>
  promise.then(
    () => "ok",
    (error: AppError) => error.code,
  );
const add = (chapter: Chapter, label: string, user = author) =>
  addProblem({ workId: work.id, chapterId: chapter.id, label, statement: "Evaluate $j$." }, user);
const order = async (chapter: Chapter) =>
  (await Problem.findAll({ where: { chapterId: chapter.id }, order: [["position", "ASC"]] })).map(
    ({ label }) => label,
  );

describe("problems", () => {
  it("stand in the order in which they were added and can change places", async () => {
    const chapter = await buildChapter({ workId: work.id });
    const [a, , c] = [await add(chapter, "1.1"), await add(chapter, "1.2"), await add(chapter, "1.3")];
    expect(await order(chapter)).toEqual(["1.1", "1.2", "1.3"]);
    expect(await moveProblem({ workId: work.id, problemId: c.id, to: "earlier" }, author)).toEqual({
      moved: true,
    });
    expect(await moveProblem({ workId: work.id, problemId: a.id, to: "earlier" }, author)).toEqual({
      moved: false,
    });
    expect(await order(chapter)).toEqual(["1.1", "1.3", "1.2"]);
  });

  it("refuse a label twice in a chapter, at its field, also when two people are equally quick", async () => {
    const chapter = await buildChapter({ workId: work.id });
    const tries = await Promise.allSettled(Array.from({ length: 8 }, () => add(chapter, "2.1")));
    expect(tries.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    for (const each of tries)
      if (each.status === "rejected")
        expect((each.reason as AppError).fields?.label?.[0]).toContain("already has a problem 2.1");
    await add(await buildChapter({ workId: work.id }), "2.1");
  });

  it("carry what is stored to somebody who saved too late, and the second press of a button does nothing", async () => {
    const chapter = await buildChapter({ workId: work.id });
    const { id: problemId } = await add(chapter, "3.1");
    const input = { workId: work.id, problemId, version: 0, label: "3.1", statement: "New words." };
    await editProblem(input, author);
    expect((await editProblem(input, author)).version).toBe(1);
    const late: AppError = await editProblem({ ...input, statement: "Other words." }, author).then(
      () => new AppError("invalid", "it was saved"),
      (error: AppError) => error,
    );
    expect([late.code, late.details?.stored]).toEqual([
      "conflict",
      { version: 1, label: "3.1", statement: "New words." },
    ]);
    expect((await Problem.findByPk(problemId, { rejectOnEmpty: true })).statement).toBe("New words.");
  });

  it("are removed only when they never had a claim", async () => {
    const chapter = await buildChapter({ workId: work.id });
    const [empty, used] = [await add(chapter, "4.1"), await add(chapter, "4.2")];
    await buildClaim({ problemId: used.id, withdrawnAt: new Date() });
    expect(await codeOf(removeProblem({ workId: work.id, problemId: used.id }, author))).toBe("conflict");
    await removeProblem({ workId: work.id, problemId: empty.id }, author);
    expect(await order(chapter)).toEqual(["4.2"]);
    expect(await AuditEvent.count({ where: { action: "problem.remove", subjectId: empty.id } })).toBe(1);
  });

  it("do not exist for strangers, production, and referees of other chapters", async () => {
    const chapter = await buildChapter({ workId: work.id });
    const { id: problemId } = await add(chapter, "5.1");
    const tries = (user: SessionUser) =>
      Promise.all([
        codeOf(add(chapter, "5.2", user)),
        codeOf(editProblem({ workId: work.id, problemId, version: 0, label: "5.1", statement: "x" }, user)),
        codeOf(moveProblem({ workId: work.id, problemId, to: "later" }, user)),
        codeOf(removeProblem({ workId: work.id, problemId }, user)),
      ]);
    const nothing = Array.from({ length: 4 }, () => "not_found");
    expect(await tries(await buildMember(await buildWork(), "lead"))).toEqual(nothing);
    expect(await tries(await buildMember(work, "production"))).toEqual(nothing);
    expect(await tries(await buildMember(work, "referee", { chapterIds: [] }))).toEqual(nothing);
    expect(await tries(await buildMember(work, "referee", { chapterIds: [chapter.id] }))).toEqual(
      Array.from({ length: 4 }, () => "forbidden"),
    );
  });
});
