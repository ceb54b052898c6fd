import { LinkButton } from "@/components/ui/button";
import { Section } from "@/components/ui/page";
import type { RunView } from "@/lib/runs/get-run";
import { StartRunButton } from "../../_components/start-run-button";
import { wrongOf } from "../../_components/words";

/** What the run leads to: waiting, the review queue, a key, or another run. */
export function WhatNext({ run }: { run: RunView }) {
  const { says, actions } = next(run);
  return (
    <Section id="next" title="What happens next">
      <p className="max-w-measure">{says}</p>
      {actions ? <div className="mt-4 flex flex-wrap gap-3">{actions}</div> : null}
    </Section>
  );
}

function next(run: RunView): { says: string; actions?: React.ReactNode } {
  const { going, progress, openFlags, may, work, chapter } = run;
  const queue = `/works/${work.id}/flags${chapter ? `?chapter=${chapter.id}` : ""}`;
  const again = may.start ? (
    <StartRunButton
      workId={work.id}
      chapterId={chapter?.id ?? null}
      label="Start another run"
      variant="quiet"
    />
  ) : null;
  if (going)
    return {
      says: "When the last claim is judged, the claims are compared with all others of the work, and what is wrong becomes flags for a second author. You can leave this page: the run goes on, and whoever has a flag to settle gets one mail.",
    };
  if (progress.state === "cancelled")
    return {
      says: "The run was cancelled, so nothing that it found has become a flag. What it had judged by then stays with the claims; another run judges all of them.",
      actions: again,
    };
  if (openFlags > 0)
    return {
      says: `${openFlags === 1 ? "One flag waits" : `${openFlags} flags wait`} for a second author. Nobody settles a flag on their own claim.`,
      actions: (
        <>
          <LinkButton variant="primary" href={queue}>
            Open the review queue
          </LinkButton>
          {again}
        </>
      ),
    };
  const wrong = wrongOf(progress.counts);
  const undecided = progress.counts.undecided;
  const rest =
    undecided > 0
      ? ` ${undecided === 1 ? "One claim is" : `${undecided} claims are`} undecided and ${undecided === 1 ? "needs" : "need"} a change, or a waiver by the lead, before a key can be frozen.`
      : "";
  return {
    says: `${wrong > 0 ? "Every flag of this run is settled." : "Nothing of this run waits for a second author."}${rest} Preflight lists whatever still prevents a key.`,
    actions: (
      <>
        <LinkButton variant={undecided > 0 ? "quiet" : "primary"} href={`/works/${work.id}/keys`}>
          See preflight
        </LinkButton>
        {again}
      </>
    ),
  };
}
