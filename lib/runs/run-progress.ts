import { col, fn } from "sequelize";
import { Finding, type Run } from "@/models";
import type { Verdict } from "@/models/finding";
import type { RunState } from "@/models/run";

export type Counts = Record<Verdict, number>;

/** How far a run has come. */
export type RunProgress = {
  state: RunState;
  total: number;
  done: number;
  counts: Counts;
  /** claims a second since it began; null before there is anything to measure */
  perSecond: number | null;
  /** null when it cannot be told yet, or nothing is left */
  secondsLeft: number | null;
};

export const noCounts = (): Counts => ({
  confirmed: 0,
  "confirmed-not-house-form": 0,
  discrepant: 0,
  contradicted: 0,
  unreadable: 0,
  undecided: 0,
});

/** Counts the findings of a run by verdict, from an index alone. */
export async function runProgress(run: Run): Promise<RunProgress> {
  const rows = (await Finding.findAll({
    attributes: ["verdict", [fn("COUNT", col("id")), "count"]],
    where: { runId: run.id },
    group: ["verdict"],
    raw: true,
  })) as unknown as { verdict: Verdict | null; count: number | string }[];
  const counts = noCounts();
  for (const { verdict, count } of rows) if (verdict) counts[verdict] = Number(count);
  const done = Object.values(counts).reduce((sum, count) => sum + count, 0);
  return { state: run.state, total: run.total, done, counts, ...speed(run, done) };
}

function speed(
  { startedAt, endedAt, total }: Run,
  done: number,
): Pick<RunProgress, "perSecond" | "secondsLeft"> {
  if (!startedAt || done === 0) return { perSecond: null, secondsLeft: null };
  const seconds = ((endedAt ?? new Date()).getTime() - startedAt.getTime()) / 1000;
  if (seconds <= 0) return { perSecond: null, secondsLeft: null };
  const perSecond = done / seconds;
  return { perSecond, secondsLeft: endedAt || done >= total ? null : Math.ceil((total - done) / perSecond) };
}
