"use client";

import { useEffect, useId, useRef, type ReactNode } from "react";

import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";

/**
 * A question that must be answered before going on. The browser's own modal dialog: focus stays inside, Escape closes
 * it, the rest of the page is inert, and focus returns to what opened it.
 */
export function Dialog({
  open,
  onClose,
  title,
  children,
  footer,
  wide = false,
}: {
  open: boolean;
  onClose: () => void;
  title: ReactNode;
  children: ReactNode;
  footer?: ReactNode;
  wide?: boolean;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  const id = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (!dialog) return;
    if (open && !dialog.open) {
      if (typeof dialog.showModal === "function") dialog.showModal();
      else dialog.setAttribute("open", "");
    }
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={ref}
      aria-labelledby={`${id}-title`}
      onClose={onClose}
      onClick={(event) => {
        if (event.target === event.currentTarget) onClose();
      }}
      className={cx(
        "m-auto max-h-[88dvh] w-[calc(100vw-2rem)] overflow-visible border border-edge bg-sheet p-0 text-ink shadow-lift backdrop:bg-ink/45",
        wide ? "max-w-sheet" : "max-w-measure",
      )}
    >
      {open ? (
        <div className="max-h-[88dvh] overflow-y-auto">
          <header className="flex items-start justify-between gap-4 border-b border-rule px-6 pt-5 pb-3">
            <h2 id={`${id}-title`} className="text-xl">
              {title}
            </h2>
            <button
              type="button"
              onClick={onClose}
              className="-mr-2 grid size-9 place-items-center text-quiet hover:text-ink"
              aria-label="Close"
            >
              <Mark name="close" size={16} />
            </button>
          </header>
          <div className="px-6 py-5">{children}</div>
          {footer ? (
            <footer className="flex flex-wrap justify-end gap-3 border-t border-rule px-6 py-4">
              {footer}
            </footer>
          ) : null}
        </div>
      ) : null}
    </dialog>
  );
}
