import { orbitKeyOf, readClaim, type ClaimReading } from "@/lib/claims/reading";
import { leadingLabel } from "@/lib/claims/propose-ref";
import { ClaimText } from "@/lib/claims/schema";
import type { KeyFile } from "@/lib/key-files/read-key-file";
import { PROBLEM_LIMITS } from "@/lib/problems/schema";
import type { Conventions } from "@/lib/verify/conventions";
import { translateRow } from "./translate";

/** By which conventions a file is read that states its own: the work's sheet, or its own, rewritten for the sheet. */
export type ConventionsChoice = "sheet" | "file";

/** One row of a key file as it would enter the work. */
export type ReadRow = {
  line: number;
  column: number;
  ref: string;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  /** the problem it goes to, by the file's own column or by the look of its ref */
  label: string;
  /** as it stands in the file, when it was rewritten for the work's sheet */
  written: { quantity: string; claimed: string } | null;
  reading: ClaimReading;
  orbitKey: string | null;
  /** why it cannot be stored at all, whatever stands in the work */
  trouble: string | null;
};

/** Rows read before others get a turn on the processor. */
const BETWEEN_TURNS = 100;

/**
 * Reads every row of a file by the conventions of the work. Long files are read in pieces, so that a web process goes
 * on answering meanwhile.
 */
export async function readRows(
  file: KeyFile,
  conventions: Conventions,
  choice: ConventionsChoice,
): Promise<ReadRow[]> {
  const own = choice === "file" && file.conventions ? { ...conventions, ...file.conventions } : null;
  const rows: ReadRow[] = [];
  for (const [i, row] of file.rows.entries()) {
    if (i % BETWEEN_TURNS === BETWEEN_TURNS - 1) await new Promise((resolve) => setImmediate(resolve));
    rows.push(readRow(row, conventions, own));
  }
  return rows;
}

function readRow(row: KeyFile["rows"][number], conventions: Conventions, own: Conventions | null): ReadRow {
  const { line, column } = row;
  const rewritten = own ? translateRow(row, own, conventions) : null;
  const typed = rewritten ?? { quantity: row.quantity, claimed: row.claimed };
  const text = ClaimText.safeParse({ ref: row.ref, ...typed, note: row.note, page: row.page });
  const kept = text.success
    ? text.data
    : {
        ref: row.ref.trim(),
        quantity: typed.quantity,
        claimed: typed.claimed,
        note: row.note,
        page: row.page,
      };
  const label = row.problem?.trim().normalize("NFC") || leadingLabel(kept.ref);
  return {
    ...kept,
    line,
    column,
    label,
    written: rewritten && { quantity: row.quantity, claimed: row.claimed },
    reading: readClaim(kept.quantity, kept.claimed, conventions),
    orbitKey: orbitKeyOf(kept.quantity, conventions),
    trouble: text.success ? troubleWithLabel(label) : troubleIn(text.error.issues),
  };
}

function troubleWithLabel(label: string): string | null {
  return label.length > PROBLEM_LIMITS.label
    ? `The problem's label may have ${PROBLEM_LIMITS.label} characters; this one has ${label.length}.`
    : null;
}

const COLUMN: Record<string, string> = {
  ref: "ref",
  quantity: "quantity",
  claimed: "claimed",
  note: "note",
  page: "page",
};

function troubleIn(issues: readonly { path: PropertyKey[]; message: string }[]): string {
  const [first] = issues;
  const column = COLUMN[String(first?.path[0])];
  return column ? `${column}: ${first?.message ?? ""}` : (first?.message ?? "This row cannot be read.");
}
