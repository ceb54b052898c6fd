import { asRational, isZero, type Exact } from "@/lib/symbols/exact";
import { toForm, type HouseForm } from "@/lib/symbols/exact-print";
import { rootsAreImplied, type Conventions } from "./conventions";
import { shapeOf } from "./expression";
import { readValue, type ClaimedValue } from "./read-value";

/** The name of a house form in a sentence. */
export const HOUSE_FORMS: Record<HouseForm, string> = {
  rationalised: "without a root in the denominator",
  "single-root": "under one root",
  "root-below": "with the root left below",
  "signed-square": "as a signed square with the root understood",
  any: "in any form",
};

/**
 * The value as the work prints it, in a form that reads back as the same value under the same conventions; null when
 * the work prescribes nothing. Where roots are understood over plain fractions, a rational value is printed as its signed square.
 */
export function houseFormOf(value: Exact, conventions: Conventions): { text: string; latex: string } | null {
  const form = formFor(value, conventions);
  return form === "any" ? null : { text: toForm(value, form, "text"), latex: toForm(value, form, "latex") };
}

function formFor(value: Exact, conventions: Conventions): HouseForm {
  if (rootsAreImplied(conventions) && asRational(value) !== null && !isZero(value)) return "signed-square";
  return conventions.houseForm;
}

/** Whether a claimed value, known to be right, is written as the house writes it. */
export function inHouseForm(claimed: ClaimedValue, value: Exact, conventions: Conventions): boolean {
  if (conventions.houseForm === "any") return true;
  const house = houseFormOf(value, conventions);
  if (!house) return true;
  const read = readValue(house.text, conventions);
  return read.ok && claimed.kind === "exact" && shapeOf(claimed.tree) === shapeOf(read.value.tree);
}
