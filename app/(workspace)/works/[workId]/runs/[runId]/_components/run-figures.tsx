import { Mark } from "@/components/marks";
import { cx } from "@/components/cx";
import { TONE_TEXT, VERDICTS, type VerdictId } from "@/components/words";
import type { RunProgress } from "@/lib/runs/run-progress";
import { durationInWords, number, speedInWords } from "../../_components/words";

const ORDER: readonly VerdictId[] = [
  "confirmed",
  "confirmed-not-house-form",
  "discrepant",
  "contradicted",
  "unreadable",
  "undecided",
];

/** The run in figures: each verdict with its mark and word, what is left, and how fast it goes. */
export function RunFigures({ progress }: { progress: RunProgress }) {
  const { state, total, done, counts, secondsLeft } = progress;
  const going = state === "queued" || state === "running";
  return (
    <div className="mt-6 grid gap-x-10 gap-y-5 md:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
      <dl className="grid grid-cols-2 gap-x-6 border-t border-rule font-ui text-sm sm:grid-cols-3">
        {ORDER.map((verdict) => (
          <div key={verdict} className="flex min-w-0 items-center gap-2.5 border-b border-rule py-2">
            <Mark
              name={verdict}
              size={18}
              className={counts[verdict] > 0 ? TONE_TEXT[VERDICTS[verdict].tone] : "text-quiet"}
            />
            <dt className="order-2 min-w-0 leading-tight text-quiet">{VERDICTS[verdict].short}</dt>
            <dd className={cx("tabular order-1 text-base", counts[verdict] > 0 ? "text-ink" : "text-quiet")}>
              {number(counts[verdict])}
            </dd>
          </div>
        ))}
      </dl>
      <dl className="border-t border-rule font-ui text-sm">
        <Line term="Done">{number(done)}</Line>
        <Line term="Left">{number(total - done)}</Line>
        <Line term={going ? "Speed" : "Speed reached"}>{speedInWords(progress)}</Line>
        {going && secondsLeft !== null ? (
          <Line term="Time left">about {durationInWords(secondsLeft)}</Line>
        ) : null}
      </dl>
    </div>
  );
}

function Line({ term, children }: { term: string; children: React.ReactNode }) {
  return (
    <div className="flex justify-between gap-4 border-b border-rule py-2">
      <dt className="text-quiet">{term}</dt>
      <dd className="tabular text-right">{children}</dd>
    </div>
  );
}
