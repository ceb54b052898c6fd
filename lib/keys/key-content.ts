import { createHash } from "node:crypto";
import canonicalize from "canonicalize";

import type { Conventions } from "@/lib/verify/conventions";
import type { Verdict } from "@/models/finding";
import type { SettleWord } from "@/models/settlement";
import type { WorkKind } from "@/models/work";

/** How a flag on a claim was settled, as a key keeps it. */
export type KeySettlement = {
  word: SettleWord;
  reason: string | null;
  convention: string | null;
  by: string;
  at: string;
};

/** One answer of a key. Every number is text: RFC 8785 would round a long one. */
export type KeyClaim = {
  id: string;
  chapter: string;
  problem: string;
  ref: string;
  page: string | null;
  quantity: string;
  quantityLatex: string | null;
  /** as the author typed it */
  claimed: string;
  claimedLatex: string | null;
  /** what is printed: the claimed value, or its house form where it was right in another one */
  answer: { text: string; latex: string | null };
  /** what was recomputed when the key was frozen; null where nothing could be */
  value: { text: string; latex: string; decimal: string } | null;
  verdict: Verdict;
  settlement: KeySettlement | null;
  waiver: { reason: string; by: string; at: string } | null;
};

/** Who made an export and when: stands in it, outside what is hashed. */
export type Exported = { by: string; at: string };

/** What a frozen key says. Its canonical JSON is stored, hashed, and never changed. */
export type KeyContent = {
  format: "surdmark-key-1";
  work: { title: string; kind: WorkKind };
  number: string;
  frozenAt: string;
  frozenBy: string;
  /** version of the program that recomputed the values */
  engine: string;
  conventions: Conventions;
  conventionsVersion: string;
  /** the key before this one */
  previous: { number: string; sha256: string } | null;
  chapters: { number: string; title: string }[];
  claims: KeyClaim[];
  /** claims that were taken out by settling a flag or by hand */
  withdrawn: { chapter: string; problem: string; ref: string; settlement: KeySettlement | null }[];
};

/** Canonical JSON by RFC 8785. @throws Error when the content holds a number, which belongs in it as text */
export function canonicalJson(content: KeyContent): string {
  refuseNumbers(content, "");
  const text = canonicalize(content);
  if (text === undefined) throw new Error("A key's content must be JSON.");
  return text;
}

export const sha256 = (text: string): string => createHash("sha256").update(text, "utf8").digest("hex");

function refuseNumbers(value: unknown, path: string): void {
  if (typeof value === "number" || typeof value === "bigint")
    throw new Error(`A key holds numbers as text only: ${path}`);
  if (typeof value === "object" && value !== null)
    for (const [name, inner] of Object.entries(value)) refuseNumbers(inner, `${path}/${name}`);
}
