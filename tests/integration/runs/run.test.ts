import { Op } from "sequelize";
import { expect, it } from "vitest";
import { AuditEvent, Claim, ClaimVersion, Finding, Flag, Outbox, Run } from "@/models";
import { workOn } from "@/lib/jobs/work";
import { cancelRun } from "@/lib/runs/cancel-run";
import { getRun } from "@/lib/runs/get-run";
import { batchKey } from "@/lib/runs/going";
import { listRuns } from "@/lib/runs/list-runs";
import { rescueRuns } from "@/lib/runs/rescue-runs";
import { startRun } from "@/lib/runs/start-run";
import { openVerifier } from "@/lib/runs/verifier";
import { buildChapter, buildMember, buildUser, asUser, buildWork } from "../../factories";
import { buildScene, handlers, manyClaims, saidIn, stateOf, workOff, writeClaims } from "./setup";

const never = new AbortController().signal;

it("carries a run from start to end and raises a flag for each wrong claim", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(120));
  const { runId, total } = await startRun(scene, scene.lead);
  expect(total).toBe(120);
  expect(await Finding.count({ where: { runId, verdict: null } })).toBe(120);
  await workOff();

  const view = await getRun({ workId: scene.workId, runId }, scene.author);
  expect(view.progress).toMatchObject({ state: "ended", done: 120, total: 120 });
  const { discrepant, contradicted, confirmed } = view.progress.counts;
  expect({ confirmed, wrong: discrepant + contradicted }).toEqual({ confirmed: 108, wrong: 12 });
  expect(view.found).toHaveLength(12);
  expect(view.openFlags).toBe(12);
  expect(view.strips[0]?.cells).toHaveLength(120);
  expect(await Flag.count({ where: { runId, assigneeId: scene.author.id } })).toBe(12);
  const claims = await Claim.findAll({ where: { workId: scene.workId } });
  expect(claims.every(({ verdict, findingId, version }) => verdict && findingId && version === 0)).toBe(true);
  const { runs } = await listRuns(scene.workId, scene.lead);
  expect(runs).toMatchObject([{ id: runId, state: "ended", total: 120 }]);
});

it("finds claims that contradict each other in different chapters", async () => {
  const scene = await buildScene();
  const other = { ...scene, chapterId: (await buildChapter({ workId: scene.workId })).id };
  await writeClaims(scene, [{ quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(30)/15" }]);
  await writeClaims(other, [{ quantity: "(1 2 1; 0 0 0)", claimed: "-sqrt(30)/15" }]);
  await startRun(scene, scene.lead);
  await workOff();
  const { runId } = await startRun(other, scene.lead);
  await workOff();
  const finding = await Finding.findOne({ where: { runId }, rejectOnEmpty: true });
  expect(finding.verdict).toBe("contradicted");
  expect(finding.reason).toMatch(/contradicts claim 1\.1\(1\)/);
  expect((await Claim.findByPk(finding.claimId))?.verdict).toBe("contradicted");
});

it("refuses a second run beside the first, also when both start at once", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(3));
  const whole = { workId: scene.workId, chapterId: null };
  const tries = await Promise.allSettled(
    [scene, scene, whole, scene, whole].map((what) => startRun(what, scene.lead)),
  );
  const started = tries.flatMap((each) => (each.status === "fulfilled" ? [each.value.runId] : []));
  expect(started).toHaveLength(1);
  for (const each of tries.filter(({ status }) => status === "rejected"))
    expect(each).toMatchObject({ reason: { code: "conflict", details: { runId: started[0] } } });
  const elsewhere = { ...scene, chapterId: (await buildChapter({ workId: scene.workId })).id };
  await expect(startRun(elsewhere, scene.lead)).rejects.toMatchObject({
    code: started[0] && (await Run.findByPk(started[0]))?.chapterId === null ? "conflict" : "invalid",
  });
});

it("says why a run cannot start", async () => {
  const scene = await buildScene();
  await expect(startRun(scene, scene.lead)).rejects.toMatchObject({
    code: "invalid",
    message: /no claim to check/,
  });
  const referee = await buildMember(await workOf(scene.workId), "referee");
  await expect(startRun(scene, referee)).rejects.toMatchObject({ code: "forbidden" });
  await expect(startRun(scene, asUser(await buildUser()))).rejects.toMatchObject({ code: "not_found" });
  const foreign = { workId: scene.workId, chapterId: (await buildChapter()).id };
  await expect(startRun(foreign, scene.lead)).rejects.toMatchObject({ code: "not_found" });
});

it("judges the version that the run was started with, and leaves a newer one unjudged", async () => {
  const scene = await buildScene();
  const [claimId = ""] = await writeClaims(scene, [{ quantity: "(1 1 2; 0 0 0)", claimed: "1/2" }]);
  const { runId } = await startRun(scene, scene.lead);
  await ClaimVersion.create({
    workId: scene.workId,
    claimId,
    number: 2,
    quantity: "(1 1 2; 0 0 0)",
    claimed: "sqrt(30)/15",
    authorId: scene.lead.id,
    origin: "typed",
  });
  await Claim.update({ current: 2, claimed: "sqrt(30)/15" }, { where: { id: claimId } });
  await workOff();
  expect(await Finding.findOne({ where: { runId } })).toMatchObject({
    claimVersion: 1,
    verdict: "discrepant",
  });
  expect(await Claim.findByPk(claimId)).toMatchObject({ verdict: null, findingId: null });
  expect(await Flag.count({ where: { runId } })).toBe(0);
});

it("stops when it is cancelled, and raises no flags", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(120));
  const { runId } = await startRun(scene, scene.lead);
  const first = await Outbox.findOne({ where: { dedupeKey: batchKey(runId, 0) }, rejectOnEmpty: true });
  await workOn(first.id, handlers, never);
  await cancelRun({ workId: scene.workId, runId }, scene.author);
  await workOff();
  expect(await stateOf(runId)).toBe("cancelled");
  expect(await Finding.count({ where: { runId, verdict: { [Op.not]: null } } })).toBe(50);
  expect(await Flag.count({ where: { runId } })).toBe(0);
  expect(await Outbox.count({ where: { state: "pending", kind: ["run-batch", "run-finish"] } })).toBe(0);
  await expect(cancelRun({ workId: scene.workId, runId }, scene.lead)).rejects.toMatchObject({
    code: "conflict",
  });
  expect(await AuditEvent.count({ where: { subjectId: runId, action: "run.cancel" } })).toBe(1);
});

it("comes to the same when batches are worked on twice and at once", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(110));
  const { runId } = await startRun(scene, scene.lead);
  await workOff();
  const undisturbed = await saidIn(runId);

  const again = await startRun(scene, scene.lead);
  const rows = await Outbox.findAll({ where: { kind: "run-batch", state: "pending" } });
  const batches = [...rows, ...rows].map(({ payload }) => handlers["run-batch"].run(payload as never, FREE));
  await Promise.all([...batches, workOff(), workOff()]);
  await workOff();
  expect(await stateOf(again.runId)).toBe("ended");
  expect(await saidIn(again.runId)).toEqual(undisturbed);
  expect(await AuditEvent.count({ where: { subjectId: again.runId, action: "run.end" } })).toBe(1);
});

it("leaves a claim that fells its worker undecided, and judges all others", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(30));
  const { runId } = await startRun(scene, scene.lead);
  const poison = await Finding.findOne({ where: { runId }, rejectOnEmpty: true });
  await poison.update({ attempts: 3 });
  await workOff();
  await poison.reload();
  expect(poison).toMatchObject({
    verdict: "undecided",
    reason: expect.stringMatching(/begun 3 times/) as string,
  });
  expect(await stateOf(runId)).toBe("ended");
  const others = await Finding.findAll({ where: { runId, id: { [Op.ne]: poison.id } } });
  expect(others.every(({ verdict }) => verdict !== null && verdict !== "undecided")).toBe(true);
});

it("ends a claim that takes too long or dies, and goes on with the next", async () => {
  const script = new URL("./hostile-thread.mjs", import.meta.url);
  const hostile = openVerifier({ script, claimMs: 1_500 });
  const tasks = ["fine", "hang", "fine", "die", "fine"].map((ref, i) => ({
    id: `${i}`,
    ref,
    quantity: "",
    claimed: "",
  }));
  const results = await hostile.verify(tasks, {} as never);
  await hostile.close();
  expect(results.map(({ id, kind }) => `${id} ${kind}`)).toEqual([
    "0 failed",
    "1 stopped",
    "2 failed",
    "3 stopped",
    "4 failed",
  ]);
  expect(results[1]?.kind === "stopped" && results[1].says).toMatch(/longer than/);
});

it("helps a run that has lost its outbox rows", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(5));
  const { runId } = await startRun(scene, scene.lead);
  await Outbox.destroy({ where: { kind: "run-batch" } });
  expect(await rescueRuns()).toBe(0); // too young: its rows could be on their way
  await Run.update({ createdAt: new Date(Date.now() - 60_000) } as never, { where: { id: runId } });
  expect(await rescueRuns()).toBe(1);
  await workOff();
  expect(await stateOf(runId)).toBe("ended");
});

it("shows a run to those who may read its chapter, and to nobody else", async () => {
  const scene = await buildScene();
  await writeClaims(scene, manyClaims(2));
  const { runId } = await startRun(scene, scene.lead);
  const work = await workOf(scene.workId);
  const which = { workId: scene.workId, runId };
  const inside = await buildMember(work, "referee", { chapterIds: [scene.chapterId] });
  await expect(getRun(which, inside)).resolves.toMatchObject({ id: runId, may: { cancel: false } });
  const outside = await buildMember(work, "referee", {
    chapterIds: [(await buildChapter({ workId: work.id })).id],
  });
  for (const user of [outside, await buildMember(work, "production"), asUser(await buildUser())]) {
    await expect(getRun(which, user)).rejects.toMatchObject({ code: "not_found" });
    await expect(cancelRun(which, user)).rejects.toMatchObject({ code: "not_found" });
  }
  expect((await listRuns(work.id, outside)).runs).toEqual([]);
  const elsewhere = await buildWork();
  await expect(getRun({ workId: elsewhere.id, runId }, scene.lead)).rejects.toMatchObject({
    code: "not_found",
  });
});

const FREE = { id: "none", attempt: 1, done: () => Promise.resolve(), goOn: () => undefined };

async function workOf(id: string) {
  const { Work } = await import("@/models");
  return Work.findByPk(id, { rejectOnEmpty: true });
}
