import Link from "next/link";

import { Math } from "@/components/math";
import { Section } from "@/components/ui/page";
import { VerdictMark } from "@/components/verdict-mark";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { FlagView } from "@/lib/flags/get-flag";

type Shown = { text: string; latex: string | null };

/** Other claims that a symmetry joins to this one: what is changed here may have to be changed there. */
export function Orbit({ flag }: { flag: FlagView }) {
  const { claims, total } = flag.orbit;
  if (total === 0) return null;
  return (
    <Section
      title="Joined to it by a symmetry"
      id="orbit"
      aside={total === 1 ? "one other claim of this work" : `${total} other claims of this work`}
    >
      <ul className="grid gap-x-10 sm:grid-cols-2 lg:grid-cols-3">
        {claims.map((claim) => (
          <li
            key={claim.id}
            className="flex min-w-0 items-center justify-between gap-4 border-b border-rule py-2.5"
          >
            <span className="min-w-0">
              <Link href={`/works/${flag.work.id}/claims/${claim.id}`} className="link font-work">
                {claim.ref}
              </Link>
              <ScrollBox label="the claim" className="mt-1 block py-1">
                <Printed of={claim.quantity} />
                <span className="text-blue">
                  {" = "}
                  <Printed of={claim.claimed} />
                </span>
              </ScrollBox>
            </span>
            <VerdictMark verdict={claim.verdict} short />
          </li>
        ))}
      </ul>
      {total > claims.length ? (
        <p className="mt-2 font-ui text-xs text-quiet">and {total - claims.length} more, not listed here</p>
      ) : null}
    </Section>
  );
}

function Printed({ of }: { of: Shown }) {
  return of.latex ? <Math own latex={of.latex} /> : <code className="font-mono text-xs">{of.text}</code>;
}
