import { randomUUID } from "node:crypto";
import type { CreationAttributes, Transaction } from "sequelize";
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

const FILLED: (keyof Filled | "judgedAt")[] = [
  "verdict",
  "exactText",
  "exactLatex",
  "exactDecimal",
  "slips",
  "reason",
  "details",
  "evidence",
  "orbitKey",
  "judgedAt",
];

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
  const resultOf = new Map(pairs.map(({ empty, result }) => [empty.id, result]));
  const rows = await Finding.findAll({
    where: { id: [...resultOf.keys()], verdict: null },
    order: [["id", "ASC"]],
    lock: transaction.LOCK.UPDATE,
    transaction,
    raw: true,
  });
  if (rows.length === 0) return true;
  const written = rows.map((row) => {
    const result = resultOf.get(row.id) ?? { kind: "failed" as const, id: row.id, says: "no result" };
    return { ...row, ...fill(result), judgedAt: new Date(), result };
  });
  // One statement for all of them: the rows are there and locked, so each is changed and none is added.
  await Finding.bulkCreate(written as CreationAttributes<Finding>[], {
    updateOnDuplicate: FILLED,
    transaction,
  });
  await markClaims(written, transaction);
  for (const { id, workId, claimId, result } of written) {
    if (result.kind === "alarm") await raiseAlarm({ id, workId, claimId }, result.says, transaction);
    if (result.kind === "failed") log.error({ claimId, fault: result.says }, "a check broke");
  }
  return true;
}

type Judged = Pick<Finding, "id" | "claimId" | "claimVersion" | "verdict" | "orbitKey">;

/** Claims carry the verdict on their current version. They are locked in the order of their ids, as by everybody else. */
async function markClaims(judged: Judged[], transaction: Transaction): Promise<void> {
  const findingOf = new Map(judged.map((finding) => [finding.claimId, finding]));
  const claims = await Claim.findAll({
    where: { id: [...findingOf.keys()] },
    order: [["id", "ASC"]],
    lock: transaction.LOCK.UPDATE,
    transaction,
    raw: true,
  });
  const marked = claims.flatMap((claim) => {
    const finding = findingOf.get(claim.id);
    if (!finding || finding.claimVersion !== claim.current) return [];
    const { verdict, orbitKey, id: findingId } = finding;
    return [{ ...claim, verdict, orbitKey, findingId } as CreationAttributes<Claim>];
  });
  if (marked.length === 0) return;
  await Claim.bulkCreate(marked, { updateOnDuplicate: ["verdict", "orbitKey", "findingId"], transaction });
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
async function raiseAlarm(
  finding: { id: string; workId: string; claimId: string },
  says: string,
  transaction: Transaction,
): Promise<void> {
  const reference = randomUUID().slice(0, 8);
  log.fatal({ claimId: finding.claimId, fault: says, reference }, "two routes disagree");
  await audit(transaction, {
    workId: finding.workId,
    action: "engine.disagree",
    subjectType: "finding",
    subjectId: finding.id,
    after: { reference, says },
  });
}
