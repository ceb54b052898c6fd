import type { Metadata } from "next";

import { Facts } from "@/components/ui/definition";
import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Table } from "@/components/ui/table";
import { Tag } from "@/components/ui/tag";
import { Time } from "@/components/ui/time";
import { getQueues } from "@/lib/admin/get-queues";
import { requireAdmin } from "@/lib/auth/session";
import { AdminPlaces } from "../_components/admin-places";
import { TryAgainPress } from "../_components/press";

export const metadata: Metadata = { title: "Mail and queues · Administration" };

const KIND: Record<string, string> = {
  mail: "mail",
  "flag-digest": "digest of flags",
  "run-batch": "part of a run",
  "run-finish": "end of a run",
};

export default async function AdminMailPage() {
  const user = await requireAdmin();
  const { depth, health, troubled, mail } = await getQueues(user);
  return (
    <PageBody>
      <PageHeader title="Mail and queues">
        What is to be sent or done is kept in the database until it is.
      </PageHeader>
      <AdminPlaces here="/admin/mail" />
      <Section id="state" title="How it stands">
        <Facts
          items={[
            { term: "Waiting", value: depth.pending },
            {
              term: "Longest wait",
              value:
                depth.oldestDueSeconds === 0
                  ? "nothing is late"
                  : `${depth.oldestDueSeconds} s past its time`,
            },
            { term: "Given up", value: depth.dead },
            { term: "Database", value: health.database.ok ? "answers" : health.database.reason },
            { term: "Redis", value: health.redis.ok ? "answers" : health.redis.reason },
            {
              term: "Worker",
              value: health.worker.ok ? `seen ${health.worker.seenSecondsAgo} s ago` : health.worker.reason,
            },
          ]}
        />
      </Section>
      <Section id="troubled" title="Given up or failing">
        {troubled.length === 0 ? (
          <EmptyState title="Nothing is stuck" mark="confirmed">
            A mail that cannot be sent is tried again for hours, then listed here.
          </EmptyState>
        ) : (
          <Table
            caption="Given up or failing"
            captionHidden
            rows={troubled}
            rowKey={(row) => row.id}
            columns={[
              {
                id: "what",
                header: "What",
                rowHeader: true,
                cell: (row) =>
                  row.mail ? `${row.mail.template} to ${row.mail.to}` : (KIND[row.kind] ?? row.kind),
              },
              {
                id: "state",
                header: "State",
                cell: (row) =>
                  row.state === "dead" ? <Tag tone="red">given up</Tag> : <Tag tone="amber">tried again</Tag>,
              },
              { id: "attempts", header: "Attempts", align: "end", cell: (row) => row.attempts },
              { id: "since", header: "Since", cell: (row) => <Time at={row.createdAt} withClock /> },
              {
                id: "error",
                header: "Last error",
                cell: (row) => <span className="break-words">{row.lastError ?? ""}</span>,
              },
              {
                id: "do",
                header: <span className="sr-only">What can be done</span>,
                label: "",
                cell: (row) =>
                  row.state === "dead" ? (
                    <TryAgainPress id={row.id} what={KIND[row.kind] ?? row.kind} />
                  ) : null,
              },
            ]}
          />
        )}
      </Section>
      <Section id="mail" title="Outgoing mail" aside="the latest 50">
        <Table
          caption="Outgoing mail"
          captionHidden
          rows={mail}
          rowKey={(row) => row.id}
          empty={<p className="py-6 text-quiet">No mail has been written yet.</p>}
          columns={[
            {
              id: "to",
              header: "To",
              rowHeader: true,
              cell: (row) => <span className="inline-block max-w-72 break-words">{row.to}</span>,
            },
            { id: "template", header: "Mail", cell: (row) => row.template },
            {
              id: "state",
              header: "State",
              cell: (row) =>
                row.state === "done" ? (
                  "sent"
                ) : row.state === "dead" ? (
                  <Tag tone="red">given up</Tag>
                ) : (
                  "waiting"
                ),
            },
            { id: "at", header: "Written", cell: (row) => <Time at={row.at} withClock /> },
          ]}
        />
      </Section>
    </PageBody>
  );
}
