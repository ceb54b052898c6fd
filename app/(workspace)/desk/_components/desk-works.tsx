import Link from "next/link";

import { Mark } from "@/components/marks";
import { VERDICTS, TONE_TEXT, type VerdictId } from "@/components/words";
import { ROLE_WORDS } from "@/lib/people/schema";
import type { DeskWork } from "@/lib/works/get-desk";
import { KIND_WORDS } from "@/lib/works/schema";

const ORDER = Object.keys(VERDICTS) as VerdictId[];

/** The works of this person: what each is, their role, and how it stands. */
export function DeskWorks({ works }: { works: readonly DeskWork[] }) {
  return (
    <ul className="grid gap-6 lg:grid-cols-2">
      {works.map((work) => (
        <li key={work.id} className="sheet flex min-w-0 flex-col gap-3 px-6 py-5">
          <p className="small-caps flex flex-wrap justify-between gap-x-4 text-base text-quiet">
            <span>{KIND_WORDS[work.kind].name}</span>
            <span>{ROLE_WORDS[work.role].name}</span>
          </p>
          <h3 className="text-xl">
            <Link
              href={`/works/${work.id}`}
              className="inline-flex min-h-6 items-center break-words no-underline hover:text-blue hover:underline hover:underline-offset-6"
            >
              <bdi>{work.title}</bdi>
            </Link>
          </h3>
          {work.confidential ? (
            <p className="flex items-center gap-1.5 font-ui text-xs text-amber">
              <Mark name="warning" size={15} /> confidential
            </p>
          ) : null}
          <Standing work={work} />
        </li>
      ))}
    </ul>
  );
}

function Standing({ work: { counts, openFlags, lastKey, role } }: { work: DeskWork }) {
  // Keys are none of a referee's business, so nothing is said of them.
  const key = role === "referee" ? null : lastKey === null ? "no key frozen yet" : `frozen key ${lastKey}`;
  if (counts === null) return <p className="font-ui text-sm text-quiet">{key}</p>;
  return (
    <div className="mt-auto grid gap-1 border-t border-rule pt-3 font-ui text-sm">
      <ul className="tabular flex flex-wrap gap-x-4 gap-y-1">
        {ORDER.filter((verdict) => (counts[verdict] ?? 0) > 0).map((verdict) => (
          <li key={verdict} className="flex items-center gap-1.5">
            <Mark name={verdict} size={15} className={TONE_TEXT[VERDICTS[verdict].tone]} />
            {(counts[verdict] ?? 0).toLocaleString("en-GB")} {VERDICTS[verdict].short}
          </li>
        ))}
        {counts.unchecked > 0 ? (
          <li className="text-quiet">{counts.unchecked.toLocaleString("en-GB")} not checked yet</li>
        ) : null}
        {counts.total === 0 ? <li className="text-quiet">no claims yet</li> : null}
      </ul>
      <p className="text-quiet">
        {openFlags ? `${openFlags} open ${openFlags === 1 ? "flag" : "flags"}` : "no open flag"}
        {key === null ? null : `; ${key}`}
      </p>
    </div>
  );
}
