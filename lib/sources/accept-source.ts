import { randomUUID } from "node:crypto";
import { fn, col, Op, type CreationAttributes, type Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { keyOf } from "@/lib/claims/text";
import { supersedeFlags } from "@/lib/claims/supersede-flag";
import { AppError, isDuplicate, notFound } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { transact } from "@/lib/transact";
import { Chapter, Claim, ClaimVersion, Problem, Source, User } from "@/models";
import { findSource } from "./find-source";
import { enters, planRows, type Plan, type PlannedRow } from "./plan-rows";
import { readSource } from "./read-source";
import type { AcceptSource } from "./schema";
import { pieces, standingClaims } from "./standing-claims";
import { differences } from "./translate";

export type Accepted = {
  /** claims that were added or replaced, by this call or by the one that was first */
  rows: number;
  added: number;
  replaced: number;
  /** it had been accepted already; nothing was done again */
  already: boolean;
};

/**
 * Lets the rows of a source into the work: all of them or none, once, however often and by however many it is asked.
 * Refused when accepting would now do something else than the preview showed.
 * @throws AppError not_found; forbidden; conflict (set aside, or the chapter, the sheet changed; says what);
 *   invalid (no row to enter, refused rows with "all", conventions not chosen)
 */
export async function acceptSource(input: AcceptSource, user: SessionUser): Promise<Accepted> {
  const { source: found, access } = await findSource(input.workId, input.sourceId, user);
  const before = already(found);
  if (before) return before;
  if (access.work.conventionsVersion !== input.conventionsVersion) throw sheetChanged();
  // The long part is done before anything is locked: the bytes of a source never change.
  const conventions = await conventionsAt(input.workId, input.conventionsVersion);
  const { file, rows } = await readSource(found, conventions, input.conventions ?? "sheet");
  if (differences(file.conventions, conventions).length > 0 && !input.conventions)
    throw new AppError(
      "invalid",
      "This file states conventions of its own that differ from the work's sheet. Choose first by which of them it is read.",
    );

  return transact(async (transaction) => {
    // Whoever holds this lock is the one who accepts; the others wait here and find it done.
    const source = await Source.findOne({
      attributes: { exclude: ["bytes"] },
      where: { id: input.sourceId, workId: input.workId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!source) throw notFound();
    const now = await gate(
      user,
      "source.upload",
      source.workId,
      { chapterId: source.chapterId },
      transaction,
    );
    const done = already(source);
    if (done) return done;
    if (source.state === "set-aside")
      throw new AppError("conflict", "This source was set aside in the meantime. Take it up again first.");
    if (now.work.conventionsVersion !== input.conventionsVersion) throw sheetChanged();
    await Chapter.findByPk(source.chapterId, { lock: transaction.LOCK.UPDATE, transaction });
    const standing = await standingClaims(
      source.workId,
      rows.map(({ ref }) => ref),
      transaction,
    );
    const plan = planRows(rows, standing, source.chapterId);
    if (plan.fingerprint !== input.fingerprint) throw await chapterChanged(input, plan, transaction);
    const chosen = choose(plan, input.rows, file.errors.length);
    await enter(chosen, source, user, transaction);
    const replaced = chosen.filter(({ effect }) => effect === "replaces").length;
    const result: Accepted = {
      rows: chosen.length,
      added: chosen.length - replaced,
      replaced,
      already: false,
    };
    await source.update(
      { state: "accepted", acceptedRows: chosen.length, acceptedAt: new Date(), acceptedById: user.id },
      { transaction },
    );
    await audit(transaction, {
      workId: source.workId,
      actorId: user.id,
      action: "source.accept",
      subjectType: "source",
      subjectId: source.id,
      before: {
        state: "received",
        replaced: chosen.flatMap(({ standing: old }) =>
          old ? [{ ref: old.ref, quantity: old.quantity, claimed: old.claimed }] : [],
        ),
      },
      after: {
        state: "accepted",
        rows: input.rows,
        conventions: input.conventions ?? "sheet",
        added: result.added,
        replaced,
        leftOut: plan.rows.length - chosen.length - plan.counts.nothing,
      },
    });
    return result;
  });
}

function already(source: Source): Accepted | null {
  return source.state === "accepted"
    ? { rows: source.acceptedRows ?? 0, added: 0, replaced: 0, already: true }
    : null;
}

const sheetChanged = () =>
  new AppError(
    "conflict",
    "The conventions sheet was changed since you opened this page, so the rows may be read differently. Look at the preview again.",
  );

function choose(plan: Plan, which: AcceptSource["rows"], broken: number): PlannedRow[] {
  const out = plan.counts.refused + broken;
  if (which === "all" && out > 0)
    throw new AppError(
      "invalid",
      `${out} of the rows cannot enter; accept the good rows only, or mend the file.`,
    );
  const chosen = plan.rows.filter((row) => enters(row) && (row.readable || which === "all"));
  if (chosen.length === 0)
    throw new AppError(
      "invalid",
      "No row of this file would change anything, so there is nothing to accept. Set it aside instead.",
    );
  return chosen;
}

async function enter(
  rows: readonly PlannedRow[],
  source: Source,
  user: SessionUser,
  transaction: Transaction,
): Promise<void> {
  const added = rows.filter(({ effect }) => effect === "adds");
  const problems = await problemsFor(added, source, transaction);
  const next = await lastPositions([...problems.values()], transaction);
  const claims = added.map((row) => {
    const problemId = problems.get(keyOf(row.label)) ?? "";
    const position = (next.get(problemId) ?? -1) + 1;
    next.set(problemId, position);
    const { ref, quantity, claimed, note, page, orbitKey } = row;
    return { id: randomUUID(), problemId, position, ref, quantity, claimed, note, page, orbitKey };
  });
  const { workId, chapterId } = source;
  const by = { workId, authorId: user.id, origin: "source" as const, sourceId: source.id };
  for (const some of pieces(claims)) {
    await Claim.bulkCreate(
      some.map((claim) => ({ ...claim, workId, chapterId, claimantId: user.id })),
      { transaction },
    ).catch((error: unknown) => {
      throw isDuplicate(error)
        ? new AppError(
            "conflict",
            "Somebody added a claim with one of these refs at this moment. Look at the preview again.",
          )
        : error;
    });
    await ClaimVersion.bulkCreate(
      some.map(({ id, quantity, claimed, note, page }) => ({
        ...by,
        claimId: id,
        number: 1,
        quantity,
        claimed,
        note,
        page,
      })),
      { transaction },
    );
  }
  await replace(
    rows.filter(({ effect }) => effect === "replaces"),
    by,
    transaction,
  );
}

const REPLACED = [
  "current",
  "quantity",
  "claimed",
  "note",
  "page",
  "claimantId",
  "orbitKey",
  "verdict",
  "findingId",
  "version",
  "updatedAt",
] as const;

/** New versions of claims that stand already; the caller holds their locks. Written in bulk, as the file may be long. */
async function replace(
  rows: readonly PlannedRow[],
  by: { workId: string; authorId: string; origin: "source"; sourceId: string },
  transaction: Transaction,
): Promise<void> {
  for (const some of pieces(rows)) {
    const rowOf = new Map(some.flatMap((row) => (row.standing ? [[row.standing.id, row] as const] : [])));
    const claims = await Claim.findAll({
      where: { id: [...rowOf.keys()] },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    const next = claims.flatMap((claim) => {
      const row = rowOf.get(claim.id);
      if (!row) return [];
      const text = {
        quantity: row.quantity,
        claimed: row.claimed,
        note: row.note ?? claim.note,
        page: row.page ?? claim.page,
      };
      return [{ claim, text, number: claim.current + 1, orbitKey: row.orbitKey }];
    });
    await ClaimVersion.bulkCreate(
      next.map(({ claim, text, number }) => ({ ...by, ...text, claimId: claim.id, number })),
      { transaction },
    );
    await Claim.bulkCreate(
      next.map(({ claim, text, number, orbitKey }) => ({
        ...(claim.get() as CreationAttributes<Claim>),
        ...text,
        current: number,
        claimantId: by.authorId,
        orbitKey,
        verdict: null,
        findingId: null,
        version: claim.version + 1,
      })),
      { updateOnDuplicate: [...REPLACED], transaction },
    );
    await supersedeFlags([...rowOf.keys()], by.authorId, transaction);
  }
}

/** The problem of each label, made where the chapter has none of that label, in the order of the file. */
async function problemsFor(
  rows: readonly PlannedRow[],
  source: Source,
  transaction: Transaction,
): Promise<Map<string, string>> {
  const { workId, chapterId } = source;
  const existing = await Problem.findAll({
    attributes: ["id", "label", "position"],
    where: { chapterId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const byLabel = new Map(existing.map(({ id, label }) => [keyOf(label), id]));
  const missing = [...new Set(rows.map(({ label }) => keyOf(label)))].filter((label) => !byLabel.has(label));
  const last = Math.max(-1, ...existing.map(({ position }) => position));
  const made = missing.map((label, i) => ({
    id: randomUUID(),
    workId,
    chapterId,
    label,
    statement: "",
    position: last + 1 + i,
  }));
  for (const some of pieces(made)) await Problem.bulkCreate(some, { transaction });
  for (const { id, label } of made) byLabel.set(keyOf(label), id);
  return byLabel;
}

async function lastPositions(
  problemIds: readonly string[],
  transaction: Transaction,
): Promise<Map<string, number>> {
  const last = new Map<string, number>();
  for (const some of pieces(problemIds)) {
    const rows = (await Claim.findAll({
      attributes: ["problemId", [fn("max", col("position")), "last"]],
      where: { problemId: some },
      group: ["problemId"],
      raw: true,
      transaction,
    })) as unknown as { problemId: string; last: number | string }[];
    for (const row of rows) last.set(row.problemId, Number(row.last));
  }
  return last;
}

/** Names what is different from the preview, so that the person need not search for it. */
async function chapterChanged(input: AcceptSource, plan: Plan, transaction: Transaction): Promise<AppError> {
  const ids = plan.rows.flatMap(({ standing }) => standing?.id ?? []);
  const since = new Date(input.seenAt);
  const changed: { ref: string; by: string }[] = [];
  const refOf = new Map(
    plan.rows.flatMap(({ ref, standing }) => (standing ? [[standing.id, ref] as const] : [])),
  );
  for (const some of pieces(ids)) {
    const versions = (await ClaimVersion.findAll({
      attributes: ["claimId"],
      where: { claimId: some, createdAt: { [Op.gte]: since } },
      include: [{ model: User, as: "author", attributes: ["name"] }],
      order: [["createdAt", "ASC"]],
      transaction,
    })) as (ClaimVersion & { author?: User })[];
    for (const { claimId, author } of versions)
      changed.push({ ref: refOf.get(claimId) ?? "", by: author?.name ?? "somebody" });
  }
  const withdrawn = plan.rows
    .filter(({ standing, effect }) => standing?.withdrawn && effect === "refused")
    .map(({ ref }) => ref);
  const refs = [...new Set([...changed.map(({ ref }) => ref), ...withdrawn])];
  const people = [...new Set(changed.map(({ by }) => by))];
  const what =
    refs.length === 0
      ? "The claims that this file concerns were changed"
      : `${refs.slice(0, 5).join(", ")}${refs.length > 5 ? ` and ${refs.length - 5} more` : ""} ${refs.length === 1 ? "was" : "were"} changed${people.length > 0 ? ` by ${people.join(", ")}` : ""}`;
  return new AppError(
    "conflict",
    `${what} since you opened this page. Nothing was accepted; look at the preview as it is now.`,
    {
      details: { changed: refs.slice(0, 100) },
    },
  );
}
