import type { Options } from "sequelize";
import { beforeAll, describe, expect, it } from "vitest";
import type { SessionUser } from "@/lib/auth/user";
import { addClaim } from "@/lib/claims/add-claim";
import { editClaim } from "@/lib/claims/edit-claim";
import { getClaim } from "@/lib/claims/get-claim";
import { getGalley } from "@/lib/claims/get-galley";
import { moveClaim } from "@/lib/claims/move-claim";
import { restoreClaim, withdrawClaim } from "@/lib/claims/withdraw-claim";
import { AppError } from "@/lib/errors";
import { AuditEvent, Claim, ClaimVersion, Flag, Problem, type Chapter, type Work } from "@/models";
import {
  buildChapter,
  buildClaim,
  buildFinding,
  buildFlag,
  buildMember,
  buildProblem,
  buildSettlement,
  buildWork,
} from "../../factories";

let work: Work;
let chapter: Chapter;
let author: SessionUser;
let second: SessionUser;

beforeAll(async () => {
  work = await buildWork();
  chapter = await buildChapter({ workId: work.id });
  author = await buildMember(work, "author");
  second = await buildMember(work, "author");
});

const text = (ref: string, given = {}) => ({
  ref,
  quantity: "(1 1 2; 0 0 0)",
  claimed: "sqrt(30)/15",
  note: null,
  page: null,
  ...given,
});

/** The AppError that a promise ends with. */
async function failure(promise: Promise<unknown>): Promise<AppError> {
  const error: unknown = await promise.then(
    () => new Error("it succeeded"),
    (reason: unknown) => reason,
  );
  if (error instanceof AppError) return error;
  throw error;
}

async function newClaim(ref: string, by = author) {
  const problem = await buildProblem({ chapterId: chapter.id });
  const { id } = await addClaim({ workId: work.id, problemId: problem.id, ...text(ref) }, by);
  return Claim.findByPk(id, { rejectOnEmpty: true });
}

const editing = (claim: Claim, given = {}) => ({
  workId: work.id,
  claimId: claim.id,
  version: claim.version,
  ...text(claim.ref),
  ...given,
});

describe("adding a claim", () => {
  it("saves it whatever the verdict, with its first version, its orbit and an audit event", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const wrong = await addClaim(
      { workId: work.id, problemId: problem.id, ...text("A(a)", { claimed: "7/9", note: "by hand" }) },
      author,
    );
    const unread = await addClaim(
      { workId: work.id, problemId: problem.id, ...text("A(b)", { quantity: "(1 1 2; 0 0" }) },
      author,
    );
    const [a, b] = await Promise.all(
      [wrong, unread].map(({ id }) => Claim.findByPk(id, { rejectOnEmpty: true })),
    );
    expect([a?.claimed, a?.verdict, a?.claimantId, a?.position]).toEqual(["7/9", null, author.id, 0]);
    expect([b?.position, b?.orbitKey]).toEqual([1, null]);
    expect(a?.orbitKey).toMatch(/./);
    expect(await ClaimVersion.findAll({ where: { claimId: wrong.id }, raw: true })).toMatchObject([
      { number: 1, origin: "typed", note: "by hand", authorId: author.id },
    ]);
    expect(
      await AuditEvent.count({ where: { action: "claim.add", subjectId: wrong.id, actorId: author.id } }),
    ).toBe(1);
  });

  it("saves a symbol past the engine's limit too, without an orbit", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const huge = text("huge(a)", { quantity: "(6000 6000 2; 0 0 0)", claimed: "1/7" });
    const { id } = await addClaim({ workId: work.id, problemId: problem.id, ...huge }, author);
    expect((await Claim.findByPk(id, { rejectOnEmpty: true })).orbitKey).toBeNull();
  });

  it("gives symbols that a symmetry joins the same orbit, a 3j and its CG coefficient among them", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const made = await Promise.all(
      ["(1 1 2; 0 0 0)", "(2 1 1; 0 0 0)", "<1 0 1 0 | 2 0>"].map((quantity, i) =>
        addClaim({ workId: work.id, problemId: problem.id, ...text(`orbit-${i}`, { quantity }) }, author),
      ),
    );
    const keys = (await Claim.findAll({ where: { id: made.map(({ id }) => id) } })).map(
      ({ orbitKey }) => orbitKey,
    );
    expect(new Set(keys).size).toBe(1);
  });

  it("refuses a taken reference at its field, but keeps 7.3(a) and 7.3(A) apart", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const add = (ref: string) => addClaim({ workId: work.id, problemId: problem.id, ...text(ref) }, author);
    await add("7.3(a)");
    await add("7.3(A)");
    const refused = await failure(add("7.3(a)"));
    expect([refused.code, refused.fields?.ref?.[0]]).toEqual([
      "invalid",
      "This work already has a claim 7.3(a). Choose another reference.",
    ]);
  });

  it("lets one of twenty at once have a reference and gives the others the error at the field", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const tries = await Promise.allSettled(
      Array.from({ length: 20 }, () =>
        addClaim({ workId: work.id, problemId: problem.id, ...text("race(a)") }, author),
      ),
    );
    expect(tries.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    for (const each of tries)
      if (each.status === "rejected") expect((each.reason as AppError).fields).toHaveProperty("ref");
    expect(await Claim.count({ where: { workId: work.id, ref: "race(a)" } })).toBe(1);
  });

  it("gives twenty claims added at once twenty places", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    await Promise.all(
      Array.from({ length: 20 }, (_, i) =>
        addClaim({ workId: work.id, problemId: problem.id, ...text(`place-${i}`) }, author),
      ),
    );
    const places = (await Claim.findAll({ where: { problemId: problem.id } })).map(
      ({ position }) => position,
    );
    expect(places.sort((a, b) => a - b)).toEqual(Array.from({ length: 20 }, (_, i) => i));
  });
});

describe("editing a claim", () => {
  it("makes a new unchecked version of the editor's, keeps the old one, and closes the open flag", async () => {
    const claim = await newClaim("edit(a)");
    const flag = await buildFlag({ claimId: claim.id });
    await claim.reload();
    const edited = await editClaim(editing(claim, { claimed: "sqrt(2/15)" }), second);
    expect(edited.change).toBe("version");
    await claim.reload();
    expect([claim.current, claim.claimed, claim.verdict, claim.findingId, claim.claimantId]).toEqual([
      2,
      "sqrt(2/15)",
      null,
      null,
      second.id,
    ]);
    const versions = await ClaimVersion.findAll({ where: { claimId: claim.id }, order: [["number", "ASC"]] });
    expect(versions.map(({ claimed, authorId }) => [claimed, authorId])).toEqual([
      ["sqrt(30)/15", author.id],
      ["sqrt(2/15)", second.id],
    ]);
    await flag.reload();
    expect([flag.state, flag.openClaimId]).toEqual(["superseded", null]);
  });

  it("changes only the reference without touching the verdict", async () => {
    const claim = await newClaim("old-ref");
    await buildFinding({ claimId: claim.id, verdict: "confirmed" });
    await claim.reload();
    expect((await editClaim(editing(claim, { ref: "new-ref" }), author)).change).toBe("ref");
    await claim.reload();
    expect([claim.ref, claim.current, claim.verdict]).toEqual(["new-ref", 1, "confirmed"]);
  });

  it("changes nothing when nothing was changed, except where a settling asked for another version", async () => {
    const claim = await newClaim("same(a)");
    expect((await editClaim(editing(claim), author)).change).toBe("nothing");
    const flag = await buildFlag({ claimId: claim.id, state: "settled" });
    await buildSettlement({
      flagId: flag.id,
      settlerId: second.id,
      word: "reword",
      reason: "The sign of m is unclear.",
    });
    await claim.reload();
    expect((await editClaim(editing(claim), author)).change).toBe("version");
    expect((await claim.reload()).current).toBe(2);
  });

  it("lets one of two people win; the other gets what is stored now, and neither text is lost", async () => {
    for (let round = 0; round < 10; round++) {
      const claim = await newClaim(`race-${round}`);
      const [mine, theirs] = await Promise.allSettled([
        editClaim(editing(claim, { claimed: "1/3" }), author),
        editClaim(editing(claim, { claimed: "1/5" }), second),
      ]);
      const lost = [mine, theirs].filter((each) => each.status === "rejected");
      expect(lost).toHaveLength(1);
      const won =
        mine.status === "fulfilled"
          ? { claimed: "1/3", by: author.name }
          : { claimed: "1/5", by: second.name };
      const conflict = (lost[0] as PromiseRejectedResult).reason as AppError;
      expect(conflict.code).toBe("conflict");
      expect(conflict.details?.stored).toMatchObject({ ...won, version: (await claim.reload()).version });
      expect(claim.current).toBe(2);
    }
  });

  it("takes a second press of the same button for the first", async () => {
    const claim = await newClaim("twice(a)");
    const input = editing(claim, { claimed: "1/7" });
    await editClaim(input, author);
    expect((await editClaim(input, author)).change).toBe("nothing");
    expect((await claim.reload()).current).toBe(2);
  });

  it("refuses a reference that another claim has", async () => {
    const claim = await newClaim("mine(a)");
    await newClaim("theirs(a)");
    expect((await failure(editClaim(editing(claim, { ref: "theirs(a)" }), author))).fields).toHaveProperty(
      "ref",
    );
  });
});

describe("withdrawing, restoring and ordering", () => {
  it("takes a claim out of the key and brings it back unchecked, its claimant unchanged", async () => {
    const claim = await newClaim("gone(a)");
    const flag = await buildFlag({ claimId: claim.id });
    await claim.reload();
    const at = { workId: work.id, claimId: claim.id };
    const { version } = await withdrawClaim({ ...at, version: claim.version }, second);
    expect((await claim.reload()).withdrawnAt).not.toBeNull();
    expect((await flag.reload()).state).toBe("superseded");
    expect(await withdrawClaim({ ...at, version: 0 }, second)).toEqual({ version });
    await restoreClaim({ ...at, version }, second);
    await claim.reload();
    expect([claim.withdrawnAt, claim.current, claim.verdict, claim.claimantId]).toEqual([
      null,
      2,
      null,
      author.id,
    ]);
    expect(await ClaimVersion.findOne({ where: { claimId: claim.id, number: 2 }, raw: true })).toMatchObject({
      origin: "restored",
      authorId: second.id,
    });
  });

  it("refuses to withdraw what was changed in the meantime", async () => {
    const claim = await newClaim("stale(a)");
    await editClaim(editing(claim, { claimed: "1/9" }), second);
    const refused = await failure(
      withdrawClaim({ workId: work.id, claimId: claim.id, version: claim.version }, author),
    );
    expect([refused.code, (refused.details?.stored as { claimed: string }).claimed]).toEqual([
      "conflict",
      "1/9",
    ]);
  });

  it("moves a claim by one place, and not past an end", async () => {
    const problem = await buildProblem({ chapterId: chapter.id });
    const ids: string[] = [];
    for (const letter of "abc")
      ids.push(
        (await addClaim({ workId: work.id, problemId: problem.id, ...text(`order(${letter})`) }, author)).id,
      );
    const order = async () =>
      (await Claim.findAll({ where: { problemId: problem.id }, order: [["position", "ASC"]] }))
        .map(({ ref }) => ref.slice(-2, -1))
        .join("");
    const move = (i: number, to: "earlier" | "later") =>
      moveClaim({ workId: work.id, claimId: ids[i] ?? "", to }, author);
    await move(2, "earlier");
    expect(await order()).toBe("acb");
    expect(await move(0, "earlier")).toEqual({ moved: false });
    const before = (await Claim.findByPk(ids[0] ?? "", { rejectOnEmpty: true })).version;
    await Promise.all([move(0, "later"), move(1, "earlier"), move(2, "later")]);
    expect((await order()).split("").sort().join("")).toBe("abc");
    const places = (
      await Claim.findAll({ where: { problemId: problem.id }, order: [["position", "ASC"]] })
    ).map(({ position }) => position);
    expect(places).toEqual([0, 1, 2]);
    expect((await Claim.findByPk(ids[0] ?? "", { rejectOnEmpty: true })).version).toBe(before);
  });
});

describe("who may", () => {
  it("answers a stranger and production 404, a referee of the chapter with a refusal, of another chapter 404", async () => {
    const claim = await newClaim("guard(a)");
    const problem = await Problem.findByPk(claim.problemId, { rejectOnEmpty: true });
    const stranger = await buildMember(await buildWork(), "lead");
    const production = await buildMember(work, "production");
    const inside = await buildMember(work, "referee", { chapterIds: [chapter.id] });
    const outside = await buildMember(work, "referee", { chapterIds: [] });
    const at = { workId: work.id, claimId: claim.id, version: claim.version };
    const each = (user: SessionUser) => [
      getGalley(work.id, chapter.id, user),
      getClaim(work.id, claim.id, user),
      addClaim({ workId: work.id, problemId: problem.id, ...text("guard(b)") }, user),
      editClaim({ ...at, ...text("guard(c)") }, user),
      moveClaim({ ...at, to: "later" }, user),
      withdrawClaim(at, user),
      restoreClaim(at, user),
    ];
    const codes = (user: SessionUser) =>
      Promise.all(
        each(user).map((promise) =>
          promise.then(
            () => "ok",
            (error: AppError) => error.code,
          ),
        ),
      );
    const nothing = Array.from({ length: 7 }, () => "not_found");
    expect(await codes(stranger)).toEqual(nothing);
    expect(await codes(production)).toEqual(nothing);
    expect(await codes(outside)).toEqual(nothing);
    expect(await codes(inside)).toEqual(["ok", "ok", ...Array.from({ length: 5 }, () => "forbidden")]);
    expect((await claim.reload()).withdrawnAt).toBeNull();
  });

  it("finds nothing when ids of two works are mixed in one request", async () => {
    const other = await buildWork();
    const lead = await buildMember(other, "lead");
    const mine = await buildClaim({ workId: other.id });
    const foreign = await newClaim("mixed(a)");
    const foreignProblem = await buildProblem({ chapterId: chapter.id });
    const tries: Promise<unknown>[] = [
      getGalley(other.id, chapter.id, lead),
      getClaim(other.id, foreign.id, lead),
      editClaim({ workId: other.id, claimId: foreign.id, version: 0, ...text("mixed(b)") }, lead),
      addClaim({ workId: other.id, problemId: foreignProblem.id, ...text("mixed(c)") }, lead),
      editClaim({ workId: work.id, claimId: mine.id, version: 0, ...text("mixed(d)") }, author),
      withdrawClaim({ workId: other.id, claimId: foreign.id, version: 0 }, lead),
    ];
    const failures = await Promise.all(tries.map(failure));
    expect(failures.map(({ code }) => code)).toEqual(tries.map(() => "not_found"));
  });
});

describe("reading", () => {
  it("shows the galley by pages without a query for each claim", async () => {
    const own = await buildWork();
    const lead = await buildMember(own, "lead");
    const many = await buildChapter({ workId: own.id });
    const made: Claim[] = [];
    for (let i = 0; i < 4; i++) {
      const problem = await buildProblem({ chapterId: many.id });
      for (let k = 0; k < 25; k++)
        made.push(await buildClaim({ problemId: problem.id, ref: `${problem.label}-${k}` }));
    }
    await buildFlag({ claimId: made[30]?.id ?? "" });
    const { sequelize } = await import("@/models");
    let queries = 0;
    const settings = (sequelize as unknown as { options: Options }).options; // there, though the types leave it out
    settings.logging = () => void (queries += 1);
    const first = await getGalley(own.id, many.id, lead);
    settings.logging = false;
    expect(queries).toBeLessThan(16);
    expect([first.pages, first.strip.length, first.unchecked, first.problems.length]).toEqual([
      2, 100, 99, 2,
    ]);
    const flagged = first.problems[1]?.claims.find(({ id }) => id === made[30]?.id);
    expect([flagged?.verdict, flagged?.flag?.state, flagged?.finding?.exact?.text]).toEqual([
      "discrepant",
      "open",
      "sqrt(30)/15",
    ]);
    const there = await getGalley(own.id, many.id, lead, { claimId: made[80]?.id ?? "" });
    expect(there.page).toBe(2);
    expect(there.problems.flatMap(({ claims }) => claims.map(({ id }) => id))).toContain(made[80]?.id);
  });

  it("shows one claim with its versions and its findings over runs", async () => {
    const claim = await newClaim("history(a)");
    await buildFinding({ claimId: claim.id });
    await claim.reload();
    await editClaim(editing(claim, { claimed: "sqrt(2/15)" }), second);
    await buildFinding({ claimId: claim.id, verdict: "confirmed-not-house-form" });
    const view = await getClaim(work.id, claim.id, second);
    expect(view.versions.map(({ number, claimed, author: by }) => [number, claimed, by])).toEqual([
      [2, "sqrt(2/15)", second.name],
      [1, "sqrt(30)/15", author.name],
    ]);
    expect(view.findings.map(({ verdict, claimVersion }) => [verdict, claimVersion])).toEqual([
      ["confirmed-not-house-form", 2],
      ["discrepant", 1],
    ]);
    expect([view.claim.verdict, view.claim.own, view.claim.reading.errors]).toEqual([
      "confirmed-not-house-form",
      true,
      [],
    ]);
    expect(await Flag.count({ where: { claimId: claim.id } })).toBe(0);
  });
});
