import { afterAll, beforeEach, describe, expect, it } from "vitest";

import { editClaim } from "@/lib/claims/edit-claim";
import type { AppError } from "@/lib/errors";
import { settleFlag } from "@/lib/flags/settle-flag";
import type { Hindrance } from "@/lib/keys/judge-readiness";
import { listKeys } from "@/lib/keys/list-keys";
import { nameWaiver } from "@/lib/keys/name-waiver";
import { preflight } from "@/lib/keys/preflight";
import { NameWaiver } from "@/lib/keys/schema";
import { ConventionsSheet, sequelize } from "@/models";
import { buildClaim, buildRun } from "../../factories";
import { buildStage, buildWrong, settling, type Stage } from "../flags/stage";
import { buildJudged } from "./stage";

let stage: Stage;
beforeEach(async () => {
  stage = await buildStage();
});
afterAll(() => sequelize.close());

const report = () => preflight(stage.work.id, stage.lead);
const kinds = async () => (await report()).groups.map(({ kind, total }) => [kind, total]);

describe("preflight", () => {
  const cases: { name: string; prepare: () => Promise<unknown>; kind: Hindrance | null }[] = [
    { name: "a confirmed claim", prepare: () => buildJudged(stage), kind: null },
    {
      name: "a claim right in another form",
      prepare: () => buildJudged(stage, { claimed: "sqrt(2/15)", verdict: "confirmed-not-house-form" }),
      kind: null,
    },
    {
      name: "a claim that no run has seen",
      prepare: () => buildClaim({ chapterId: stage.chapter.id }),
      kind: "unchecked",
    },
    { name: "an open flag", prepare: () => buildWrong(stage), kind: "open-flag" },
    {
      name: "a wrong claim without a flag",
      prepare: () => buildJudged(stage, { verdict: "discrepant" }),
      kind: "unsettled",
    },
    {
      name: "an undecided claim",
      prepare: () => buildJudged(stage, { verdict: "undecided" }),
      kind: "undecided",
    },
    { name: "correct", prepare: () => settled("correct"), kind: null },
    { name: "stet", prepare: () => settled("stet"), kind: null },
    { name: "reword", prepare: () => settled("reword"), kind: "reword" },
    { name: "withdraw", prepare: () => settled("withdraw"), kind: null },
    {
      name: "a stet on an earlier version",
      prepare: async () => {
        const claim = await settled("stet");
        const { id: claimId, workId, version, ref, quantity } = claim;
        await editClaim(
          { workId, claimId, version, ref, quantity, claimed: "1/7", note: null, page: null },
          stage.claimant,
        );
      },
      kind: "unchecked",
    },
    {
      name: "a verdict under an earlier conventions sheet",
      prepare: async () => {
        await buildJudged(stage);
        await newSheet();
      },
      kind: "old-conventions",
    },
    {
      name: "a correction under an earlier conventions sheet",
      prepare: async () => {
        await settled("correct");
        await newSheet();
      },
      kind: "old-conventions",
    },
  ];
  for (const { name, prepare, kind } of cases)
    it(`${name}: ${kind ?? "passes"}`, async () => {
      await buildJudged(stage);
      if (kind === "old-conventions") {
        await prepare();
        expect((await kinds()).map(([found]) => found)).toEqual([kind]);
        return;
      }
      await prepare();
      expect(await kinds()).toEqual(kind === null ? [] : [[kind, 1]]);
      expect((await report()).ready).toBe(kind === null);
    });

  it("is not ready without any claim, nor while a run is going, and leads to the run", async () => {
    expect((await report()).ready).toBe(false);
    await buildJudged(stage);
    const run = await buildRun({ workId: stage.work.id, state: "running", endedAt: null });
    const going = await report();
    expect(going).toMatchObject({ ready: false, running: { runId: run.id } });
  });

  it("leads to the place and names who can act", async () => {
    const { flag } = await buildWrong(stage, { assigneeId: stage.second.id });
    const [group] = (await report()).groups;
    expect(group?.lines[0]).toMatchObject({
      path: `/works/${stage.work.id}/flags/${flag.id}`,
      who: stage.second.name,
    });
  });

  it("is not for production, a referee or a stranger; production sees keys alone", async () => {
    const codes = await Promise.all(
      [stage.production, stage.referee, stage.stranger].map((user) =>
        preflight(stage.work.id, user).then(
          () => "ok",
          (error: AppError) => error.code,
        ),
      ),
    );
    expect(codes).toEqual(["not_found", "not_found", "not_found"]);
    expect(await listKeys(stage.work.id, stage.production)).toMatchObject({
      preflight: null,
      keys: [],
      may: { freeze: false },
    });
  });
});

describe("a waiver", () => {
  const waive = (claim: { id: string; current: number }, user = stage.lead, claimVersion = claim.current) =>
    nameWaiver(
      {
        workId: stage.work.id,
        claimId: claim.id,
        claimVersion,
        reason: "Beyond the stated limit, checked by hand.",
      },
      user,
    ).then(
      () => "ok",
      (error: AppError) => error.code,
    );

  it("lets an undecided claim pass, once, by a lead, on this version only", async () => {
    const claim = await buildJudged(stage, { verdict: "undecided" });
    expect(await waive(claim, stage.second)).toBe("forbidden");
    expect(await waive(claim, stage.production)).toBe("forbidden");
    expect(await waive(claim, stage.stranger)).toBe("not_found");
    expect(await waive(claim, stage.lead, 2)).toBe("conflict");
    expect(await waive(claim)).toBe("ok");
    expect(await waive(claim)).toBe("conflict");
    expect((await report()).waivers).toMatchObject([{ ref: claim.ref, by: stage.lead.name }]);
    expect((await report()).ready).toBe(true);
  });

  it("is not for a claim that is wrong", async () => {
    expect(await waive(await buildJudged(stage, { verdict: "discrepant" }))).toBe("conflict");
  });

  it("needs a reason", () => {
    const read = NameWaiver.safeParse({
      workId: stage.work.id,
      claimId: stage.work.id,
      claimVersion: 1,
      reason: "  no  ",
    });
    expect(read.success).toBe(false);
  });
});

async function settled(word: "correct" | "stet" | "reword" | "withdraw") {
  const { flag, claim } = await buildWrong(stage);
  await settleFlag(settling(flag, word), stage.second);
  return claim.reload();
}

async function newSheet() {
  await stage.work.reload();
  const version = stage.work.conventionsVersion + 1;
  await ConventionsSheet.create({
    workId: stage.work.id,
    version,
    choices: { houseForm: "any" },
    createdById: stage.lead.id,
    createdAt: new Date(Date.now() + 1_000),
  });
  await stage.work.update({ conventionsVersion: version });
}
