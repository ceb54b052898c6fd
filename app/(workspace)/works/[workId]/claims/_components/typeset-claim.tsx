import { cx } from "@/components/cx";
import { Math } from "@/components/math";
import type { ClaimReading } from "@/lib/claims/reading";

/**
 * A claim as it would be printed: quantity = claimed value, the value in the author's pencil. A side that cannot be
 * read is shown as it was typed.
 */
export function TypesetClaim({
  quantity,
  claimed,
  reading,
  struck = false,
  className,
}: {
  quantity: string;
  claimed: string;
  reading: ClaimReading;
  struck?: boolean;
  className?: string;
}) {
  return (
    <span
      className={cx(
        "inline-flex max-w-full flex-wrap items-center gap-x-2 gap-y-1 overflow-x-auto py-0.5",
        struck && "line-through",
        className,
      )}
    >
      <Side latex={reading.quantityLatex} text={quantity} />
      <span>=</span>
      <span className="text-blue">
        <Side latex={reading.claimedLatex} text={claimed} />
      </span>
    </span>
  );
}

function Side({ latex, text }: { latex: string | null; text: string }) {
  return latex === null ? (
    <code className="font-mono text-base break-all whitespace-pre-wrap">{text}</code>
  ) : (
    <Math latex={latex} own />
  );
}
