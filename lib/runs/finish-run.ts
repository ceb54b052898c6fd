import { Op, type Transaction } from "sequelize";
import { Claim, Finding, Run } from "@/models";
import type { Verdict } from "@/models/finding";
import { audit } from "@/lib/audit";
import { raiseFlags } from "@/lib/flags/raise-flags";
import type { Payload } from "@/lib/jobs/definitions";
import type { Job } from "@/lib/jobs/work";
import { transact } from "@/lib/transact";
import { contradictions, type OrbitEntry } from "@/lib/verify/contradictions";
import { isGoing } from "./going";

/**
 * Ends a run once: compares its claims with all others of the work through their orbits, raises flags, and closes the run,
 * all in one transaction with the row that asked for it.
 */
export async function finishRun({ runId }: Payload<"run-finish">, job: Job): Promise<void> {
  await transact(async (transaction) => {
    const run = await Run.findByPk(runId, { transaction, lock: transaction.LOCK.UPDATE });
    await job.done(transaction);
    if (!run || !isGoing(run.state)) return;
    // Posted too early, as by hand: the last batch will post it again.
    if ((await Finding.count({ where: { runId, verdict: null }, transaction })) > 0) return;
    const contradicted = await noteContradictions(run, transaction);
    const { raised, superseded } = await raiseFlags(runId, transaction);
    await run.update({ state: "ended", endedAt: new Date() }, { transaction });
    await audit(transaction, {
      workId: run.workId,
      action: "run.end",
      subjectType: "run",
      subjectId: runId,
      after: { claims: run.total, contradicted, flagsRaised: raised, flagsSuperseded: superseded },
    });
  });
}

type Entry = OrbitEntry & { reason: string; claimId: string };

/** Writes into the findings of the run what other claims of the work say against them. */
async function noteContradictions(run: Run, transaction: Transaction): Promise<number> {
  const keys = await doubtfulOrbits(run, transaction);
  const own = await ownEntries(run.id, keys, transaction);
  const others = await otherEntries(run, keys, new Set(own.map(({ claimId }) => claimId)), transaction);
  // Named in the order of the work: the same sentence however the rows came.
  const inOrder = [...own, ...others].toSorted((a, b) => a.ref.localeCompare(b.ref, "en", { numeric: true }));
  const clashes = contradictions(inOrder);
  let changed = 0;
  for (const { id, claimId, verdict, reason } of own.toSorted((a, b) => (a.claimId < b.claimId ? -1 : 1))) {
    const clash = clashes.get(id);
    if (!clash) continue;
    await Finding.update(
      { verdict: clash.verdict, reason: `${reason} ${clash.says}` },
      { where: { id }, transaction },
    );
    if (clash.verdict === verdict) continue;
    changed += 1;
    await Claim.update(
      { verdict: clash.verdict },
      { where: { id: claimId, findingId: id }, silent: true, transaction },
    );
  }
  return changed;
}

const WRONG: Verdict[] = ["discrepant", "contradicted"];

/** Orbits in which a claim is wrong; in all others everybody says what the exact value says. */
async function doubtfulOrbits({ id: runId, workId }: Run, transaction: Transaction): Promise<string[]> {
  const where = { verdict: { [Op.in]: WRONG }, orbitKey: { [Op.not]: null } };
  const [findings, claims] = await Promise.all([
    Finding.findAll({ attributes: ["orbitKey"], where: { ...where, runId }, transaction }),
    Claim.findAll({ attributes: ["orbitKey"], where: { ...where, workId, withdrawnAt: null }, transaction }),
  ]);
  return [...new Set([...findings, ...claims].flatMap(({ orbitKey }) => orbitKey ?? []))];
}

async function ownEntries(runId: string, keys: string[], transaction: Transaction): Promise<Entry[]> {
  const rows = await inPieces(keys, (orbitKey) =>
    Finding.findAll({
      attributes: ["id", "claimId", "claimVersion", "verdict", "orbitKey", "details", "reason"],
      where: { runId, orbitKey },
      include: [{ model: Claim, as: "claim", attributes: ["ref", "current"], where: { withdrawnAt: null } }],
      transaction,
    }),
  );
  return rows.flatMap((finding) => {
    const { claim } = finding as Finding & { claim: Claim };
    return claim.current === finding.claimVersion ? entry(finding, claim.ref, finding.verdict) : [];
  });
}

/** What the claims outside this run say now, each by the finding on its current version. */
async function otherEntries(
  run: Run,
  keys: string[],
  own: Set<string>,
  transaction: Transaction,
): Promise<Entry[]> {
  const rows = await inPieces(keys, (orbitKey) =>
    Claim.findAll({
      attributes: ["id", "ref", "current", "verdict"],
      where: { workId: run.workId, orbitKey, withdrawnAt: null, verdict: { [Op.not]: null } },
      include: [{ model: Finding, as: "finding", required: true, attributes: { exclude: ["evidence"] } }],
      transaction,
    }),
  );
  return rows.flatMap((claim) => {
    const { finding } = claim as Claim & { finding: Finding };
    return finding.claimVersion === claim.current && !own.has(claim.id)
      ? entry(finding, claim.ref, claim.verdict)
      : [];
  });
}

function entry(finding: Finding, ref: string, verdict: Verdict | null): Entry[] {
  if (verdict === null) return [];
  const { id, claimId, orbitKey, reason } = finding;
  const said = (finding.details as { canonicalClaim?: unknown } | null)?.canonicalClaim;
  return [
    {
      id,
      claimId,
      ref,
      verdict,
      orbitKey,
      reason: reason ?? "",
      impliedCanonical: typeof said === "string" ? said : null,
    },
  ];
}

/** Asks for many keys a few hundred at a time. */
async function inPieces<Row>(keys: string[], find: (piece: string[]) => Promise<Row[]>): Promise<Row[]> {
  const rows: Row[] = [];
  for (let from = 0; from < keys.length; from += 300)
    rows.push(...(await find(keys.slice(from, from + 300))));
  return rows;
}
