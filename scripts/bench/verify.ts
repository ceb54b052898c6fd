import { toText } from "@/lib/symbols/exact-print";
import { negate } from "@/lib/symbols/exact";
import { evaluate, quantityText } from "@/lib/symbols/quantity";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { verifyClaim } from "@/lib/verify/verify-claim";
import { allUpToSix } from "./engine";
import { time, type Timed } from "./timing";

/** The verifier's rows: right claims, wrong ones with and without diagnosis; end to end, from typed text to finding. */
export function benchVerify(): Timed[] {
  const quantities = allUpToSix().filter((q, i) => i % 250 === 7 && evaluate(q).terms.length > 0);
  const claims = (wrong: boolean) =>
    quantities.map((q) => ({
      ref: "bench",
      quantity: quantityText(q, "j1m1j2m2"),
      claimed: toText(wrong ? negate(evaluate(q)) : evaluate(q)),
    }));
  const run = (wrong: boolean, slips: boolean) => {
    const list = claims(wrong);
    return () => list.forEach((claim) => verifyClaim(claim, DEFAULT_CONVENTIONS, { slips }));
  };
  return [
    time("a right claim, symmetries included", quantities.length, run(false, true), 5),
    time("a wrong claim, without diagnosis", quantities.length, run(true, false), 5),
    time("a wrong claim, with diagnosis", quantities.length, run(true, true), 3),
  ];
}
