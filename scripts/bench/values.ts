import { multiply, sign } from "@/lib/symbols/exact";
import { toText as valueText } from "@/lib/symbols/exact-print";
import { evaluate, quantityText, type Quantity } from "@/lib/symbols/quantity";
import type { SignedSquare } from "./sympy";

/** Whether the engine's value has the sign and the square that another program found. */
export function equals(q: Quantity, [theirSign, theirSquare]: SignedSquare): boolean {
  const value = evaluate(q);
  return sign(value) === theirSign && valueText(multiply(value, value)) === theirSquare;
}

export const toText = (q: Quantity): string => quantityText(q, "j1m1j2m2");
