import { cg, table, threeJ } from "./demo-symbols";
import type { SlipRule } from "./demo-values";
import type { DemoKey } from "./demo-people";

export type DemoProblem = {
  label: string;
  statement: string;
  page: string;
  claimant: Extract<DemoKey, "lead" | "first" | "second">;
  /** quantities as typed; an empty result of the engine is never claimed */
  quantities: string[];
  /** digits after the point, where the answers are printed as decimals */
  places?: number;
  /** which answers are wrong, and by which slip */
  slips?: Record<number, SlipRule>;
};
export type DemoChapter = { number: number; title: string; problems: DemoProblem[] };

export const DEMO_TITLE = "Two Spins and a Sum: Problems in Angular Momentum";

/** An invented course. The answers are computed from the quantities; only the slips make some of them wrong. */
export const DEMO_CHAPTERS: readonly DemoChapter[] = [
  {
    number: 1,
    title: "Adding two angular momenta",
    problems: [
      {
        label: "1.1",
        page: "12",
        claimant: "first",
        statement:
          "Two particles of spin $\\tfrac12$ sit side by side. Write the triplet and the singlet in the product basis; the coefficients asked for are $\\langle \\tfrac12\\,m_1\\,\\tfrac12\\,m_2|S\\,M\\rangle$.",
        quantities: table(0.5, 0.5, 5),
        slips: { 4: "overall-sign" },
      },
      {
        label: "1.2",
        page: "13",
        claimant: "first",
        statement:
          "An electron in a p state. Couple $l=1$ and $s=\\tfrac12$, in this order, and give the coefficients of $|j\\,m\\rangle$ for $m\\ge 0$.",
        quantities: table(1, 0.5, 5),
        slips: { 2: "square-for-value" },
      },
      {
        label: "1.3",
        page: "14",
        claimant: "second",
        statement:
          "Two vectors make a scalar, a vector and a tensor of rank 2. Find the coefficients of $1\\otimes 1$ that belong to $M\\ge 0$.",
        quantities: table(1, 1, 11),
        slips: { 3: "root-extent", 8: "coupling-order" },
      },
      {
        label: "1.4",
        page: "16",
        claimant: "second",
        statement:
          "A level with $j=\\tfrac32$ meets a vector. Tabulate $\\langle \\tfrac32\\,m_1\\,1\\,m_2|J\\,M\\rangle$ for $M\\ge\\tfrac12$.",
        quantities: table(1.5, 1, 10),
        slips: { 6: "upside-down" },
      },
      {
        label: "1.5",
        page: "18",
        claimant: "lead",
        statement:
          "Which of these vanish, and why? Answer without computing a sum: projections first, then the triangle.",
        quantities: [
          cg(1, 1, 1, 0, 2, 0),
          cg(1, 0, 1, 0, 1, 0),
          cg(2, 1, 1, -1, 4, 0),
          cg(1.5, 0.5, 0.5, 0.5, 0, 1),
        ],
      },
    ],
  },
  {
    number: 2,
    title: "The 3j symbol and its symmetries",
    problems: [
      {
        label: "2.1",
        page: "27",
        claimant: "first",
        statement:
          "All projections zero. Evaluate $\\begin{pmatrix} j_1&j_2&j_3\\\\0&0&0\\end{pmatrix}$ and explain, for those that vanish, what the parity of $j_1+j_2+j_3$ has to do with it.",
        quantities: [
          threeJ(1, 1, 2, 0, 0, 0),
          threeJ(2, 2, 2, 0, 0, 0),
          threeJ(1, 2, 3, 0, 0, 0),
          threeJ(1, 1, 1, 0, 0, 0),
          threeJ(2, 2, 4, 0, 0, 0),
          threeJ(2, 3, 4, 0, 0, 0),
          threeJ(3, 3, 2, 0, 0, 0),
          threeJ(2, 4, 4, 0, 0, 0),
        ],
        slips: { 2: "cg-for-3j" },
      },
      {
        label: "2.2",
        page: "28",
        claimant: "second",
        statement: "Half-integers. Evaluate the symbols and check one of them by exchanging two columns.",
        quantities: [
          threeJ(0.5, 0.5, 1, 0.5, -0.5, 0),
          threeJ(0.5, 1, 1.5, 0.5, 0, -0.5),
          threeJ(1.5, 1, 0.5, -0.5, 1, -0.5),
          threeJ(1.5, 1.5, 1, 0.5, -0.5, 0),
          threeJ(1.5, 1.5, 2, 0.5, 0.5, -1),
          threeJ(2.5, 2, 0.5, 1.5, -1, -0.5),
          threeJ(2.5, 1.5, 2, 0.5, -1.5, 1),
          threeJ(3.5, 2, 1.5, -0.5, 1, -0.5),
        ],
        slips: { 3: "phase-omitted", 6: "digit-slip" },
      },
      {
        label: "2.3",
        page: "30",
        claimant: "first",
        statement: "The stretched symbols, where the sum has a single term: $j_3=j_1+j_2$.",
        quantities: [
          threeJ(1, 2, 3, 1, 2, -3),
          threeJ(1, 2, 3, 1, 1, -2),
          threeJ(2, 2, 4, 2, 0, -2),
          threeJ(2, 2, 4, 1, -1, 0),
          threeJ(2, 3, 5, 1, 2, -3),
          threeJ(1.5, 2.5, 4, 0.5, 1.5, -2),
        ],
      },
      {
        label: "2.4",
        page: "31",
        claimant: "second",
        statement:
          "Columns exchanged, signs turned, rows mixed. Find the value of each from that of one relative in problems 2.1 to 2.3, with its phase.",
        quantities: [
          threeJ(2, 1, 3, 0, 0, 0),
          threeJ(2, 3, 1, 1, -2, 1),
          threeJ(1, 1.5, 0.5, 0, -0.5, 0.5),
          threeJ(1.5, 1.5, 1, -0.5, 0.5, 0),
          threeJ(4, 2, 2, 2, -2, 0),
          threeJ(3, 2, 5, 2, 1, -3),
        ],
      },
      {
        label: "2.5",
        page: "33",
        claimant: "lead",
        statement:
          "For the table at the end of the chapter. The author worked these out as decimals; the key prints them in the form of the house.",
        quantities: [
          threeJ(2, 2, 2, 1, -1, 0),
          threeJ(3, 2, 2, 1, 0, -1),
          threeJ(3, 3, 2, 1, 0, -1),
          threeJ(4, 3, 2, 1, 1, -2),
          threeJ(4, 4, 2, 2, -1, -1),
          threeJ(5, 4, 3, 1, 1, -2),
        ],
        places: 4,
        slips: { 3: "rounded-wrongly" },
      },
    ],
  },
  {
    number: 3,
    title: "Selection rules and matrix elements",
    problems: [
      {
        label: "3.1",
        page: "45",
        claimant: "first",
        statement:
          "Some of these vanish by a rule, one by accident. Name the rule, or convince yourself that there is none: for $j=3$, $m=2$ look at $3m^2-j(j+1)$.",
        quantities: [
          threeJ(3, 3, 2, 2, -2, 0),
          threeJ(1, 1, 3, 0, 0, 0),
          threeJ(2, 2, 2, 1, 1, -1),
          threeJ(2, 1, 2, 0, 0, 0),
          threeJ(3, 2, 2, 0, 0, 0),
          threeJ(2, 2, 1, 1, -1, 0),
        ],
        slips: { 5: "odd-permutation" },
      },
      {
        label: "3.2",
        page: "47",
        claimant: "second",
        statement:
          "A vector operator acts on a level with $j=2$. By the Wigner-Eckart theorem all elements follow from one for each final $J$; give the coefficients $\\langle 2\\,m\\,1\\,q|J\\,M\\rangle$ that go with it.",
        quantities: table(2, 1, 12),
        slips: { 4: "dimension-factor" },
      },
      {
        label: "3.3",
        page: "49",
        claimant: "first",
        statement:
          "Dipole lines from $l=3$ to $l=2$. The angular factors are $\\begin{pmatrix}3&1&2\\\\-m&q&m'\\end{pmatrix}$; find them for the three polarisations.",
        quantities: [
          threeJ(3, 1, 2, 0, 0, 0),
          threeJ(3, 1, 2, -1, 1, 0),
          threeJ(3, 1, 2, -1, 0, 1),
          threeJ(3, 1, 2, -2, 1, 1),
          threeJ(3, 1, 2, -2, 0, 2),
          threeJ(3, 1, 2, -3, 1, 2),
          threeJ(3, 1, 2, 0, 1, -1),
          threeJ(3, 1, 2, 1, 1, -2),
        ],
        slips: { 2: "overall-sign", 4: "unreadable" },
      },
      {
        label: "3.4",
        page: "51",
        claimant: "lead",
        statement: "Quadrupole elements in a level with $j=4$, where the sum has several terms.",
        quantities: [
          threeJ(4, 2, 4, -2, 0, 2),
          threeJ(4, 2, 4, -1, 0, 1),
          threeJ(4, 2, 4, -3, 1, 2),
          threeJ(4, 2, 4, -3, 2, 1),
          threeJ(4, 3, 4, -1, 0, 1),
          threeJ(4, 4, 4, -2, 0, 2),
          threeJ(4, 4, 4, 1, 2, -3),
          threeJ(5, 4, 4, -2, 1, 1),
        ],
        slips: { 6: "3j-for-cg" },
      },
      {
        label: "3.5",
        page: "54",
        claimant: "second",
        statement: "Two spins of $\\tfrac32$: the coefficients of the state with $J=2$, $M=0$ and $M=1$.",
        quantities: [
          cg(1.5, 1.5, 1.5, -1.5, 2, 0),
          cg(1.5, 0.5, 1.5, -0.5, 2, 0),
          cg(1.5, -0.5, 1.5, 0.5, 2, 0),
          cg(1.5, -1.5, 1.5, 1.5, 2, 0),
          cg(1.5, 1.5, 1.5, -0.5, 2, 1),
          cg(1.5, -0.5, 1.5, 1.5, 2, 1),
        ],
      },
    ],
  },
];

/** Added after the last run: a chapter that is still being written. */
export const DEMO_LATE_PROBLEM: DemoProblem = {
  label: "3.6",
  page: "56",
  claimant: "first",
  statement: "An octupole between $l=2$ and $l=3$ (draft).",
  quantities: [
    threeJ(2, 3, 3, 1, -1, 0),
    threeJ(2, 3, 3, 2, -2, 0),
    threeJ(2, 3, 3, 0, 1, -1),
    threeJ(2, 3, 3, 1, 1, -2),
  ],
};
