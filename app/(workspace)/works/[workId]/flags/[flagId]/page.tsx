import type { Metadata } from "next";
import { cache } from "react";

import { LinkButton } from "@/components/ui/button";
import { PageBody, PageHeader, Section } from "@/components/ui/page";
import { VerdictMark } from "@/components/verdict-mark";
import { CAUTIONS } from "@/components/words";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { flagQueryText, readFlagQuery } from "@/lib/flags/flag-query";
import { getFlag, type FlagView } from "@/lib/flags/get-flag";
import { AssignPanel } from "./_components/assign-panel";
import { Comparison } from "./_components/comparison";
import { Discussion } from "./_components/discussion";
import { Evidence } from "./_components/evidence";
import { FlagPlace } from "./_components/flag-place";
import { History } from "./_components/history";
import { Orbit } from "./_components/orbit";
import { SettleForm } from "./_components/settle-form";
import { Settled } from "./_components/settled";
import { settleForm } from "./_components/settle-view";

type Props = PageProps<"/works/[workId]/flags/[flagId]">;

const load = cache(async ({ params, searchParams }: Props) => {
  const user = await requireUser();
  const { workId, flagId } = await params;
  const query = readFlagQuery(await searchParams);
  return { query, flag: await orNotFound(getFlag(workId, flagId, query, user)) };
});

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { flag } = await load(props);
  return { title: `Flag on ${flag.claim.ref}` };
}

export default async function FlagPage(props: Props) {
  const { flag, query } = await load(props);
  const queue = `/works/${flag.work.id}/flags`;
  const asked = flagQueryText(query, { page: query.page });
  const next = flag.neighbours.next ? `${queue}/${flag.neighbours.next}${asked}` : null;
  return (
    <PageBody>
      <PageHeader
        trail={[
          { label: flag.work.title, href: `/works/${flag.work.id}` },
          { label: "review queue", href: `${queue}${asked}` },
          { label: flag.claim.ref },
        ]}
        title={<>Claim {flag.claim.ref}</>}
        actions={<Leafing flag={flag} queue={queue} asked={asked} />}
      >
        <VerdictMark verdict={flag.verdict} withWord className="text-base" /> in chapter {flag.chapter.number}
        , {flag.chapter.title}
      </PageHeader>
      <Comparison flag={flag} />
      <div className="mt-10 grid gap-x-12 gap-y-10 md:grid-cols-[minmax(0,1fr)_20rem]">
        <div className="min-w-0">
          {flag.state === "open" ? (
            <Section title="Settle" id="settle">
              <SettleForm {...settleForm(flag, next ?? `${queue}${asked}`)} />
            </Section>
          ) : (
            <Settled flag={flag} next={next} queue={`${queue}${asked}`} />
          )}
        </div>
        <aside aria-label="About this claim" className="min-w-0">
          <FlagPlace flag={flag} />
          {flag.may.assign || flag.may.take ? (
            <AssignPanel
              workId={flag.work.id}
              flagId={flag.id}
              version={flag.version}
              assigneeId={flag.assignee?.id ?? null}
              people={flag.people}
              mayTake={flag.may.take}
              mayAssign={flag.may.assign}
            />
          ) : null}
        </aside>
      </div>
      <Section
        title="Evidence"
        id="evidence"
        aside={flag.proof?.evidence ? <>recomputed by {flag.proof.evidence.version}</> : null}
      >
        <Evidence flag={flag} />
      </Section>
      <Orbit flag={flag} />
      <div className="grid gap-x-12 md:grid-cols-[minmax(0,1fr)_20rem]">
        <Section title="Discussion" id="discussion" className="min-w-0 first:mt-10">
          <Discussion flag={flag} />
        </Section>
        <Section title="History" id="history" className="min-w-0">
          <History lines={flag.history} />
        </Section>
      </div>
      <p className="mt-10 border-t border-rule pt-3 font-ui text-xs text-quiet">
        {CAUTIONS[0]} {CAUTIONS[2]}
      </p>
    </PageBody>
  );
}

/** To the flags before and after this one, in the queue that the reader came from. */
function Leafing({ flag, queue, asked }: { flag: FlagView; queue: string; asked: string }) {
  const { previous, next, position, of } = flag.neighbours;
  return (
    <nav aria-label="Other flags" className="flex items-center gap-3 font-ui text-sm">
      {position > 0 ? (
        <span className="tabular text-quiet">
          {position} of {of}
        </span>
      ) : null}
      {previous ? (
        <LinkButton href={`${queue}/${previous}${asked}`} rel="prev" size="small" className="min-h-11">
          Previous
        </LinkButton>
      ) : null}
      {next ? (
        <LinkButton href={`${queue}/${next}${asked}`} rel="next" size="small" className="min-h-11">
          Next flag
        </LinkButton>
      ) : null}
    </nav>
  );
}
