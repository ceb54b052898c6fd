import type { Metadata } from "next";

import { PageBody, PageHeader } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Table } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { listSiteEvents } from "@/lib/admin/list-events";
import { requireAdmin } from "@/lib/auth/session";
import { AdminPlaces } from "../_components/admin-places";
import { pageOf } from "../_lib/query";

export const metadata: Metadata = { title: "Events · Administration" };

const SAYS: Record<string, string> = {
  "account.create": "made an account",
  "account.disable": "disabled the account of",
  "account.enable": "enabled the account of",
  "invitation.send": "sent an invitation",
  "invitation.resend": "sent an invitation again",
  "invitation.withdraw": "withdrew an invitation",
  "invitation.accept": "accepted an invitation",
  "outbox.retry": "asked for another try",
};

export default async function AdminEventsPage({ searchParams }: PageProps<"/admin/events">) {
  const user = await requireAdmin();
  const events = await listSiteEvents({ page: pageOf((await searchParams).page) }, user);
  return (
    <PageBody>
      <PageHeader title="Events">
        Who did what to accounts, invitations and queues. Nothing here can be changed.
      </PageHeader>
      <AdminPlaces here="/admin/events" />
      <Table
        caption="Events"
        captionHidden
        rows={events.rows}
        rowKey={(row) => String(row.id)}
        empty={<p className="py-6 text-quiet">Nothing has happened yet.</p>}
        columns={[
          { id: "at", header: "When", cell: (row) => <Time at={row.at} withClock /> },
          { id: "who", header: "Who", rowHeader: true, cell: (row) => <bdi>{row.who}</bdi> },
          { id: "action", header: "Did", cell: (row) => SAYS[row.action] ?? row.action },
          {
            id: "subject",
            header: "To",
            cell: (row) => [row.subject, row.detail].filter(Boolean).join(": "),
          },
        ]}
      />
      <Pager
        page={events.page}
        pages={events.pages}
        total={events.total}
        unit={events.total === 1 ? "event" : "events"}
        href={(page) => `/admin/events?page=${page}`}
      />
    </PageBody>
  );
}
