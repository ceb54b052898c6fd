/** Fixed names of the known ways of getting a value wrong; they stand in files and answers and never change. */
export type SlipId =
  | "overall-sign"
  | "phase-omitted"
  | "coupling-order"
  | "odd-permutation"
  | "projections-reversed"
  | "cg-for-3j"
  | "3j-for-cg"
  | "dimension-factor"
  | "m3-sign"
  | "arguments-reordered"
  | "neighbour-entry"
  | "doubled-arguments"
  | "square-for-value"
  | "implied-root"
  | "value-for-square"
  | "root-extent"
  | "sign-under-root"
  | "upside-down"
  | "factor-of-two"
  | "digit-slip"
  | "rounded-wrongly"
  | "cut-off";

/** One explanation of a wrong value. `causes` are all slips that give this very value here. */
export type Slip = {
  causes: SlipId[];
  /** One sentence for the author, with the numbers put in. */
  says: string;
  /** The relation between the true and the claimed value, with the numbers put in. */
  formulaLatex: string;
  certainty: "likely" | "possible";
};

export type SlipEntry = {
  id: SlipId;
  /** A name that an author would use. */
  name: string;
  /** What it does to the quantity or to its value. */
  does: string;
  /** When it changes nothing, and so stays unseen. */
  silent: string;
  /** Share of wrong values that are of this kind, as far as errata and table misprints tell. */
  prior: number;
  /** A published case, where one is known. */
  example?: string;
};

const entry = (
  id: SlipId,
  name: string,
  does: string,
  silent: string,
  prior: number,
  example?: string,
): SlipEntry => ({ id, name, does, silent, prior, ...(example === undefined ? {} : { example }) });

const LIST: readonly SlipEntry[] = [
  entry(
    "overall-sign",
    "opposite sign",
    "the value with the other sign",
    "the value is 0",
    0.12,
    "A worked Wigner-Eckart example prints (2 1 1; 0 0 0) as −√(2/15).",
  ),
  entry(
    "phase-omitted",
    "phase left out",
    "the phase (−1)^(j1−j2−m3) between a 3j symbol and its CG coefficient was dropped",
    "the exponent is even",
    0.1,
  ),
  entry(
    "coupling-order",
    "coupled in the other order",
    "j2 was coupled to j1 instead of j1 to j2: a factor (−1)^(j1+j2−J)",
    "j1+j2−J is even",
    0.08,
    "A worked example on πN states prints the signs of 1 × 1/2 for kets labelled 1/2 × 1.",
  ),
  entry(
    "odd-permutation",
    "columns exchanged",
    "two columns of the 3j symbol changed places: a factor (−1)^(j1+j2+j3)",
    "j1+j2+j3 is even",
    0.06,
  ),
  entry(
    "projections-reversed",
    "all projections reversed",
    "every m was given the other sign: a factor (−1)^(j1+j2+j3), for a CG coefficient (−1)^(j1+j2−J)",
    "the exponent is even",
    0.05,
  ),
  entry(
    "cg-for-3j",
    "CG coefficient given for the 3j symbol",
    "the factor (−1)^(j1−j2−m3)/√(2j3+1) is missing",
    "j3 = 0 and the phase is even",
    0.1,
  ),
  entry(
    "3j-for-cg",
    "3j symbol given for the CG coefficient",
    "the factor (−1)^(j1−j2+M)·√(2J+1) is missing",
    "J = 0 and the phase is even",
    0.1,
  ),
  entry(
    "dimension-factor",
    "dimension factor wrong",
    "√(2j+1) is missing, doubled, or taken of another j",
    "the j in question is 0, or the two are equal",
    0.07,
  ),
  entry(
    "m3-sign",
    "sign of m3",
    "+M stands in the 3j symbol where −M belongs, or the phase has m3 with the other sign",
    "M = 0",
    0.04,
    "A program's documentation gives the 3j symbol with +M in its bottom row.",
  ),
  entry(
    "arguments-reordered",
    "arguments in another order",
    "the same numbers were read in another order",
    "the numbers in question are equal",
    0.04,
  ),
  entry(
    "neighbour-entry",
    "neighbouring entry of the table",
    "the value belongs to the entry beside, above or below it",
    "neighbouring entries are equal",
    0.05,
    "A re-typeset table merges the rows of m = 3/2 and m = 1/2.",
  ),
  entry(
    "doubled-arguments",
    "doubled arguments",
    "2j and 2m were used for j and m, or the other way round",
    "all arguments are 0",
    0.01,
  ),
  entry(
    "square-for-value",
    "square given for the value",
    "the probability stands where the amplitude belongs",
    "the value is 0 or ±1",
    0.07,
  ),
  entry(
    "implied-root",
    "root of a table left out",
    "an entry of a table with roots understood was copied as it stands",
    "the value is 0 or ±1",
    0.06,
  ),
  entry(
    "value-for-square",
    "root taken twice",
    "the value stands where its square belongs, so that a root is taken once too often",
    "the value is 0 or ±1",
    0.03,
  ),
  entry(
    "root-extent",
    "root sign too long or too short",
    "the root covers too much or too little of the fraction",
    "what is left out is 1",
    0.05,
    "A re-typeset table reads √3/2 as √(3/2).",
  ),
  entry(
    "sign-under-root",
    "minus sign under the root",
    "√(−a) stands where −√a belongs",
    "the value is not negative",
    0.02,
  ),
  entry(
    "upside-down",
    "fraction upside down",
    "numerator and denominator are exchanged",
    "they are equal",
    0.03,
  ),
  entry("factor-of-two", "factor of 2", "a factor 2 or √2 is missing or too many", "never", 0.03),
  entry(
    "digit-slip",
    "misprinted digit",
    "one digit is wrong, missing, doubled, or changed places with its neighbour",
    "never",
    0.08,
  ),
  entry(
    "rounded-wrongly",
    "rounded wrongly",
    "the last digit is not the correctly rounded one",
    "the next digits are zeros",
    0.05,
  ),
  entry(
    "cut-off",
    "cut off instead of rounded",
    "the digits were cut off where they should have been rounded up",
    "the next digit is below 5",
    0.05,
  ),
];

/** The catalogue of slips, by id. */
export const SLIPS = Object.fromEntries(LIST.map((each) => [each.id, each])) as Record<SlipId, SlipEntry>;

/** How a likely and a merely possible explanation are introduced to a reader. */
export const CERTAINTIES = {
  likely: "Likely: a wrong value would hardly match this by accident.",
  possible: "Possible: the value matches, but a value as simple as this one can match by accident.",
} as const;
