import Link from "next/link";

import { MathText } from "@/components/math";
import { Facts } from "@/components/ui/definition";
import { Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import type { FlagView } from "@/lib/flags/get-flag";

/** Where the claim stands in the work, who wrote it and who reads it. */
export function FlagPlace({ flag }: { flag: FlagView }) {
  const work = `/works/${flag.work.id}`;
  const facts = [
    {
      term: "Problem",
      value: (
        <Link className="link" href={`${work}/chapters/${flag.chapter.id}`}>
          {flag.problem.label}
        </Link>
      ),
    },
    {
      term: "Claim",
      value: (
        <Link className="link" href={`${work}/claims/${flag.claim.id}`}>
          {flag.claim.ref}
        </Link>
      ),
    },
    ...(flag.claim.page ? [{ term: "Page", value: flag.claim.page }] : []),
    ...(flag.place
      ? [
          {
            term: "File",
            value: (
              <Link className="link break-all" href={`${work}/sources/${flag.place.sourceId}`}>
                {flag.place.name}
                {flag.place.line ? `, line ${flag.place.line}` : ""}
              </Link>
            ),
          },
        ]
      : []),
    { term: "Claimant", value: flag.claimant.name },
    { term: "Waits for", value: flag.assignee?.name ?? "nobody yet" },
    { term: "Raised", value: <Time at={flag.raisedAt} /> },
    ...(flag.claim.note ? [{ term: "Note", value: flag.claim.note }] : []),
  ];
  return (
    <Section title="In the work" id="place">
      {flag.problem.statement ? (
        <blockquote
          className="mb-4 max-h-80 overflow-y-auto border-l border-blue pl-3 text-base"
          tabIndex={0}
        >
          <span className="old-style mr-2 font-semibold">{flag.problem.label}</span>
          <MathText text={flag.problem.statement} />
        </blockquote>
      ) : null}
      <div className="[&_dl>div]:grid-cols-[6rem_minmax(0,1fr)]!">
        <Facts items={facts} />
      </div>
    </Section>
  );
}
