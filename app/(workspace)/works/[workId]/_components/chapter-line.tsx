import Link from "next/link";

import { ChapterStrip } from "@/components/chapter-strip";
import { Time } from "@/components/ui/time";
import { VerdictMark } from "@/components/verdict-mark";
import { VERDICTS, type VerdictId } from "@/components/words";
import type { ChapterView } from "@/lib/works/get-overview";
import { ChapterTools } from "./chapter-tools";

/** Above this many claims the strip is one picture, below it each cell leads to its claim. */
const MOST_LINKS = 120;

const ORDER = Object.keys(VERDICTS) as VerdictId[];

/** One chapter of a work at a glance: its strip, its flags, its last run. */
export function ChapterLine({
  workId,
  chapter,
  mayEdit,
  place,
}: {
  workId: string;
  chapter: ChapterView;
  mayEdit: boolean;
  place: { first: boolean; last: boolean };
}) {
  const { id, number, title, counts, cells } = chapter;
  const href = `/works/${workId}/chapters/${id}`;
  return (
    <li className="grid gap-x-8 gap-y-3 border-b border-rule py-6 md:grid-cols-[minmax(0,1fr)_15rem]">
      <div className="min-w-0">
        <h2 className="mb-3 flex items-baseline gap-3 text-xl">
          <span className="old-style min-w-6 text-red">{number}</span>
          <Link
            href={href}
            className="min-w-0 break-words no-underline hover:text-blue hover:underline hover:underline-offset-6"
          >
            <bdi>{title}</bdi>
          </Link>
        </h2>
        {cells ? (
          <ChapterStrip
            label={`Claims of chapter ${number}`}
            compact={cells.length > MOST_LINKS}
            cells={cells.map((cell) => ({
              id: cell.id,
              label: cell.ref,
              verdict: cell.verdict,
              href: `/works/${workId}/claims/${cell.id}`,
            }))}
          />
        ) : (
          <ul className="tabular flex flex-wrap gap-x-5 gap-y-1 font-ui text-sm">
            {ORDER.filter((verdict) => (counts[verdict] ?? 0) > 0).map((verdict) => (
              <li key={verdict} className="flex items-center gap-1.5">
                <VerdictMark verdict={verdict} size={15} /> {(counts[verdict] ?? 0).toLocaleString("en-GB")}{" "}
                {VERDICTS[verdict].word}
              </li>
            ))}
            {counts.unchecked > 0 ? (
              <li>{counts.unchecked.toLocaleString("en-GB")} not checked yet</li>
            ) : null}
          </ul>
        )}
      </div>
      <div className="grid content-start gap-1.5 font-ui text-sm">
        {chapter.openFlags > 0 ? (
          <Link
            href={`/works/${workId}/flags?chapter=${id}`}
            className="inline-flex min-h-6 items-center text-red underline underline-offset-4"
          >
            {chapter.openFlags} open {chapter.openFlags === 1 ? "flag" : "flags"}
          </Link>
        ) : (
          <span className="text-quiet">no open flag</span>
        )}
        {chapter.lastRun ? (
          <Link
            href={`/works/${workId}/runs/${chapter.lastRun.id}`}
            className="inline-flex min-h-6 items-center text-quiet underline underline-offset-4"
          >
            <span>
              {RUN_WORDS[chapter.lastRun.state]} <Time at={chapter.lastRun.at} />
            </span>
          </Link>
        ) : (
          <span className="text-quiet">no run yet</span>
        )}
        {mayEdit ? (
          <ChapterTools
            workId={workId}
            chapter={{ id, number, title }}
            place={place}
            empty={counts.total === 0}
          />
        ) : null}
      </div>
    </li>
  );
}

const RUN_WORDS = {
  queued: "a run waits since",
  running: "a run is going since",
  ended: "last run",
  cancelled: "run cancelled",
} as const;
