import { cookies } from "next/headers";
import Link from "next/link";

import { readTheme, THEME_COOKIE } from "@/components/theme";
import { ThemeSwitch } from "@/components/theme-switch";
import { CAUTIONS } from "@/components/words";

/** The foot of every page: the cautions, help, and the choice of paper. */
export async function SiteFooter() {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <footer className="no-print mt-auto border-t border-ink">
      <div className="mx-auto grid max-w-page gap-x-12 gap-y-6 px-5 py-8 sm:px-8 md:grid-cols-[minmax(0,1fr)_auto]">
        <ul className="grid max-w-sheet gap-x-8 gap-y-1 text-sm text-quiet italic sm:grid-cols-2">
          {CAUTIONS.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
        <div className="flex flex-wrap items-center gap-x-8 gap-y-2 md:flex-col md:items-end">
          <Link href="/about/verdicts" className="link inline-flex min-h-8 items-center font-ui text-sm">
            What the verdicts mean
          </Link>
          <ThemeSwitch theme={theme} />
        </div>
      </div>
    </footer>
  );
}
