/**
 * Every limit of reading and judging a claim, in one place. They count operations and digits, never seconds, so
 * that the same claim gets the same verdict on every machine.
 */
export const BUDGET = {
  /** UTF-16 units of a quantity or of a claimed value. */
  text: 4_000,
  /** Tokens of a claimed value: numbers, operators, parentheses, names. */
  tokens: 400,
  /** Digits of one number, and of all numbers of a claimed value together. */
  digitsOfNumber: 200,
  digits: 400,
  /** Digits that an intermediate result may grow to. */
  resultDigits: 1_500,
  /** Different roots that a product or power may spread into. */
  resultTerms: 64,
  /** Depth of parentheses. */
  depth: 40,
  /** Largest numerator of an exponent. */
  exponent: 64,
  /** Digits of one entry of a symbol. */
  digitsOfEntry: 7,
  /** Largest doubled j for which slips are looked for by trying other elements. */
  diagnosedTwice: 120,
  /** Largest doubled entry for which every symmetry-related symbol is recomputed. */
  variantsTwice: 60,
  /** Longest printed value (characters) from which misprints are imagined. */
  misprintText: 60,
} as const;
