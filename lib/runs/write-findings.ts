import { randomUUID } from "node:crypto";
import type { Transaction } from "sequelize";
import { Claim, Finding, Run } from "@/models";
import { audit } from "@/lib/audit";
import { log } from "@/lib/log";
import type { Verdict } from "@/models/finding";
import { isGoing } from "./going";
import type { Result } from "./verifier";

/** An empty finding that a batch is about to fill. */
export type Empty = { id: string; workId: string; runId: string; claimId: string; claimVersion: number };

type Filled = {
  verdict: Verdict;
  exactText: string | null;
  exactLatex: string | null;
  exactDecimal: string | null;
  slips: unknown;
  reason: string;
  details: unknown;
  evidence: unknown;
  orbitKey: string | null;
};

/** What a TEXT column takes. */
const MOST_TEXT = 60_000;

/**
 * Fills findings, each only when it is still empty; a claim gets the verdict only while its current version is the one
 * that was judged.
 * @returns false, with nothing written, when the run is no longer going
 */
export async function fillFindings(
  runId: string,
  pairs: { empty: Empty; result: Result }[],
  transaction: Transaction,
): Promise<boolean> {
  const run = await Run.findByPk(runId, {
    attributes: ["id", "state"],
    transaction,
    lock: transaction.LOCK.SHARE,
  });
  if (!run || !isGoing(run.state)) return false;
  // Everybody who changes several claims takes them in the order of their ids.
  for (const { empty, result } of pairs.toSorted((a, b) => (a.empty.claimId < b.empty.claimId ? -1 : 1))) {
    const filled = fill(result);
    const [written] = await Finding.update(
      { ...filled, judgedAt: new Date() },
      { where: { id: empty.id, verdict: null }, transaction },
    );
    if (written === 0) continue;
    await Claim.update(
      { verdict: filled.verdict, findingId: empty.id, orbitKey: filled.orbitKey },
      { where: { id: empty.claimId, current: empty.claimVersion }, silent: true, transaction },
    );
    if (result.kind === "alarm") await raiseAlarm(empty, result.says, transaction);
    if (result.kind === "failed") log.error({ claimId: empty.claimId, fault: result.says }, "a check broke");
  }
  return true;
}

function fill(result: Result): Filled {
  if (result.kind !== "judged") return undecided(reasonFor(result));
  const { finding, evidence } = result;
  const { exact, reading, errors, houseForm, canonicalClaim, rightUnder, zero, place, engine } = finding;
  const fits = exact !== null && exact.text.length <= MOST_TEXT && exact.latex.length <= MOST_TEXT;
  return {
    verdict: finding.verdict,
    exactText: fits ? exact.text : null,
    exactLatex: fits ? exact.latex : null,
    exactDecimal: exact?.decimal ?? null,
    slips: finding.slips,
    reason: finding.reason,
    details: { reading, errors, houseForm, canonicalClaim, rightUnder, zero, place, engine },
    evidence,
    orbitKey: finding.orbitKey,
  };
}

const undecided = (reason: string): Filled => ({
  verdict: "undecided",
  exactText: null,
  exactLatex: null,
  exactDecimal: null,
  slips: [],
  reason,
  details: null,
  evidence: null,
  orbitKey: null,
});

function reasonFor(result: Exclude<Result, { kind: "judged" }>): string {
  if (result.kind === "stopped")
    return `Nothing is said about this claim: ${result.says}. The rest of the run was not held up by it.`;
  if (result.kind === "alarm")
    return "Nothing is said about this claim: two ways of computing the value gave different answers, so the program disagrees with itself. It has been reported as a fault of the program, not of the claim.";
  return "Nothing is said about this claim: the check broke on it. It has been reported as a fault of the program, not of the claim.";
}

/** Two routes that disagree are the gravest thing the program can find out about itself. */
async function raiseAlarm(empty: Empty, says: string, transaction: Transaction): Promise<void> {
  const reference = randomUUID().slice(0, 8);
  log.fatal({ claimId: empty.claimId, fault: says, reference }, "two routes disagree");
  await audit(transaction, {
    workId: empty.workId,
    action: "engine.disagree",
    subjectType: "finding",
    subjectId: empty.id,
    after: { reference, says },
  });
}
