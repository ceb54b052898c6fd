import type { Metadata } from "next";
import Link from "next/link";

import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader } from "@/components/ui/page";
import { Table, type Column } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { listKeptMails, type KeptMail } from "@/lib/mail/kept-mails";

export const metadata: Metadata = { title: "Outgoing mail" };

export default async function KeptMailsPage() {
  const mails = await orNotFound(listKeptMails());
  return (
    <PageBody width="sheet">
      <PageHeader kicker="development only" title="Outgoing mail">
        The local mail server keeps every mail that the product sends here, instead of delivering it.
      </PageHeader>
      <Table
        caption="Kept mails, newest first"
        captionHidden
        columns={COLUMNS}
        rows={mails}
        rowKey={({ name }) => name}
        empty={
          <EmptyState title="No mail has been sent yet" mark="note">
            Invite somebody to a work, or let a run raise flags: the mail is here a moment later.
          </EmptyState>
        }
      />
    </PageBody>
  );
}

const COLUMNS: Column<KeptMail>[] = [
  {
    id: "subject",
    header: "Subject",
    label: "",
    rowHeader: true,
    cell: ({ name, subject }) => (
      <Link className="link" href={`/development/mail/${name}`}>
        {subject}
      </Link>
    ),
  },
  { id: "to", header: "To", cell: ({ to }) => <span className="break-all">{to}</span> },
  { id: "at", header: "Sent", cell: ({ at }) => <Time at={at} withClock /> },
];
