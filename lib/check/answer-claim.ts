import { z } from "zod";
import { ConventionsInput } from "@/lib/key-files/key-schema";
import { withoutHoles } from "@/lib/key-files/json";
import { TooCostly } from "@/lib/symbols/failures";
import { LIMITS, evidence, type Evidence } from "@/lib/symbols/quantity";
import { findingView, type FindingView } from "@/lib/typeset/finding-view";
import { typeset } from "@/lib/typeset/typeset";
import { BUDGET } from "@/lib/verify/budget";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";
import type { Finding } from "@/lib/verify/finding";
import { readQuantity } from "@/lib/verify/read-quantity";
import { verifyClaim } from "@/lib/verify/verify-claim";

/** What a person may have worked out while they type; a run has larger limits. */
export const LIVE_LIMITS = { bytes: 32 * 1024, largestJ: 100, explainedJ: 30 } as const;

/** One claim as the live form sends it. */
export const LiveClaim = z.strictObject({
  quantity: z
    .string({ error: "“quantity” must be a string." })
    .max(BUDGET.text + 1, "The quantity is too long."),
  claimed: z
    .string({ error: "“claimed” must be a string." })
    .max(BUDGET.text + 1, "The claimed value is too long."),
  conventions: ConventionsInput.nullish(),
});

export type ClaimAnswer = FindingView<Finding>;

/** Verifies one claim and sets its formulas, for the live form and the front page. */
export function answerClaim({
  quantity,
  claimed,
  conventions: stated,
}: z.output<typeof LiveClaim>): ClaimAnswer {
  const conventions = { ...DEFAULT_CONVENTIONS, ...withoutHoles(stated ?? undefined) };
  const finding = verifyClaim({ ref: "", quantity, claimed }, conventions, {
    largestJ: LIVE_LIMITS.largestJ,
  });
  const reason =
    finding.verdict === "undecided" && finding.errors.length === 0
      ? `${finding.reason} A run of a chapter works them out up to ${LIMITS.largestJ.toLocaleString("en-GB")}.`
      : finding.reason;
  const view = findingView({ ...finding, reason }, evidenceFor(finding, conventions));
  // The quantity is shown as read even while its value cannot be: it may not be written yet.
  const read = finding.reading ? null : readQuantity(quantity, conventions);
  return read?.ok ? { ...view, html: { ...view.html, quantity: typeset(read.latex, { own: true }) } } : view;
}

function evidenceFor(finding: Finding, conventions: Conventions): Evidence | null {
  const read = finding.exact ? readQuantity(finding.quantity, conventions) : null;
  if (!read?.ok || read.quantity.args.some((arg) => Math.abs(arg) > 2 * LIVE_LIMITS.explainedJ)) return null;
  try {
    return evidence(read.quantity);
  } catch (error) {
    if (error instanceof TooCostly) return null;
    throw error;
  }
}
