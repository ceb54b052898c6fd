import { quantityLatex, type Quantity } from "@/lib/symbols/quantity";
import { BUDGET } from "./budget";
import type { Conventions } from "./conventions";
import { KINDS, VERIFIED_HERE } from "./kinds/kinds";
import { NOT_YET } from "./kinds/not-yet";
import { readShape, type Shape } from "./quantity-shape";
import { reading, refuse, type ReadError } from "./read-error";

export type { ReadError } from "./read-error";
export type QuantityReading =
  { ok: true; quantity: Quantity; latex: string } | { ok: false; error: ReadError };

/**
 * Reads a typed quantity: `(1 1 2; 0 0 0)` or `<1 0 1 0 | 2 0>`, the arguments of the latter in the order of the
 * conventions. Never throws; an error carries the place, what was found and what was expected.
 */
export function readQuantity(text: string, conventions: Conventions): QuantityReading {
  return reading(() => {
    if (text.length > BUDGET.text) {
      refuse(
        text,
        BUDGET.text,
        1,
        `at most ${BUDGET.text} characters`,
        `The quantity is ${text.length} characters long; at most ${BUDGET.text} are read.`,
        { limit: true },
      );
    }
    refuseKindsNotVerified(text);
    const shape = readShape(text, conventions);
    const kind = KINDS.find((each) => each.claims(shape));
    if (!kind) refuseBracket(shape);
    const quantity = kind.read(shape, conventions);
    return { quantity, latex: quantityLatex(quantity, conventions.cgOrder) };
  });
}

function refuseKindsNotVerified(text: string): void {
  const start = text.length - text.trimStart().length;
  const found = NOT_YET.find(({ begins }) => begins.test(text.slice(start)));
  if (found) {
    refuse(
      text,
      start,
      text.trim().length,
      "a 3j symbol or a Clebsch-Gordan coefficient",
      `This edition does not verify ${found.name}; it verifies ${VERIFIED_HERE}.`,
    );
  }
}

function refuseBracket({ text, open, spelt, parts }: Shape): never {
  const [top, bottom] = parts;
  const suggestion =
    parts.length === 2 && top?.entries.length === 3 && bottom?.entries.length === 3
      ? { suggestion: `(${spelt.slice(0, 3).join(" ")}; ${spelt.slice(3).join(" ")})` }
      : {};
  refuse(
    text,
    open.at,
    1,
    "( or <",
    `A 3j symbol stands in ( ) and a Clebsch-Gordan coefficient in < >, but this one opens with ${open.text}.`,
    suggestion,
  );
}
