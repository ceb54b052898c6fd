import { cx } from "@/components/cx";
import { Math } from "@/components/math";
import { ScrollBox } from "@/components/ui/scroll-box";
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
    <ScrollBox
      label="the claim"
      className={cx(
        "inline-flex flex-wrap items-center gap-x-2 gap-y-1 py-0.5",
        struck && "line-through",
        className,
      )}
    >
      <Side latex={reading.quantityLatex} text={quantity} />
      <span>=</span>
      <span className="text-blue">
        <Side latex={reading.claimedLatex} text={claimed} />
      </span>
    </ScrollBox>
  );
}

function Side({ latex, text }: { latex: string | null; text: string }) {
  return latex === null ? (
    <code className="font-mono text-base break-all whitespace-pre-wrap">{text}</code>
  ) : (
    <Math latex={latex} own />
  );
}
