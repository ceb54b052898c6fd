import type { Metadata } from "next";

import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { Notice } from "@/components/ui/notice";
import { PageBody, PageHeader } from "@/components/ui/page";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { getOverview, type Overview } from "@/lib/works/get-overview";
import { getWork, type WorkChrome } from "@/lib/works/get-work";
import { KIND_WORDS } from "@/lib/works/schema";
import { AddChapter } from "../_components/add-chapter";
import { ChapterLine } from "../_components/chapter-line";
import { ProductionPage } from "../_components/production-page";
import { WorkSettings } from "../_components/work-settings";

export async function generateMetadata({ params }: PageProps<"/works/[workId]">): Promise<Metadata> {
  const user = await requireUser();
  return { title: (await orNotFound(getWork((await params).workId, user))).title };
}

export default async function WorkPage({ params }: PageProps<"/works/[workId]">) {
  const user = await requireUser();
  const { workId } = await params;
  const work = await orNotFound(getWork(workId, user));
  if (!work.parts.chapters) return <ProductionPage work={work} user={user} />;
  const overview = await orNotFound(getOverview(workId, user));
  return (
    <PageBody>
      <PageHeader
        kicker={KIND_WORDS[work.kind].name}
        title={<bdi>{work.title}</bdi>}
        actions={
          work.may.manage ? (
            <WorkSettings
              work={{ id: work.id, title: work.title, kind: work.kind, confidential: work.confidential }}
            />
          ) : null
        }
      >
        {inWords(overview)}
      </PageHeader>
      <Next overview={overview} />
      <Chapters work={work} overview={overview} />
    </PageBody>
  );
}

function Next({ overview: { next } }: { overview: Overview }) {
  if (!next) return null;
  return (
    <Notice
      kind="info"
      title="What to do next"
      className="mb-8"
      action={
        <LinkButton href={next.href} variant="primary">
          {next.label}
        </LinkButton>
      }
    >
      {next.says}
    </Notice>
  );
}

function Chapters({ work, overview }: { work: WorkChrome; overview: Overview }) {
  const { chapters } = overview;
  const number = (chapters.at(-1)?.number ?? 0) + 1;
  if (chapters.length === 0 && !work.may.editChapters)
    return (
      <EmptyState title="No chapters are open to you yet">
        The lead author chooses the chapters a referee reads.
      </EmptyState>
    );
  if (chapters.length === 0)
    return (
      <EmptyState
        title="A work begins with a chapter"
        action={<AddChapter workId={work.id} number={number} first />}
      >
        Problems and their claims stand in chapters, numbered as they are printed.
      </EmptyState>
    );
  return (
    <>
      <ol className="border-t border-rule">
        {chapters.map((chapter, i) => (
          <ChapterLine
            key={chapter.id}
            workId={work.id}
            chapter={chapter}
            mayEdit={work.may.editChapters}
            place={{ first: i === 0, last: i === chapters.length - 1 }}
          />
        ))}
      </ol>
      {work.may.editChapters ? (
        <div className="mt-6">
          <AddChapter workId={work.id} number={number} />
        </div>
      ) : null}
    </>
  );
}

function inWords({ counts, openFlags, lastKey, chapters }: Overview): string {
  if (chapters.length === 0) return "";
  const claims = `${counts.total.toLocaleString("en-GB")} ${counts.total === 1 ? "claim" : "claims"} in ${chapters.length} ${chapters.length === 1 ? "chapter" : "chapters"}`;
  const flags = openFlags === 0 ? "no open flag" : `${openFlags} open ${openFlags === 1 ? "flag" : "flags"}`;
  return `${claims}, ${flags}${lastKey ? `, key ${lastKey.number} frozen` : ""}.`;
}
