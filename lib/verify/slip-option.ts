import type { Quantity } from "@/lib/symbols/quantity";
import type { Conventions } from "./conventions";
import type { SignedRoot } from "./signed-root";
import type { SlipId } from "./slips";

/** One way in which a value can have gone wrong: what it gives, how common it is, and how it is told. */
export type Option = {
  ids: SlipId[];
  /** Prior of the slip, shared among the variants that it has here. */
  weight: number;
  value: SignedRoot;
  /** Slips of one family are not tried on top of each other. */
  family: "sign" | "conversion" | "square" | "print" | "factor" | "element";
  /** A clause for a sentence: "the sign is the opposite one". */
  clause: () => string;
  /** A shorter one for a sentence that tells two slips; the clause itself when left out. */
  brief?: () => string;
  /** The left side of the relation "… = claimed value", given the LaTeX of what the slip starts from. */
  relation: (of: string) => string;
  /** True when the relation already ends in the claimed form. */
  whole?: true;
  /** The element that was taken in place of the one asked for. */
  element?: Quantity;
};

/** What a slip starts from: a symbol and its value, which may already carry another slip. */
export type Setting = { quantity: Quantity; value: SignedRoot; conventions: Conventions };
