import { stringify } from "csv-stringify/sync";

import type { Exported, KeyContent } from "@/lib/keys/key-content";

const COLUMNS = [
  "ref",
  "quantity",
  "claimed",
  "problem",
  "page",
  "chapter",
  "answer",
  "value",
  "decimal",
  "verdict",
  "settled",
  "settled_by",
  "settled_at",
  "reason",
  "convention",
  "key",
  "key_sha256",
  "exported_by",
  "exported_at",
] as const;

const PLAIN_NUMBER = /^-?\d+(\.\d+)?(\/\d+)?$/;

/**
 * The key as CSV by RFC 4180, one row a claim, readable again as a key by its first three columns. The last columns say
 * of which key it is and who made the file.
 */
export function keyAsCsv(content: KeyContent, sha256: string, made: Exported): string {
  const rows = content.claims.map((claim): Record<(typeof COLUMNS)[number], string> => ({
    ref: claim.ref,
    quantity: safeValue(claim.quantity),
    claimed: safeValue(claim.claimed),
    problem: claim.problem,
    page: claim.page ?? "",
    chapter: claim.chapter,
    answer: safeValue(claim.answer.text),
    value: safeValue(claim.value?.text ?? ""),
    decimal: claim.value?.decimal ?? "",
    verdict: claim.verdict,
    settled: claim.waiver ? "waived" : (claim.settlement?.word ?? ""),
    settled_by: claim.waiver?.by ?? claim.settlement?.by ?? "",
    settled_at: claim.waiver?.at ?? claim.settlement?.at ?? "",
    reason: claim.waiver?.reason ?? claim.settlement?.reason ?? "",
    convention: claim.settlement?.convention ?? "",
    key: content.number,
    key_sha256: sha256,
    exported_by: made.by,
    exported_at: made.at,
  }));
  const safe = rows.map((row) =>
    Object.fromEntries(Object.entries(row).map(([name, text]) => [name, safeCell(text)])),
  );
  return stringify(safe, {
    header: true,
    columns: [...COLUMNS],
    record_delimiter: "windows",
    escape_formulas: false,
  });
}

/**
 * A value that a spreadsheet would take for a formula gets a minus sign in print (U+2212), which the product reads like
 * the hyphen; a leading plus says nothing and is left out. Plain numbers stay as they are.
 */
function safeValue(text: string): string {
  if (PLAIN_NUMBER.test(text)) return text;
  return text.replace(/^\s*\+\s*/, "").replace(/^-/, "−");
}

/** Any other cell that begins like a formula is marked as text by an apostrophe, as spreadsheets do. */
function safeCell(text: string): string {
  return /^[=+\-@\t\r＝＋－＠|]/u.test(text) && !PLAIN_NUMBER.test(text) ? `'${text}` : text;
}
