"use client";

import {
  createColumnHelper,
  rowPaginationFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from "@tanstack/react-table";
import Link from "next/link";
import useSWR from "swr";

import { Mark } from "@/components/marks";
import { MathHtml } from "@/components/math-html";
import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { Pager } from "@/components/ui/pager";
import { Cell, ColumnHead, TableFrame } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { SettleMark, VerdictMark } from "@/components/verdict-mark";
import { ScrollBox } from "@/components/ui/scroll-box";
import { FLAGS_PER_PAGE, flagQueryText, isNarrowed, type FlagQuery } from "@/lib/flags/flag-query";
import type { FlagRow } from "@/lib/flags/flag-row";
import type { FlagList } from "@/lib/flags/list-flags";

// Sorting and paging happen in the database; the table only knows how the rows came.
const features = tableFeatures({ rowSortingFeature, rowPaginationFeature });
const helper = createColumnHelper<typeof features, FlagRow>();
const NO_CHANGE = () => undefined;

const columns = helper.columns([
  helper.display({ id: "place", header: "Claim", cell: ({ row }) => <Place row={row.original} /> }),
  helper.display({
    id: "values",
    header: () => <span className="inline-flex min-h-6 items-baseline">As claimed, as recomputed</span>,
    cell: ({ row }) => <Values row={row.original} />,
  }),
  helper.display({
    id: "verdict",
    header: "What the verifier says",
    cell: ({ row }) => <Says row={row.original} />,
  }),
  helper.display({ id: "claimant", header: "Claimant", cell: ({ row }) => row.original.claimant.name }),
  helper.display({ id: "assignee", header: "Waits for", cell: ({ row }) => <Assignee row={row.original} /> }),
  helper.display({ id: "age", header: "Raised", cell: ({ row }) => <Time at={row.original.raisedAt} /> }),
]);

const SORTABLE: readonly string[] = ["place", "verdict", "claimant", "assignee", "age"];

async function fetchList(path: string): Promise<FlagList> {
  const response = await fetch(path, { headers: { accept: "application/json" } });
  if (!response.ok) throw new Error(`The queue could not be read (${response.status}).`);
  return (await response.json()) as FlagList;
}

/** The queue as a proof-reader's list. Kept fresh while it is looked at; sorting and paging are links. */
export function FlagTable({
  workId,
  query,
  initial,
}: {
  workId: string;
  query: FlagQuery;
  initial: FlagList;
}) {
  const path = `/works/${workId}/flags`;
  const here = flagQueryText(query, { page: query.page });
  const { data, error } = useSWR<FlagList, Error>(`/api${path}${here}`, fetchList, {
    fallbackData: initial,
    refreshInterval: 20_000,
    revalidateOnMount: false,
    keepPreviousData: false,
  });
  // Coming back to the page brings a newer list than the one that was kept from the last visit.
  const list = data && data.readAt > initial.readAt ? data : initial;
  const table = useTable({
    features,
    columns,
    data: list.rows,
    getRowId: (row) => row.id,
    manualSorting: true,
    manualPagination: true,
    rowCount: list.total,
    state: {
      sorting: [{ id: query.sort, desc: query.order === "descending" }],
      pagination: { pageIndex: list.page - 1, pageSize: FLAGS_PER_PAGE },
    },
    onSortingChange: NO_CHANGE,
    onPaginationChange: NO_CHANGE,
  });
  const sortOf = (id: string) => {
    if (!SORTABLE.includes(id)) return undefined;
    const sorted = table.getColumn(id)?.getIsSorted();
    const next = sorted === "asc" ? "descending" : "ascending";
    return {
      href: `${path}${flagQueryText(query, { sort: id, order: next })}`,
      direction:
        sorted === "asc" ? ("ascending" as const) : sorted === "desc" ? ("descending" as const) : null,
    };
  };
  if (list.rows.length === 0) return <NothingListed path={path} query={query} list={list} />;
  return (
    <>
      {error ? (
        <p role="status" className="mb-3 font-ui text-sm text-amber">
          The list could not be refreshed just now; it shows how things stood a moment ago.
        </p>
      ) : null}
      <TableFrame caption="Flags, with what was claimed and what was recomputed" captionHidden>
        <thead role="rowgroup">
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id} role="row">
              {group.headers.map((header) => (
                <ColumnHead key={header.id} sort={sortOf(header.column.id)}>
                  <table.FlexRender header={header} />
                </ColumnHead>
              ))}
            </tr>
          ))}
        </thead>
        <tbody role="rowgroup">
          {table.getRowModel().rows.map((row) => (
            <tr key={row.id} role="row" className="relative">
              {row.getAllCells().map((cell) => (
                <Cell
                  key={cell.id}
                  rowHeader={cell.column.id === "place"}
                  label={LABELS[cell.column.id]}
                  className="align-middle"
                >
                  {cell.column.id === "place" ? (
                    <Place row={row.original} href={`${path}/${row.original.id}${here}`} />
                  ) : (
                    <table.FlexRender cell={cell} />
                  )}
                </Cell>
              ))}
            </tr>
          ))}
        </tbody>
      </TableFrame>
      <Pager
        page={list.page}
        pages={list.pages}
        total={list.total}
        unit={list.total === 1 ? "flag" : "flags"}
        href={(page) => `${path}${flagQueryText(query, { page })}`}
      />
    </>
  );
}

const LABELS: Record<string, string> = { claimant: "Claimant", assignee: "Waits for", age: "Raised" };

function Place({ row, href }: { row: FlagRow; href?: string }) {
  return (
    <>
      {href ? (
        <Link
          href={href}
          className="font-work text-lg text-ink decoration-blue decoration-1 underline-offset-4 hover:text-blue hover:underline"
        >
          {row.ref}
        </Link>
      ) : (
        row.ref
      )}
      <span className="block text-xs text-quiet" title={row.chapter.title}>
        chapter {row.chapter.number}
      </span>
    </>
  );
}

/** The symbol with the author's value in blue and, under it on the same axis, the recomputed one in red. */
function Values({ row }: { row: FlagRow }) {
  return (
    <ScrollBox
      label="claimed and recomputed"
      className="grid w-fit grid-cols-[auto_auto_minmax(0,auto)] items-center gap-x-2.5 font-work"
    >
      <span className="row-span-2">
        {row.quantityHtml ? (
          <MathHtml html={row.quantityHtml} />
        ) : (
          <code className="font-mono text-xs break-all">{row.quantity}</code>
        )}
      </span>
      <span className="text-blue" aria-hidden="true">
        =
      </span>
      <span className="py-1 text-blue">
        <span className="sr-only">claimed </span>
        {row.claimedHtml ? (
          <MathHtml html={row.claimedHtml} />
        ) : (
          <code className="font-mono text-xs break-all">{row.claimed}</code>
        )}
      </span>
      <span className="text-red" aria-hidden="true">
        =
      </span>
      <span className="py-1 text-red">
        <span className="sr-only">recomputed </span>
        {row.exactHtml ? (
          <MathHtml html={row.exactHtml} />
        ) : (
          <span className="font-ui text-xs">nothing recomputed</span>
        )}
      </span>
    </ScrollBox>
  );
}

function Says({ row }: { row: FlagRow }) {
  return (
    <div className="max-w-80 min-w-0">
      <span className="flex flex-wrap items-center gap-x-3">
        <VerdictMark verdict={row.verdict} withWord short />
        {row.settled ? <SettleMark word={row.settled} /> : null}
        {row.state === "superseded" ? <span className="text-xs text-quiet">closed by a change</span> : null}
      </span>
      <span className="mt-0.5 line-clamp-3 text-sm text-ink">
        {row.certainty === "possible" ? <span className="text-quiet">Possibly: </span> : null}
        {row.says}
      </span>
    </div>
  );
}

function Assignee({ row }: { row: FlagRow }) {
  if (row.isMine)
    return (
      <span className="inline-flex items-center gap-1.5 font-medium text-blue">
        <Mark name="person" size={15} />
        you
      </span>
    );
  return row.assignee ? <>{row.assignee.name}</> : <span className="text-quiet">nobody yet</span>;
}

function NothingListed({ path, query, list }: { path: string; query: FlagQuery; list: FlagList }) {
  const work = path.replace(/\/flags$/, "");
  if (isNarrowed(query) || list.total > 0)
    return (
      <EmptyState
        title="No flag matches"
        mark="undecided"
        action={
          <LinkButton
            href={`${path}${flagQueryText({ ...query, verdict: undefined, chapter: undefined, assignee: undefined, slip: undefined })}`}
          >
            Show the whole list
          </LinkButton>
        }
      >
        Nothing {query.state === "open" ? "that waits to be settled " : ""}answers to what the list was
        narrowed to.
      </EmptyState>
    );
  if (query.state !== "open")
    return (
      <EmptyState
        title="Nothing here yet"
        mark="undecided"
        action={<LinkButton href={path}>Show what waits to be settled</LinkButton>}
      >
        {query.state === "settled" ? "No flag has been settled." : "No flag has been raised or closed."}
      </EmptyState>
    );
  return (
    <EmptyState
      title="Nothing to settle"
      mark="confirmed"
      action={
        <>
          <LinkButton href={`${work}/keys`} variant="primary">
            See what a key still needs
          </LinkButton>
          <LinkButton href={work}>Back to the work</LinkButton>
        </>
      }
    >
      A run raises a flag for each claim that it finds discrepant, contradicted or unreadable, and gives it to
      a second author.
    </EmptyState>
  );
}
