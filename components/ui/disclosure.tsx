import type { ReactNode } from "react";

import { cx } from "@/components/cx";

/** Something that unfolds in place: evidence, details, a list. Works without script. */
export function Disclosure({
  summary,
  children,
  open,
  className,
}: {
  summary: ReactNode;
  children: ReactNode;
  open?: boolean;
  className?: string;
}) {
  return (
    <details open={open} className={cx("group/fold border-t border-rule last:border-b", className)}>
      <summary className="flex min-h-11 items-center gap-2.5 py-2 font-ui text-sm font-medium hover:text-blue">
        <svg
          viewBox="0 0 10 10"
          width="10"
          height="10"
          aria-hidden="true"
          className="shrink-0 transition-transform group-open/fold:rotate-90"
        >
          <path d="M3 1 7.5 5 3 9" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
        <span className="min-w-0">{summary}</span>
      </summary>
      <div className="pb-4 pl-5">{children}</div>
    </details>
  );
}
