"use client";

import { useEffect, useRef, type ReactNode } from "react";

import { cx } from "@/components/cx";

/**
 * A short list of places or presses under a label. Built on the browser's disclosure, so it opens without script; with
 * script it also closes on Escape, on a click outside and after a choice.
 */
export function Menu({
  label,
  children,
  align = "end",
  className,
}: {
  label: ReactNode;
  children: ReactNode;
  align?: "start" | "end";
  className?: string;
}) {
  const ref = useRef<HTMLDetailsElement>(null);
  useEffect(() => {
    const outside = (event: Event) => {
      const menu = ref.current;
      if (menu?.open && event.target instanceof Node && !menu.contains(event.target)) menu.open = false;
    };
    document.addEventListener("pointerdown", outside);
    document.addEventListener("focusin", outside);
    return () => {
      document.removeEventListener("pointerdown", outside);
      document.removeEventListener("focusin", outside);
    };
  }, []);
  return (
    <details
      ref={ref}
      className={cx("group relative font-ui text-sm", className)}
      onKeyDown={(event) => {
        if (event.key === "Escape" && ref.current?.open) {
          ref.current.open = false;
          ref.current.querySelector("summary")?.focus();
        }
      }}
    >
      <summary className="flex min-h-11 items-center gap-2 px-1 hover:text-blue">
        {label}
        <svg
          viewBox="0 0 10 7"
          width="10"
          height="7"
          aria-hidden="true"
          className="transition-transform group-open:rotate-180"
        >
          <path d="m1 1 4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.4" />
        </svg>
      </summary>
      <div
        className={cx(
          "absolute z-30 min-w-60 border border-edge bg-sheet py-1 text-ink shadow-lift",
          align === "end" ? "right-0" : "left-0",
        )}
        onClick={(event) => {
          if ((event.target as HTMLElement).closest("a") && ref.current) ref.current.open = false;
        }}
      >
        {children}
      </div>
    </details>
  );
}
