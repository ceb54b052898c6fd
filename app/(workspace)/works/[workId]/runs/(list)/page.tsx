import type { Metadata } from "next";
import Link from "next/link";
import { cache } from "react";
import { z } from "zod";

import { EmptyState } from "@/components/ui/empty-state";
import { LinkButton } from "@/components/ui/button";
import { PageBody, PageHeader } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Table, type Column } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { notFound } from "@/lib/errors";
import { listRuns, type RunLine, type RunList } from "@/lib/runs/list-runs";
import { StartRunButton } from "../_components/start-run-button";
import { number, RUN_STATES, wrongOf } from "../_components/words";

type Props = PageProps<"/works/[workId]/runs">;

const Page = z.coerce.number().int().min(1).max(10_000).catch(1);

const load = cache(async ({ params, searchParams }: Props): Promise<RunList> => {
  const user = await requireUser();
  const workId = z.uuid().safeParse((await params).workId);
  const page = Page.parse((await searchParams).page ?? 1);
  return orNotFound(workId.success ? listRuns(workId.data, user, page) : Promise.reject(notFound()));
});

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: `Runs, ${(await load(props)).work.title}` };
}

export default async function RunsPage(props: Props) {
  const { work, runs, page, pages, total, may } = await load(props);
  const here = `/works/${work.id}/runs`;
  return (
    <PageBody>
      <PageHeader
        trail={[{ label: work.title, href: `/works/${work.id}` }, { label: "runs" }]}
        title="Runs"
        actions={
          may.start ? (
            <StartRunButton workId={work.id} chapterId={null} label="Run the whole work" />
          ) : undefined
        }
      >
        Each run judges every claim of a chapter, or of the work, in the conventions of its day.
      </PageHeader>
      <Table
        caption="Runs of this work, newest first"
        captionHidden
        columns={columnsFor(work.id)}
        rows={runs}
        rowKey={({ id }) => id}
        empty={
          <EmptyState
            title="No run has been started yet"
            mark="run"
            action={<LinkButton href={`/works/${work.id}`}>To the chapters</LinkButton>}
          >
            {may.start
              ? "Start one from a chapter, or run the whole work: each claim is recomputed exactly and what is wrong goes to a second author."
              : "An author starts the first one; you will see here how it went."}
          </EmptyState>
        }
      />
      {pages > 1 ? (
        <div className="mt-5">
          <Pager
            page={page}
            pages={pages}
            total={total}
            unit="runs"
            href={(n) => (n === 1 ? here : `${here}?page=${n}`)}
          />
        </div>
      ) : null}
    </PageBody>
  );
}

const columnsFor = (workId: string): Column<RunLine>[] => [
  {
    id: "run",
    header: "Run",
    rowHeader: true,
    label: "",
    cell: ({ id, chapter }) => (
      <Link className="link" href={`/works/${workId}/runs/${id}`}>
        {chapter ? `Chapter ${chapter.number}, ${chapter.title}` : "The whole work"}
      </Link>
    ),
  },
  {
    id: "when",
    header: "Started",
    cell: ({ createdAt, startedBy }) => (
      <>
        <Time at={createdAt} withClock />
        <span className="block text-xs text-quiet">{startedBy}</span>
      </>
    ),
  },
  { id: "state", header: "State", cell: ({ state }) => RUN_STATES[state] },
  {
    id: "done",
    header: "Judged",
    align: "end",
    cell: ({ counts, total }) => {
      const done = Object.values(counts).reduce((sum, count) => sum + count, 0);
      return (
        <span className="tabular">
          {done === total ? number(total) : `${number(done)} of ${number(total)}`}
        </span>
      );
    },
  },
  {
    id: "right",
    header: "Confirmed",
    align: "end",
    cell: ({ counts }) => (
      <span className="tabular">{number(counts.confirmed + counts["confirmed-not-house-form"])}</span>
    ),
  },
  {
    id: "wrong",
    header: "To settle",
    align: "end",
    cell: ({ counts }) => (
      <span className={wrongOf(counts) > 0 ? "tabular text-red" : "tabular"}>{number(wrongOf(counts))}</span>
    ),
  },
  {
    id: "undecided",
    header: "Undecided",
    align: "end",
    cell: ({ counts }) => <span className="tabular">{number(counts.undecided)}</span>,
  },
];
