import { Time } from "@/components/ui/time";
import type { HistoryLine } from "@/lib/flags/flag-history";

/** What happened to the flag, from the audit of the work. */
export function History({ lines }: { lines: readonly HistoryLine[] }) {
  return (
    <ol className="grid gap-2.5 font-ui text-sm">
      {lines.map((line) => (
        <li key={line.id} className="border-l border-edge pl-3">
          <span className="block break-words">
            <b className="font-medium">{line.who}</b> {line.says}
          </span>
          <span className="text-xs text-quiet">
            <Time at={line.at} withClock />
          </span>
        </li>
      ))}
    </ol>
  );
}
