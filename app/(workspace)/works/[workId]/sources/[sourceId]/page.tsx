import type { Metadata } from "next";
import Link from "next/link";
import { cache } from "react";

import { DownloadButton } from "@/components/ui/button";
import { Facts } from "@/components/ui/definition";
import { Disclosure } from "@/components/ui/disclosure";
import { Notice } from "@/components/ui/notice";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { getSource, ROW_VIEWS, type RowView, type SourceView } from "@/lib/sources/get-source";
import { sizeInWords } from "@/lib/sources/limits";
import { SourceStateTag } from "../../chapters/[chapterId]/_components/source-list";
import { Acceptance } from "./_components/acceptance";
import { ConventionsChoice } from "./_components/conventions-choice";
import { RowTable } from "./_components/row-table";

type Props = PageProps<"/works/[workId]/sources/[sourceId]">;

const load = cache(async ({ params, searchParams }: Props) => {
  const user = await requireUser();
  const { workId, sourceId } = await params;
  const { page, rows, conventions } = await searchParams;
  const view = ROW_VIEWS.find((each) => each === rows) ?? "all";
  const choice = conventions === "sheet" || conventions === "file" ? conventions : undefined;
  return orNotFound(getSource(workId, sourceId, user, { page: Number(page ?? 1), view, choice }));
});

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { source, page, pages } = await load(props);
  return { title: `Source ${source.name}${pages > 1 ? `, page ${page} of ${pages}` : ""}` };
}

export default async function SourcePage(props: Props) {
  const view = await load(props);
  const { work, chapter, source, counts, errors } = view;
  const galley = `/works/${work.id}/chapters/${chapter.id}`;
  return (
    <PageBody>
      <PageHeader
        trail={[
          { label: work.title, href: `/works/${work.id}` },
          { label: `Chapter ${chapter.number}`, href: galley },
          { label: "Source" },
        ]}
        title={<span className="break-all">{source.name}</span>}
        actions={
          <DownloadButton href={`/api/works/${work.id}/sources/${source.id}/bytes`}>
            Download as it came
          </DownloadButton>
        }
      >
        <SourceStateTag state={source.state} /> <span className="ml-2">{inWords(view)}</span>
      </PageHeader>

      <div className="grid gap-5">
        {source.state === "accepted" && source.acceptedAt ? (
          <Notice
            kind="ok"
            title={`${source.acceptedRows} ${source.acceptedRows === 1 ? "row is" : "rows are"} in the chapter`}
            action={
              <Link className="link inline-flex min-h-8 items-center" href={galley}>
                Open the galley of chapter {chapter.number}
              </Link>
            }
          >
            Accepted by {source.acceptedBy} on <Time at={source.acceptedAt} withClock />. Below, the file
            beside the chapter as it is now.
          </Notice>
        ) : null}
        {source.state === "set-aside" ? (
          <Notice kind="info" title="This source was set aside">
            Nothing of it entered the chapter. Its bytes are kept, and it can be taken up again.
          </Notice>
        ) : null}
        {view.notices.length > 0 ? (
          <Notice kind="info" title="How the file was read">
            <ul className="grid gap-0.5">
              {view.notices.map((notice) => (
                <li key={notice}>{notice}</li>
              ))}
            </ul>
          </Notice>
        ) : null}
        {errors.length > 0 ? <FileErrors errors={errors} whole={counts.rows === 0} /> : null}
        {view.differs.length > 0 ? (
          <ConventionsChoice
            differs={view.differs}
            choice={view.choice}
            href={(choice) => address(view, { choice })}
          />
        ) : null}
        {counts.rows > 0 || source.state !== "received" ? (
          <Acceptance
            workId={work.id}
            sourceId={source.id}
            state={source.state}
            chapterNumber={chapter.number}
            galley={galley}
            seen={{
              fingerprint: view.fingerprint,
              conventionsVersion: view.conventionsVersion,
              seenAt: view.seenAt,
            }}
            choice={view.choice}
            counts={counts}
          />
        ) : (
          <Acceptance
            workId={work.id}
            sourceId={source.id}
            state={source.state}
            chapterNumber={chapter.number}
            galley={galley}
            seen={null}
            choice={view.choice}
            counts={counts}
          />
        )}
      </div>

      {counts.rows > 0 ? (
        <Section title="Rows" id="rows" className="first:mt-10" aside={<Views view={view} />}>
          <RowTable workId={work.id} rows={view.rows} />
          <Pager
            page={view.page}
            pages={view.pages}
            total={view.matching}
            unit={view.matching === 1 ? "row" : "rows"}
            href={(page) => address(view, { page })}
          />
        </Section>
      ) : null}

      <div className="mt-10">
        <Disclosure summary="About this file">
          <Facts
            items={[
              {
                term: "Uploaded",
                value: (
                  <>
                    by {source.uploadedBy}, <Time at={source.at} withClock />
                  </>
                ),
              },
              { term: "Format", value: source.format.toUpperCase() },
              {
                term: "Size",
                value: `${source.size.toLocaleString("en-GB")} bytes (${sizeInWords(source.size)})`,
              },
              {
                term: "SHA-256",
                value: <code className="font-mono text-xs break-all">{source.sha256}</code>,
              },
            ]}
          />
        </Disclosure>
      </div>
    </PageBody>
  );
}

const SHOWN_ERRORS = 30;

function FileErrors({ errors, whole }: { errors: SourceView["errors"]; whole: boolean }) {
  const title = whole
    ? "No row of this file can be read"
    : errors.length === 1
      ? "One line cannot be read"
      : `${errors.length} lines cannot be read`;
  return (
    <Notice kind="error" title={title}>
      <ul className="tabular grid gap-1">
        {errors.slice(0, SHOWN_ERRORS).map(({ line, column, says }) => (
          <li key={`${line} ${column} ${says}`}>
            <b className="font-medium">
              Line {line}, column {column}:
            </b>{" "}
            {says}
          </li>
        ))}
      </ul>
      {errors.length > SHOWN_ERRORS ? <p className="mt-1">And {errors.length - SHOWN_ERRORS} more.</p> : null}
      <p className="mt-2 text-quiet">The file is kept as it came. Mend it and upload it again.</p>
    </Notice>
  );
}

const VIEW_WORDS: Record<RowView, string> = {
  all: "all rows",
  changes: "what would change",
  trouble: "what needs a look",
};

function Views({ view }: { view: SourceView }) {
  return (
    <nav aria-label="Rows shown" className="flex flex-wrap gap-x-5">
      {ROW_VIEWS.map((each) =>
        each === view.view ? (
          <span
            key={each}
            aria-current="true"
            className="inline-flex min-h-8 items-center border-b-2 border-ink text-ink"
          >
            {VIEW_WORDS[each]}
          </span>
        ) : (
          <Link
            key={each}
            href={address(view, { rows: each, page: 1 })}
            scroll={false}
            className="inline-flex min-h-8 items-center hover:text-blue"
          >
            {VIEW_WORDS[each]}
          </Link>
        ),
      )}
    </nav>
  );
}

function address(
  view: SourceView,
  change: { page?: number; rows?: RowView; choice?: "sheet" | "file" },
): string {
  const page = change.page ?? 1;
  const rows = change.rows ?? view.view;
  const choice = change.choice ?? (view.differs.length > 0 ? view.choice : null);
  const query = new URLSearchParams({
    ...(page > 1 && { page: String(page) }),
    ...(rows !== "all" && { rows }),
    ...(choice && { conventions: choice }),
  }).toString();
  return `/works/${view.work.id}/sources/${view.source.id}${query ? `?${query}` : ""}`;
}

/** "30 rows: 28 new, 2 replace a claim" */
function inWords({ counts }: SourceView): string {
  const parts = [
    counts.adds > 0 && `${counts.adds} new`,
    counts.replaces > 0 && `${counts.replaces} ${counts.replaces === 1 ? "replaces" : "replace"} a claim`,
    counts.nothing > 0 && `${counts.nothing} unchanged`,
    counts.refused > 0 && `${counts.refused} cannot enter`,
    counts.unreadable > 0 && `${counts.unreadable} of them unreadable`,
  ].filter(Boolean);
  return `${counts.rows} ${counts.rows === 1 ? "row" : "rows"}${parts.length > 0 ? `: ${parts.join(", ")}` : ""}`;
}
