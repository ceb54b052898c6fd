import type { Metadata } from "next";

import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Table } from "@/components/ui/table";
import { Tag } from "@/components/ui/tag";
import { Time } from "@/components/ui/time";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { listPeople, type MemberView, type PeopleView } from "@/lib/people/list-people";
import { ROLE_WORDS } from "@/lib/people/schema";
import { InvitationPresses } from "./_components/invitation-presses";
import { InviteForm } from "./_components/invite-form";
import { MemberTools } from "./_components/member-tools";

export const metadata: Metadata = { title: "People" };

export default async function PeoplePage({ params }: PageProps<"/works/[workId]/people">) {
  const user = await requireUser();
  const view = await orNotFound(listPeople((await params).workId, user));
  return (
    <PageBody>
      <PageHeader
        trail={[{ label: view.work.title, href: `/works/${view.work.id}` }, { label: "people" }]}
        title="People"
      >
        A flag needs somebody other than the claimant. Nobody settles a flag on their own claim.
      </PageHeader>
      <Members view={view} />
      {view.mayManage ? <Invitations view={view} /> : null}
      {view.mayManage ? (
        <Section id="invite" title="Invite somebody">
          <InviteForm workId={view.work.id} chapters={view.chapters} />
        </Section>
      ) : null}
    </PageBody>
  );
}

function Members({ view }: { view: PeopleView }) {
  const { work, members, mayManage, chapters } = view;
  const leads = members.filter(({ role }) => role === "lead").length;
  return (
    <Section id="members" title={`On this work: ${members.length}`}>
      <Table
        caption="People on this work"
        captionHidden
        rows={members}
        rowKey={(row) => row.userId}
        columns={[
          { id: "name", header: "Name", rowHeader: true, cell: (row) => <MemberName member={row} /> },
          ...(mayManage
            ? [
                {
                  id: "email",
                  header: "Address",
                  cell: (row: MemberView) => (
                    <span className="inline-block max-w-72 break-words">{row.email}</span>
                  ),
                },
              ]
            : []),
          {
            id: "role",
            header: "Role",
            cell: (row) => <RoleName role={row.role} chapterIds={row.chapterIds} chapters={chapters} />,
          },
          { id: "since", header: "Since", cell: (row) => <Time at={row.since} /> },
          {
            id: "do",
            header: <span className="sr-only">What can be done</span>,
            label: "",
            cell: (row) =>
              mayManage || row.isSelf ? (
                <MemberTools
                  workId={work.id}
                  member={{
                    userId: row.userId,
                    name: row.name,
                    role: row.role,
                    chapterIds: row.chapterIds,
                    isSelf: row.isSelf,
                  }}
                  mayManage={mayManage}
                  isLastLead={row.role === "lead" && leads === 1}
                  chapters={chapters}
                />
              ) : null,
          },
        ]}
      />
    </Section>
  );
}

function MemberName({ member }: { member: MemberView }) {
  return (
    <span>
      <bdi className="break-words">{member.name}</bdi>
      {member.isSelf ? <span className="text-quiet"> (you)</span> : null}{" "}
      {member.disabled ? <Tag tone="amber">account disabled</Tag> : null}
    </span>
  );
}

function RoleName({
  role,
  chapterIds,
  chapters,
}: Pick<MemberView, "role" | "chapterIds"> & Pick<PeopleView, "chapters">) {
  if (chapterIds === null) return <>{ROLE_WORDS[role].name}</>;
  const names = chapters.filter(({ id }) => chapterIds.includes(id)).map(({ label }) => label);
  return (
    <>
      {ROLE_WORDS[role].name}
      <span className="block text-xs text-quiet">
        {names.length > 0 ? `reads ${names.join("; ")}` : `reads ${chapterIds.length} of the chapters`}
      </span>
    </>
  );
}

function Invitations({ view: { work, invitations, chapters } }: { view: PeopleView }) {
  if (invitations.length === 0) return null;
  return (
    <Section id="invitations" title={`Invited, not here yet: ${invitations.length}`}>
      <Table
        caption="Open invitations"
        captionHidden
        rows={invitations}
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
            header: "Role",
            cell: (row) => <RoleName role={row.role} chapterIds={row.chapterIds} chapters={chapters} />,
          },
          {
            id: "until",
            header: "Link works until",
            cell: (row) => (row.expired ? <Tag tone="amber">expired</Tag> : <Time at={row.expiresAt} />),
          },
          {
            id: "do",
            header: <span className="sr-only">What can be done</span>,
            label: "",
            cell: (row) => <InvitationPresses workId={work.id} invitationId={row.id} email={row.email} />,
          },
        ]}
      />
    </Section>
  );
}
