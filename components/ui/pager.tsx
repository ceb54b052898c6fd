import Link from "next/link";

/** Which part of a long list is shown, and the way to the next. `href(page)` gives the address of a page, from 1. */
export function Pager({
  page,
  pages,
  total,
  unit = "rows",
  href,
}: {
  page: number;
  pages: number;
  total: number;
  unit?: string;
  href: (page: number) => string;
}) {
  if (pages <= 1) {
    return <p className="tabular py-3 font-ui text-xs text-quiet">{`${total} ${unit}`}</p>;
  }
  const link = "inline-flex min-h-11 items-center px-1 text-blue underline underline-offset-4";
  return (
    <nav
      aria-label="Pages"
      className="tabular flex flex-wrap items-center justify-between gap-4 py-2 font-ui text-sm"
    >
      <span className="text-quiet">{`${total} ${unit}`}</span>
      <span className="flex items-center gap-5">
        {page > 1 ? (
          <Link href={href(page - 1)} rel="prev" className={link}>
            Earlier
          </Link>
        ) : (
          <span className="px-1 text-quiet">Earlier</span>
        )}
        <span>
          page <b>{page}</b> of {pages}
        </span>
        {page < pages ? (
          <Link href={href(page + 1)} rel="next" className={link}>
            Later
          </Link>
        ) : (
          <span className="px-1 text-quiet">Later</span>
        )}
      </span>
    </nav>
  );
}
