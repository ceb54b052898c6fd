import Link from "next/link";
import type { ReactNode } from "react";

import { Mark } from "@/components/marks";
import { Menu } from "@/components/ui/menu";
import { MenuButton, MenuLink, MenuNote } from "@/components/ui/menu-item";
import { Wordmark } from "@/components/wordmark";

export type HeaderPlace = { href: string; label: ReactNode };

/** The running head of every page: the name, the places, and who is at the desk. */
export function SiteHeader({
  user,
  places,
}: {
  user: { name: string; email: string; isAdmin: boolean } | null;
  places: readonly HeaderPlace[];
}) {
  return (
    <header className="no-print border-b-3 border-double border-ink bg-paper">
      <a
        href="#content"
        className="sr-only bg-ink px-4 py-3 font-ui text-sheet focus:not-sr-only focus:absolute focus:z-50"
      >
        Skip to the content
      </a>
      <div className="mx-auto flex min-h-16 max-w-page flex-wrap items-center justify-between gap-x-8 px-5 sm:px-8">
        <Link
          href={user ? "/desk" : "/"}
          className="inline-flex py-3 no-underline"
          aria-label={user ? "Surdmark, to the desk" : "Surdmark, front page"}
        >
          <Wordmark />
        </Link>
        <nav aria-label="Main" className="flex items-center gap-x-7">
          <ul className="small-caps hidden items-center gap-x-7 text-lg sm:flex">
            {places.map((place) => (
              <li key={place.href}>
                <Link
                  href={place.href}
                  className="inline-flex min-h-11 items-center no-underline hover:text-blue hover:underline hover:underline-offset-6"
                >
                  {place.label}
                </Link>
              </li>
            ))}
          </ul>
          {user ? (
            <Menu
              label={
                <>
                  <Mark name="person" size={18} />
                  <span className="max-w-40 truncate">{user.name}</span>
                </>
              }
            >
              <MenuNote>
                signed in as
                <span className="block text-sm break-all text-ink">{user.email}</span>
              </MenuNote>
              {places.map((place) => (
                <span key={place.href} className="sm:hidden">
                  <MenuLink href={place.href}>{place.label}</MenuLink>
                </span>
              ))}
              {user.isAdmin ? <MenuLink href="/admin">Administration</MenuLink> : null}
              <MenuLink href="/about/verdicts">What the verdicts mean</MenuLink>
              <form method="post" action="/sign-out" className="border-t border-rule">
                <MenuButton type="submit">Sign out</MenuButton>
              </form>
            </Menu>
          ) : (
            <Link
              href="/sign-in"
              className="small-caps inline-flex min-h-11 items-center text-lg text-blue underline decoration-1 underline-offset-6 hover:decoration-2"
            >
              sign in
            </Link>
          )}
        </nav>
      </div>
    </header>
  );
}
