import { createHash } from "node:crypto";
import { keyOf } from "@/lib/claims/text";
import type { ReadRow } from "./read-rows";

/** A claim that stands in the work under a ref of the file. */
export type Standing = {
  id: string;
  ref: string;
  chapterId: string;
  label: string;
  current: number;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  withdrawn: boolean;
};

/** What accepting the file would do with a row. */
export type Effect = "adds" | "replaces" | "nothing" | "refused";

export type PlannedRow = ReadRow & {
  effect: Effect;
  /** why it is refused, or what a person should know of it */
  says: string | null;
  /** both sides could be read by the work's conventions */
  readable: boolean;
  standing: Standing | null;
};

export type Plan = {
  rows: PlannedRow[];
  counts: { adds: number; replaces: number; nothing: number; refused: number; unreadable: number };
  /** the same as long as accepting would do the same */
  fingerprint: string;
};

/**
 * Decides for each row what accepting it would do: add a claim, replace one, change nothing, or be refused with the
 * reason. A ref that the file gives twice with different content is refused each time, since nobody can tell which is
 * meant.
 */
export function planRows(
  rows: readonly ReadRow[],
  standing: ReadonlyMap<string, Standing>,
  chapterId: string,
): Plan {
  const byRef = new Map<string, ReadRow[]>();
  for (const row of rows) byRef.set(keyOf(row.ref), [...(byRef.get(keyOf(row.ref)) ?? []), row]);
  const planned = rows.map((row): PlannedRow => {
    const key = keyOf(row.ref);
    const claim = standing.get(key) ?? null;
    const readable = row.reading.errors.length === 0;
    return { ...row, ...decide(row, byRef.get(key) ?? [row], claim, chapterId), readable, standing: claim };
  });
  const count = (effect: Effect) => planned.filter((row) => row.effect === effect).length;
  return {
    rows: planned,
    counts: {
      adds: count("adds"),
      replaces: count("replaces"),
      nothing: count("nothing"),
      refused: count("refused"),
      unreadable: planned.filter((row) => !row.readable && enters(row)).length,
    },
    fingerprint: fingerprintOf(planned),
  };
}

/** Whether accepting may write this row. */
export const enters = (row: Pick<PlannedRow, "effect">) => row.effect === "adds" || row.effect === "replaces";

type Decision = Pick<PlannedRow, "effect" | "says">;

function decide(
  row: ReadRow,
  sameRef: readonly ReadRow[],
  claim: Standing | null,
  chapterId: string,
): Decision {
  if (row.trouble) return { effect: "refused", says: row.trouble };
  const [first = row] = sameRef;
  if (sameRef.some((other) => !sameText(other, first)))
    return {
      effect: "refused",
      says: `${row.ref} stands on lines ${inWords(sameRef.map(({ line }) => line))} with different content; keep one of them.`,
    };
  if (first !== row) return { effect: "nothing", says: `The same as line ${first.line}.` };
  if (!claim) return { effect: "adds", says: null };
  if (claim.chapterId !== chapterId)
    return { effect: "refused", says: `${row.ref} is already a claim of another chapter of this work.` };
  if (claim.withdrawn)
    return { effect: "refused", says: `${row.ref} was withdrawn. Restore it first, then accept this row.` };
  const kept = claim.label === row.label ? null : `It stays with problem ${claim.label}.`;
  return unchanged(row, claim) ? { effect: "nothing", says: null } : { effect: "replaces", says: kept };
}

const sameText = (a: ReadRow, b: ReadRow) =>
  a.quantity === b.quantity && a.claimed === b.claimed && a.note === b.note && a.page === b.page;

/** A file without a note or a page says nothing about them: what stands there stays. */
const unchanged = (row: ReadRow, claim: Standing) =>
  row.quantity === claim.quantity &&
  row.claimed === claim.claimed &&
  (row.note === null || row.note === claim.note) &&
  (row.page === null || row.page === claim.page);

function inWords(numbers: readonly number[]): string {
  const shown = numbers.slice(0, 5).map(String);
  if (numbers.length > 5) return `${shown.join(", ")} and ${numbers.length - 5} more`;
  return `${shown.slice(0, -1).join(", ")} and ${shown.at(-1) ?? ""}`;
}

function fingerprintOf(rows: readonly PlannedRow[]): string {
  const hash = createHash("sha256");
  for (const { ref, quantity, claimed, label, effect, standing } of rows)
    hash.update(
      JSON.stringify([
        ref,
        quantity,
        claimed,
        label,
        effect,
        standing?.id,
        standing?.current,
        standing?.withdrawn,
      ]),
    );
  return hash.digest("hex");
}
