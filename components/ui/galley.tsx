import type { ReactNode } from "react";

import { cx } from "@/components/cx";
import { Mark, type MarkName } from "@/components/marks";

/** A galley: lines of the work with a ruled margin for notes. */
export function Galley({
  label,
  className,
  children,
}: {
  label?: string;
  className?: string;
  children: ReactNode;
}) {
  return (
    <div className={cx("galley", className)} role={label ? "group" : undefined} aria-label={label}>
      {children}
    </div>
  );
}

/** One line of a galley with the notes that concern it; on a phone the notes fall under the line. */
export function GalleyLine({
  id,
  notes,
  className,
  children,
}: {
  id?: string;
  notes?: ReactNode;
  className?: string;
  children: ReactNode;
}) {
  return (
    <div id={id} className={cx("galley-line", className)}>
      <div className="galley-text min-w-0">{children}</div>
      <div className="galley-notes min-w-0">{notes}</div>
    </div>
  );
}

/** A note in the margin: the verifier's in red pencil, the author's in blue, with a mark so that colour is never alone. */
export function MarginNote({
  pencil,
  mark,
  title,
  children,
  className,
}: {
  pencil: "red" | "blue";
  mark?: MarkName;
  title?: ReactNode;
  children?: ReactNode;
  className?: string;
}) {
  return (
    <div
      role="note"
      aria-label={pencil === "red" ? "Verifier's note" : "Author's note"}
      className={cx(
        "flex gap-2 text-sm leading-snug",
        pencil === "red" ? "pencil-red" : "pencil-blue",
        className,
      )}
    >
      {mark ? <Mark name={mark} size={18} className="mt-0.5" /> : null}
      <div className="min-w-0">
        {title ? <p className="font-ui font-medium">{title}</p> : null}
        {children ? <div className="italic [&_.katex]:not-italic">{children}</div> : null}
      </div>
    </div>
  );
}
