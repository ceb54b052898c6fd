import { evidence } from "@/lib/symbols/quantity";
import { findingView } from "@/lib/typeset/finding-view";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { verifyClaim } from "@/lib/verify/verify-claim";

/** A claim with the commonest of slips in it: the Clebsch-Gordan coefficient given for the 3j symbol. */
export const EXAMPLE = { quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/3)" };

/** The verifier's answer to the example, computed here and now like every other. */
export function exampleAnswer() {
  const finding = verifyClaim({ ref: "example", ...EXAMPLE }, DEFAULT_CONVENTIONS);
  const reading = readQuantity(EXAMPLE.quantity, DEFAULT_CONVENTIONS);
  return findingView(finding, reading.ok ? evidence(reading.quantity) : null);
}
