import Link from "next/link";

import { MathText } from "@/components/math";
import { MarginNote } from "@/components/ui/galley";
import type { GalleyClaim, GalleyProblem } from "@/lib/claims/get-galley";
import type { Conventions } from "@/lib/verify/conventions";
import { FindingMargin } from "../../../claims/_components/finding-margin";
import { TypesetClaim } from "../../../claims/_components/typeset-claim";
import { AddClaim } from "./add-claim";
import { EditableClaim } from "./editable-claim";
import { EditableProblem } from "./editable-problem";

type Shared = { workId: string; conventions: Conventions; mayEdit: boolean };

/** A problem set as in the book, its claims line by line, the verifier's notes in the margin. */
export function GalleyProblemBlock({ problem, ...shared }: Shared & { problem: GalleyProblem }) {
  const { workId, conventions, mayEdit } = shared;
  const head = (
    <>
      <h2 id={`problem-${problem.id}`} className="inline text-lg font-semibold">
        {problem.label}
      </h2>
      {problem.continued ? (
        <span className="ml-3 text-quiet italic">continued</span>
      ) : problem.statement ? (
        <MathText text={problem.statement} className="ml-3" />
      ) : (
        <span className="ml-3 text-quiet italic">No statement yet.</span>
      )}
    </>
  );
  const { id, label, statement, version, first, last, claims } = problem;
  return (
    <section
      aria-labelledby={`problem-${problem.id}`}
      className="border-b border-rule px-5 py-6 last:border-b-0 sm:px-9"
    >
      {mayEdit ? (
        <EditableProblem
          workId={workId}
          problem={{ id, label, statement, version, first, last, empty: problem.total === 0 }}
        >
          {head}
        </EditableProblem>
      ) : (
        <div>{head}</div>
      )}
      {claims.length > 0 ? (
        <ol aria-label={`Claims of problem ${label}`} className="mt-3">
          {claims.map((claim, i) => (
            <li key={claim.id} className="border-t border-rule">
              <ClaimLine
                claim={claim}
                first={i === 0 && !problem.continued}
                last={i === claims.length - 1 && !problem.continues}
                {...shared}
              />
            </li>
          ))}
        </ol>
      ) : (
        <p className="mt-2 font-ui text-sm text-quiet">
          No claims yet{mayEdit ? ": add the first answer of this problem." : "."}
        </p>
      )}
      {mayEdit ? (
        <div className="no-print mt-3">
          <AddClaim
            workId={workId}
            problem={{ id, label, proposedRef: problem.proposedRef }}
            conventions={conventions}
          />
        </div>
      ) : null}
    </section>
  );
}

function ClaimLine({
  claim,
  first,
  last,
  workId,
  conventions,
  mayEdit,
}: Shared & { claim: GalleyClaim; first: boolean; last: boolean }) {
  const { id, ref, version, quantity, claimed, note, page, withdrawn } = claim;
  const line = <ClaimText workId={workId} claim={claim} />;
  const notes = withdrawn ? (
    <MarginNote pencil="blue" mark="withdraw" title="withdrawn">
      Not in the key.
    </MarginNote>
  ) : (
    <FindingMargin workId={workId} verdict={claim.verdict} finding={claim.finding} flag={claim.flag} />
  );
  if (mayEdit)
    return (
      <EditableClaim
        workId={workId}
        conventions={conventions}
        claim={{ id, ref, version, quantity, claimed, note, page, withdrawn, first, last }}
        line={line}
        notes={notes}
      />
    );
  return (
    <div id={`claim-${id}`} className="galley-line target:bg-amber-wash">
      <div className="galley-text min-w-0">{line}</div>
      <div className="galley-notes min-w-0">{notes}</div>
    </div>
  );
}

function ClaimText({ workId, claim }: { workId: string; claim: GalleyClaim }) {
  const [error] = claim.reading.errors;
  return (
    <>
      <div className="flex flex-wrap items-center gap-x-5 gap-y-1">
        <div className="w-16 shrink-0 font-ui">
          <Link
            href={`/works/${workId}/claims/${claim.id}`}
            className="link tabular inline-flex min-h-6 items-center text-sm break-all"
          >
            <span className="sr-only">Claim </span>
            {claim.ref}
          </Link>
          {claim.page ? <p className="text-xs leading-tight text-quiet">page {claim.page}</p> : null}
        </div>
        <TypesetClaim
          quantity={claim.quantity}
          claimed={claim.claimed}
          reading={claim.reading}
          struck={claim.withdrawn}
          className="text-lg"
        />
      </div>
      {error && !claim.withdrawn ? (
        <p className="mt-1 font-ui text-sm text-red">
          {error.field === "quantity" ? "In the quantity" : "In the claimed value"}, character {error.at + 1}:{" "}
          {error.says}
        </p>
      ) : null}
      {claim.note ? <p className="mt-1 text-sm text-blue italic">{claim.note}</p> : null}
    </>
  );
}
