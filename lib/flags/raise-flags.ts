import { fn, col, Op, type Transaction } from "sequelize";

import { audit } from "@/lib/audit";
import { env } from "@/lib/env";
import { chooseAssignee, type Candidate } from "@/lib/flags/choose-assignee";
import { post } from "@/lib/jobs/outbox";
import { Claim, Finding, Flag, Membership, Run, Settlement, User } from "@/models";
import type { Verdict } from "@/models/finding";

/** Verdicts that need a second author. */
const NEEDS_A_SECOND: readonly Verdict[] = ["discrepant", "contradicted", "unreadable"];
const PASSES: readonly Verdict[] = ["confirmed", "confirmed-not-house-form"];

export type Raised = { raised: number; superseded: number; told: string[] };

/**
 * Turns the findings of a run into flags: one for every claim that is not right as it now stands, unless the same
 * version already has a flag that is open or settled; closes open flags whose claim is confirmed by this run. Running it
 * twice changes nothing. The claims are locked first, in the order of their ids, as everything else that changes them does.
 * @returns how many were raised and closed, and who will be told by digest.
 */
export async function raiseFlags(runId: string, transaction: Transaction): Promise<Raised> {
  const run = await Run.findByPk(runId, { transaction, rejectOnEmpty: true });
  const findings = await Finding.findAll({
    attributes: ["id", "claimId", "claimVersion", "chapterId", "verdict", "exactText", "reason"],
    where: { runId, verdict: { [Op.in]: [...NEEDS_A_SECOND, ...PASSES] } },
    transaction,
  });
  const claimIds = findings.map(({ claimId }) => claimId);
  if (claimIds.length === 0) return { raised: 0, superseded: 0, told: [] };
  const claims = await Claim.findAll({
    attributes: ["id", "current", "claimantId", "chapterId", "withdrawnAt"],
    where: { id: claimIds, workId: run.workId },
    order: [["id", "ASC"]],
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const claimById = new Map(claims.map((claim) => [claim.id, claim]));
  const openByClaim = await openFlagsOf(claimIds, transaction);
  const settled = await settledVersions(claimIds, transaction);

  let superseded = 0;
  const wanted: Finding[] = [];
  for (const finding of findings) {
    const claim = claimById.get(finding.claimId);
    if (!claim || claim.withdrawnAt !== null || claim.current !== finding.claimVersion) continue;
    const open = openByClaim.get(claim.id);
    if (PASSES.includes(finding.verdict as Verdict)) {
      if (open) superseded += await supersede(open, finding, transaction);
      continue;
    }
    if (open && open.claimVersion === finding.claimVersion) {
      await renewFinding(open, finding, run.id, transaction);
      continue;
    }
    if (open) superseded += await supersede(open, finding, transaction);
    if (!settled.has(`${claim.id} ${finding.claimVersion}`)) wanted.push(finding);
  }

  const told = new Set<string>();
  const { candidates, openFlags } = wanted.length > 0 ? await people(run.workId, transaction) : NOBODY;
  for (const finding of wanted) {
    const claim = claimById.get(finding.claimId);
    if (!claim) continue;
    const assigneeId = chooseAssignee(claim.claimantId, claim.chapterId, candidates, openFlags);
    if (assigneeId) {
      openFlags.set(assigneeId, (openFlags.get(assigneeId) ?? 0) + 1);
      told.add(assigneeId);
    }
    const flag = await Flag.create(
      {
        workId: run.workId,
        chapterId: claim.chapterId,
        claimId: claim.id,
        claimVersion: finding.claimVersion,
        findingId: finding.id,
        runId: run.id,
        claimantId: claim.claimantId,
        openClaimId: claim.id,
        assigneeId,
      },
      { transaction },
    );
    await audit(transaction, {
      workId: run.workId,
      actorId: null,
      action: "flag.raise",
      subjectType: "flag",
      subjectId: flag.id,
      before: null,
      after: { verdict: finding.verdict, assigneeId },
    });
  }
  for (const userId of told) await postDigest(userId, run.workId, transaction);
  return { raised: wanted.length, superseded, told: [...told] };
}

/** One digest for one person and work, however many flags come together before it is due. */
export async function postDigest(userId: string, workId: string, transaction: Transaction): Promise<void> {
  await post(transaction, {
    kind: "flag-digest",
    payload: { userId, workId },
    dedupeKey: `flag-digest ${workId} ${userId}`,
    dueAt: new Date(Date.now() + env.DIGEST_DELAY_SECONDS * 1000),
  });
}

const NOBODY = { candidates: [] as Candidate[], openFlags: new Map<string, number>() };

async function openFlagsOf(claimIds: string[], transaction: Transaction): Promise<Map<string, Flag>> {
  const flags = await Flag.findAll({
    where: { openClaimId: claimIds },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  return new Map(flags.map((flag) => [flag.claimId, flag]));
}

/** "claim version" of every settlement in force: a person has already answered for that version. */
async function settledVersions(claimIds: string[], transaction: Transaction): Promise<Set<string>> {
  const flags = await Flag.findAll({
    attributes: ["claimId", "claimVersion"],
    where: { claimId: claimIds, state: "settled" },
    include: [
      {
        model: Settlement,
        as: "settlements",
        attributes: [],
        where: { activeFlagId: { [Op.not]: null } },
        required: true,
      },
    ],
    // A locking read sees what was committed while this transaction waited for the claims.
    lock: transaction.LOCK.SHARE,
    transaction,
  });
  return new Set(flags.map(({ claimId, claimVersion }) => `${claimId} ${claimVersion}`));
}

/** Everybody who may settle, with the number of flags that wait for them in this work. */
async function people(workId: string, transaction: Transaction) {
  const members = await Membership.findAll({
    where: { workId, role: ["lead", "author", "referee"] },
    include: [{ model: User, as: "user", attributes: [], where: { disabledAt: null }, required: true }],
    transaction,
  });
  const candidates: Candidate[] = members.map(({ userId, role, chapterIds }) => ({
    userId,
    role: role as Candidate["role"],
    chapterIds: role === "referee" ? chapterIds : null,
  }));
  const counts = (await Flag.findAll({
    attributes: ["assigneeId", [fn("COUNT", col("id")), "waiting"]],
    where: { workId, state: "open", assigneeId: { [Op.not]: null } },
    group: ["assigneeId"],
    raw: true,
    transaction,
  })) as unknown as { assigneeId: string; waiting: number | string }[];
  return { candidates, openFlags: new Map(counts.map((row) => [row.assigneeId, Number(row.waiting)])) };
}

/** The flag has nothing left to say: the claim was changed or is now confirmed. */
async function supersede(flag: Flag, finding: Finding, transaction: Transaction): Promise<1> {
  await flag.update({ state: "superseded", openClaimId: null }, { transaction });
  await audit(transaction, {
    workId: flag.workId,
    actorId: null,
    action: "flag.supersede",
    subjectType: "flag",
    subjectId: flag.id,
    before: { state: "open" },
    after: { state: "superseded", verdict: finding.verdict },
  });
  return 1;
}

/**
 * A later run judged the same version again. Only when it says something else does the open flag follow it, which
 * also tells whoever is reading the flag at this moment that what they see has changed.
 */
async function renewFinding(
  flag: Flag,
  finding: Finding,
  runId: string,
  transaction: Transaction,
): Promise<void> {
  const old = await Finding.findByPk(flag.findingId, {
    attributes: ["verdict", "exactText", "reason"],
    transaction,
  });
  const same =
    old?.verdict === finding.verdict &&
    old?.exactText === finding.exactText &&
    old?.reason === finding.reason;
  if (!same) await flag.update({ findingId: finding.id, runId }, { transaction });
}
