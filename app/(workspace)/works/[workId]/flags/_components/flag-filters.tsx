import Form from "next/form";
import Link from "next/link";

import { cx } from "@/components/cx";
import { Button } from "@/components/ui/button";
import { Select } from "@/components/ui/field";
import { VERDICTS } from "@/components/words";
import { FLAG_VERDICTS, flagQueryText, isNarrowed, type FlagQuery } from "@/lib/flags/flag-query";
import type { FlagFilters as Filters } from "@/lib/flags/list-flags";
import { SLIPS } from "@/lib/verify/slips";

const STATES = [
  { value: "open", label: "to settle" },
  { value: "settled", label: "settled" },
  { value: "superseded", label: "closed by a change" },
  { value: "all", label: "all" },
] as const;

const ANY = { value: "", label: "any" };

/** Which flags are listed. A form that asks by address, so that it works without script and can be kept as a bookmark. */
export function FlagFilters({
  workId,
  query,
  filters,
  mine,
  open,
}: {
  workId: string;
  query: FlagQuery;
  filters: Filters;
  mine: number;
  open: number;
}) {
  const path = `/works/${workId}/flags`;
  return (
    <div className="no-print mb-6">
      <nav aria-label="Which flags" className="flex flex-wrap gap-x-6 gap-y-1 font-work text-lg">
        {STATES.map(({ value, label }) => (
          <Choice
            key={value}
            href={`${path}${flagQueryText(query, { state: value })}`}
            chosen={query.state === value}
          >
            {label}
            {value === "open" && open > 0 ? <span className="old-style text-quiet"> {open}</span> : null}
          </Choice>
        ))}
        <span className="ml-auto">
          <Choice
            href={`${path}${flagQueryText(query, { assignee: query.assignee === "me" ? undefined : "me" })}`}
            chosen={query.assignee === "me"}
          >
            for me
            {mine > 0 ? <span className="old-style text-quiet"> {mine}</span> : null}
          </Choice>
        </span>
      </nav>
      <details className="group/narrow mt-2 border-y border-rule" open={isNarrowed(query)}>
        <summary className="flex min-h-11 items-center gap-2 font-ui text-sm text-quiet hover:text-ink">
          <svg
            viewBox="0 0 10 10"
            width="10"
            height="10"
            aria-hidden="true"
            className="transition-transform group-open/narrow:rotate-90"
          >
            <path d="M3 1 7.5 5 3 9" fill="none" stroke="currentColor" strokeWidth="1.5" />
          </svg>
          Narrow the list
        </summary>
        <Form
          action={path}
          className="grid gap-4 pb-4 sm:grid-cols-2 lg:grid-cols-[1fr_1fr_1fr_1fr_auto] lg:items-end"
        >
          {query.state === "open" ? null : <input type="hidden" name="state" value={query.state} />}
          {query.sort === "place" ? null : <input type="hidden" name="sort" value={query.sort} />}
          {query.order === "ascending" ? null : <input type="hidden" name="order" value={query.order} />}
          <Select
            key={`v${query.verdict}`}
            label="Verdict"
            name="verdict"
            defaultValue={query.verdict ?? ""}
            options={[ANY, ...FLAG_VERDICTS.map((value) => ({ value, label: VERDICTS[value].word }))]}
          />
          <Select
            key={`c${query.chapter}`}
            label="Chapter"
            name="chapter"
            defaultValue={query.chapter ?? ""}
            options={[
              ANY,
              ...filters.chapters.map(({ id, number, title }) => ({
                value: id,
                label: `${number}. ${title}`,
              })),
            ]}
          />
          <Select
            key={`a${query.assignee}`}
            label="Waits for"
            name="assignee"
            defaultValue={query.assignee ?? ""}
            options={[
              { value: "", label: "anybody" },
              { value: "me", label: "me" },
              { value: "nobody", label: "nobody yet" },
              ...filters.people.map(({ id, name }) => ({ value: id, label: name })),
            ]}
          />
          <Select
            key={`s${query.slip}`}
            label="Slip"
            name="slip"
            defaultValue={query.slip ?? ""}
            options={[ANY, ...Object.values(SLIPS).map(({ id, name }) => ({ value: id, label: name }))]}
          />
          <Button type="submit">Show</Button>
        </Form>
      </details>
    </div>
  );
}

function Choice({ href, chosen, children }: { href: string; chosen: boolean; children: React.ReactNode }) {
  return (
    <Link
      href={href}
      scroll={false}
      aria-current={chosen ? "true" : undefined}
      className={cx(
        "inline-flex min-h-11 items-baseline gap-1.5 pt-2.5 no-underline decoration-2 underline-offset-6 hover:underline",
        chosen ? "text-ink underline" : "text-quiet hover:text-ink",
      )}
    >
      {children}
    </Link>
  );
}
