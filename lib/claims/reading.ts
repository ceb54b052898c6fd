import { TooCostly } from "@/lib/symbols/failures";
import { orbit } from "@/lib/symbols/quantity";
import type { Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { readValue } from "@/lib/verify/read-value";
import type { ReadError } from "@/lib/verify/read-error";

export type ReadingError = ReadError & { field: "quantity" | "claimed" };

/** How the typed texts of one claim are read: each side in LaTeX, or null with its error. Nothing is judged. */
export type ClaimReading = {
  quantityLatex: string | null;
  claimedLatex: string | null;
  errors: ReadingError[];
};

/** Reads both sides of a claim by the conventions of its work. */
export function readClaim(quantity: string, claimed: string, conventions: Conventions): ClaimReading {
  const left = readQuantity(quantity, conventions);
  const right = readValue(claimed, conventions);
  const errors: ReadingError[] = [];
  if (!left.ok) errors.push({ field: "quantity", ...left.error });
  if (!right.ok) errors.push({ field: "claimed", ...right.error });
  return { quantityLatex: left.ok ? left.latex : null, claimedLatex: right.ok ? right.latex : null, errors };
}

/** The key under which the symbol stands with its relatives; null when it cannot be read or is past the engine's limit. */
export function orbitKeyOf(quantity: string, conventions: Conventions): string | null {
  const read = readQuantity(quantity, conventions);
  if (!read.ok) return null;
  try {
    return orbit(read.quantity).key;
  } catch (error) {
    if (error instanceof TooCostly) return null;
    throw error;
  }
}
