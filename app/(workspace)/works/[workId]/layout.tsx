import Link from "next/link";
import type { ReactNode } from "react";

import { Mark } from "@/components/marks";
import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { getWork, type WorkChrome } from "@/lib/works/get-work";
import { WorkPlaces, type WorkPlace } from "./_components/work-places";

/** The running head of a work: its name, its parts for this person, and whether it is confidential. */
export default async function WorkLayout({
  params,
  children,
}: {
  params: Promise<{ workId: string }>;
  children: ReactNode;
}) {
  const user = await requireUser();
  const work = await orNotFound(getWork((await params).workId, user));
  return (
    <>
      <div className="no-print border-b border-rule">
        <div className="mx-auto flex max-w-page flex-wrap items-center justify-between gap-x-8 px-5 sm:px-8">
          <p className="flex min-w-0 flex-wrap items-center gap-x-4 py-1">
            <Link
              href={`/works/${work.id}`}
              className="inline-flex min-h-11 max-w-full items-center text-lg italic no-underline hover:text-blue hover:underline hover:underline-offset-6"
            >
              <bdi className="line-clamp-2">{work.title}</bdi>
            </Link>
            {work.confidential ? (
              <span className="flex items-center gap-1.5 font-ui text-xs text-amber">
                <Mark name="warning" size={15} />
                confidential: show it to nobody outside this work
              </span>
            ) : null}
          </p>
          <WorkPlaces places={placesOf(work)} />
        </div>
      </div>
      {children}
    </>
  );
}

function placesOf({ id, parts }: WorkChrome): WorkPlace[] {
  const base = `/works/${id}`;
  const all: (WorkPlace & { open: boolean })[] = [
    { segment: null, href: base, label: "chapters", open: parts.chapters },
    { segment: "flags", href: `${base}/flags`, label: "flags", open: parts.flags },
    { segment: "keys", href: `${base}/keys`, label: "keys", open: parts.keys },
    { segment: "people", href: `${base}/people`, label: "people", open: parts.people },
    { segment: "conventions", href: `${base}/conventions`, label: "conventions", open: parts.conventions },
  ];
  return all.filter(({ open }) => open).map(({ segment, href, label }) => ({ segment, href, label }));
}
