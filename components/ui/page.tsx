import Link from "next/link";
import { Fragment, type ReactNode } from "react";

import { cx } from "@/components/cx";

/** The column of a page: `sheet` for reading and forms, `page` for galleys and tables. */
export function PageBody({
  width = "page",
  className,
  children,
}: {
  width?: "measure" | "sheet" | "page";
  className?: string;
  children: ReactNode;
}) {
  const widths = { measure: "max-w-measure", sheet: "max-w-sheet", page: "max-w-page" };
  return (
    <div className={cx("mx-auto w-full px-5 pt-7 pb-16 sm:px-8", widths[width], className)}>{children}</div>
  );
}

export type Crumb = { label: ReactNode; href?: string };

/** Where this page stands: work, chapter, problem. The last has no address. */
export function Crumbs({ trail }: { trail: readonly Crumb[] }) {
  return (
    <nav aria-label="Where you are" className="font-ui text-sm text-quiet">
      <ol className="flex flex-wrap items-baseline gap-x-2.5">
        {trail.map((crumb, i) => (
          <Fragment key={i}>
            {i > 0 ? (
              <li aria-hidden="true" className="text-rule">
                ❘
              </li>
            ) : null}
            <li className="min-w-0">
              {crumb.href ? (
                <Link
                  href={crumb.href}
                  className="inline-flex min-h-6 items-center no-underline hover:text-blue hover:underline hover:underline-offset-4"
                >
                  {crumb.label}
                </Link>
              ) : (
                <span aria-current="page">{crumb.label}</span>
              )}
            </li>
          </Fragment>
        ))}
      </ol>
    </nav>
  );
}

/** The head of a page: where it stands, its name, a line about it, and what can be done here. */
export function PageHeader({
  trail,
  kicker,
  title,
  children,
  actions,
}: {
  trail?: readonly Crumb[];
  kicker?: ReactNode;
  title: ReactNode;
  children?: ReactNode;
  actions?: ReactNode;
}) {
  return (
    <header className="mb-8">
      {trail ? <Crumbs trail={trail} /> : null}
      <div className="mt-2 flex flex-wrap items-end justify-between gap-x-8 gap-y-4 border-b-2 border-ink pb-4">
        <div className="min-w-0 flex-1 basis-80">
          {kicker ? <p className="small-caps text-lg text-red">{kicker}</p> : null}
          <h1 className="old-style text-2xl sm:text-3xl">{title}</h1>
          {children ? <div className="mt-1.5 max-w-measure text-quiet">{children}</div> : null}
        </div>
        {actions ? <div className="flex flex-wrap gap-3">{actions}</div> : null}
      </div>
    </header>
  );
}

/** A part of a page under a ruled heading. */
export function Section({
  title,
  aside,
  id,
  className,
  children,
}: {
  title: ReactNode;
  aside?: ReactNode;
  id?: string;
  className?: string;
  children: ReactNode;
}) {
  return (
    <section aria-labelledby={id} className={cx("mt-10 first:mt-0", className)}>
      <div className="mb-3 flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 border-b border-rule pb-1.5">
        <h2 id={id} className="text-lg">
          {title}
        </h2>
        {aside ? <div className="font-ui text-sm text-quiet">{aside}</div> : null}
      </div>
      {children}
    </section>
  );
}

/** The sheet of type with its hairline frame; `marks` adds the printer's crop marks outside the corners. */
export function Sheet({
  marks = false,
  className,
  children,
}: {
  marks?: boolean;
  className?: string;
  children: ReactNode;
}) {
  return <div className={cx("sheet", marks && "sheet-marks", className)}>{children}</div>;
}
