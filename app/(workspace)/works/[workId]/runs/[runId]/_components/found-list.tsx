import Link from "next/link";

import { MathHtml } from "@/components/math-html";
import { EmptyState } from "@/components/ui/empty-state";
import { Galley, GalleyLine, MarginNote } from "@/components/ui/galley";
import { VERDICTS } from "@/components/words";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { Found } from "@/lib/runs/found";
import type { RunProgress } from "@/lib/runs/run-progress";
import { number, wrongOf } from "../../_components/words";

/** Lines on the page; the review queue lists them all, with filters. */
const MOST_LINES = 200;

/** Each claim that needs a second author, as it stands in the work, with the verifier's note in the margin. */
export function FoundList({
  workId,
  found,
  progress,
}: {
  workId: string;
  found: readonly Found[];
  progress: RunProgress;
}) {
  const going = progress.state === "queued" || progress.state === "running";
  if (found.length === 0) return <Nothing going={going} progress={progress} />;
  const lines = found.slice(0, MOST_LINES);
  const more = wrongOf(progress.counts) - lines.length;
  return (
    <>
      <Galley label="Claims that need a second author">
        {lines.map((each) => (
          <GalleyLine key={each.id} notes={<Note workId={workId} found={each} />}>
            <Claim workId={workId} found={each} />
          </GalleyLine>
        ))}
      </Galley>
      {more > 0 ? (
        <p className="mt-4 font-ui text-sm text-quiet">
          {number(more)} more {going ? "so far" : ""} are not listed here; when the run has ended, all of them
          are in the{" "}
          <Link className="link" href={`/works/${workId}/flags`}>
            review queue
          </Link>
          .
        </p>
      ) : null}
    </>
  );
}

function Nothing({ going, progress: { counts, done, total } }: { going: boolean; progress: RunProgress }) {
  if (going)
    return (
      <p className="py-6 text-quiet">
        Nothing so far. Whatever needs a second author appears here as it is found.
      </p>
    );
  if (done < total)
    return (
      <EmptyState title="Nothing was found before it was cancelled" mark="pending">
        {done === 0
          ? "No claim had been judged by then."
          : "The claims that it had judged by then need no second author."}
      </EmptyState>
    );
  const right = counts.confirmed + counts["confirmed-not-house-form"];
  return (
    <EmptyState title="Nothing to settle" mark={done > 0 && right === done ? "confirmed" : "undecided"}>
      {done > 0 && right === done
        ? "Every claim that this run judged is confirmed."
        : "No claim that this run judged differs from its exact value; those that are undecided say why on their own pages."}
    </EmptyState>
  );
}

function Claim({ workId, found }: { workId: string; found: Found }) {
  const { quantityHtml, claimedHtml, quantity, claimed, ref, claimId } = found;
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
      <Link
        href={`/works/${workId}/claims/${claimId}`}
        className="link old-style w-20 shrink-0 text-sm break-words"
      >
        {ref}
      </Link>
      {quantityHtml !== null && claimedHtml !== null ? (
        <ScrollBox label="the claim" className="flex min-w-0 flex-wrap items-center gap-x-2 py-1">
          <MathHtml html={quantityHtml} />
          <span aria-hidden="true">=</span>
          <span className="sr-only">claimed to equal</span>
          <span className="text-blue">
            <MathHtml html={claimedHtml} />
          </span>
        </ScrollBox>
      ) : (
        <span className="min-w-0 font-mono text-sm break-all">
          {quantity} = <span className="text-blue">{claimed}</span>
        </span>
      )}
    </div>
  );
}

function Note({ workId, found: { verdict, exactHtml, says, flagId } }: { workId: string; found: Found }) {
  return (
    <MarginNote pencil="red" mark={verdict} title={VERDICTS[verdict].word}>
      {verdict !== "unreadable" && exactHtml !== null ? (
        <p className="py-1 text-lg">
          <MathHtml html={exactHtml} label="recomputed value" />
        </p>
      ) : null}
      <p>{says}</p>
      {flagId ? (
        <p className="font-ui text-sm not-italic">
          <Link className="link" href={`/works/${workId}/flags/${flagId}`}>
            Open its flag
          </Link>
        </p>
      ) : null}
    </MarginNote>
  );
}
