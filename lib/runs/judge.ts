import { evidence as evidenceOf, type Evidence } from "@/lib/symbols/quantity";
import { RouteDisagreement } from "@/lib/symbols/failures";
import type { Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { verifyClaim, type Finding } from "@/lib/verify/verify-claim";

/** A claim as a run sees it: the version that it was started with. */
export type Task = { id: string; ref: string; quantity: string; claimed: string };

/** What came of it. `alarm`: the program disagrees with itself. `failed`: it broke. Neither is a verdict on the claim. */
export type Outcome =
  | { kind: "judged"; id: string; finding: Finding; evidence: Evidence | null }
  | { kind: "alarm"; id: string; says: string }
  | { kind: "failed"; id: string; says: string };

/** Characters of evidence that are kept with a finding; more than any symbol within the limits needs. */
const MOST_EVIDENCE = 400_000;

/** Judges one claim and gathers its evidence. Never throws. */
export function judge(task: Task, conventions: Conventions): Outcome {
  const { id, ref, quantity, claimed } = task;
  try {
    const finding = verifyClaim({ ref, quantity, claimed }, conventions);
    return { kind: "judged", id, finding, evidence: evidenceFor(quantity, conventions, finding) };
  } catch (error) {
    const says = error instanceof Error ? error.message : String(error);
    return { kind: error instanceof RouteDisagreement ? "alarm" : "failed", id, says };
  }
}

/** Evidence for whatever could be computed; null when the quantity has no exact value or is too large to explain. */
function evidenceFor(quantity: string, conventions: Conventions, finding: Finding): Evidence | null {
  if (finding.exact === null) return null;
  const read = readQuantity(quantity, conventions);
  if (!read.ok) return null;
  try {
    const evidence = evidenceOf(read.quantity);
    return JSON.stringify(evidence).length <= MOST_EVIDENCE ? evidence : null;
  } catch (error) {
    if (error instanceof RouteDisagreement) throw error;
    return null;
  }
}
