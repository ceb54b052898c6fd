import Link from "next/link";
import type { ComponentProps, ReactNode } from "react";

import { cx } from "@/components/cx";

export type ButtonVariant = "primary" | "quiet" | "blue" | "red" | "danger";
export type ButtonSize = "small" | "medium" | "large";

const VARIANT: Record<ButtonVariant, string> = {
  primary: "bg-ink text-sheet border-ink hover:bg-quiet hover:border-quiet",
  quiet: "bg-transparent text-ink border-edge hover:bg-sunk",
  blue: "bg-transparent text-blue border-blue hover:bg-blue-wash",
  red: "bg-transparent text-red border-red hover:bg-red-wash",
  danger: "bg-red text-sheet border-red hover:bg-ink hover:border-ink",
};

const SIZE: Record<ButtonSize, string> = {
  small: "min-h-8 px-3 text-xs",
  medium: "min-h-11 px-4 text-sm",
  large: "min-h-12 px-6 text-base",
};

function look(variant: ButtonVariant, size: ButtonSize, className?: string): string {
  return cx(
    "inline-flex items-center justify-center gap-2 rounded-sm border font-ui font-medium no-underline transition-colors",
    "disabled:cursor-not-allowed disabled:opacity-55 aria-disabled:cursor-not-allowed aria-disabled:opacity-55",
    VARIANT[variant],
    SIZE[size],
    className,
  );
}

type ButtonProps = ComponentProps<"button"> & {
  variant?: ButtonVariant;
  size?: ButtonSize;
  /** Work is under way: the button stays where it is, says so, and refuses a second press. */
  pending?: boolean;
  pendingLabel?: string;
  mark?: ReactNode;
};

/** A press. `primary` is the one next step of a page; `blue` is the author's pencil, `red` the verifier's. */
export function Button({
  variant = "quiet",
  size = "medium",
  pending = false,
  pendingLabel,
  mark,
  className,
  children,
  type = "button",
  disabled,
  ...rest
}: ButtonProps) {
  return (
    <button
      type={type}
      className={look(variant, size, className)}
      disabled={disabled || pending}
      aria-busy={pending || undefined}
      {...rest}
    >
      {pending ? <PendingDots /> : mark}
      {pending && pendingLabel ? pendingLabel : children}
    </button>
  );
}

type LinkButtonProps = ComponentProps<typeof Link> & {
  variant?: ButtonVariant;
  size?: ButtonSize;
  mark?: ReactNode;
};

/** A link that looks like a press: it goes somewhere and changes nothing. */
export function LinkButton({
  variant = "quiet",
  size = "medium",
  mark,
  className,
  children,
  ...rest
}: LinkButtonProps) {
  return (
    <Link className={look(variant, size, className)} {...rest}>
      {mark}
      {children}
    </Link>
  );
}

/** Like LinkButton, for a file to download (a plain anchor, so that no page is prefetched). */
export function DownloadButton({
  variant = "quiet",
  size = "medium",
  mark,
  className,
  children,
  ...rest
}: ComponentProps<"a"> & { variant?: ButtonVariant; size?: ButtonSize; mark?: ReactNode }) {
  return (
    <a className={look(variant, size, className)} download {...rest}>
      {mark}
      {children}
    </a>
  );
}

function PendingDots() {
  return (
    <svg viewBox="0 0 18 6" width="18" height="6" aria-hidden="true" fill="currentColor">
      {[3, 9, 15].map((x, i) => (
        <circle
          key={x}
          cx={x}
          cy="3"
          r="1.8"
          style={{ animation: `unset-type 0.7s ${i * 0.2}s infinite alternate` }}
        />
      ))}
    </svg>
  );
}
