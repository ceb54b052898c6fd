import { asRational, equals, isZero, type Exact } from "@/lib/symbols/exact";
import { TooCostly } from "@/lib/symbols/failures";
import { evaluate, quantityLatex, type Quantity } from "@/lib/symbols/quantity";
import { orderInWords, rootsAreImplied, type Conventions } from "./conventions";
import { judgeDecimal } from "./rounding-slips";
import { readQuantity } from "./read-quantity";
import { readValue, type ClaimedValue } from "./read-value";

/** A convention under which a claim would be right: what it changes, in words that continue "It is right …". */
export type OtherConvention = { change: Partial<Conventions>; says: string };

/**
 * The first other convention that makes a wrong claim right: the other order of the arguments of a CG coefficient, a
 * root understood or not, or both. Null when none does. A value of 0 or ±1 is no evidence for a convention about roots.
 */
export function rightUnder(
  claim: { quantity: string; claimed: string },
  quantity: Quantity,
  conventions: Conventions,
): OtherConvention | null {
  const order: Partial<Conventions> = {
    cgOrder: conventions.cgOrder === "j1m1j2m2" ? "j1j2m1m2" : "j1m1j2m2",
  };
  const implied = rootsAreImplied(conventions);
  const roots: Partial<Conventions> = implied
    ? { impliedRoot: false, ...(conventions.houseForm === "signed-square" ? { houseForm: "any" } : {}) }
    : { impliedRoot: true };
  const inOrder = `with the arguments in the order ${orderInWords(order.cgOrder ?? "j1m1j2m2")}`;
  const withRoot = implied
    ? "when the value is read as it stands, without an understood root"
    : "when a square root is understood over the value, as in printed tables";
  const tries: OtherConvention[] = [{ change: roots, says: withRoot }];
  if (quantity.kind === "cg") {
    tries.unshift({ change: order, says: inOrder });
    tries.push({ change: { ...order, ...roots }, says: `${inOrder}, ${withRoot}` });
  }
  return tries.find(({ change }) => holds(claim, quantity, { ...conventions, ...change })) ?? null;
}

function holds(
  claim: { quantity: string; claimed: string },
  asRead: Quantity,
  conventions: Conventions,
): boolean {
  const quantity = readQuantity(claim.quantity, conventions);
  const value = readValue(claim.claimed, conventions);
  if (!quantity.ok || !value.ok) return false;
  try {
    const truth = evaluate(quantity.quantity);
    const reordered = quantityLatex(quantity.quantity) !== quantityLatex(asRead);
    return !isZero(truth) && (reordered || !isUnit(truth)) && agrees(value.value, truth);
  } catch (error) {
    if (error instanceof TooCostly) return false;
    throw error;
  }
}

/** Whether a claimed value is the true one: equal, or for a decimal correctly rounded to its digits. */
export function agrees(claimed: ClaimedValue, truth: Exact): boolean {
  if (claimed.kind === "exact") return equals(claimed.exact, truth);
  const judged = judgeDecimal(claimed, truth);
  return judged === "equal" || judged === "rounded";
}

function isUnit(x: Exact): boolean {
  const q = asRational(x);
  return q !== null && q.n === q.d;
}
