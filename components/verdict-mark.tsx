import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";
import { SETTLE_WORDS, TONE_TEXT, VERDICTS, type SettleId, type VerdictId } from "@/components/words";

/**
 * A verdict as its mark, with the word beside it (`withWord`) or kept for screen readers. `null` is a claim that no
 * run has seen yet.
 */
export function VerdictMark({
  verdict,
  withWord = false,
  short = false,
  size = 18,
  className,
}: {
  verdict: VerdictId | null;
  withWord?: boolean;
  short?: boolean;
  size?: number;
  className?: string;
}) {
  const {
    word,
    short: shortWord,
    tone,
  } = verdict === null
    ? { word: "not checked yet", short: "not checked", tone: "quiet" as const }
    : VERDICTS[verdict];
  const shown = short ? shortWord : word;
  return (
    <span className={cx("inline-flex items-center gap-1.5 font-ui", TONE_TEXT[tone], className)}>
      <Mark name={verdict ?? "pending"} size={size} label={withWord ? undefined : word} />
      {withWord ? <span>{shown}</span> : null}
    </span>
  );
}

/** One of the four words that settle a flag, with its mark. */
export function SettleMark({
  word,
  withWord = true,
  size = 18,
  className,
}: {
  word: SettleId;
  withWord?: boolean;
  size?: number;
  className?: string;
}) {
  return (
    <span className={cx("inline-flex items-center gap-1.5 font-ui text-blue", className)}>
      <Mark name={word} size={size} label={withWord ? undefined : SETTLE_WORDS[word].word} />
      {withWord ? <span>{SETTLE_WORDS[word].word}</span> : null}
    </span>
  );
}

/** The seal of a frozen key, with its number. */
export function KeySeal({
  number,
  size = 40,
  className,
}: {
  number: number;
  size?: number;
  className?: string;
}) {
  return (
    <span className={cx("inline-flex items-center gap-2 text-red", className)}>
      <Mark name="seal" size={size} />
      <span className="small-caps text-lg">
        frozen key <span className="old-style">{number}</span>
      </span>
    </span>
  );
}
