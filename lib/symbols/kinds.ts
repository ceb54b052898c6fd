import type { Exact } from "@/lib/symbols/exact";
import type { Twice } from "@/lib/symbols/half";

/** The kinds of symbol that the engine knows. */
export type Kind = "3j" | "cg";

/**
 * A symbol with its entries, as doubled integers.
 * 3j: j1 j2 j3 m1 m2 m3. CG: j1 m1 j2 m2 J M of ⟨j1 m1 j2 m2 | J M⟩.
 */
export type Quantity = { kind: Kind; args: readonly Twice[] };

/** Order in which a work writes the first four entries of a CG coefficient. */
export type CgOrder = "j1m1j2m2" | "j1j2m1m2";

export type VanishingRule =
  | "projection-range"
  | "projection-kind"
  | "projection-sum"
  | "triangle"
  | "sum-not-integer"
  | "parity"
  | "regge-parity"
  | "accidental";

/** One reason why a symbol is 0, with the numbers put in. */
export type VanishingReason = { rule: VanishingRule; says: string };

/** One of the symbols that a symmetry makes of a given one: value of the given symbol = phase · factor · value here. */
export type Variant = {
  name: string;
  does: string;
  phase: 1 | -1;
  quantity: Quantity;
  /** 1 for a 3j; for a CG the ratio √((2J+1)/(2J'+1)) that goes with its phase. */
  factor: Exact;
  /** Computed directly from the entries of the variant. */
  value: Exact;
  agrees: boolean;
};

/** value(symbol) = factor · value(canonical symbol of key); the factor is a sign, for a CG times √(2J+1). */
export type Orbit = { key: string; factor: Exact; zero: boolean };

/** What the work on one symbol will cost at most. */
export type Cost = { terms: number; digits: number };

export type Rule = { says: string; holds: boolean };

/**
 * One term of the sum. numerator over denominators (factorials) is the term as published; value is the whole number after
 * multiplication by A! B! C!, which is (−1)^k times the product of the binomials.
 */
export type EvidenceTerm = {
  k: number;
  numerator: string;
  denominators: string[];
  binomials: { over: number; under: number; value: string }[];
  value: string;
};

/** Everything that a person needs to redo the value with pencil and paper; plain data, fit for JSON. */
export type Evidence = {
  quantity: { kind: Kind; text: string; latex: string };
  rules: Rule[];
  formula: { latex: string; source: string };
  /** The 3×3 square of integers whose rows and columns all add up to `sum`; null when a selection rule fails. */
  reggeSquare: number[][] | null;
  sum: number | null;
  terms: EvidenceTerm[];
  /** Given instead of the terms when there are more than a stated number of them. */
  summary: { count: number; first: EvidenceTerm; last: EvidenceTerm; largest: EvidenceTerm } | null;
  total: string;
  /** The number under the root, in primes; for a CG it includes the factor 2J+1. */
  prefactor: { primes: [number, number][]; latex: string };
  sign: { exponent: string; value: 1 | -1 } | null;
  value: { text: string; latex: string; decimal: string };
  zero: VanishingReason[];
  /** The steps from the integers of the sum to the printed form, in LaTeX. */
  steps: string[];
  routes: { name: string; value: string }[];
  conventions: string[];
  version: string;
};
