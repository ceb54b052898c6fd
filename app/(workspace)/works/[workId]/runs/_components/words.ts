import type { RunState } from "@/models/run";
import type { Counts, RunProgress } from "@/lib/runs/run-progress";

export const RUN_STATES: Record<RunState, string> = {
  queued: "waiting to begin",
  running: "going on",
  ended: "ended",
  cancelled: "cancelled",
};

const one = new Intl.NumberFormat("en-GB", { maximumFractionDigits: 1 });
const whole = new Intl.NumberFormat("en-GB");
export const number = (value: number) => whole.format(value);

/** Claims that need a second author. */
export const wrongOf = ({ discrepant, contradicted, unreadable }: Counts) =>
  discrepant + contradicted + unreadable;

export const speedInWords = ({ perSecond }: RunProgress) =>
  perSecond === null
    ? "not known yet"
    : perSecond >= 10
      ? `${number(Math.round(perSecond))} claims a second`
      : `${one.format(perSecond)} claims a second`;

export function durationInWords(seconds: number): string {
  if (seconds < 1.5) return "a second";
  if (seconds < 90) return `${Math.round(seconds)} seconds`;
  if (seconds < 5_400) return `${Math.round(seconds / 60)} minutes`;
  return `${one.format(seconds / 3_600)} hours`;
}
