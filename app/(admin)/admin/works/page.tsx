import type { Metadata } from "next";

import { PageBody, PageHeader } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Table } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { listWorkSizes } from "@/lib/admin/list-works";
import { requireAdmin } from "@/lib/auth/session";
import { KIND_WORDS } from "@/lib/works/schema";
import { AdminPlaces } from "../_components/admin-places";
import { pageOf } from "../_lib/query";

export const metadata: Metadata = { title: "Works · Administration" };

export default async function AdminWorksPage({ searchParams }: PageProps<"/admin/works">) {
  const user = await requireAdmin();
  const works = await listWorkSizes({ page: pageOf((await searchParams).page) }, user);
  return (
    <PageBody>
      <PageHeader title="Works">Names and sizes only. What is in a work is for its members.</PageHeader>
      <AdminPlaces here="/admin/works" />
      <Table
        caption="Works"
        captionHidden
        rows={works.rows}
        rowKey={(row) => row.id}
        empty={<p className="py-6 text-quiet">Nobody has started a work yet.</p>}
        columns={[
          { id: "title", header: "Title", rowHeader: true, cell: (row) => <bdi>{row.title}</bdi> },
          { id: "kind", header: "Kind", cell: (row) => KIND_WORDS[row.kind].name },
          { id: "people", header: "People", align: "end", cell: (row) => row.people },
          { id: "claims", header: "Claims", align: "end", cell: (row) => row.claims.toLocaleString("en-GB") },
          { id: "since", header: "Since", cell: (row) => <Time at={row.createdAt} /> },
        ]}
      />
      <Pager
        page={works.page}
        pages={works.pages}
        total={works.total}
        unit={works.total === 1 ? "work" : "works"}
        href={(page) => `/admin/works?page=${page}`}
      />
    </PageBody>
  );
}
