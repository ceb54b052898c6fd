import { showHalf } from "@/lib/symbols/half";
import type { Entry } from "../quantity-shape";
import { refuse } from "../read-error";

/** A j is a length: never negative. */
export function refuseNegative(text: string, j: Entry): void {
  if (j.value < 0) {
    refuse(
      text,
      j.at,
      j.length,
      "a j that is not negative",
      `This entry is a j, and ${showHalf(j.value)} is negative; only the m may be negative.`,
    );
  }
}
