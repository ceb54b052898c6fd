import type { HouseForm } from "@/lib/symbols/exact-print";

/** What a work says of its own notation, as far as the value of a 3j symbol or a CG coefficient depends on it. */
export type Conventions = {
  cgOrder: "j1m1j2m2" | "j1j2m1m2";
  phase: "condon-shortley";
  houseForm: HouseForm;
  impliedRoot: boolean;
  decimalMark: "." | ",";
};

/** What a key without a conventions sheet is read by: nothing about the look of a value is demanded. */
export const DEFAULT_CONVENTIONS: Conventions = {
  cgOrder: "j1m1j2m2",
  phase: "condon-shortley",
  houseForm: "any",
  impliedRoot: false,
  decimalMark: ".",
};

export type ConventionChoice = {
  id: keyof Conventions;
  question: string;
  help: string;
  options: readonly { value: string; label: string; example: string; latex: string }[];
};

/** The questions of a conventions sheet, for forms and for the messages that name a convention. */
export const CONVENTION_CHOICES: readonly ConventionChoice[] = [
  {
    id: "cgOrder",
    question: "In which order does the work write the arguments of a Clebsch-Gordan coefficient?",
    help: "It decides how a typed bra-ket is read; the value does not change.",
    options: [
      {
        value: "j1m1j2m2",
        label: "each j followed by its m",
        example: "<1 0 1 0 | 2 0>",
        latex: "\\langle j_1\\,m_1\\,j_2\\,m_2 \\,|\\, J\\,M\\rangle",
      },
      {
        value: "j1j2m1m2",
        label: "both j, then both m",
        example: "<1 1 0 0 | 2 0>",
        latex: "\\langle j_1\\,j_2\\,m_1\\,m_2 \\,|\\, J\\,M\\rangle",
      },
    ],
  },
  {
    id: "phase",
    question: "Which phase convention do the coefficients follow?",
    help: "Condon and Shortley: all coefficients are real and the one with m1 = j1, M = J is positive.",
    options: [
      {
        value: "condon-shortley",
        label: "Condon-Shortley",
        example: "<1/2 1/2 1/2 -1/2 | 0 0> = sqrt(1/2)",
        latex: "\\langle j_1\\,j_1\\,j_2\\,(J-j_1) \\,|\\, J\\,J\\rangle > 0",
      },
    ],
  },
  {
    id: "houseForm",
    question: "In which form are values printed?",
    help: "A right value in another form is confirmed, and the house form is named beside it.",
    options: [
      {
        value: "any",
        label: "any form",
        example: "sqrt(2/15) or sqrt(30)/15",
        latex: "\\sqrt{\\tfrac{2}{15}},\\ \\tfrac{\\sqrt{30}}{15}",
      },
      {
        value: "rationalised",
        label: "no root in a denominator",
        example: "sqrt(30)/15",
        latex: "\\frac{\\sqrt{30}}{15}",
      },
      {
        value: "single-root",
        label: "one root over everything",
        example: "sqrt(2/15)",
        latex: "\\sqrt{\\frac{2}{15}}",
      },
      {
        value: "root-below",
        label: "roots may stand below",
        example: "1/sqrt(6)",
        latex: "\\frac{1}{\\sqrt{6}}",
      },
      {
        value: "signed-square",
        label: "signed square, root implied",
        example: "-8/15",
        latex: "-\\tfrac{8}{15}\\ \\text{for}\\ -\\sqrt{\\tfrac{8}{15}}",
      },
    ],
  },
  {
    id: "impliedRoot",
    question: "Is a square root to be understood over every plain fraction?",
    help: "Usual in printed tables of coefficients: −8/15 stands for −√(8/15). Values with a root sign are read as written.",
    options: [
      {
        value: "false",
        label: "no, roots are written",
        example: "sqrt(8/15)",
        latex: "-\\sqrt{\\tfrac{8}{15}}",
      },
      {
        value: "true",
        label: "yes, as in tables",
        example: "-8/15",
        latex: "-\\tfrac{8}{15}\\ \\to\\ -\\sqrt{\\tfrac{8}{15}}",
      },
    ],
  },
  {
    id: "decimalMark",
    question: "Which mark do decimals carry?",
    help: "With the comma, a comma between two digits is a decimal mark, and entries are separated by spaces.",
    options: [
      { value: ".", label: "a point", example: "0.3651", latex: "0.3651" },
      { value: ",", label: "a comma", example: "0,3651", latex: "0{,}3651" },
    ],
  },
];

/** Whether plain fractions are read with a root understood: said outright, or by the house form. */
export function rootsAreImplied(conventions: Conventions): boolean {
  return conventions.impliedRoot || conventions.houseForm === "signed-square";
}

/** The order of the arguments of a CG coefficient in words, for messages. */
export function orderInWords(order: Conventions["cgOrder"]): string {
  return order === "j1m1j2m2" ? "j1 m1 j2 m2" : "j1 j2 m1 m2";
}
