import type { SessionUser } from "@/lib/auth/user";
import { readClaim, type ClaimReading } from "@/lib/claims/reading";
import { notFound } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import type { Conventions } from "@/lib/verify/conventions";
import { Chapter, User, type Source } from "@/models";
import { findSource } from "./find-source";
import { planRows, type Plan, type PlannedRow } from "./plan-rows";
import type { ConventionsChoice } from "./read-rows";
import { readSource } from "./read-source";
import { standingClaims } from "./standing-claims";
import { differences, type Difference } from "./translate";

/** Rows of a preview on one page. */
export const ROWS_PER_PAGE = 50;

export const ROW_VIEWS = ["all", "changes", "trouble"] as const;
export type RowView = (typeof ROW_VIEWS)[number];

/** A row beside the claim that it concerns, which is read as well. */
export type SourceRow = PlannedRow & { standingReading: ClaimReading | null };

export type SourceView = {
  work: { id: string; title: string };
  chapter: { id: string; number: number; title: string };
  source: {
    id: string;
    name: string;
    size: number;
    sha256: string;
    state: Source["state"];
    format: "csv" | "json";
    uploadedBy: string;
    at: string;
    acceptedRows: number | null;
    acceptedAt: string | null;
    acceptedBy: string | null;
  };
  conventions: Conventions;
  conventionsVersion: number;
  seenAt: string;
  notices: string[];
  /** of the file as a whole or of its lines */
  errors: { line: number; column: number; says: string }[];
  differs: Difference[];
  choice: ConventionsChoice | null;
  /** rows that could be taken from the file, what accepting would do with them, and lines that gave no row */
  counts: Plan["counts"] & { rows: number; broken: number };
  fingerprint: string;
  view: RowView;
  rows: SourceRow[];
  matching: number;
  page: number;
  pages: number;
};

/**
 * What a source holds and what accepting it would do, row by row; nothing is changed by looking.
 * @throws AppError not_found
 */
export async function getSource(
  workId: string,
  sourceId: string,
  user: SessionUser,
  ask: { page?: number; view?: RowView; choice?: ConventionsChoice | undefined } = {},
): Promise<SourceView> {
  const seenAt = new Date().toISOString();
  const { source, access } = await findSource(workId, sourceId, user);
  const conventionsVersion = access.work.conventionsVersion;
  const [conventions, chapter, people] = await Promise.all([
    conventionsAt(workId, conventionsVersion),
    Chapter.findByPk(source.chapterId),
    User.findAll({
      attributes: ["id", "name"],
      where: { id: [source.uploadedById, source.acceptedById ?? source.uploadedById] },
    }),
  ]);
  if (!chapter) throw notFound();
  const name = (id: string | null) => people.find((person) => person.id === id)?.name ?? null;
  const { file, rows } = await readSource(source, conventions, ask.choice ?? "sheet");
  const plan = planRows(
    rows,
    await standingClaims(
      workId,
      rows.map(({ ref }) => ref),
    ),
    source.chapterId,
  );
  const differs = differences(file.conventions, conventions);
  const view = ask.view ?? "all";
  const matching = plan.rows.filter(VIEWS[view]);
  const pages = Math.max(1, Math.ceil(matching.length / ROWS_PER_PAGE));
  const page = Math.min(pages, Math.max(1, Math.trunc(ask.page ?? 1) || 1));
  return {
    work: { id: workId, title: access.work.title },
    chapter: { id: chapter.id, number: chapter.number, title: chapter.title },
    source: {
      id: source.id,
      name: source.name,
      size: source.size,
      sha256: source.sha256,
      state: source.state,
      format: file.format,
      uploadedBy: name(source.uploadedById) ?? "",
      at: source.createdAt.toISOString(),
      acceptedRows: source.acceptedRows,
      acceptedAt: source.acceptedAt?.toISOString() ?? null,
      acceptedBy: name(source.acceptedById),
    },
    conventions,
    conventionsVersion,
    seenAt,
    notices: file.notices,
    errors: file.errors,
    differs,
    choice: differs.length > 0 ? (ask.choice ?? null) : "sheet",
    counts: { ...plan.counts, rows: plan.rows.length, broken: file.errors.length },
    fingerprint: plan.fingerprint,
    view,
    rows: matching.slice((page - 1) * ROWS_PER_PAGE, page * ROWS_PER_PAGE).map((row) => ({
      ...row,
      standingReading: row.standing && readClaim(row.standing.quantity, row.standing.claimed, conventions),
    })),
    matching: matching.length,
    page,
    pages,
  };
}

const VIEWS: Record<RowView, (row: PlannedRow) => boolean> = {
  all: () => true,
  changes: (row) => row.effect === "adds" || row.effect === "replaces",
  trouble: (row) => row.effect === "refused" || !row.readable,
};
