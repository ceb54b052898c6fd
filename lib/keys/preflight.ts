import type { Transaction } from "sequelize";

import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { hindranceOf, type Hindrance, type SheetInForce } from "@/lib/keys/judge-readiness";
import { loadClaimStates, settledNow, type ClaimState } from "@/lib/keys/key-claims";
import { ConventionsSheet, FrozenKey, Run, type Work } from "@/models";

/** How many lines of one kind are listed; the rest is counted. */
const LISTED = 50;

export type PreflightLine = {
  claimId: string;
  claimVersion: number;
  ref: string;
  chapterId: string;
  /** path of the place where it can be mended */
  path: string;
  /** who can act, in words */
  who: string;
};

export type PreflightGroup = { kind: Hindrance; total: number; lines: PreflightLine[] };

export type Preflight = {
  number: number;
  claims: number;
  fit: number;
  withdrawn: number;
  stets: number;
  waivers: { claimId: string; ref: string; reason: string; by: string }[];
  running: { runId: string } | null;
  groups: PreflightGroup[];
  ready: boolean;
};

const ORDER: readonly Hindrance[] = [
  "unchecked",
  "old-conventions",
  "open-flag",
  "unsettled",
  "reword",
  "undecided",
];

/**
 * What still keeps the next key of a work from being frozen, in the order in which it is best mended.
 * @throws AppError not_found for everybody who may not see drafts
 */
export async function preflight(workId: string, user: SessionUser): Promise<Preflight> {
  const access = await gate(user, "key.read", workId);
  await gate(user, "chapter.read", workId);
  const [states, sheet, number, running] = await Promise.all([
    loadClaimStates(workId),
    sheetInForce(access.work),
    nextKeyNumber(workId),
    Run.findOne({ attributes: ["id"], where: { workId, state: ["queued", "running"] } }),
  ]);
  const report = judgeStates(states, sheet);
  return {
    ...report,
    number,
    running: running ? { runId: running.id } : null,
    ready: report.ready && running === null,
  };
}

/** The version of the conventions sheet in force, and since when. */
export async function sheetInForce(
  work: Pick<Work, "id" | "conventionsVersion">,
  transaction?: Transaction,
): Promise<SheetInForce> {
  const sheet = await ConventionsSheet.findOne({
    attributes: ["version", "createdAt"],
    where: { workId: work.id, version: work.conventionsVersion },
    rejectOnEmpty: true,
    transaction: transaction ?? null,
  });
  return { version: sheet.version, since: sheet.createdAt };
}

/** The number that the next key will have. */
export async function nextKeyNumber(workId: string, transaction?: Transaction): Promise<number> {
  const last = await FrozenKey.max<number | null, FrozenKey>("number", {
    where: { workId },
    transaction: transaction ?? null,
  });
  return (last ?? 0) + 1;
}

/** The report on all claims of a work; ready when there is at least one claim and nothing hinders. */
export function judgeStates(
  states: readonly ClaimState[],
  sheet: SheetInForce,
): Omit<Preflight, "number" | "running"> {
  const judged = states.map((state) => ({ state, hindrance: hindranceOf(state, sheet) }));
  const kept = judged.filter(({ state }) => state.claim.withdrawnAt === null);
  const groups = ORDER.flatMap((kind) => {
    const found = kept.filter(({ hindrance }) => hindrance === kind);
    return found.length === 0
      ? []
      : [
          {
            kind,
            total: found.length,
            lines: found.slice(0, LISTED).map(({ state }) => toLine(state, kind)),
          },
        ];
  });
  const fit = kept.filter(({ hindrance }) => hindrance === null);
  return {
    claims: kept.length,
    fit: fit.length,
    withdrawn: states.length - kept.length,
    stets: fit.filter(({ state }) => settledNow(state)?.settlement.word === "stet").length,
    waivers: kept.flatMap(({ state: { claim, waiver } }) =>
      waiver && claim.verdict === "undecided"
        ? [{ claimId: claim.id, ref: claim.ref, reason: waiver.row.reason, by: waiver.by }]
        : [],
    ),
    groups,
    ready: kept.length > 0 && groups.length === 0,
  };
}

function toLine(state: ClaimState, kind: Hindrance): PreflightLine {
  const { claim, chapter, openFlag, claimant } = state;
  const work = `/works/${claim.workId}`;
  const chapterPath = `${work}/chapters/${chapter.id}`;
  const line = (path: string, who: string) => ({
    claimId: claim.id,
    claimVersion: claim.current,
    ref: claim.ref,
    chapterId: chapter.id,
    path,
    who,
  });
  switch (kind) {
    case "open-flag":
      return line(
        `${work}/flags/${openFlag?.id ?? ""}`,
        openFlag?.assignee ?? "a lead author, who gives it to somebody",
      );
    case "reword":
      return line(`${work}/claims/${claim.id}`, claimant);
    case "undecided":
      return line(`${work}/claims/${claim.id}`, "a lead author, by a waiver");
    case "unchecked":
    case "old-conventions":
    case "unsettled":
      return line(chapterPath, "an author or a lead, by a run");
  }
}
