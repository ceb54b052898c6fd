import type { Metadata } from "next";
import Link from "next/link";

import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { VerdictMark } from "@/components/verdict-mark";
import { requireUser } from "@/lib/auth/session";
import { getDesk, type Desk } from "@/lib/works/get-desk";
import { DeskWorks } from "./_components/desk-works";

export const metadata: Metadata = { title: "Desk" };

export default async function DeskPage() {
  const user = await requireUser();
  const desk = await getDesk(user);
  const waits = desk.flags.total + desk.returned.total;
  return (
    <PageBody>
      <PageHeader
        title="Your desk"
        actions={
          <LinkButton href="/works/new" variant={desk.works.length === 0 ? "primary" : "quiet"}>
            Start a work
          </LinkButton>
        }
      >
        {waits === 0 ? "Nothing waits for you." : inWords(desk)}
      </PageHeader>
      {desk.flags.total > 0 ? <Flags flags={desk.flags} /> : null}
      {desk.returned.total > 0 ? <Returned returned={desk.returned} /> : null}
      <Section id="works" title="Works">
        {desk.works.length === 0 ? (
          <EmptyState title="No works yet">
            Start one yourself, or ask a lead author to invite you: the invitation comes by e-mail.
          </EmptyState>
        ) : (
          <DeskWorks works={desk.works} />
        )}
      </Section>
    </PageBody>
  );
}

function Flags({ flags }: { flags: Desk["flags"] }) {
  return (
    <Section
      id="flags"
      title="Flags for you to settle"
      aside={
        flags.total > flags.rows.length
          ? `the oldest ${flags.rows.length} of ${flags.total}`
          : `${flags.total}`
      }
    >
      <ul>
        {flags.rows.map((flag) => (
          <li
            key={flag.id}
            className="grid gap-x-6 gap-y-1 border-b border-rule py-3 sm:grid-cols-[minmax(0,9rem)_minmax(0,1fr)_auto] sm:items-baseline"
          >
            <Link
              href={`/works/${flag.workId}/flags/${flag.id}`}
              className="inline-flex min-h-6 items-center text-lg text-blue underline decoration-1 underline-offset-6 hover:decoration-2"
            >
              {flag.ref}
            </Link>
            <span className="min-w-0 font-ui text-sm text-quiet">
              <bdi>{flag.work}</bdi>, chapter {flag.chapter}; waits since <Time at={flag.since} />
            </span>
            <VerdictMark verdict={flag.verdict} withWord short />
          </li>
        ))}
      </ul>
    </Section>
  );
}

function Returned({ returned }: { returned: Desk["returned"] }) {
  return (
    <Section
      id="returned"
      title="Your claims that came back"
      aside={
        returned.total > returned.rows.length
          ? `the latest ${returned.rows.length} of ${returned.total}`
          : `${returned.total}`
      }
    >
      <ul>
        {returned.rows.map((claim) => (
          <li
            key={claim.id}
            className="grid gap-x-6 gap-y-1 border-b border-rule py-3 sm:grid-cols-[minmax(0,9rem)_minmax(0,1fr)_auto] sm:items-baseline"
          >
            <Link
              href={`/works/${claim.workId}/claims/${claim.id}`}
              className="inline-flex min-h-6 items-center text-lg text-blue underline decoration-1 underline-offset-6 hover:decoration-2"
            >
              {claim.ref}
            </Link>
            <span className="min-w-0 font-ui text-sm text-quiet">
              <bdi>{claim.work}</bdi>
            </span>
            <VerdictMark verdict={claim.verdict} withWord short />
          </li>
        ))}
      </ul>
    </Section>
  );
}

function inWords({ flags, returned }: Desk): string {
  const parts = [
    flags.total > 0 ? `${flags.total} ${flags.total === 1 ? "flag" : "flags"} to settle` : "",
    returned.total > 0 ? `${returned.total} of your claims came back` : "",
  ].filter(Boolean);
  return `${parts.join("; ")}.`;
}
