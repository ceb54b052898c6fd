import { cx } from "@/components/cx";

/**
 * HTML that our own server has typeset (`typeset`, `typesetText`), and nothing else: this is the one place where markup
 * goes into a page as it is. Works on the server and in client components.
 */
export function MathHtml({
  html,
  display = false,
  prose = false,
  label,
  wide = false,
  align = "centre",
  className,
}: {
  html: string;
  display?: boolean;
  /** May be wider than its place: it scrolls in its own box, which the keyboard can then reach. */
  wide?: boolean;
  prose?: boolean;
  label?: string;
  align?: "start" | "centre";
  className?: string;
}) {
  return (
    <span
      className={cx(prose ? undefined : display ? "math-block" : "math-inline", className)}
      data-align={display ? align : undefined}
      role={label ? "math" : undefined}
      aria-label={label}
      tabIndex={display && wide ? 0 : undefined}
      dangerouslySetInnerHTML={{ __html: html }}
    />
  );
}
