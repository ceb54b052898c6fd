"use client";

import Link from "next/link";
import { useSelectedLayoutSegment } from "next/navigation";

export type WorkPlace = { segment: string | null; href: string; label: string };

/** Pages that hang below the chapters: their place in the head is "chapters". */
const UNDER_CHAPTERS = ["(overview)", "chapters", "claims", "sources", "runs"];

/** The parts of a work, with the one that is open underlined. */
export function WorkPlaces({ places }: { places: readonly WorkPlace[] }) {
  const segment = useSelectedLayoutSegment();
  const open = segment && UNDER_CHAPTERS.includes(segment) ? null : segment;
  return (
    <nav aria-label="Parts of this work" className="-mx-1 max-w-full overflow-x-auto px-1">
      <ul className="small-caps flex gap-x-6 text-base whitespace-nowrap">
        {places.map((place) => (
          <li key={place.href}>
            <Link
              href={place.href}
              aria-current={place.segment === open ? "page" : undefined}
              className="inline-flex min-h-11 items-center border-b-2 border-transparent no-underline hover:text-blue aria-[current=page]:border-ink"
            >
              {place.label}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
