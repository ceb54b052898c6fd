import { equals } from "@/lib/symbols/exact";
import { toForm, toText } from "@/lib/symbols/exact-print";
import { quantityText } from "@/lib/symbols/quantity";
import { CONVENTION_CHOICES, rootsAreImplied, type Conventions } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { readValue } from "@/lib/verify/read-value";

type Typed = { quantity: string; claimed: string };

/** One choice in which a file's own conventions differ from the work's sheet, in words. */
export type Difference = { question: string; file: string; sheet: string };

/** Where the file's own conventions differ from the sheet; empty when it states none or agrees. */
export function differences(file: Partial<Conventions> | null, sheet: Conventions): Difference[] {
  if (!file) return [];
  return CONVENTION_CHOICES.flatMap(({ id, question, options }) => {
    const own = file[id];
    if (own === undefined || own === sheet[id]) return [];
    const word = (value: unknown) =>
      options.find((option) => option.value === String(value))?.label ?? String(value);
    return [{ question, file: word(own), sheet: word(sheet[id]) }];
  });
}

/**
 * A row written by `own` conventions, rewritten so that the work's sheet reads the same symbol and the same value.
 * Only what the sheet would read differently is touched; null when nothing is. What cannot be read stays as it is.
 */
export function translateRow(row: Typed, own: Conventions, sheet: Conventions): Typed | null {
  const quantity = translateQuantity(row.quantity, own, sheet);
  const claimed = translateValue(row.claimed, own, sheet);
  return quantity === row.quantity && claimed === row.claimed ? null : { quantity, claimed };
}

function translateQuantity(text: string, own: Conventions, sheet: Conventions): string {
  if (own.cgOrder === sheet.cgOrder && own.decimalMark === sheet.decimalMark) return text;
  const read = readQuantity(text, own);
  if (!read.ok || (read.quantity.kind !== "cg" && own.decimalMark === sheet.decimalMark)) return text;
  const now = readQuantity(text, sheet);
  const same =
    now.ok &&
    now.quantity.kind === read.quantity.kind &&
    now.quantity.args.every((arg, i) => arg === read.quantity.args[i]);
  return same ? text : quantityText(read.quantity, sheet.cgOrder);
}

function translateValue(text: string, own: Conventions, sheet: Conventions): string {
  if (own.decimalMark === sheet.decimalMark && rootsAreImplied(own) === rootsAreImplied(sheet)) return text;
  const read = readValue(text, own);
  if (!read.ok) return text;
  const now = readValue(text, sheet);
  if (now.ok && now.value.kind === read.value.kind && equals(now.value.exact, read.value.exact)) return text;
  if (read.value.kind === "decimal") return text.replace(own.decimalMark, sheet.decimalMark);
  return rootsAreImplied(sheet)
    ? toForm(read.value.exact, "signed-square", "text")
    : toText(read.value.exact);
}
