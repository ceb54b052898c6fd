import type { ReactNode } from "react";

import { cx } from "@/components/cx";
import { TONE_TEXT, type Tone } from "@/components/words";

/** A short word about a thing, such as a role or a format: small capitals between hairlines, not a pill. */
export function Tag({
  tone = "quiet",
  className,
  children,
}: {
  tone?: Tone;
  className?: string;
  children: ReactNode;
}) {
  return (
    <span
      className={cx(
        "small-caps inline-block border-x border-current px-1.5 text-base leading-none whitespace-nowrap",
        TONE_TEXT[tone],
        className,
      )}
    >
      {children}
    </span>
  );
}
