import Link from "next/link";

import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";
import { TONE_TEXT, TONE_WASH, VERDICTS, type Tone, type VerdictId } from "@/components/words";

export type StripCell = { id: string; label: string; verdict: VerdictId | null; href?: string };

const ORDER: readonly (VerdictId | null)[] = [
  "confirmed",
  "confirmed-not-house-form",
  "discrepant",
  "contradicted",
  "unreadable",
  "undecided",
  null,
];

function wordOf(verdict: VerdictId | null): string {
  return verdict === null ? "not checked yet" : VERDICTS[verdict].word;
}

function toneOf(verdict: VerdictId | null): Tone {
  return verdict === null ? "quiet" : VERDICTS[verdict].tone;
}

/** "98 confirmed, 3 discrepant": the strip in words, in the order of the verdicts. */
export function stripInWords(cells: readonly StripCell[]): string {
  const counted = ORDER.map((verdict) => ({
    verdict,
    count: cells.filter((cell) => cell.verdict === verdict).length,
  })).filter(({ count }) => count > 0);
  return counted.map(({ verdict, count }) => `${count} ${wordOf(verdict)}`).join(", ");
}

/**
 * A chapter at a glance, one slug of type a claim, in the order of the chapter.
 * Plain, each cell is a link named "7.3(a): discrepant"; `compact` is one picture with its counts in words.
 */
export function ChapterStrip({
  cells,
  label,
  compact = false,
  className,
}: {
  cells: readonly StripCell[];
  label: string;
  compact?: boolean;
  className?: string;
}) {
  if (cells.length === 0) return <p className="font-ui text-sm text-quiet">No claims yet.</p>;
  if (compact) return <CompactStrip {...{ cells, label, className }} />;
  return (
    <div className={className}>
      <ol aria-label={label} className="flex flex-wrap gap-x-px gap-y-1.5">
        {cells.map((cell) => (
          <li key={cell.id}>
            <Slug cell={cell} />
          </li>
        ))}
      </ol>
      <p className="mt-2 font-ui text-xs text-quiet">{stripInWords(cells)}</p>
    </div>
  );
}

function Slug({ cell }: { cell: StripCell }) {
  const tone = toneOf(cell.verdict);
  const name = `${cell.label}: ${wordOf(cell.verdict)}`;
  const wrong = tone === "red" || tone === "amber";
  const look = cx(
    "grid h-9 w-6 place-items-center border-y border-t-edge border-b-3 bg-sheet",
    TONE_TEXT[tone],
    wrong ? cx(TONE_WASH[tone], "border-b-current") : "border-b-edge",
  );
  const mark = <Mark name={cell.verdict ?? "pending"} size={15} />;
  if (!cell.href) {
    return (
      <span className={look} role="img" aria-label={name} title={name}>
        {mark}
      </span>
    );
  }
  return (
    <Link
      href={cell.href}
      prefetch={false}
      className={cx(look, "hover:-translate-y-0.5 hover:border-t-current motion-reduce:transform-none")}
      aria-label={name}
      title={name}
    >
      {mark}
    </Link>
  );
}

const BAR: Record<Tone, string> = {
  green: "fill-green",
  amber: "fill-amber",
  red: "fill-red",
  quiet: "fill-rule",
  blue: "fill-blue",
  ink: "fill-ink",
};

// Height carries the verdict too, so the strip reads without colour: right is low, wrong stands out of the line.
const HEIGHT: Record<Tone, number> = { green: 10, amber: 16, red: 24, quiet: 5, blue: 10, ink: 10 };

function CompactStrip({
  cells,
  label,
  className,
}: {
  cells: readonly StripCell[];
  label: string;
  className?: string;
}) {
  const step = 7;
  const words = stripInWords(cells);
  return (
    <figure className={className}>
      <svg
        viewBox={`0 0 ${cells.length * step} 28`}
        role="img"
        aria-label={`${label}: ${words}`}
        className="block h-7 max-w-full"
        style={{ width: cells.length * step }}
        preserveAspectRatio="none"
      >
        {cells.map((cell, i) => {
          const tone = toneOf(cell.verdict);
          const height = HEIGHT[tone];
          return (
            <rect
              key={cell.id}
              x={i * step + 0.75}
              y={26 - height}
              width={step - 1.5}
              height={height}
              className={BAR[tone]}
            />
          );
        })}
        <path d={`M0 27.5H${cells.length * step}`} className="stroke-edge" strokeWidth="1" />
      </svg>
      <figcaption className="mt-1 font-ui text-xs text-quiet">{words}</figcaption>
    </figure>
  );
}
