import { cx } from "@/components/cx";

/** The name under its own radical: the surd's hook is the examiner's tick, in red pencil. */
export function Wordmark({ size = "medium", className }: { size?: "medium" | "large"; className?: string }) {
  const large = size === "large";
  return (
    <span
      className={cx(
        "inline-flex items-stretch font-work leading-none whitespace-nowrap text-ink",
        large ? "text-4xl sm:text-[4rem]" : "text-xl",
        className,
      )}
    >
      <svg
        viewBox="0 0 22 36"
        className="h-[1.32em] w-[0.8em] overflow-visible text-red"
        fill="none"
        stroke="currentColor"
        aria-hidden="true"
      >
        <path d="M1.5 21.5 6 18.8" strokeWidth="1.5" strokeLinecap="round" />
        <path d="m5.8 18.6 5.4 14.2" strokeWidth="3" strokeLinecap="round" />
        <path d="M11.3 33.5 22 .9" strokeWidth="1.5" strokeLinecap="square" />
      </svg>
      <span className="relative pt-[0.2em] pr-[0.1em] pl-[0.06em]">
        <span aria-hidden="true" className="absolute inset-x-0 top-0 h-[0.055em] min-h-px bg-red" />
        Surdmark
      </span>
    </span>
  );
}
