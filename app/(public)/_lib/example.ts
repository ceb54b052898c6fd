import { answerClaim } from "@/lib/check/answer-claim";

/** A claim with the commonest of slips in it: the Clebsch-Gordan coefficient given for the 3j symbol. */
export const EXAMPLE = { quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/3)" };

/** The verifier's answer to the example, worked out here and now like every other. */
export function exampleAnswer() {
  return answerClaim(EXAMPLE);
}
