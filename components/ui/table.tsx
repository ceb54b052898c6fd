import type { ComponentProps, ReactNode } from "react";
import Link from "next/link";

import { cx } from "@/components/cx";

export type Column<Row> = {
  id: string;
  header: ReactNode;
  cell: (row: Row) => ReactNode;
  /** The cell that names the row (a `th`). */
  rowHeader?: boolean;
  align?: "start" | "end";
  /** Label shown beside the cell when rows are stacked on a phone; defaults to `header` when that is text. "" for none. */
  label?: string;
  className?: string;
  /** A sortable column: where its heading leads, and how it is sorted now. */
  sort?: { href: string; direction: "ascending" | "descending" | null };
};

/** A table from data. Every row is named by its `rowHeader` cell; on a phone each row becomes a small stack. */
export function Table<Row>({
  caption,
  captionHidden = false,
  columns,
  rows,
  rowKey,
  rowProps,
  empty,
  className,
}: {
  caption: ReactNode;
  captionHidden?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  rowProps?: (row: Row) => ComponentProps<"tr">;
  empty?: ReactNode;
  className?: string;
}) {
  if (rows.length === 0 && empty) return <>{empty}</>;
  return (
    <TableFrame caption={caption} captionHidden={captionHidden} className={className}>
      <thead role="rowgroup">
        <tr role="row">
          {columns.map((column) => (
            <ColumnHead key={column.id} align={column.align} sort={column.sort} className={column.className}>
              {column.header}
            </ColumnHead>
          ))}
        </tr>
      </thead>
      <tbody role="rowgroup">
        {rows.map((row) => (
          <tr key={rowKey(row)} role="row" {...rowProps?.(row)}>
            {columns.map((column) => (
              <Cell
                key={column.id}
                rowHeader={column.rowHeader}
                align={column.align}
                label={column.label ?? (typeof column.header === "string" ? column.header : undefined)}
                className={column.className}
              >
                {column.cell(row)}
              </Cell>
            ))}
          </tr>
        ))}
      </tbody>
    </TableFrame>
  );
}

/** The frame alone, for tables that draw their own head and body (with ColumnHead and Cell). */
export function TableFrame({
  caption,
  captionHidden = false,
  className,
  children,
  ...rest
}: { caption: ReactNode; captionHidden?: boolean } & ComponentProps<"table">) {
  return (
    // The roles keep it a table for assistive technology when a phone's style sheet lays the rows out as blocks.
    <table role="table" className={cx("ledger ledger-stack", className)} {...rest}>
      <caption className={captionHidden ? "sr-only" : undefined}>{caption}</caption>
      {children}
    </table>
  );
}

/** A column's heading. With `onSort` it is a button, with `sort` a link, and it says how the column is sorted. */
export function ColumnHead({
  align,
  sort,
  onSort,
  direction,
  className,
  children,
}: {
  align?: "start" | "end";
  sort?: { href: string; direction: "ascending" | "descending" | null };
  onSort?: () => void;
  direction?: "ascending" | "descending" | null;
  className?: string;
  children?: ReactNode;
}) {
  const state = sort?.direction ?? direction ?? null;
  const sortable = Boolean(sort ?? onSort);
  const arrow = sortable ? <SortMark state={state} /> : null;
  const press =
    "inline-flex min-h-6 items-baseline gap-1.5 underline-offset-4 hover:text-ink hover:underline";
  return (
    <th
      scope="col"
      role="columnheader"
      data-align={align}
      aria-sort={sortable ? (state ?? "none") : undefined}
      className={className}
    >
      {sort ? (
        <Link href={sort.href} className={cx(press, "no-underline")} scroll={false}>
          {children}
          {arrow}
        </Link>
      ) : onSort ? (
        <button type="button" onClick={onSort} className={press}>
          {children}
          {arrow}
        </button>
      ) : (
        children
      )}
    </th>
  );
}

/** A cell of a TableFrame; `label` is shown beside it on a phone. */
export function Cell({
  rowHeader = false,
  align,
  label,
  className,
  children,
}: {
  rowHeader?: boolean;
  align?: "start" | "end";
  label?: string;
  className?: string;
  children?: ReactNode;
}) {
  const shared = { "data-align": align, "data-label": label || undefined, className };
  // One child inside, so that a stacked cell has exactly two grid items: its label and its content.
  const content = <div className="min-w-0">{children}</div>;
  return rowHeader ? (
    <th scope="row" role="rowheader" {...shared}>
      {content}
    </th>
  ) : (
    <td role="cell" {...shared}>
      {content}
    </td>
  );
}

function SortMark({ state }: { state: "ascending" | "descending" | null }) {
  return (
    <svg
      viewBox="0 0 8 12"
      width="8"
      height="12"
      aria-hidden="true"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.3"
    >
      <path d="M1 4.5 4 1.5l3 3" opacity={state === "descending" ? 0.25 : 1} />
      <path d="m1 7.5 3 3 3-3" opacity={state === "ascending" ? 0.25 : 1} />
    </svg>
  );
}
