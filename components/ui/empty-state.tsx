import type { ReactNode } from "react";

import { Mark, type MarkName } from "@/components/marks";

/** Nothing here yet: what would be here, and the one thing to do next. */
export function EmptyState({
  title,
  children,
  action,
  mark = "insert",
}: {
  title: ReactNode;
  children?: ReactNode;
  action?: ReactNode;
  mark?: MarkName;
}) {
  return (
    <div className="border-y border-rule py-12 text-center">
      <div className="relative mx-auto mb-5 h-20 w-56 text-rule" aria-hidden="true">
        <svg
          viewBox="0 0 224 80"
          className="absolute inset-0"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.5"
        >
          <path
            d="M6 14h88M130 14h88M6 34h70M148 34h70M6 54h88M130 54h88M6 74h128M146 74h36"
            strokeDasharray="1 0"
          />
        </svg>
        <span className="absolute inset-0 grid place-items-center text-red">
          <Mark name={mark} size={46} />
        </span>
      </div>
      <h2 className="text-lg">{title}</h2>
      {children ? <div className="mx-auto mt-1.5 max-w-measure px-4 text-quiet">{children}</div> : null}
      {action ? <div className="mt-5 flex flex-wrap justify-center gap-3">{action}</div> : null}
    </div>
  );
}
