import { stringify } from "csv-stringify/sync";

import type { Exported, KeyClaim, KeyContent } from "@/lib/keys/key-content";

/** The columns of a key file, and no others: what is exported can be read again as a key. */
const COLUMNS = ["ref", "quantity", "claimed", "note", "problem", "page"] as const;

const PLAIN_NUMBER = /^-?\d+(\.\d+)?(\/\d+)?$/;

/**
 * The key as CSV by RFC 4180, one row an answer. `claimed` is the answer as it is printed; the note says what was
 * recomputed, how it was settled, of which key the row is, and who made the file.
 */
export function keyAsCsv(content: KeyContent, sha256: string, made: Exported): string {
  const origin = `key ${content.number} (SHA-256 ${sha256.slice(0, 16)}), exported ${made.at} by ${made.by}`;
  const rows = content.claims.map((claim): Record<(typeof COLUMNS)[number], string> => ({
    ref: safeCell(claim.ref),
    quantity: safeCell(safeValue(claim.quantity)),
    claimed: safeCell(safeValue(claim.answer.text)),
    note: safeCell([...remarks(claim), origin].join("; ").slice(0, 500)),
    problem: safeCell(claim.problem),
    page: safeCell(claim.page ?? ""),
  }));
  return stringify(rows, { header: true, columns: [...COLUMNS], record_delimiter: "windows" });
}

function remarks({ verdict, value, settlement, waiver }: KeyClaim): string[] {
  const decimal = value ? `recomputed ${value.text} = ${value.decimal}` : "nothing recomputed";
  if (waiver) return [verdict, `waived by ${waiver.by}: ${waiver.reason.slice(0, 120)}`];
  if (!settlement) return [verdict, decimal];
  const relies = settlement.convention ? ` (${settlement.convention.slice(0, 100)})` : "";
  return [verdict, decimal, `${settlement.word}${relies} by ${settlement.by}, ${settlement.at.slice(0, 10)}`];
}

/**
 * A value that a spreadsheet would take for a formula gets a minus sign in print (U+2212), which the product reads like
 * the hyphen; a leading plus says nothing and is left out. Plain numbers such as -3 or -1/2 stay as they are.
 */
function safeValue(text: string): string {
  if (PLAIN_NUMBER.test(text)) return text;
  return text.replace(/^\s*\+\s*/, "").replace(/^-/, "−");
}

/** Any other cell that begins like a formula is marked as text by an apostrophe, as spreadsheets do. */
function safeCell(text: string): string {
  return /^[=+\-@\t\r＝＋－＠|]/u.test(text) && !PLAIN_NUMBER.test(text) ? `'${text}` : text;
}
