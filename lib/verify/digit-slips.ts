import Fraction from "fraction.js";
import { equals, type Exact } from "@/lib/symbols/exact";
import { toDecimalPlaces } from "@/lib/symbols/exact-print";
import { BUDGET } from "./budget";
import { numbersOf, valueOf, withNumber } from "./expression";
import { signedRoot, type ClaimedValue } from "./read-value";
import { Unreadable } from "./read-error";

/** A single digit put right: what stood there, what belongs there, and how many repairs were tried in all. */
export type DigitSlip = { typed: string; meant: string; tried: number };

/**
 * Looks for one digit of the claimed value whose repair (changed, left out, put in, or exchanged with its neighbour)
 * gives the true value. Null when there is none; `tried` counts the repairs.
 */
export function digitSlip(text: string, claimed: ClaimedValue, truth: Exact): DigitSlip | { tried: number } {
  if (text.length > BUDGET.misprintText) return { tried: 0 };
  return claimed.kind === "decimal" ? inDecimal(claimed, truth) : inExact(text, claimed, truth);
}

function inExact(
  text: string,
  claimed: ClaimedValue & { kind: "exact" },
  truth: Exact,
): DigitSlip | { tried: number } {
  let tried = 0;
  for (const leaf of numbersOf(claimed.tree)) {
    if (!/^\d+$/.test(leaf.text)) continue;
    for (const meant of repairs(leaf.text)) {
      if (meant === "0" && leaf.text.length > 1) continue;
      tried += 1;
      const value = safely(() => {
        const plain = valueOf(withNumber(claimed.tree, leaf, new Fraction(BigInt(meant))), text);
        return claimed.rootUnderstood ? signedRoot(plain) : plain;
      });
      if (value && equals(value, truth)) return { typed: leaf.text, meant, tried };
    }
  }
  return { tried };
}

function inDecimal(claimed: ClaimedValue & { kind: "decimal" }, truth: Exact): DigitSlip | { tried: number } {
  const leaf = claimed.tree.type === "negative" ? claimed.tree.of : claimed.tree;
  if (leaf.type !== "number" || /e/i.test(leaf.text)) return { tried: 0 };
  const [whole = "", decimals = ""] = leaf.text.split(".");
  const size = (places: number) => toDecimalPlaces(truth, places).replace(/^-/, "").replace(/^0\./, ".");
  const positive = !toDecimalPlaces(truth, claimed.places).startsWith("-");
  let tried = 0;
  if (positive === (claimed.tree.type === "negative")) return { tried };
  for (const meant of repairs(decimals)) {
    tried += 1;
    const repaired = `${whole.replace(/^0+$/, "")}.${meant}`;
    // A repair to zeros alone would agree with any small value, and so says nothing.
    if (/[1-9]/.test(meant + whole) && size(meant.length) === repaired) {
      return { typed: leaf.text, meant: `${whole}.${meant}`, tried };
    }
  }
  return { tried };
}

/** Every number that differs from this one by a single slip of a digit; no leading zeros unless it has them. */
function repairs(digits: string): string[] {
  const all = new Set<string>();
  const leading = digits.startsWith("0");
  for (let n = 0; n <= digits.length; n++) {
    const [before, after] = [digits.slice(0, n), digits.slice(n + 1)];
    for (const d of "0123456789") {
      if (n < digits.length) all.add(before + d + after);
      all.add(before + d + digits.slice(n));
    }
    if (n < digits.length) all.add(before + after);
    if (n + 1 < digits.length)
      all.add(before + (digits[n + 1] as string) + (digits[n] as string) + digits.slice(n + 2));
  }
  all.delete(digits);
  all.delete("");
  return [...all].filter((each) => leading || each === "0" || !each.startsWith("0"));
}

function safely(work: () => Exact): Exact | null {
  try {
    return work();
  } catch (error) {
    if (error instanceof Unreadable) return null;
    throw error;
  }
}
