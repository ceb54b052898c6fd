import type { ReactNode } from "react";

import { Math } from "@/components/math";
import { Section } from "@/components/ui/page";
import { Time } from "@/components/ui/time";
import { SettleMark, VerdictMark } from "@/components/verdict-mark";
import type { KeyClaim, KeyContent, KeySettlement } from "@/lib/keys/key-content";

/** Who settled what in this key, and who answers for what could not be decided. */
export function SettledList({ content }: { content: KeyContent }) {
  const claims = content.claims.filter(({ settlement, waiver }) => settlement ?? waiver);
  const { withdrawn } = content;
  if (claims.length + withdrawn.length === 0) return null;
  return (
    <Section
      title="Settled by a second author"
      id="settled"
      className="mt-12"
      aside={`${claims.length + withdrawn.length} of the claims`}
    >
      <ul>
        {claims.map((claim) => (
          <Line key={claim.id} claimRef={claim.ref} mark={<WordOf claim={claim} />}>
            {claim.waiver ? (
              <Said
                by={claim.waiver.by}
                at={claim.waiver.at}
                reason={claim.waiver.reason}
                convention={null}
              />
            ) : claim.settlement ? (
              <>
                {claim.settlement.word === "stet" && claim.value ? (
                  <span className="text-red">
                    recomputed <Math own latex={claim.value.latex} />{" "}
                  </span>
                ) : null}
                <Said {...claim.settlement} />
              </>
            ) : null}
          </Line>
        ))}
        {withdrawn.map((gone) => (
          <Line key={gone.ref} claimRef={gone.ref} mark={<SettleMark word="withdraw" />}>
            {gone.settlement ? (
              <Said {...gone.settlement} />
            ) : (
              <span className="text-quiet">taken out by its authors</span>
            )}
          </Line>
        ))}
      </ul>
    </Section>
  );
}

function Line({ claimRef, mark, children }: { claimRef: string; mark: ReactNode; children: ReactNode }) {
  return (
    <li className="grid gap-x-6 border-b border-rule py-2.5 sm:grid-cols-[6rem_8rem_minmax(0,1fr)]">
      <b className="old-style font-semibold">{claimRef}</b>
      <span>{mark}</span>
      <span className="min-w-0 break-words">{children}</span>
    </li>
  );
}

function WordOf({ claim }: { claim: KeyClaim }) {
  if (claim.waiver) return <VerdictMark verdict="undecided" withWord />;
  return claim.settlement ? <SettleMark word={claim.settlement.word} /> : null;
}

function Said({ by, at, reason, convention }: Pick<KeySettlement, "by" | "at" | "reason" | "convention">) {
  return (
    <>
      {convention ? <span>relies on: {convention}. </span> : null}
      {reason ? <span>{reason} </span> : null}
      <span className="font-ui text-sm text-quiet">
        {by}, <Time at={at} />
      </span>
    </>
  );
}
