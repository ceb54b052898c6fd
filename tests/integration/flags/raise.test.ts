import { afterAll, beforeEach, describe, expect, it } from "vitest";

import { raiseFlags } from "@/lib/flags/raise-flags";
import { settleFlag } from "@/lib/flags/settle-flag";
import { undoSettlement } from "@/lib/flags/undo-settlement";
import { Flag, Outbox, sequelize } from "@/models";
import {
  buildChapter,
  buildClaim,
  buildFinding,
  buildMember,
  buildRun,
  buildWork,
  leadOf,
} from "../../factories";
import { buildStage, settling, type Stage } from "./stage";

const raise = (runId: string) => sequelize.transaction((transaction) => raiseFlags(runId, transaction));

let stage: Stage;
beforeEach(async () => {
  stage = await buildStage();
});
afterAll(() => sequelize.close());

/** A run with one finding of each verdict given, on claims of the claimant. */
async function runWith(
  verdicts: Parameters<typeof buildFinding>[0]["verdict"][],
  claimantId = stage.claimant.id,
) {
  const run = await buildRun({ workId: stage.work.id, total: verdicts.length });
  const claims = [];
  for (const verdict of verdicts) {
    const claim = await buildClaim({ chapterId: stage.chapter.id, claimantId });
    await buildFinding({ claimId: claim.id, runId: run.id, verdict });
    claims.push(claim);
  }
  return { run, claims };
}

describe("raiseFlags", () => {
  it("raises for discrepant, contradicted and unreadable, and for nothing else", async () => {
    const { run, claims } = await runWith([
      "confirmed",
      "confirmed-not-house-form",
      "discrepant",
      "contradicted",
      "unreadable",
      "undecided",
    ]);
    expect(await raise(run.id)).toMatchObject({ raised: 3, superseded: 0 });
    const flagged = (await Flag.findAll({ where: { runId: run.id } })).map(({ claimId }) => claimId);
    expect(new Set(flagged)).toEqual(new Set(claims.slice(2, 5).map(({ id }) => id)));
  });

  it("does nothing the second time", async () => {
    const { run } = await runWith(["discrepant"]);
    await raise(run.id);
    expect(await raise(run.id)).toMatchObject({ raised: 0, superseded: 0, told: [] });
    expect(await Flag.count({ where: { runId: run.id } })).toBe(1);
  });

  it("gives flags to authors and referees of the chapter evenly, never to the claimant, and to a lead only for want of others", async () => {
    const { run } = await runWith(Array.from({ length: 8 }, () => "discrepant" as const));
    await raise(run.id);
    const flags = await Flag.findAll({ where: { runId: run.id } });
    const count = (id: string) => flags.filter(({ assigneeId }) => assigneeId === id).length;
    expect([count(stage.second.id), count(stage.referee.id)]).toEqual([4, 4]);
    expect(count(stage.claimant.id) + count(stage.lead.id) + count(stage.production.id)).toBe(0);
  });

  it("passes over a referee who does not have the chapter", async () => {
    const other = await buildChapter({ workId: stage.work.id });
    const claim = await buildClaim({ chapterId: other.id, claimantId: stage.claimant.id });
    const { runId } = await buildFinding({ claimId: claim.id, verdict: "discrepant" });
    await raise(runId);
    const flag = await Flag.findOne({ where: { claimId: claim.id }, rejectOnEmpty: true });
    expect(flag.assigneeId).toBe(stage.second.id);
  });

  it("falls to the lead when nobody else is there, and to nobody when the lead is the claimant", async () => {
    const work = await buildWork();
    const lead = await leadOf(work);
    const chapter = await buildChapter({ workId: work.id });
    const author = await buildMember(work, "author");
    const byAuthor = await buildClaim({ chapterId: chapter.id, claimantId: author.id });
    const first = await buildFinding({ claimId: byAuthor.id, verdict: "discrepant" });
    await raise(first.runId);
    expect((await Flag.findOne({ where: { claimId: byAuthor.id } }))?.assigneeId).toBe(lead.id);

    const alone = await buildWork();
    const byLead = await buildClaim({ workId: alone.id });
    const second = await buildFinding({ claimId: byLead.id, verdict: "discrepant" });
    await raise(second.runId);
    expect(
      (await Flag.findOne({ where: { claimId: byLead.id }, rejectOnEmpty: true })).assigneeId,
    ).toBeNull();
  });

  it("posts one digest for a person, however many flags", async () => {
    const { run } = await runWith(Array.from({ length: 6 }, () => "discrepant" as const));
    const { told } = await raise(run.id);
    const digests = (await Outbox.findAll({ where: { kind: "flag-digest" } })).filter(
      ({ payload }) => (payload as { workId: string }).workId === stage.work.id,
    );
    expect(digests.map(({ payload }) => (payload as { userId: string }).userId).sort()).toEqual(
      [...told].sort(),
    );
    expect(told).toHaveLength(2);
  });

  it("closes an open flag whose claim is now confirmed", async () => {
    const { run, claims } = await runWith(["discrepant"]);
    await raise(run.id);
    const later = await buildRun({ workId: stage.work.id });
    await buildFinding({ claimId: claims[0]?.id ?? "", runId: later.id, verdict: "confirmed" });
    expect(await raise(later.id)).toMatchObject({ raised: 0, superseded: 1 });
    expect((await Flag.findOne({ where: { runId: run.id }, rejectOnEmpty: true })).state).toBe("superseded");
  });

  it("does not raise again what a person has settled on this version, but does after an undo", async () => {
    const { run, claims } = await runWith(["discrepant"]);
    await raise(run.id);
    const flag = await Flag.findOne({ where: { runId: run.id }, rejectOnEmpty: true });
    await settleFlag(settling(flag, "stet"), stage.lead);
    const again = await buildRun({ workId: stage.work.id });
    await buildFinding({ claimId: claims[0]?.id ?? "", runId: again.id, verdict: "discrepant" });
    expect((await raise(again.id)).raised).toBe(0);
    await flag.reload();
    await undoSettlement({ workId: flag.workId, flagId: flag.id, version: flag.version }, stage.lead);
    const third = await buildRun({ workId: stage.work.id });
    await buildFinding({ claimId: claims[0]?.id ?? "", runId: third.id, verdict: "discrepant" });
    expect((await raise(third.id)).raised).toBe(0);
    expect(await Flag.count({ where: { openClaimId: claims[0]?.id ?? "" } })).toBe(1);
  });

  it("leaves out claims that were changed or withdrawn while the run went on", async () => {
    const { run, claims } = await runWith(["discrepant", "discrepant"]);
    await claims[0]?.reload();
    await claims[0]?.update({ withdrawnAt: new Date() });
    const [, changed] = claims;
    await buildClaimVersion(changed?.id ?? "");
    expect((await raise(run.id)).raised).toBe(0);
  });
});

async function buildClaimVersion(claimId: string) {
  const { Claim, ClaimVersion } = await import("@/models");
  const claim = await Claim.findByPk(claimId, { rejectOnEmpty: true });
  await ClaimVersion.create({
    workId: claim.workId,
    claimId,
    number: 2,
    quantity: claim.quantity,
    claimed: "1",
    authorId: claim.claimantId,
    origin: "typed",
  });
  await claim.update({ current: 2, claimed: "1", verdict: null, findingId: null });
}
