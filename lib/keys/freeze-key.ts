import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, isDuplicate } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { composeKey } from "@/lib/keys/compose-key";
import { loadClaimStates } from "@/lib/keys/key-claims";
import { canonicalJson, sha256 } from "@/lib/keys/key-content";
import { judgeStates, nextKeyNumber, sheetInForce } from "@/lib/keys/preflight";
import { recheckAll, type Recheck } from "@/lib/keys/recheck";
import type { FreezeKey } from "@/lib/keys/schema";
import { transact } from "@/lib/transact";
import { FrozenKey, Run, Work } from "@/models";

/**
 * Freezes the next key of a work. Every value is recomputed once more before the claims are locked; then, in one
 * transaction, all claims are locked, preflight is asked again, and the snapshot is written. No claim changes under it.
 * @throws AppError not_found; forbidden for all but a lead; invalid when the typed name is another; conflict when
 *   something hinders the key, a run is under way, a recomputed value disagrees, or another key was frozen meanwhile
 */
export async function freezeKey(
  input: FreezeKey,
  user: SessionUser,
): Promise<{ number: number; sha256: string }> {
  const access = await gate(user, "key.freeze", input.workId);
  if (input.confirmation.toLowerCase() !== `key ${input.number}`) {
    const message = `Type key ${input.number} to freeze it`;
    throw new AppError("invalid", message, { fields: { confirmation: [message] } });
  }
  const early = await conventionsAt(input.workId, access.work.conventionsVersion);
  const rechecked = await recheckAll(await loadClaimStates(input.workId), early);
  try {
    return await transact((transaction) => freeze(input, user, rechecked, transaction));
  } catch (error) {
    if (isDuplicate(error)) throw frozenMeanwhile(input.number);
    throw error;
  }
}

const frozenMeanwhile = (number: number) =>
  new AppError(
    "conflict",
    `Key ${number} has been frozen in the meantime. Look at it before you freeze another.`,
  );

async function freeze(
  input: FreezeKey,
  user: SessionUser,
  rechecked: Recheck,
  transaction: Parameters<Parameters<typeof transact>[0]>[0],
): Promise<{ number: number; sha256: string }> {
  const { workId } = input;
  // The work first: one freezing at a time, and no new claim, run or sheet of conventions while it lasts.
  const work = await Work.findByPk(workId, {
    lock: transaction.LOCK.UPDATE,
    rejectOnEmpty: true,
    transaction,
  });
  await gate(user, "key.freeze", workId, {}, transaction);
  const states = await loadClaimStates(workId, transaction, true);
  const number = await nextKeyNumber(workId, transaction);
  if (number !== input.number) throw frozenMeanwhile(input.number);

  const sheet = await sheetInForce(work, transaction);
  const report = judgeStates(states, sheet);
  const running = await Run.count({ where: { workId, state: ["queued", "running"] }, transaction });
  if (!report.ready || running > 0)
    throw new AppError("conflict", refusal(report.claims - report.fit, report.claims, running > 0), {
      details: { hindered: report.claims - report.fit },
    });

  const conventions = await conventionsAt(workId, sheet.version, transaction);
  const findings = await recheckAll(states, conventions, rechecked);
  const previous = await FrozenKey.findOne({
    attributes: ["number", "sha256"],
    where: { workId, number: number - 1 },
    transaction,
  });
  const now = new Date();
  const content = composeKey({
    work,
    number,
    frozenAt: now,
    frozenBy: user.name,
    conventions,
    sheet,
    previous,
    states,
    findings,
  });
  const json = canonicalJson(content);
  const hash = sha256(json);
  const key = await FrozenKey.create(
    {
      workId,
      number,
      canonicalJson: json,
      sha256: hash,
      claims: content.claims.length,
      frozenById: user.id,
      createdAt: now,
    },
    { transaction },
  );
  await audit(transaction, {
    workId,
    actorId: user.id,
    action: "key.freeze",
    subjectType: "key",
    subjectId: key.id,
    after: { number, sha256: hash, claims: content.claims.length },
  });
  return { number, sha256: hash };
}

function refusal(hindered: number, claims: number, running: boolean): string {
  if (claims === 0) return "There is no claim to freeze yet.";
  if (running) return "A run is under way. Wait until it has ended, then freeze.";
  return `${hindered === 1 ? "1 claim still keeps" : `${hindered} claims still keep`} this key from being frozen. Preflight lists what there is to do.`;
}
