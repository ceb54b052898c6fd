import type { Metadata } from "next";

import { PageBody, PageHeader } from "@/components/ui/page";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { readFlagQuery } from "@/lib/flags/flag-query";
import { listFlagFilters, listFlags } from "@/lib/flags/list-flags";
import { FlagFilters } from "../_components/flag-filters";
import { FlagTable } from "../_components/flag-table";

export const metadata: Metadata = { title: "Review queue" };

export default async function FlagsPage({ params, searchParams }: PageProps<"/works/[workId]/flags">) {
  const user = await requireUser();
  const { workId } = await params;
  const query = readFlagQuery(await searchParams);
  const [filters, list] = await orNotFound(
    Promise.all([listFlagFilters(workId, user), listFlags(workId, query, user)]),
  );
  return (
    <PageBody>
      <PageHeader
        trail={[{ label: filters.work.title, href: `/works/${workId}` }, { label: "review queue" }]}
        title="Review queue"
      >
        {inWords(list.open, list.mine)}
      </PageHeader>
      <FlagFilters workId={workId} query={query} filters={filters} mine={list.mine} open={list.open} />
      <FlagTable workId={workId} query={query} initial={list} />
    </PageBody>
  );
}

function inWords(open: number, mine: number): string {
  if (open === 0) return "Every flag is settled.";
  const flags = open === 1 ? "One flag waits" : `${open} flags wait`;
  return mine === 0
    ? `${flags} for a second author.`
    : `${flags} for a second author, ${mine === open ? "all of them for you" : `${mine} of them for you`}.`;
}
