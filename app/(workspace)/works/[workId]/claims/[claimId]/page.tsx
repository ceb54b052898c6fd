import type { Metadata } from "next";
import Link from "next/link";
import { cache } from "react";

import { EvidenceSheet } from "@/components/evidence";
import { FindingNote } from "@/components/finding-note";
import { MathText } from "@/components/math";
import { LinkButton } from "@/components/ui/button";
import { Disclosure } from "@/components/ui/disclosure";
import { MarginNote } from "@/components/ui/galley";
import { PageBody, PageHeader, Section, Sheet } from "@/components/ui/page";
import { Table } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import { VerdictMark } from "@/components/verdict-mark";
import { CAUTIONS } from "@/components/words";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import type { FindingShown } from "@/lib/claims/finding-view";
import { getClaim, type ClaimView } from "@/lib/claims/get-claim";
import { evidenceHtml } from "@/lib/typeset/evidence-view";
import { findingView } from "@/lib/typeset/finding-view";
import { ClaimActions } from "../_components/claim-actions";
import { TypesetClaim } from "../_components/typeset-claim";
import { VersionTable } from "../_components/version-table";

type Props = PageProps<"/works/[workId]/claims/[claimId]">;

const load = cache(async ({ params }: Props) => {
  const user = await requireUser();
  const { workId, claimId } = await params;
  return orNotFound(getClaim(workId, claimId, user));
});

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { claim } = await load(props);
  return { title: `Claim ${claim.ref}` };
}

export default async function ClaimPage(props: Props) {
  const view = await load(props);
  const { work, chapter, problem, claim, proof, may } = view;
  const galley = `/works/${work.id}/chapters/${chapter.id}`;
  const place = `${galley}?claim=${claim.id}#claim-${claim.id}`;
  return (
    <PageBody>
      <PageHeader
        trail={[
          { label: work.title, href: `/works/${work.id}` },
          { label: `Chapter ${chapter.number}`, href: galley },
          { label: `Problem ${problem.label}`, href: place },
          { label: claim.ref },
        ]}
        title={<>Claim {claim.ref}</>}
        actions={<LinkButton href={place}>In the galley</LinkButton>}
      >
        <VerdictMark verdict={claim.verdict} withWord className="text-base" /> Claimed by {claim.claimant},
        version {claim.current}
        {claim.withdrawnAt ? ", withdrawn" : ""}
      </PageHeader>

      <Sheet marks className="px-5 py-3 sm:px-9">
        {problem.statement ? (
          <div className="border-b border-rule py-4">
            <b>{problem.label}</b> <MathText text={problem.statement} className="ml-2" />
          </div>
        ) : null}
        <div className="galley-line">
          <div className="galley-text min-w-0">
            <TypesetClaim
              quantity={claim.quantity}
              claimed={claim.claimed}
              reading={claim.reading}
              struck={claim.withdrawnAt !== null}
              className="text-2xl"
            />
            {claim.note || claim.page ? (
              <p className="mt-2 text-blue italic">
                {[claim.note, claim.page && `page ${claim.page}`].filter(Boolean).join(" · ")}
              </p>
            ) : null}
            <Disclosure summary="As it was typed" className="mt-5">
              <p className="font-mono text-base break-all whitespace-pre-wrap">
                {claim.quantity} = <span className="text-blue">{claim.claimed}</span>
              </p>
            </Disclosure>
            {may.edit ? (
              <div className="mt-5">
                <ClaimActions
                  workId={work.id}
                  conventions={view.conventions}
                  claim={{ ...claim, withdrawn: claim.withdrawnAt !== null }}
                />
              </div>
            ) : null}
          </div>
          <div className="galley-notes min-w-0">
            <Notes view={view} />
          </div>
        </div>
      </Sheet>

      {proof?.evidence ? (
        <Section title="Evidence" id="evidence" className="first:mt-10">
          <Disclosure summary="The recomputation, to be redone by hand">
            <EvidenceSheet evidence={proof.evidence} html={evidenceHtml(proof.evidence)} />
          </Disclosure>
        </Section>
      ) : null}

      <Section title="Versions" id="versions" aside="Nothing that was claimed is ever thrown away">
        <VersionTable workId={work.id} versions={view.versions} maySources={may.readSources} />
      </Section>

      <Section title="Findings" id="findings" aside="One from each run that judged it">
        <Findings workId={work.id} findings={view.findings} />
      </Section>
      <p className="mt-10 border-t border-rule pt-3 font-ui text-xs text-quiet">{CAUTIONS[0]}</p>
    </PageBody>
  );
}

function Notes({ view: { work, claim, finding, flag, may } }: { view: ClaimView }) {
  return (
    <>
      {claim.withdrawnAt ? (
        <MarginNote pencil="blue" mark="withdraw" title="withdrawn">
          <Time at={claim.withdrawnAt} />. Not in the key.
        </MarginNote>
      ) : null}
      {finding ? (
        <FindingNote {...noteOf(finding, claim)} />
      ) : (
        <p className="text-quiet italic">No run has judged this version yet.</p>
      )}
      {flag && may.readFlags ? (
        <p className="font-ui text-sm">
          <Link className="link inline-flex min-h-6 items-center" href={`/works/${work.id}/flags/${flag.id}`}>
            {flag.state === "settled"
              ? "The flag, settled"
              : flag.assignee
                ? `The flag, with ${flag.assignee}`
                : "The flag, not assigned yet"}
          </Link>
        </p>
      ) : null}
    </>
  );
}

/** A stored finding in the shape of the margin note. */
function noteOf(finding: FindingShown, { quantity, claimed }: { quantity: string; claimed: string }) {
  const { html } = findingView(finding);
  const errors = finding.errors.map(({ suggestion, ...error }) => ({
    ...error,
    found: "",
    expected: "",
    ...(suggestion && { suggestion }),
  }));
  return { finding: { ...finding, quantity, claimed, errors }, html };
}

function Findings({ workId, findings }: { workId: string; findings: readonly FindingShown[] }) {
  return (
    <Table
      caption="Findings on this claim, newest first"
      captionHidden
      rows={findings}
      rowKey={({ id }) => id}
      empty={<p className="text-quiet">No run has judged this claim yet. Start one from its chapter.</p>}
      columns={[
        {
          id: "verdict",
          header: "Verdict",
          rowHeader: true,
          cell: ({ verdict }) => <VerdictMark verdict={verdict} withWord />,
        },
        { id: "version", header: "Of version", align: "end", cell: ({ claimVersion }) => claimVersion },
        {
          id: "reason",
          header: "What it said",
          cell: ({ slips, reason }) => (
            <span className="font-work text-base">{slips[0]?.says ?? reason}</span>
          ),
        },
        {
          id: "run",
          header: "Run",
          cell: ({ runId, judgedAt }) => (
            <Link className="link" href={`/works/${workId}/runs/${runId}`}>
              {judgedAt ? <Time at={judgedAt} withClock /> : "run"}
            </Link>
          ),
        },
      ]}
    />
  );
}
