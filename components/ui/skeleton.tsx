import { cx } from "@/components/cx";

const WIDTHS = ["92%", "78%", "86%", "64%", "81%", "70%"];

/** Lines of type not yet set. */
export function SkeletonLines({ lines = 3, className }: { lines?: number; className?: string }) {
  return (
    <div aria-hidden="true" className={cx("grid gap-3", className)}>
      {Array.from({ length: lines }, (_, i) => (
        <span key={i} className="unset h-3.5" style={{ width: WIDTHS[i % WIDTHS.length] }} />
      ))}
    </div>
  );
}

/** One block of a given size, such as a heading or a strip. */
export function SkeletonBlock({ className }: { className?: string }) {
  return <span aria-hidden="true" className={cx("unset", className)} />;
}

/** A page on its way: its heading, then `rows` ruled rows. Says "Loading" to a screen reader once. */
export function SkeletonPage({ rows = 6, label = "Loading" }: { rows?: number; label?: string }) {
  return (
    <div role="status" aria-label={label}>
      <SkeletonBlock className="mb-3 h-4 w-40" />
      <SkeletonBlock className="mb-8 h-9 w-80 max-w-full" />
      <div aria-hidden="true" className="border-t-2 border-ink">
        {Array.from({ length: rows }, (_, i) => (
          <div key={i} className="grid grid-cols-[5rem_1fr_6rem] gap-6 border-b border-rule py-4">
            <SkeletonBlock className="h-4" />
            <span className="unset h-4" style={{ width: WIDTHS[i % WIDTHS.length] }} />
            <SkeletonBlock className="h-4" />
          </div>
        ))}
      </div>
    </div>
  );
}
