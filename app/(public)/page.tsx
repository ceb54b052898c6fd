import type { Metadata } from "next";
import Link from "next/link";

import { ClaimCheck } from "@/components/claim-check";
import { KeyJourney } from "@/components/key-journey";
import { Sheet } from "@/components/ui/page";
import { VerdictMark } from "@/components/verdict-mark";
import { VERDICTS, type VerdictId } from "@/components/words";
import { getUser } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { exampleAnswer, EXAMPLE } from "./_lib/example";

export const metadata: Metadata = { title: { absolute: "Surdmark: answer keys verified before print" } };

/** The front page: what this is, and one claim checked on the spot, without an account. */
export default async function FrontPage() {
  const user = await getUser();
  return (
    <div className="mx-auto max-w-page px-5 pb-20 sm:px-8">
      <section className="grid items-end gap-x-12 gap-y-6 pt-9 pb-9 lg:grid-cols-[minmax(0,1fr)_22rem]">
        <h1 className="max-w-[30ch] text-3xl sm:text-4xl">
          Every coupling coefficient in your answer key, recomputed before it is printed.
        </h1>
        <div className="border-l-3 border-double border-red pl-5">
          <p>
            Surdmark reads each claimed 3j symbol and Clebsch-Gordan coefficient as it was written, recomputes
            it exactly, and says how a wrong one came to be wrong. A second author settles it. A person signs
            the key.
          </p>
          <p className="mt-3 font-ui text-sm">
            {user ? (
              <Link href="/desk" className="link inline-flex min-h-8 items-center">
                To your desk
              </Link>
            ) : (
              <Link href="/sign-in" className="link inline-flex min-h-8 items-center">
                Sign in to your works
              </Link>
            )}
          </p>
        </div>
      </section>

      <section aria-labelledby="check">
        <Sheet marks className="px-5 pt-4 pb-6 sm:px-8">
          <div className="flex flex-wrap items-baseline justify-between gap-x-6 border-b-2 border-ink pb-2">
            <h2 id="check" className="text-xl">
              Check one claim
            </h2>
            <p className="small-caps text-base text-quiet">no account needed</p>
          </div>
          <ClaimCheck initial={EXAMPLE} initialAnswer={exampleAnswer()} id="check-one" />
        </Sheet>
        {env.SURDMARK_DEMO && !user ? (
          <p className="mt-5 font-ui text-sm text-quiet">
            This copy carries a demo work. Its sign-ins stand on the{" "}
            <Link href="/sign-in" className="link">
              sign-in page
            </Link>{" "}
            and in the terminal where it was started.
          </p>
        ) : null}
      </section>

      <section aria-labelledby="journey" className="mt-16">
        <h2 id="journey" className="mb-6 border-b border-ink pb-2 text-xl">
          How a key travels
        </h2>
        <KeyJourney />
      </section>

      <section
        aria-labelledby="cautions"
        className="mt-16 grid gap-x-12 gap-y-4 lg:grid-cols-[minmax(0,1fr)_22rem]"
      >
        <div className="prose-galley max-w-measure">
          <h2 id="cautions" className="mt-0! text-xl">
            What it does not do
          </h2>
          <p>
            It verifies values. It does not judge the physics of a problem, nor its wording. Conventions
            differ between books, so a value that is let stand names the convention it relies on, and the key
            says which conventions it was verified in.
          </p>
          <p>
            <Link href="/about/verdicts">What each verdict means, the slips it knows, and its limits</Link>
          </p>
        </div>
        <div className="border-l-3 border-double border-rule pl-5">
          <p className="small-caps mb-2 text-base text-quiet">the verifier’s marks</p>
          <ul className="grid gap-1.5">
            {(Object.keys(VERDICTS) as VerdictId[]).map((verdict) => (
              <li key={verdict}>
                <VerdictMark verdict={verdict} withWord size={22} className="text-sm" />
              </li>
            ))}
          </ul>
        </div>
      </section>
    </div>
  );
}
