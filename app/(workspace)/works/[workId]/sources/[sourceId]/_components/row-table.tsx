import Link from "next/link";

import { Mark } from "@/components/marks";
import { Table } from "@/components/ui/table";
import { VerdictMark } from "@/components/verdict-mark";
import type { SourceRow } from "@/lib/sources/get-source";
import { TypesetClaim } from "../../../claims/_components/typeset-claim";

/** The rows of a source: how each is read, and what accepting it would do. */
export function RowTable({ workId, rows }: { workId: string; rows: readonly SourceRow[] }) {
  return (
    <Table
      caption="Rows of the file and what accepting them would do"
      captionHidden
      rows={rows}
      rowKey={({ line, ref }) => `${line} ${ref}`}
      empty={<p className="border-y border-rule py-6 text-quiet">No row of this kind.</p>}
      columns={[
        {
          id: "line",
          header: "Line",
          align: "end",
          cell: ({ line }) => <span className="text-quiet">{line}</span>,
        },
        {
          id: "ref",
          header: "Reference",
          rowHeader: true,
          cell: ({ ref, label, standing }) => (
            <>
              {standing ? (
                <Link className="link" href={`/works/${workId}/claims/${standing.id}`}>
                  {ref}
                </Link>
              ) : (
                <b className="font-medium break-all">{ref || "(none)"}</b>
              )}
              <span className="block text-xs text-quiet">problem {label}</span>
            </>
          ),
        },
        { id: "reading", header: "As it is read", cell: (row) => <Reading row={row} /> },
        { id: "effect", header: "Accepting it", className: "sm:w-72", cell: (row) => <EffectOf row={row} /> },
      ]}
    />
  );
}

function Reading({ row }: { row: SourceRow }) {
  return (
    <div className="grid gap-1">
      {row.effect === "replaces" && row.standing && row.standingReading ? (
        <div className="text-quiet">
          <span className="text-xs">now in the chapter</span>
          <div className="font-work text-base">
            <TypesetClaim
              quantity={row.standing.quantity}
              claimed={row.standing.claimed}
              reading={row.standingReading}
            />
          </div>
          <span className="text-xs">in the file</span>
        </div>
      ) : null}
      <div className="font-work text-lg">
        <TypesetClaim quantity={row.quantity} claimed={row.claimed} reading={row.reading} />
      </div>
      {row.written ? (
        <p className="text-xs text-amber">
          rewritten for the sheet; in the file:{" "}
          <code className="font-mono break-all">{`${row.written.quantity} = ${row.written.claimed}`}</code>
        </p>
      ) : null}
      {row.note || row.page ? (
        <p className="font-work text-sm text-blue italic">
          {[row.note, row.page && `page ${row.page}`].filter(Boolean).join(" · ")}
        </p>
      ) : null}
      {row.reading.errors.map((error) => (
        <p key={error.field} className="text-red">
          {error.field === "quantity" ? "Quantity" : "Claimed value"}, character {error.at + 1}: {error.says}
          {error.suggestion ? (
            <>
              {" "}
              This reads: <code className="font-mono">{error.suggestion}</code>
            </>
          ) : null}
        </p>
      ))}
    </div>
  );
}

function EffectOf({ row: { effect, readable, says, line, column } }: { row: SourceRow }) {
  if (effect === "refused")
    return (
      <div className="flex gap-2 text-red">
        <Mark name="discrepant" size={16} className="mt-0.5" />
        <span>
          <b className="font-medium">cannot enter.</b> Line {line}, column {column}: {says}
        </span>
      </div>
    );
  const what =
    effect === "adds" ? "a new claim" : effect === "replaces" ? "replaces the claim" : "changes nothing";
  return (
    <div className="grid gap-0.5">
      <span className="flex items-center gap-2">
        <Mark
          name={effect === "adds" ? "insert" : effect === "replaces" ? "correct" : "stet"}
          size={16}
          className={effect === "nothing" ? "text-quiet" : "text-blue"}
        />
        <span className={effect === "nothing" ? "text-quiet" : undefined}>{what}</span>
      </span>
      {readable ? null : <VerdictMark verdict="unreadable" withWord size={16} />}
      {says ? <span className="text-xs text-quiet">{says}</span> : null}
    </div>
  );
}
