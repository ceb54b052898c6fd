import type { ReactNode } from "react";

import { cx } from "@/components/cx";
import { Mark, type MarkName } from "@/components/marks";
import { TONE_TEXT, TONE_WASH, type Tone } from "@/components/words";

export type NoticeKind = "info" | "ok" | "warn" | "error";

const KINDS: Record<NoticeKind, { mark: MarkName; word: string; tone: Tone; rule: string }> = {
  info: { mark: "info", word: "Note", tone: "blue", rule: "border-blue" },
  ok: { mark: "confirmed", word: "Done", tone: "green", rule: "border-green" },
  warn: { mark: "warning", word: "Take care", tone: "amber", rule: "border-amber" },
  error: { mark: "discrepant", word: "Error", tone: "red", rule: "border-red" },
};

/** Something a person should know, with a mark and a word for its kind. `live` announces it when it appears. */
export function Notice({
  kind = "info",
  title,
  children,
  action,
  live = false,
  className,
}: {
  kind?: NoticeKind;
  title?: ReactNode;
  children?: ReactNode;
  action?: ReactNode;
  live?: boolean;
  className?: string;
}) {
  const { mark, word, tone, rule } = KINDS[kind];
  return (
    <div
      role={live ? (kind === "error" ? "alert" : "status") : undefined}
      className={cx("flex gap-3 border-l-3 px-4 py-3 font-ui text-sm", rule, TONE_WASH[tone], className)}
    >
      <Mark name={mark} size={18} className={cx("mt-0.5", TONE_TEXT[tone])} />
      <div className="min-w-0 flex-1">
        <p className={cx("font-medium", TONE_TEXT[tone])}>{title ?? word}</p>
        {children ? <div className="mt-0.5 text-ink">{children}</div> : null}
        {action ? <div className="mt-2.5 flex flex-wrap gap-3">{action}</div> : null}
      </div>
    </div>
  );
}
