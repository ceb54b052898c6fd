"use client";

import { useEffect, useRef } from "react";

export type SummaryItem = { field?: string; message: string };

/**
 * What must be mended before a form can be saved: at the head of the form, with focus moved to it, each line leading to
 * its field by the field's id. Give a new `key` (a count of attempts) to have focus moved again.
 */
export function ErrorSummary({
  items,
  title = "This was not saved yet",
}: {
  items: readonly SummaryItem[];
  title?: string;
}) {
  const ref = useRef<HTMLDivElement>(null);
  const shown = items.length > 0;
  useEffect(() => {
    if (shown) ref.current?.focus();
  }, [shown]);
  if (!shown) return null;
  return (
    <div
      ref={ref}
      tabIndex={-1}
      role="alert"
      aria-labelledby="error-summary-title"
      className="border-2 border-red bg-sheet px-5 py-4 font-ui text-sm"
    >
      <h2 id="error-summary-title" className="font-ui text-base font-medium text-red">
        {title}
      </h2>
      <ul className="mt-2 grid gap-1">
        {items.map((item) => (
          <li key={`${item.field ?? ""}${item.message}`}>
            {item.field ? (
              <a
                href={`#${item.field}`}
                className="inline-flex min-h-6 items-center text-red underline underline-offset-4"
                onClick={(event) => {
                  const target = document.getElementById(item.field ?? "");
                  if (!target) return;
                  event.preventDefault();
                  target.scrollIntoView({ block: "center" });
                  target.focus();
                }}
              >
                {item.message}
              </a>
            ) : (
              <span className="text-red">{item.message}</span>
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}
