import { Op } from "sequelize";
import { Chapter, Claim, Finding, Flag, User } from "@/models";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import type { Verdict } from "@/models/finding";
import { foundSince, type Found } from "./found";
import { readRun } from "./read-run";
import { runProgress, type RunProgress } from "./run-progress";
import type { ThisRun } from "./schema";

/** Claims up to which a run is drawn with one cell a claim. */
export const LARGEST_STRIP = 3_000;

/** `id` is the finding's, by which a cell is filled in while the run goes on. */
export type RunCell = { id: string; claimId: string; ref: string; verdict: Verdict | null };
export type RunStrip = { chapterId: string; number: number; cells: RunCell[] };

export type RunView = {
  id: string;
  work: { id: string; title: string };
  /** null: the whole work */
  chapter: { id: string; number: number; title: string } | null;
  going: boolean;
  startedBy: string;
  createdAt: string;
  endedAt: string | null;
  conventionsVersion: number;
  engine: string;
  progress: RunProgress;
  /** empty when the run is too large to draw */
  strips: RunStrip[];
  found: Found[];
  /** flags that wait in the chapter, or the work; an earlier run may have raised them for claims that are still the same */
  openFlags: number;
  /** up to when this picture was complete: the stream goes on from here */
  seenUpTo: string;
  may: { cancel: boolean; start: boolean; freeze: boolean };
};

/**
 * A run as its page shows it, the same for everybody who may read it.
 * @throws AppError not_found
 */
export async function getRun(which: ThisRun, user: SessionUser): Promise<RunView> {
  const seenUpTo = new Date().toISOString();
  const { run, chapter, access, going } = await readRun(which, user);
  const [starter, progress, strips, found, openFlags] = await Promise.all([
    User.findByPk(run.startedById, { attributes: ["name"] }),
    runProgress(run),
    run.total <= LARGEST_STRIP ? stripsOf(run.id) : [],
    foundSince(run.id, null, new Set()),
    Flag.count({
      where: { workId: run.workId, state: "open", ...(run.chapterId && { chapterId: run.chapterId }) },
    }),
  ]);
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  const subject = { chapterId: run.chapterId };
  return {
    id: run.id,
    work: { id: access.work.id, title: access.work.title },
    chapter: chapter && { id: chapter.id, number: chapter.number, title: chapter.title },
    going,
    startedBy: starter?.name ?? "somebody who has left",
    createdAt: run.createdAt.toISOString(),
    endedAt: run.endedAt?.toISOString() ?? null,
    conventionsVersion: run.conventionsVersion,
    engine: run.engine,
    progress,
    strips,
    found,
    openFlags,
    seenUpTo,
    may: {
      cancel: going && can(person, "run.cancel", subject),
      start: !going && can(person, "run.start", subject),
      freeze: can(person, "key.freeze"),
    },
  };
}

async function stripsOf(runId: string): Promise<RunStrip[]> {
  const findings = await Finding.findAll({
    attributes: ["id", "claimId", "verdict", "chapterId"],
    where: { runId },
    include: [
      {
        model: Claim,
        as: "claim",
        attributes: ["ref"],
        include: [
          { model: Chapter, as: "chapter", attributes: ["number"] },
          { association: "problem", attributes: [] },
        ],
      },
    ],
    order: [
      ["claim", "chapter", "number", "ASC"],
      ["claim", "problem", "position", "ASC"],
      ["claim", "position", "ASC"],
    ],
  });
  const strips: RunStrip[] = [];
  for (const finding of findings) {
    const { claim } = finding as Finding & { claim: Claim & { chapter: Chapter } };
    let strip = strips.at(-1);
    if (strip?.chapterId !== finding.chapterId) {
      strip = { chapterId: finding.chapterId, number: claim.chapter.number, cells: [] };
      strips.push(strip);
    }
    strip.cells.push({ id: finding.id, claimId: finding.claimId, ref: claim.ref, verdict: finding.verdict });
  }
  return strips;
}

/** Cells that were filled in since a moment. */
export async function cellsSince(runId: string, since: Date): Promise<[string, Verdict][]> {
  const rows = await Finding.findAll({
    attributes: ["id", "verdict"],
    where: { runId, verdict: { [Op.not]: null }, judgedAt: { [Op.gte]: since } },
    raw: true,
  });
  return rows.flatMap(({ id, verdict }) => (verdict ? [[id, verdict] as [string, Verdict]] : []));
}
