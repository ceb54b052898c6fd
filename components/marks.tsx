import type { ReactNode } from "react";

import { cx } from "@/components/cx";
import type { SettleId, VerdictId } from "@/components/words";

/** Proof-reader's marks, drawn for this product on a 24-unit square with one pencil width. */
export type MarkName =
  | VerdictId
  | SettleId
  | "pending"
  | "seal"
  | "note"
  | "info"
  | "warning"
  | "source"
  | "run"
  | "person"
  | "undo"
  | "insert"
  | "close"
  | "onward"
  | "download";

const DRAWN: Record<MarkName, ReactNode> = {
  // A reader's tick with a long upstroke, as made in passing.
  confirmed: <path d="M4.2 13.6c1.9 1 3.3 2.9 4.1 5.6C10.4 11.6 14 6.9 20.3 4" />,
  // The tick over a wavy underline: right, but to be set in another form.
  "confirmed-not-house-form": (
    <>
      <path d="M5 8.8c1.5.8 2.6 2.2 3.2 4.3C10 7.6 13 4.2 18 2.4" />
      <path d="M3 19.4c1.5-2.6 3-2.6 4.5 0s3 2.6 4.5 0 3-2.6 4.5 0 3 2.6 4.5 0" />
    </>
  ),
  // Two lines of a sum, struck through: the sides are not equal.
  discrepant: (
    <>
      <path d="M4 9.3h16M4 15.2h16" />
      <path d="M17.3 3.5 6.7 20.8" />
    </>
  ),
  // The transposition curve between two points: two statements stand against each other.
  contradicted: (
    <>
      <path d="M3.5 14.5c0-8.5 8.5-8.5 8.5-2.5s8.5 6 8.5-2.5" />
      <circle cx="7.2" cy="17.8" r="1.5" fill="currentColor" stroke="none" />
      <circle cx="16.8" cy="6.2" r="1.5" fill="currentColor" stroke="none" />
    </>
  ),
  // A scrawl above a caret: this is where reading stopped.
  unreadable: (
    <>
      <path d="m3 8.5 2.6-4 2.3 5.2 2.9-5.7 2.3 5.3 2.6-5.1 2.2 5 3-3.7" />
      <path d="M6.8 20.5 12 13.7l5.2 6.8" />
    </>
  ),
  // The ringed query put to an author.
  undecided: (
    <>
      <path d="M12 2.8c5.6-.3 9.4 3.9 9.2 9.2-.2 5.5-4.3 9.3-9.4 9.2-5.3-.1-9-4.2-9-9.3 0-4.9 3.3-8.3 7.7-9" />
      <path d="M9.2 9.7c.2-1.9 1.4-2.9 3-2.8 1.7.1 2.8 1.2 2.7 2.7-.2 2.3-2.9 2.3-2.9 4.7" />
      <circle cx="12" cy="17.3" r="1.1" fill="currentColor" stroke="none" />
    </>
  ),
  // An empty quad: space kept for type not yet set.
  pending: <path d="M5 5h14v14H5z" strokeDasharray="2.6 2.6" />,
  // Caret with the new figure above it.
  correct: (
    <>
      <path d="m5.5 20.5 6.5-8.8 6.5 8.8" />
      <path d="M8 6.4h8M12 2.4v8" />
    </>
  ),
  // The dotted underline: let it stand.
  stet: (
    <>
      <path d="M4 12.5h16" />
      {[4.6, 9.55, 14.45, 19.4].map((x) => (
        <circle key={x} cx={x} cy="18.2" r="1.35" fill="currentColor" stroke="none" />
      ))}
    </>
  ),
  // The run-on line from the end of one line to the start of the next.
  reword: (
    <>
      <path d="M3 5.8h12.5c7 0 6.5 6.2 0 6.2h-7c-6.5 0-7 6.2 0 6.2H21" />
    </>
  ),
  // The looped deletion stroke.
  withdraw: <path d="M3 13.2h11.3c4.5 0 6.7-2.6 6.2-5.3-.5-2.5-3.5-3-5-1-2.6 3.6-5 8.5-6.2 13.3" />,
  // The seal of a frozen key: a scalloped ring with the radical cut into it.
  seal: (
    <>
      <path
        d="m12 1.9 2.4 2 3.1-.3.8 3 2.7 1.6-1.1 2.9 1.1 2.9-2.7 1.6-.8 3-3.1-.3-2.4 2-2.4-2-3.1.3-.8-3L3 14l1.1-2.9L3 8.2l2.7-1.6.8-3 3.1.3z"
        transform="translate(0 .9)"
      />
      <path d="m7.6 12.7 1.5-.7 2 4 2.2-7.6h3.4" />
    </>
  ),
  note: (
    <>
      <path d="M4 4v16" />
      <path d="M8.5 7h11M8.5 12h11M8.5 17h6" />
    </>
  ),
  info: (
    <>
      <path d="M12 10.2V18" />
      <circle cx="12" cy="6.2" r="1.3" fill="currentColor" stroke="none" />
      <path d="M5 3.5h-2v17h2M19 3.5h2v17h-2" />
    </>
  ),
  warning: (
    <>
      <path d="M12 5.5v8.5" />
      <circle cx="12" cy="18" r="1.3" fill="currentColor" stroke="none" />
      <path d="M5 3.5h-2v17h2M19 3.5h2v17h-2" />
    </>
  ),
  source: <path d="M6 2.8h8.5L19 7.3v13.9H6zM14.3 3v4.5H19M9 12h7M9 16h5" />,
  run: <path d="M4 12h13.5M12.5 6.5 18 12l-5.5 5.5M21 5v14" />,
  person: (
    <path d="M12 11.8c2.3 0 3.9-1.9 3.9-4.3S14.3 3.3 12 3.3 8.1 5.1 8.1 7.5s1.6 4.3 3.9 4.3ZM4 20.7c.6-4 3.7-6 8-6s7.4 2 8 6" />
  ),
  undo: <path d="M8.5 4.5 4 9l4.5 4.5M4.5 9h9c4.3 0 6.5 2.3 6.5 5.4 0 3-2.2 5.1-6 5.1H9" />,
  insert: <path d="M12 4.5v15M4.5 12h15" />,
  close: <path d="m5.5 5.5 13 13M18.5 5.5l-13 13" />,
  onward: <path d="M4 12h15M13.5 6.5 19 12l-5.5 5.5" />,
  download: <path d="M12 3.5V15M7 10.5l5 5 5-5M4 20.5h16" />,
};

/** One mark. Give `label` only where no word stands beside it. */
export function Mark({
  name,
  size = 18,
  label,
  className,
}: {
  name: MarkName;
  size?: number;
  label?: string;
  className?: string;
}) {
  return (
    <svg
      viewBox="0 0 24 24"
      width={size}
      height={size}
      fill="none"
      stroke="currentColor"
      strokeWidth={size < 16 ? 2.2 : 1.8}
      strokeLinecap="round"
      strokeLinejoin="round"
      className={cx("inline-block shrink-0", className)}
      role={label ? "img" : undefined}
      aria-label={label}
      aria-hidden={label ? undefined : true}
    >
      {DRAWN[name]}
    </svg>
  );
}
