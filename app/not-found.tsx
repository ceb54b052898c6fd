import Link from "next/link";

import { Wordmark } from "@/components/wordmark";

export const metadata = { title: "Not found" };

/** What is not there, or not there for this person: the two must look the same. */
export default function NotFound() {
  return (
    <main className="mx-auto grid min-h-dvh max-w-measure content-center gap-6 px-6 py-16">
      <Link href="/" className="inline-flex w-fit no-underline" aria-label="Surdmark, front page">
        <Wordmark />
      </Link>
      <div className="border-l-3 border-double border-red pl-6">
        <p className="small-caps text-lg text-red">404</p>
        <h1 className="text-2xl">There is no such page here</h1>
        <p className="mt-2 text-quiet">
          It may have been moved or withdrawn, or it belongs to a work that is not shared with you. Whoever
          sent you the address can tell you.
        </p>
        <p className="mt-5 flex flex-wrap gap-x-6 font-ui text-sm">
          <Link href="/desk" className="link inline-flex min-h-8 items-center">
            To your desk
          </Link>
          <Link href="/" className="link inline-flex min-h-8 items-center">
            To the front page
          </Link>
        </p>
      </div>
    </main>
  );
}
