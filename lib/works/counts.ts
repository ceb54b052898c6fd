import { col, fn, type WhereOptions } from "sequelize";
import { Claim, Flag } from "@/models";
import type { Verdict } from "@/models/finding";

/** Claims by verdict; `unchecked` have none yet. Withdrawn claims are not counted. */
export type VerdictCounts = Partial<Record<Verdict, number>> & { unchecked: number; total: number };

type Row = { group: string; verdict: Verdict | null; count: number | string };

const empty = (): VerdictCounts => ({ unchecked: 0, total: 0 });

/** Counts by verdict, for each chapter or each work that the fragment reaches. */
export async function countVerdicts(
  by: "chapterId" | "workId",
  where: WhereOptions<Claim>,
): Promise<Map<string, VerdictCounts>> {
  const column = by === "chapterId" ? "chapter_id" : "work_id";
  const rows = (await Claim.findAll({
    attributes: [[col(column), "group"], "verdict", [fn("COUNT", col("id")), "count"]],
    where: { ...where, withdrawnAt: null },
    group: [column, "verdict"],
    raw: true,
  })) as unknown as Row[];
  const counted = new Map<string, VerdictCounts>();
  for (const { group, verdict, count } of rows) {
    const counts = counted.get(group) ?? empty();
    counts[verdict ?? "unchecked"] = Number(count);
    counts.total += Number(count);
    counted.set(group, counts);
  }
  return counted;
}

/** Open flags for each chapter or work that the fragment reaches. */
export async function countOpenFlags(
  by: "chapterId" | "workId",
  where: WhereOptions<Flag>,
): Promise<Map<string, number>> {
  const column = by === "chapterId" ? "chapter_id" : "work_id";
  const rows = (await Flag.findAll({
    attributes: [
      [col(column), "group"],
      [fn("COUNT", col("id")), "count"],
    ],
    where: { ...where, state: "open" },
    group: [column],
    raw: true,
  })) as unknown as { group: string; count: number | string }[];
  return new Map(rows.map(({ group, count }) => [group, Number(count)]));
}

/** Two sets of counts as one. */
export function addCounts(all: Iterable<VerdictCounts>): VerdictCounts {
  const sum = empty();
  for (const counts of all)
    for (const [key, count] of Object.entries(counts) as [keyof VerdictCounts, number][])
      sum[key] = (sum[key] ?? 0) + count;
  return sum;
}
