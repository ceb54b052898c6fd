/** How far long work has come: a rule that is inked from the left, with the figures in words. `total` 0 = not known yet. */
export function Progress({
  done,
  total,
  label,
  text,
}: {
  done: number;
  total: number;
  label: string;
  text?: string;
}) {
  const share = total > 0 ? Math.min(100, (done / total) * 100) : 0;
  const words = text ?? (total > 0 ? `${done} of ${total}` : "starting");
  return (
    <div className="font-ui text-sm">
      <div className="mb-1.5 flex justify-between gap-4">
        <span className="font-medium">{label}</span>
        <span className="tabular text-quiet">{words}</span>
      </div>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={total > 0 ? total : undefined}
        aria-valuenow={total > 0 ? done : undefined}
        aria-valuetext={words}
        className="h-2.5 border border-edge bg-sheet"
      >
        <div className="h-full bg-ink transition-[width] duration-300" style={{ width: `${share}%` }} />
      </div>
    </div>
  );
}
