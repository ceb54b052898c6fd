"use client";

import { useRouter } from "next/navigation";
import { useEffect, useMemo, useState } from "react";

import { ChapterStrip } from "@/components/chapter-strip";
import { Notice } from "@/components/ui/notice";
import { Section } from "@/components/ui/page";
import { Progress } from "@/components/ui/progress";
import type { Found } from "@/lib/runs/found";
import type { RunView } from "@/lib/runs/get-run";
import type { RunNews } from "@/lib/runs/watch-run";
import { number, RUN_STATES } from "../../_components/words";
import { FoundList } from "./found-list";
import { RunFigures } from "./run-figures";

type News = Omit<RunNews, "id">;
type Shown = Pick<RunView, "progress" | "strips" | "found">;
type Line = "listening" | "broken" | "closed";

/** What a run has done so far, going on by itself while the run does. */
export function RunLive({ run }: { run: RunView }) {
  const { shown, line } = useRun(run);
  const { progress, strips, found } = shown;
  const going = progress.state === "queued" || progress.state === "running";
  const here = `/works/${run.work.id}`;
  return (
    <>
      <Progress
        label={going ? "Claims judged" : `This run is ${RUN_STATES[progress.state]}`}
        done={progress.done}
        total={progress.total}
        text={`${number(progress.done)} of ${number(progress.total)}`}
      />
      <Milestones progress={progress} />
      {line === "broken" && going ? (
        <Notice kind="warn" title="The connection is interrupted" className="mt-4" live>
          The run goes on without it. This page catches up by itself as soon as it can.
        </Notice>
      ) : null}
      {line === "closed" && going ? (
        <Notice kind="warn" title="This page no longer hears from the run" className="mt-4" live>
          The run goes on. Reload the page to see how far it has come; you may have to sign in again.
        </Notice>
      ) : null}
      <RunFigures progress={progress} />
      {strips.map(({ chapterId, number: chapter, cells }) => (
        <div key={chapterId} className="mt-8">
          {run.chapter === null ? <h2 className="mb-2 text-base">Chapter {chapter}</h2> : null}
          <ChapterStrip
            label={`Claims of chapter ${chapter}`}
            cells={cells.map(({ id, claimId, ref, verdict }) => ({
              id,
              label: ref,
              verdict,
              href: `${here}/claims/${claimId}`,
            }))}
          />
        </div>
      ))}
      <Section
        id="found"
        title="What turned up"
        aside={found.length > 0 ? "In the order in which it was found" : undefined}
      >
        <FoundList workId={run.work.id} found={found} progress={progress} />
      </Section>
    </>
  );
}

/** The page's own picture of the run, kept up to date by the stream until the run is over. */
function useRun(run: RunView): { shown: Shown; line: Line } {
  const router = useRouter();
  const [shown, setShown] = useState<Shown>(run);
  const [line, setLine] = useState<Line>("listening");
  const [seen, setSeen] = useState(run);
  // The server drew the page anew, after the end or a cancellation: its picture is the whole one.
  if (seen !== run) {
    setSeen(run);
    setShown(run);
  }
  const { id, going, seenUpTo } = run;
  const workId = run.work.id;
  useEffect(() => {
    if (!going) return;
    const stream = new EventSource(
      `/api/works/${workId}/runs/${id}/events?since=${encodeURIComponent(seenUpTo)}`,
    );
    stream.onopen = () => setLine("listening");
    stream.onerror = () => setLine(stream.readyState === EventSource.CLOSED ? "closed" : "broken");
    stream.addEventListener("news", (event: MessageEvent<string>) => {
      const news = JSON.parse(event.data) as News;
      setShown((before) => withNews(before, news));
    });
    stream.addEventListener("over", () => {
      stream.close();
      router.refresh();
    });
    return () => stream.close();
  }, [workId, id, going, seenUpTo, router]);
  return { shown, line };
}

function withNews({ strips, found }: Shown, news: News): Shown {
  const verdicts = new Map(news.cells);
  const known = new Set(found.map(({ id }) => id));
  const fresh: Found[] = news.found.filter(({ id }) => !known.has(id));
  return {
    progress: news.progress,
    found: fresh.length === 0 ? found : [...found, ...fresh],
    strips:
      verdicts.size === 0
        ? strips
        : strips.map((strip) => ({
            ...strip,
            cells: strip.cells.map((cell) => ({ ...cell, verdict: verdicts.get(cell.id) ?? cell.verdict })),
          })),
  };
}

/** Says each quarter aloud, and the end: a reader of the screen hears how it goes, not every claim. */
function Milestones({ progress: { state, done, total } }: { progress: RunView["progress"] }) {
  const quarter = total === 0 ? 0 : Math.floor((4 * done) / total);
  const said = useMemo(() => {
    if (state === "ended" || state === "cancelled") return `The run is ${RUN_STATES[state]}.`;
    return quarter === 0 ? "" : `${quarter * 25} per cent of the claims are judged.`;
  }, [state, quarter]);
  return (
    <p role="status" className="sr-only">
      {said}
    </p>
  );
}
