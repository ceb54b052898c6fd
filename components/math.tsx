import { cx } from "@/components/cx";
import { typeset } from "@/lib/typeset/typeset";
import { typesetText } from "@/lib/typeset/typeset-text";
import { MathHtml } from "@/components/math-html";

/** A formula, set on the server. `own` only for LaTeX that our engine wrote (it may be longer). */
export function Math({
  latex,
  display = false,
  own = false,
  wide,
  label,
  align,
  className,
}: {
  latex: string;
  display?: boolean;
  own?: boolean;
  wide?: boolean;
  label?: string;
  align?: "start" | "centre";
  className?: string;
}) {
  return <MathHtml html={typeset(latex, { display, own })} {...{ display, wide, label, align, className }} />;
}

/** A statement: prose with formulas between `$…$` or `\(…\)`. */
export function MathText({ text, className }: { text: string; className?: string }) {
  return <MathHtml html={typesetText(text)} prose className={cx("statement", className)} />;
}
