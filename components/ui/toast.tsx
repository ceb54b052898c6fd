"use client";

import { createContext, useCallback, useContext, useMemo, useRef, useState, type ReactNode } from "react";

import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";

type Toast = {
  id: number;
  kind: "ok" | "error";
  message: string;
  action?: { label: string; run: () => void };
};
type Say = (message: string, options?: { kind?: "ok" | "error"; action?: Toast["action"] }) => void;

const ToastContext = createContext<Say>(() => undefined);

/** Says something short about what was just done: `const say = useToast(); say("Saved.")`. */
export function useToast(): Say {
  return useContext(ToastContext);
}

/** Holds the region where short messages appear. They stay long enough to read and can be put away. */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [toasts, setToasts] = useState<Toast[]>([]);
  const next = useRef(1);
  const drop = useCallback((id: number) => setToasts((all) => all.filter((toast) => toast.id !== id)), []);
  const say = useCallback<Say>(
    (message, options) => {
      const id = next.current++;
      setToasts((all) => [
        ...all.slice(-2),
        { id, kind: options?.kind ?? "ok", message, action: options?.action },
      ]);
      setTimeout(() => drop(id), options?.action ? 15_000 : 7_000);
    },
    [drop],
  );
  const value = useMemo(() => say, [say]);
  return (
    <ToastContext.Provider value={value}>
      {children}
      <div
        role="status"
        aria-live="polite"
        className="no-print pointer-events-none fixed inset-x-4 bottom-4 z-40 grid justify-items-center gap-2 sm:justify-items-end"
      >
        {toasts.map((toast) => (
          <div
            key={toast.id}
            className={cx(
              "pointer-events-auto flex max-w-measure items-center gap-3 border bg-sheet py-2 pr-2 pl-4 font-ui text-sm shadow-lift",
              toast.kind === "error" ? "border-red" : "border-edge",
            )}
          >
            <Mark
              name={toast.kind === "error" ? "discrepant" : "confirmed"}
              className={toast.kind === "error" ? "text-red" : "text-green"}
              label={toast.kind === "error" ? "Error" : "Done"}
            />
            <span>{toast.message}</span>
            {toast.action ? (
              <button
                type="button"
                className="min-h-9 px-2 text-blue underline underline-offset-4"
                onClick={() => {
                  toast.action?.run();
                  drop(toast.id);
                }}
              >
                {toast.action.label}
              </button>
            ) : null}
            <button
              type="button"
              aria-label="Put this message away"
              className="grid size-9 place-items-center text-quiet hover:text-ink"
              onClick={() => drop(toast.id)}
            >
              <Mark name="close" size={14} />
            </button>
          </div>
        ))}
      </div>
    </ToastContext.Provider>
  );
}
