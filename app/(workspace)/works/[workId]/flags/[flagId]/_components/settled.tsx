import Link from "next/link";

import { Math } from "@/components/math";
import { LinkButton } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { SettleMark } from "@/components/verdict-mark";
import type { FlagView } from "@/lib/flags/get-flag";
import { UndoButton } from "./undo-button";

/** What became of a flag that is no longer open. */
export function Settled({ flag, next, queue }: { flag: FlagView; next: string | null; queue: string }) {
  const { settlement } = flag;
  const onward = (
    <LinkButton href={next ?? queue} variant="primary">
      {next ? "Next flag" : "Back to the queue"}
    </LinkButton>
  );
  if (!settlement)
    return (
      <Section title="Closed" id="settle">
        <Notice
          kind="info"
          title="The claim was changed or confirmed after this flag was raised"
          action={onward}
        >
          There is nothing left to settle here. A later run judges the claim as it now stands.
        </Notice>
      </Section>
    );
  const claim = `/works/${flag.work.id}/claims/${flag.claim.id}`;
  return (
    <Section title="Settled" id="settle" aside={<Time at={settlement.at} withClock />}>
      <p className="flex flex-wrap items-center gap-x-2.5 text-xl">
        <SettleMark word={settlement.word} size={26} className="text-xl" />
        <span className="text-quiet">by {settlement.by.name}</span>
      </p>
      <div className="prose-galley mt-3 max-w-measure">
        <Outcome flag={flag} settlement={settlement} claim={claim} />
        {settlement.convention ? (
          <p>
            <span className="text-quiet">Relies on:</span> {settlement.convention}
          </p>
        ) : null}
        {settlement.reason ? (
          <blockquote className="border-l border-blue pl-3 whitespace-pre-line">
            {settlement.reason}
          </blockquote>
        ) : null}
      </div>
      <div className="mt-5 flex flex-wrap items-center gap-4">
        {onward}
        {flag.may.undo ? (
          <UndoButton
            workId={flag.work.id}
            flagId={flag.id}
            version={flag.version}
            claimRef={flag.claim.ref}
          />
        ) : null}
        {settlement.frozenIn !== null ? (
          <p className="font-ui text-sm text-quiet">
            <Link className="link" href={`/works/${flag.work.id}/keys/${settlement.frozenIn}`}>
              Key {settlement.frozenIn}
            </Link>{" "}
            was frozen since, so it stands.
          </p>
        ) : null}
      </div>
    </Section>
  );
}

function Outcome({
  flag,
  settlement,
  claim,
}: {
  flag: FlagView;
  settlement: NonNullable<FlagView["settlement"]>;
  claim: string;
}) {
  switch (settlement.word) {
    case "correct":
      return (
        <p>
          The <Link href={claim}>claim</Link> now reads{" "}
          {settlement.now?.latex ? (
            <Math own latex={settlement.now.latex} />
          ) : (
            <code className="font-mono">{settlement.now?.text}</code>
          )}{" "}
          instead of <code className="font-mono text-sm">{settlement.before}</code>, and {flag.claimant.name}{" "}
          was told.
        </p>
      );
    case "stet":
      return <p>The claimed value stands, against the recomputed one.</p>;
    case "reword":
      return (
        <p>
          The <Link href={claim}>claim</Link> waits for {flag.claimant.name} to write a new version, and for a
          run to confirm it.
        </p>
      );
    case "withdraw":
      return (
        <p>
          The <Link href={claim}>claim</Link> has left the key.
        </p>
      );
  }
}
