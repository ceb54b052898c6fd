import type { Metadata } from "next";

import { Field } from "@/components/ui/field";
import { Button } from "@/components/ui/button";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Pager } from "@/components/ui/pager";
import { Table } from "@/components/ui/table";
import { Tag } from "@/components/ui/tag";
import { Time } from "@/components/ui/time";
import { listAccounts } from "@/lib/admin/list-accounts";
import { requireAdmin } from "@/lib/auth/session";
import { AdminPlaces } from "./_components/admin-places";
import { InviteForm } from "./_components/invite-form";
import { AccountSwitchPress, SiteInvitationPresses } from "./_components/press";
import { pageOf, textOf } from "./_lib/query";

export const metadata: Metadata = { title: "People · Administration" };

export default async function AdminPeoplePage({ searchParams }: PageProps<"/admin">) {
  const user = await requireAdmin();
  const query = await searchParams;
  const find = textOf(query.find);
  const accounts = await listAccounts({ page: pageOf(query.page), find }, user);
  return (
    <PageBody>
      <PageHeader title="Administration">
        Accounts, outgoing mail and queues. No work can be read from here.
      </PageHeader>
      <AdminPlaces here="/admin" />
      <Section id="invite" title="Invite somebody">
        <InviteForm />
      </Section>
      {accounts.invitations.length > 0 ? (
        <Section id="invitations" title="Open invitations to the site">
          <Table
            caption="Open invitations"
            captionHidden
            rows={accounts.invitations}
            rowKey={(row) => row.id}
            columns={[
              {
                id: "email",
                header: "Address",
                rowHeader: true,
                cell: (row) => <span className="inline-block max-w-72 break-words">{row.email}</span>,
              },
              {
                id: "role",
                header: "May",
                cell: (row) => (row.role === "administrator" ? "administer the site" : "start works"),
              },
              {
                id: "expires",
                header: "Works until",
                cell: (row) => (row.expired ? <Tag tone="amber">expired</Tag> : <Time at={row.expiresAt} />),
              },
              {
                id: "do",
                header: <span className="sr-only">What can be done</span>,
                label: "",
                cell: (row) => <SiteInvitationPresses invitationId={row.id} email={row.email} />,
              },
            ]}
          />
        </Section>
      ) : null}
      <Section id="accounts" title="Accounts">
        <form method="get" className="mb-4 flex max-w-measure items-end gap-3">
          <Field
            label="Find by name or address"
            name="find"
            type="search"
            defaultValue={find}
            className="flex-1"
          />
          <Button type="submit">Find</Button>
        </form>
        <Table
          caption="Accounts"
          captionHidden
          rows={accounts.rows}
          rowKey={(row) => row.id}
          empty={<p className="py-6 text-quiet">Nobody has a name or an address like this.</p>}
          columns={[
            {
              id: "name",
              header: "Name",
              rowHeader: true,
              cell: (row) => (
                <span>
                  <bdi>{row.name}</bdi> {row.isAdmin ? <Tag tone="blue">administrator</Tag> : null}
                </span>
              ),
            },
            {
              id: "email",
              header: "Address",
              cell: (row) => <span className="inline-block max-w-72 break-words">{row.email}</span>,
            },
            { id: "since", header: "Since", cell: (row) => <Time at={row.createdAt} /> },
            {
              id: "used",
              header: "Last here",
              cell: (row) =>
                row.lastUsedAt ? <Time at={row.lastUsedAt} /> : <span className="text-quiet">not yet</span>,
            },
            {
              id: "state",
              header: "State",
              cell: (row) => (row.disabledAt ? <Tag tone="amber">disabled</Tag> : "enabled"),
            },
            {
              id: "do",
              header: <span className="sr-only">What can be done</span>,
              label: "",
              cell: (row) =>
                row.isSelf ? (
                  <span className="text-quiet">you</span>
                ) : (
                  <AccountSwitchPress userId={row.id} name={row.name} enabled={row.disabledAt === null} />
                ),
            },
          ]}
        />
        <Pager
          page={accounts.page}
          pages={accounts.pages}
          total={accounts.total}
          unit={accounts.total === 1 ? "account" : "accounts"}
          href={(page) =>
            `/admin?${new URLSearchParams({ ...(find && { find }), page: String(page) }).toString()}`
          }
        />
      </Section>
    </PageBody>
  );
}
