import type { Metadata } from "next";
import Link from "next/link";
import { cache } from "react";

import { ChapterStrip } from "@/components/chapter-strip";
import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader, Section, Sheet } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { getGalley, type Galley } from "@/lib/claims/get-galley";
import { listSources } from "@/lib/sources/list-sources";
import { StartRunButton } from "../../runs/_components/start-run-button";
import { AddProblem } from "./_components/add-problem";
import { GalleyProblemBlock } from "./_components/galley-problem";
import { SourceList } from "./_components/source-list";
import { UploadArea } from "./_components/upload-area";

type Props = PageProps<"/works/[workId]/chapters/[chapterId]">;

const load = cache(async ({ params, searchParams }: Props) => {
  const user = await requireUser();
  const { workId, chapterId } = await params;
  const { page, claim } = await searchParams;
  const wanted = typeof claim === "string" ? { claimId: claim } : Number(page ?? 1);
  return { user, galley: await orNotFound(getGalley(workId, chapterId, user, wanted)) };
});

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { chapter, page, pages } = (await load(props)).galley;
  return {
    title: `Chapter ${chapter.number}, ${chapter.title}${pages > 1 ? `, page ${page} of ${pages}` : ""}`,
  };
}

export default async function ChapterPage(props: Props) {
  const { galley, user } = await load(props);
  const { work, chapter, may, problems } = galley;
  const here = `/works/${work.id}/chapters/${chapter.id}`;
  const at = (page: number) => (page === 1 ? here : `${here}?page=${page}`);
  const sources = may.upload ? await listSources(work.id, chapter.id, user) : [];
  return (
    <PageBody>
      <PageHeader
        trail={[{ label: work.title, href: `/works/${work.id}` }, { label: `Chapter ${chapter.number}` }]}
        kicker={`Chapter ${chapter.number}`}
        title={chapter.title}
        actions={<Actions galley={galley} />}
      >
        {inWords(galley)}
      </PageHeader>

      {galley.strip.length > 0 ? (
        <div className="mb-10">
          <ChapterStrip
            label={`Claims of chapter ${chapter.number}`}
            cells={galley.strip.map(({ id, ref, verdict, page }) => ({
              id,
              label: ref,
              verdict,
              href: `${at(page)}#claim-${id}`,
            }))}
          />
          {galley.lastRun ? (
            <p className="mt-1 font-ui text-xs text-quiet">
              <Link className="link" href={`/works/${work.id}/runs/${galley.lastRun.id}`}>
                {galley.lastRun.state === "running" || galley.lastRun.state === "queued"
                  ? "A run is under way"
                  : "Last run"}
              </Link>
              , <Time at={galley.lastRun.at} withClock />
            </p>
          ) : null}
        </div>
      ) : null}

      {problems.length === 0 ? (
        <EmptyState
          title="This chapter has no problems yet"
          action={
            may.edit ? (
              <AddProblem workId={work.id} chapterId={chapter.id} lastPage={here} prominent />
            ) : undefined
          }
        >
          {may.edit
            ? "Add the first problem and write its claims, or upload a key file below: its rows make the problems they need."
            : "Its authors have not written any problem yet. There is nothing for you to do here today."}
        </EmptyState>
      ) : (
        <>
          <Sheet marks className="mx-auto">
            {problems.map((problem) => (
              <GalleyProblemBlock
                key={`${problem.id}${problem.continued ? "-continued" : ""}`}
                problem={problem}
                workId={work.id}
                conventions={galley.conventions}
                mayEdit={may.edit}
              />
            ))}
          </Sheet>
          <div className="mt-5">
            {galley.pages > 1 ? (
              <Pager
                page={galley.page}
                pages={galley.pages}
                total={galley.problemCount}
                unit="problems"
                href={at}
              />
            ) : null}
          </div>
          {may.edit ? (
            <div className="no-print mt-3">
              <AddProblem
                workId={work.id}
                chapterId={chapter.id}
                lastPage={at(galley.pages)}
                prominent={false}
              />
            </div>
          ) : null}
        </>
      )}

      {may.upload ? (
        <Section title="Sources" id="sources" aside="Key files, kept byte for byte">
          <UploadArea workId={work.id} chapterId={chapter.id} />
          {sources.length > 0 ? (
            <div className="mt-6">
              <SourceList workId={work.id} sources={sources} />
            </div>
          ) : null}
        </Section>
      ) : null}
    </PageBody>
  );
}

function Actions({ galley: { work, chapter, may, strip } }: { galley: Galley }) {
  return (
    <>
      {may.readFlags ? (
        <LinkButton href={`/works/${work.id}/flags?chapter=${chapter.id}`}>Review queue</LinkButton>
      ) : null}
      {may.run && strip.length > 0 ? <StartRunButton workId={work.id} chapterId={chapter.id} /> : null}
    </>
  );
}

/** "3 problems, 12 claims, 4 of them not checked yet; 1 withdrawn" */
function inWords({ problemCount, strip, unchecked, withdrawn }: Galley): string {
  const count = (n: number, one: string, many: string) => `${n} ${n === 1 ? one : many}`;
  const claims = count(strip.length, "claim", "claims");
  const open =
    unchecked === 0
      ? ""
      : unchecked === strip.length
        ? ", not checked yet"
        : `, ${unchecked} of them not checked yet`;
  return `${count(problemCount, "problem", "problems")}, ${claims}${open}${withdrawn > 0 ? `; ${withdrawn} withdrawn` : ""}`;
}
