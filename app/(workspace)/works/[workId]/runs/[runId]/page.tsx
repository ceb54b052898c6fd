import type { Metadata } from "next";
import { cache } from "react";

import { LinkButton } from "@/components/ui/button";
import { PageBody, PageHeader } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { notFound } from "@/lib/errors";
import { getRun, type RunView } from "@/lib/runs/get-run";
import { ThisRun } from "@/lib/runs/schema";
import { CancelRunButton } from "../_components/cancel-run-button";
import { RunLive } from "./_components/run-live";
import { WhatNext } from "./_components/what-next";

type Props = PageProps<"/works/[workId]/runs/[runId]">;

const load = cache(async (params: Props["params"]): Promise<RunView> => {
  const user = await requireUser();
  const which = ThisRun.safeParse(await params);
  return orNotFound(which.success ? getRun(which.data, user) : Promise.reject(notFound()));
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const run = await load(params);
  return { title: `${nameOf(run)}, ${run.work.title}` };
}

export default async function RunPage({ params }: Props) {
  const run = await load(params);
  const { work, chapter, may } = run;
  const trail = [
    { label: work.title, href: `/works/${work.id}` },
    ...(chapter
      ? [{ label: `Chapter ${chapter.number}`, href: `/works/${work.id}/chapters/${chapter.id}` }]
      : []),
    { label: "runs", href: `/works/${work.id}/runs` },
    { label: "this run" },
  ];
  const back = chapter ? (
    <LinkButton href={`/works/${work.id}/chapters/${chapter.id}`}>To the chapter</LinkButton>
  ) : (
    <LinkButton href={`/works/${work.id}`}>To the work</LinkButton>
  );
  return (
    <PageBody>
      <PageHeader
        trail={trail}
        kicker={chapter ? chapter.title : work.title}
        title={nameOf(run)}
        actions={may.cancel ? <CancelRunButton workId={work.id} runId={run.id} /> : back}
      >
        Started by {run.startedBy}, <Time at={run.createdAt} withClock />
        {run.endedAt ? (
          <>
            ; over <Time at={run.endedAt} withClock />
          </>
        ) : null}
        . Version {run.conventionsVersion} of the conventions sheet; {run.engine}.
      </PageHeader>
      <RunLive run={run} />
      <WhatNext run={run} />
    </PageBody>
  );
}

const nameOf = ({ chapter }: RunView) =>
  chapter ? `Run of chapter ${chapter.number}` : "Run of the whole work";
