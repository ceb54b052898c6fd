import type { Metadata } from "next";
import Link from "next/link";

import { Mark } from "@/components/marks";
import { Crumbs, PageBody } from "@/components/ui/page";
import {
  CAUTIONS,
  SETTLE_WORDS,
  TONE_TEXT,
  VERDICTS,
  type SettleId,
  type VerdictId,
} from "@/components/words";
import { LIMITS } from "@/lib/symbols/quantity";
import { SLIPS, type SlipId } from "@/lib/verify/slips";

export const metadata: Metadata = { title: "What the verdicts mean" };

const NEXT_STEP: Record<VerdictId, string> = {
  confirmed: "Nothing is left to do.",
  "confirmed-not-house-form": "It may stand. The house form is printed beside it, for whoever sets the page.",
  discrepant: "It becomes a flag. The note says which slip would turn the true value into the claimed one.",
  contradicted: "It becomes a flag, with the other claim named beside it.",
  unreadable:
    "It becomes a flag, with the character under which reading stopped and a proposal where there is one.",
  undecided: "It keeps a key from being frozen until it is settled or somebody answers for it by name.",
};

/** What each verdict means, the slips by name, the words that settle a flag, cautions and limits. */
export default function VerdictsPage() {
  return (
    <PageBody width="page">
      <Crumbs trail={[{ label: "Surdmark", href: "/" }, { label: "What the verdicts mean" }]} />
      <h1 className="mt-2 border-b-2 border-ink pb-4 text-2xl sm:text-3xl">What the verdicts mean</h1>

      <section aria-label="The six verdicts" className="galley mt-2">
        {(Object.keys(VERDICTS) as VerdictId[]).map((id) => (
          <div key={id} id={id} className="galley-line">
            <div className="galley-text min-w-0">
              <h2 className={`flex items-center gap-3 text-lg ${TONE_TEXT[VERDICTS[id].tone]}`}>
                <Mark name={id} size={30} />
                {VERDICTS[id].word}
              </h2>
              <p className="mt-1 max-w-measure">{VERDICTS[id].means}</p>
            </div>
            <div className="galley-notes min-w-0">
              <p className="text-base text-quiet italic">{NEXT_STEP[id]}</p>
            </div>
          </div>
        ))}
      </section>

      <section aria-labelledby="settling" className="mt-14">
        <h2 id="settling" className="border-b border-ink pb-2 text-xl">
          The four words that settle a flag
        </h2>
        <dl className="grid gap-x-10 sm:grid-cols-2">
          {(Object.keys(SETTLE_WORDS) as SettleId[]).map((id) => (
            <div key={id} className="border-b border-rule py-3">
              <dt className="flex items-center gap-3 text-blue italic">
                <Mark name={id} size={26} />
                {SETTLE_WORDS[id].word}
              </dt>
              <dd className="pl-9.5">{SETTLE_WORDS[id].means}</dd>
            </div>
          ))}
        </dl>
        <p className="mt-3 max-w-measure text-quiet">
          Nobody settles a flag on a claim of their own. A settlement can be undone until the key is frozen.
        </p>
      </section>

      <section aria-labelledby="slips" className="mt-14">
        <h2 id="slips" className="border-b border-ink pb-2 text-xl">
          Slips it knows
        </h2>
        <p className="mt-3 max-w-measure text-quiet">
          A wrong value is tried against each of these, alone and in pairs. What fits is called likely or
          possible, never certain: a coincidence is always left open.
        </p>
        <ol className="mt-4 gap-x-12 sm:columns-2 lg:columns-3">
          {(Object.keys(SLIPS) as SlipId[]).map((id) => (
            <li key={id} id={`slip-${id}`} className="break-inside-avoid border-b border-rule py-3">
              <h3 className="leading-snug text-red italic">{SLIPS[id].name}</h3>
              <p className="mt-0.5 text-sm leading-snug">{SLIPS[id].does}.</p>
              <p className="mt-1 font-ui text-xs text-quiet">Unseen when {SLIPS[id].silent}.</p>
            </li>
          ))}
        </ol>
      </section>

      <section aria-labelledby="limits" className="mt-14 grid gap-x-14 gap-y-10 md:grid-cols-2">
        <div>
          <h2 id="limits" className="border-b border-ink pb-2 text-xl">
            Limits
          </h2>
          <ul className="mt-3 grid gap-2">
            <li>3j symbols and Clebsch-Gordan coefficients, in the Condon-Shortley phase.</li>
            <li>
              Values are exact for every j up to {LIMITS.largestJ.toLocaleString("en-GB")}; past it a claim is
              undecided, never guessed.
            </li>
            <li>
              Two independent routes must agree, up to j = {LIMITS.largestCheckedJ.toLocaleString("en-GB")}.
              Should they differ, that is an alarm about the program and no verdict is given.
            </li>
            <li>
              Limits count operations and digits, not seconds, so the same claim gets the same verdict on
              every machine.
            </li>
          </ul>
        </div>
        <div>
          <h2 className="border-b border-ink pb-2 text-xl">Cautions</h2>
          <ul className="mt-3 grid gap-2">
            {CAUTIONS.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
        </div>
      </section>

      <p className="mt-14 border-t border-rule pt-4">
        <Link href="/" className="link inline-flex min-h-8 items-center">
          Check one claim
        </Link>
      </p>
    </PageBody>
  );
}
