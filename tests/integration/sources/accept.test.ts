import { beforeAll, describe, expect, it } from "vitest";
import type { SessionUser } from "@/lib/auth/user";
import { addClaim } from "@/lib/claims/add-claim";
import { editClaim } from "@/lib/claims/edit-claim";
import { withdrawClaim } from "@/lib/claims/withdraw-claim";
import { AppError } from "@/lib/errors";
import { acceptSource } from "@/lib/sources/accept-source";
import { getSource, type SourceView } from "@/lib/sources/get-source";
import { readUpload } from "@/lib/sources/read-upload";
import { receiveSource } from "@/lib/sources/receive-source";
import { setAsideSource, takeUpSource } from "@/lib/sources/set-aside-source";
import {
  AuditEvent,
  Claim,
  ClaimVersion,
  ConventionsSheet,
  Problem,
  Source,
  Work,
  type Chapter,
} from "@/models";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import {
  buildChapter,
  buildClaim,
  buildFlag,
  buildMember,
  buildProblem,
  buildWork,
  leadOf,
} from "../../factories";

let work: Work;
let chapter: Chapter;
let author: SessionUser;
let second: SessionUser;

beforeAll(async () => {
  work = await buildWork();
  author = await buildMember(work, "author");
  second = await buildMember(work, "author");
  chapter = await buildChapter({ workId: work.id });
});

let files = 0;
const S = "(1 1 2; 0 0 0)";

async function upload(
  rows: string[],
  place: { chapter?: Chapter; name?: string; text?: string } = {},
): Promise<string> {
  const bytes = Buffer.from(place.text ?? `ref,quantity,claimed,note,problem\n${rows.join("\n")}\n`);
  const { bytes: kept, sha256 } = await readUpload({
    headers: new Headers({ "content-length": String(bytes.length) }),
    body: new Blob([bytes]).stream(),
  });
  const { id } = await receiveSource(
    {
      workId: work.id,
      chapterId: (place.chapter ?? chapter).id,
      name: place.name ?? `key-${++files}.csv`,
      bytes: kept,
      sha256,
    },
    author,
  );
  return id;
}

const asSeen = ({ source, fingerprint, conventionsVersion, seenAt }: SourceView) => ({
  workId: work.id,
  sourceId: source.id,
  fingerprint,
  conventionsVersion,
  seenAt,
});
const look = (id: string, ask = {}) => getSource(work.id, id, author, ask);
const accept = async (id: string, rows: "good" | "all" = "good", user = author) =>
  acceptSource({ ...asSeen(await look(id)), rows }, user);

async function failure(promise: Promise<unknown>): Promise<AppError> {
  const error: unknown = await promise.then(
    () => new Error("it succeeded"),
    (reason: unknown) => reason,
  );
  if (error instanceof AppError) return error;
  throw error;
}

const refs = async (of: Chapter) =>
  (await Claim.findAll({ where: { chapterId: of.id }, order: [["position", "ASC"]] })).map(({ ref }) => ref);

describe("accepting a source", () => {
  it("lets nothing in before, and everything in order afterwards, with problems made where they are missing", async () => {
    const own = await buildChapter({ workId: work.id });
    const known = await buildProblem({ chapterId: own.id, label: "1.2" });
    const earlier = await addClaim(
      {
        workId: work.id,
        problemId: known.id,
        ref: "1.2(a)",
        quantity: S,
        claimed: "1/2",
        note: null,
        page: null,
      },
      second,
    );
    const id = await upload(
      [`1.1(a),${S},sqrt(30)/15,,`, `1.1(b),${S},1/3,by table,`, `1.2(b),${S},1/5,,`, `extra,${S},0,,1.3`],
      { chapter: own },
    );
    await look(id);
    expect(await refs(own)).toEqual(["1.2(a)"]);
    expect(await accept(id)).toEqual({ rows: 4, added: 4, replaced: 0, already: false });
    const problems = await Problem.findAll({ where: { chapterId: own.id }, order: [["position", "ASC"]] });
    expect(problems.map(({ label }) => label)).toEqual(["1.2", "1.1", "1.3"]);
    const claims = await Claim.findAll({ where: { chapterId: own.id } });
    const byRef = new Map(claims.map((claim) => [claim.ref, claim]));
    expect(byRef.get("1.1(b)")).toMatchObject({
      problemId: problems[1]?.id,
      position: 1,
      claimed: "1/3",
      note: "by table",
      claimantId: author.id,
      verdict: null,
    });
    expect(byRef.get("1.2(b)")).toMatchObject({ problemId: known.id, position: 1 });
    expect(byRef.get("1.1(a)")?.orbitKey).toBe((await Claim.findByPk(earlier.id))?.orbitKey);
    const versions = await ClaimVersion.findAll({ where: { sourceId: id } });
    expect(versions.map(({ number, origin }) => [number, origin])).toEqual(
      Array.from({ length: 4 }, () => [1, "source"]),
    );
    expect(await Source.findByPk(id, { attributes: { exclude: ["bytes"] } })).toMatchObject({
      state: "accepted",
      acceptedRows: 4,
      acceptedById: author.id,
    });
  });

  it("does it once for twenty who ask at the same moment, and once more does nothing", async () => {
    const own = await buildChapter({ workId: work.id });
    const id = await upload(
      Array.from({ length: 30 }, (_, i) => `once-${i},${S},1/${i + 2},,`),
      { chapter: own },
    );
    const input = { ...asSeen(await look(id)), rows: "good" as const };
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, i) => acceptSource(input, i % 2 ? author : second)),
    );
    expect(answers.filter(({ already }) => !already)).toHaveLength(1);
    expect(answers.every(({ rows }) => rows === 30)).toBe(true);
    expect(await Claim.count({ where: { chapterId: own.id } })).toBe(30);
    expect(await ClaimVersion.count({ where: { sourceId: id } })).toBe(30);
    expect(await AuditEvent.count({ where: { action: "source.accept", subjectId: id } })).toBe(1);
    expect((await acceptSource(input, author)).already).toBe(true);
  });

  it("replaces claims by new versions, closes their flags, and leaves what is unchanged alone", async () => {
    const own = await buildChapter({ workId: work.id });
    const problem = await buildProblem({ chapterId: own.id });
    const [wrong, same] = [
      await buildClaim({ problemId: problem.id, ref: "r(a)", claimed: "1/2" }),
      await buildClaim({ problemId: problem.id, ref: "r(b)" }),
    ];
    const flag = await buildFlag({ claimId: wrong.id });
    const { version } = await wrong.reload();
    const id = await upload([`r(a),${S},sqrt(30)/15,,`, `r(b),${S},sqrt(30)/15,,`], { chapter: own });
    const view = await look(id);
    expect(view.rows.map(({ effect, standing }) => [effect, standing?.claimed])).toEqual([
      ["replaces", "1/2"],
      ["nothing", "sqrt(30)/15"],
    ]);
    expect(await accept(id)).toMatchObject({ rows: 1, added: 0, replaced: 1 });
    await Promise.all([wrong.reload(), same.reload(), flag.reload()]);
    expect([wrong.current, wrong.claimed, wrong.claimantId, wrong.verdict, wrong.findingId]).toEqual([
      2,
      "sqrt(30)/15",
      author.id,
      null,
      null,
    ]);
    expect([wrong.version, wrong.ref, wrong.problemId]).toEqual([version + 1, "r(a)", problem.id]);
    expect([same.current, same.version, flag.state]).toEqual([1, 0, "superseded"]);
  });

  it("takes the good rows only, or the unreadable as well, but never what is refused", async () => {
    const own = await buildChapter({ workId: work.id });
    const id = await upload([`g(a),${S},1/3,,`, "g(b),(1 1 2; 0 0,1/3,,"], { chapter: own });
    expect((await look(id)).counts).toMatchObject({ rows: 2, adds: 2, unreadable: 1, refused: 0 });
    expect((await accept(id)).rows).toBe(1);
    expect(await refs(own)).toEqual(["g(a)"]);
    const again = await upload([`g(c),${S},1/3,,`, "g(d),(1 1 2; 0 0,1/3,,"], { chapter: own });
    expect((await accept(again, "all")).rows).toBe(2);
    const broken = await upload([`g(e),${S},1/3,,`, `g(e),${S},1/4,,`], { chapter: own });
    expect((await failure(accept(broken, "all"))).code).toBe("invalid");
    const elsewhere = await upload([`g(a),${S},1/9,,`, `g(f),${S},1/9,,`], { chapter });
    expect((await failure(accept(elsewhere, "all"))).code).toBe("invalid");
    expect((await accept(elsewhere)).rows).toBe(1);
  });

  it("refuses when a claim that it concerns was changed after the preview, and says which and by whom", async () => {
    const own = await buildChapter({ workId: work.id });
    const problem = await buildProblem({ chapterId: own.id });
    const claim = await buildClaim({ problemId: problem.id, ref: "c(a)", claimed: "1/2" });
    const id = await upload([`c(a),${S},1/3,,`, `c(b),${S},1/3,,`], { chapter: own });
    const seen = asSeen(await look(id));
    await editClaim(
      {
        workId: work.id,
        claimId: claim.id,
        version: claim.version,
        ref: "c(a)",
        quantity: S,
        claimed: "1/7",
        note: null,
        page: null,
      },
      second,
    );
    const refused = await failure(acceptSource({ ...seen, rows: "good" }, author));
    expect([refused.code, refused.message]).toEqual([
      "conflict",
      expect.stringContaining(`c(a) was changed by ${second.name} since you opened this page`),
    ]);
    expect(await refs(own)).toEqual(["c(a)"]);
    expect((await accept(id)).rows).toBe(2);
  });

  it("refuses when a ref was taken or a claim withdrawn in the meantime, but not for a change elsewhere", async () => {
    const own = await buildChapter({ workId: work.id });
    const problem = await buildProblem({ chapterId: own.id });
    const id = await upload([`t(a),${S},1/3,,`], { chapter: own });
    const seen = asSeen(await look(id));
    const add = (ref: string) =>
      addClaim(
        { workId: work.id, problemId: problem.id, ref, quantity: S, claimed: "1/2", note: null, page: null },
        second,
      );
    await add("t(z)");
    const taken = await add("t(a)");
    expect((await failure(acceptSource({ ...seen, rows: "good" }, author))).message).toContain(
      "t(a) was changed",
    );
    const now = asSeen(await look(id));
    await withdrawClaim({ workId: work.id, claimId: taken.id, version: 0 }, second);
    expect((await failure(acceptSource({ ...now, rows: "good" }, author))).code).toBe("conflict");
    expect((await failure(accept(id))).code).toBe("invalid");
    const fresh = await upload([`t(b),${S},1/3,,`], { chapter: own });
    const before = asSeen(await look(fresh));
    await add("t(y)");
    expect((await acceptSource({ ...before, rows: "good" }, author)).rows).toBe(1);
  });

  it("refuses when the conventions sheet was changed after the preview", async () => {
    const own = await buildChapter({ workId: work.id });
    const id = await upload([`s(a),${S},1/3,,`], { chapter: own });
    const seen = asSeen(await look(id));
    await ConventionsSheet.create({
      workId: work.id,
      version: 2,
      choices: { ...DEFAULT_CONVENTIONS, houseForm: "single-root" },
      createdById: author.id,
    });
    await Work.update({ conventionsVersion: 2 }, { where: { id: work.id } });
    expect((await failure(acceptSource({ ...seen, rows: "good" }, author))).message).toContain(
      "conventions sheet was changed",
    );
    expect((await accept(id)).rows).toBe(1);
  });

  it("asks for a choice where a JSON key states other conventions, and rewrites only when told to", async () => {
    const own = await buildChapter({ workId: work.id });
    const text = JSON.stringify({
      conventions: { cgOrder: "j1j2m1m2" },
      claims: [{ ref: "j(a)", quantity: "<1 1/2 0 1/2 | 3/2 1/2>", claimed: "sqrt(2/3)" }],
    });
    const id = await upload([], { chapter: own, name: "key.json", text });
    const view = await look(id);
    expect([view.choice, view.differs.length, view.rows[0]?.quantity]).toEqual([
      null,
      1,
      "<1 1/2 0 1/2 | 3/2 1/2>",
    ]);
    expect((await failure(accept(id, "all"))).code).toBe("invalid");
    const chosen = await look(id, { choice: "file" });
    expect(chosen.rows[0]).toMatchObject({
      quantity: "<1 0 1/2 1/2 | 3/2 1/2>",
      written: { quantity: "<1 1/2 0 1/2 | 3/2 1/2>" },
    });
    await acceptSource({ ...asSeen(chosen), rows: "good", conventions: "file" }, author);
    expect((await Claim.findOne({ where: { workId: work.id, ref: "j(a)" } }))?.quantity).toBe(
      "<1 0 1/2 1/2 | 3/2 1/2>",
    );
    // A fingerprint of one choice does not serve for the other.
    const other = await upload([], { chapter: own, name: "key.json", text: text.replace("j(a)", "j(b)") });
    const bySheet = asSeen(await look(other, { choice: "sheet" }));
    expect(
      (await failure(acceptSource({ ...bySheet, rows: "good", conventions: "file" }, author))).code,
    ).toBe("conflict");
  });

  it("is all or nothing: when the last row fails, nothing has entered", async () => {
    const own = await buildChapter({ workId: work.id });
    const rows = Array.from({ length: 40 }, (_, i) => `n-${i},${S},1/3,,`);
    const id = await upload(rows, { chapter: own });
    const seen = asSeen(await look(id));
    // Two sources with the same refs at once: one of them must fail as a whole.
    const twin = await upload([...rows, `n-x,${S},1/3,,`], { chapter: own });
    const seenTwin = asSeen(await look(twin));
    const both = await Promise.allSettled([
      acceptSource({ ...seen, rows: "good" }, author),
      acceptSource({ ...seenTwin, rows: "good" }, second),
    ]);
    const won = both.filter(({ status }) => status === "fulfilled") as PromiseFulfilledResult<{
      rows: number;
    }>[];
    expect(won).toHaveLength(1);
    expect(await Claim.count({ where: { chapterId: own.id } })).toBe(won[0]?.value.rows);
    expect(await ClaimVersion.count({ where: { sourceId: [id, twin] } })).toBe(won[0]?.value.rows);
  });

  it("can be set aside, which lets nothing in, and taken up again", async () => {
    const own = await buildChapter({ workId: work.id });
    const id = await upload([`a(a),${S},1/3,,`], { chapter: own });
    const seen = asSeen(await look(id));
    await setAsideSource({ workId: work.id, sourceId: id }, author);
    expect((await failure(acceptSource({ ...seen, rows: "good" }, author))).code).toBe("conflict");
    await takeUpSource({ workId: work.id, sourceId: id }, author);
    expect((await accept(id)).rows).toBe(1);
    expect((await failure(setAsideSource({ workId: work.id, sourceId: id }, author))).code).toBe("conflict");
    await takeUpSource({ workId: work.id, sourceId: id }, author);
    expect((await look(id)).counts).toMatchObject({ nothing: 1 });
    expect((await failure(accept(id))).message).toContain("nothing to accept");
  });

  it("takes 1,500 rows at once, and again when every one of them replaces a claim", async () => {
    const own = await buildChapter({ workId: work.id });
    const rows = (value: string) => Array.from({ length: 1_500 }, (_, i) => `big-${i}(a),${S},${value},,`);
    expect((await accept(await upload(rows("1/3"), { chapter: own }))).added).toBe(1_500);
    expect((await accept(await upload(rows("1/5"), { chapter: own }))).replaced).toBe(1_500);
    expect(await Claim.count({ where: { chapterId: own.id, claimed: "1/5", current: 2 } })).toBe(1_500);
    expect(await Problem.count({ where: { chapterId: own.id } })).toBe(1_500);
  });

  it("does not exist for strangers, production and referees; ids of two works do not mix", async () => {
    const id = await upload([`w(a),${S},1/3,,`]);
    const seen = asSeen(await look(id));
    const other = await buildWork();
    const stranger = await leadOf(other);
    const people = [
      stranger,
      await buildMember(work, "production"),
      await buildMember(work, "referee", { chapterIds: [chapter.id] }),
    ];
    for (const user of people) {
      const tries = [
        acceptSource({ ...seen, rows: "good" }, user),
        setAsideSource({ workId: work.id, sourceId: id }, user),
        takeUpSource({ workId: work.id, sourceId: id }, user),
      ];
      expect((await Promise.all(tries.map(failure))).map(({ code }) => code)).toEqual(
        tries.map(() => "not_found"),
      );
    }
    expect((await failure(acceptSource({ ...seen, workId: other.id, rows: "good" }, stranger))).code).toBe(
      "not_found",
    );
    expect((await look(id)).source.state).toBe("received");
  });
});
