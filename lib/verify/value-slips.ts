import { quantityText, type Quantity } from "@/lib/symbols/quantity";
import { columnsOf, fromColumns, inside, odd, show, type Columns } from "./columns";
import type { Conventions } from "./conventions";
import { printOptions } from "./print-slips";
import { keyOf, rooted, scaled, signedRootOf, squared, type SignedRoot } from "./signed-root";
import type { Option, Setting } from "./slip-option";
import { SLIPS, type SlipId } from "./slips";

/**
 * Slips that act on the value of a symbol: its sign, the factors between a 3j symbol and a CG coefficient, roots and
 * squares, the printed fraction. `value` may already carry another slip.
 */
export function valueOptions({ quantity, value, conventions }: Setting): Option[] {
  if (value.sign === 0) return [];
  const columns = columnsOf(quantity);
  const options = [
    signOption(quantity, value),
    ...conversionOptions(quantity, columns, value, conventions),
    ...squareOptions(value),
    ...factorOptions(value),
    ...printOptions(value),
  ];
  const own = keyOf(value);
  const seen = new Set<string>();
  return options.filter((option) => {
    const key = `${option.ids.join()} ${keyOf(option.value)}`;
    if (keyOf(option.value) === own || seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}

/** Every slip that comes to a change of sign here. */
function signOption(quantity: Quantity, value: SignedRoot): Option {
  const { j, m } = columnsOf(quantity);
  const [j1, j2, j3] = j;
  const isCg = quantity.kind === "cg";
  const phase = j1 - j2 - m[2];
  const power = (names: string) => `(−1)^(${names}) = −1`;
  const exchange = power(isCg ? "j1+j2−J" : "j1+j2−j3");
  const sum = power(isCg ? "j1+j2+J" : "j1+j2+j3");
  const said: [SlipId, boolean, string][] = [
    ["coupling-order", odd(j1 + j2 - j3), `j2 is coupled to j1 instead of j1 to j2: ${exchange}`],
    ["odd-permutation", odd(j1 + j2 + j3), `two columns of the 3j symbol are exchanged without ${sum}`],
    ["phase-omitted", odd(phase), `the phase ${power(isCg ? "j1−j2+M" : "j1−j2−m3")} is left out`],
    [
      "projections-reversed",
      odd(isCg ? j1 + j2 - j3 : j1 + j2 + j3),
      `all projections are reversed without ${isCg ? exchange : sum}`,
    ],
    ["m3-sign", Math.abs(m[2]) % 2 === 1, `the phase is taken with ${show(-m[2])} for m3 = ${show(m[2])}`],
  ];
  const order = isCg ? said : [...said.slice(1, 3), ...said.slice(0, 1), ...said.slice(3)];
  const holding = order.filter(([, holds]) => holds);
  const reasons = holding.slice(0, 2).map(([, , clause]) => clause);
  return {
    ids: ["overall-sign", ...holding.map(([id]) => id)],
    weight: SLIPS["overall-sign"].prior + holding.reduce((total, [id]) => total + SLIPS[id].prior, 0),
    value: { ...value, sign: value.sign === 1 ? -1 : 1 },
    family: "sign",
    clause: () =>
      `the sign is the opposite one${reasons.length === 0 ? "" : `, as when ${reasons.join(", or when ")}`}`,
    brief: () => "the sign is the opposite one",
    relation: (of) => `-${of}`,
  };
}

function conversionOptions(
  quantity: Quantity,
  columns: Columns,
  value: SignedRoot,
  { cgOrder }: Conventions,
): Option[] {
  const options: Option[] = [];
  const { j } = columns;
  const dims = j.map((each) => BigInt(each + 1)) as [bigint, bigint, bigint];
  const [d1, d2, d3] = dims;
  const is3j = quantity.kind === "3j";
  const { exponent, text } = phaseBetween(columns);
  const sign = odd(exponent) ? -1 : 1;
  const other = fromColumns(is3j ? "cg" : "3j", columns);
  const otherText = quantityText(other, cgOrder);
  const phaseNames = is3j ? "(−1)^(j1−j2−m3)" : "(−1)^(j1−j2+M)";
  const root = `\\sqrt{2\\cdot ${halfLatexInline(j[2])}+1}`;
  const numbers = `(−1)^(${text.replaceAll("-", "−")})`;
  if (is3j) {
    options.push({
      ids: ["cg-for-3j"],
      weight: SLIPS["cg-for-3j"].prior,
      value: scaled(value, d3, 1n, sign),
      family: "conversion",
      brief: () => `the CG coefficient ${otherText} is given for the 3j symbol`,
      clause: () =>
        `this is the CG coefficient ${otherText}; the 3j symbol differs from it by ${phaseNames}/√(2j3+1), here ${numbers}/√${d3}`,
      relation: (of) => `(-1)^{${text}}\\,${root}\\;${of}`,
    });
  } else {
    options.push({
      ids: ["3j-for-cg"],
      weight: SLIPS["3j-for-cg"].prior,
      value: scaled(value, 1n, d3, sign),
      family: "conversion",
      brief: () => `the 3j symbol ${otherText} is given for the CG coefficient`,
      clause: () =>
        `this is the 3j symbol ${otherText}; the CG coefficient is ${phaseNames}·√(2J+1) times it, here ${numbers}·√${d3}`,
      relation: (of) => `\\frac{(-1)^{${text}}}{${root}}\\;${of}`,
    });
  }
  const J = is3j ? "j3" : "J";
  const [wrongWay, rightWay] = is3j
    ? (["missing", "divided"] as const)
    : (["missing", "multiplied"] as const);
  const dimension = (n: bigint, d: bigint, weight: number, clause: string, latex: string) =>
    options.push({
      ids: ["dimension-factor"],
      weight: SLIPS["dimension-factor"].prior * weight,
      value: scaled(value, n, d),
      family: "conversion",
      clause: () => clause,
      relation: (of) => `${latex}\\,${of}`,
    });
  const inverseRoot = (d: bigint) => `\\frac{1}{\\sqrt{${d}}}`;
  const missing: [bigint, bigint] = is3j ? [d3, 1n] : [1n, d3];
  dimension(
    ...missing,
    0.4,
    `the factor ${is3j ? "1/" : ""}√(2${J}+1) = ${is3j ? "1/" : ""}√${d3} is ${wrongWay}, while the phase is right`,
    is3j ? `\\sqrt{${d3}}` : inverseRoot(d3),
  );
  dimension(
    missing[1],
    missing[0],
    0.15,
    `the factor √(2${J}+1) = √${d3} was ${rightWay} ${is3j ? "out" : "in"} twice`,
    is3j ? inverseRoot(d3) : `\\sqrt{${d3}}`,
  );
  for (const [k, d] of [
    [0, d1],
    [1, d2],
  ] as const) {
    const pair: [bigint, bigint] = is3j ? [d3, d] : [d, d3];
    dimension(
      ...pair,
      0.15,
      `√(2j${k + 1}+1) = √${d} was used where √(2${J}+1) = √${d3} belongs`,
      `\\sqrt{\\frac{${pair[0]}}{${pair[1]}}}`,
    );
  }
  const squares: [bigint, bigint] = is3j ? [1n, d3] : [d3, 1n];
  if (squares[0] !== missing[1] || squares[1] !== missing[0]) {
    dimension(
      ...squares,
      0.1,
      `2${J}+1 = ${d3} was used without its root`,
      is3j ? inverseRoot(d3) : `\\sqrt{${d3}}`,
    );
  }
  return options;
}

function halfLatexInline(doubled: number): string {
  return doubled % 2 === 0 ? String(doubled / 2) : `\\tfrac{${doubled}}{2}`;
}

function squareOptions(value: SignedRoot): Option[] {
  const options: Option[] = [];
  const square = squared(value);
  const whole = { ...square, sign: 1 as const };
  options.push({
    ids: ["square-for-value", "implied-root"],
    weight: SLIPS["square-for-value"].prior + SLIPS["implied-root"].prior,
    value: square,
    family: "square",
    clause: () =>
      value.sign < 0
        ? "the square stands for the value, with the sign kept: a table with roots understood prints it so"
        : "the square stands for the value; a table with roots understood prints it so",
    relation: (of) => (value.sign < 0 ? `-\\left(${of}\\right)^2` : `\\left(${of}\\right)^2`),
  });
  if (value.sign < 0) {
    options.push({
      ids: ["square-for-value"],
      weight: SLIPS["square-for-value"].prior / 2,
      value: whole,
      family: "square",
      clause: () => "the square stands for the value, a probability where the amplitude belongs",
      relation: (of) => `\\left(${of}\\right)^2`,
    });
  }
  const root = rooted(value);
  if (root) {
    options.push({
      ids: ["value-for-square"],
      weight: SLIPS["value-for-square"].prior,
      value: root,
      family: "square",
      clause: () => "a root was taken once too often: this is the square root of the size of the value",
      relation: (of) => (value.sign < 0 ? `-\\sqrt{\\left|${of}\\right|}` : `\\sqrt{${of}}`),
    });
  }
  options.push({
    ids: ["upside-down"],
    weight: SLIPS["upside-down"].prior,
    value: signedRootOf(value.sign, value.d, value.n),
    family: "square",
    clause: () => "the fraction is upside down: this is 1 divided by the value",
    relation: (of) => `\\left(${of}\\right)^{-1}`,
  });
  return options;
}

function factorOptions(value: SignedRoot): Option[] {
  const variants: [bigint, bigint, string, string][] = [
    [4n, 1n, "a factor of 2 too many", "2\\cdot "],
    [1n, 4n, "a factor of 2 too few", "\\tfrac{1}{2}\\,"],
    [2n, 1n, "a factor of √2 too many", "\\sqrt{2}\\;"],
    [1n, 2n, "a factor of √2 too few", "\\tfrac{1}{\\sqrt{2}}\\,"],
  ];
  return variants.map(([n, d, clause, latex]) => ({
    ids: ["factor-of-two"],
    weight: SLIPS["factor-of-two"].prior / 4,
    value: scaled(value, n, d),
    family: "factor",
    clause: () => `there is ${clause}`,
    relation: (of) => latex + of,
  }));
}

/** The exponent of the phase between a 3j symbol and its CG coefficient, doubled, and how it reads with numbers. */
function phaseBetween({ j, m }: Columns): { exponent: number; text: string } {
  return { exponent: j[0] - j[1] - m[2], text: `${show(j[0])}-${inside(j[1])}-${inside(m[2])}` };
}
