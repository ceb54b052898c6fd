import { toDecimal, toLatex, toText } from "@/lib/symbols/exact-print";
import type { Exact } from "@/lib/symbols/exact";
import { showHalf, type Twice } from "@/lib/symbols/half";
import type { Evidence, EvidenceTerm, Kind, Quantity } from "@/lib/symbols/kinds";
import { listPrimes, timesInteger } from "@/lib/symbols/primes";
import { quantityLatex, quantityText } from "@/lib/symbols/quantity-print";
import { threeJEntries } from "@/lib/symbols/regge";
import { binomial, racahParts, reggeSquare, type RacahParts, type ThreeJ } from "@/lib/symbols/three-j";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import { selectionRules, whyZero } from "@/lib/symbols/why-zero";

/** A sum of more terms than this is summarised: count, first, last, largest. */
export const MOST_TERMS_SHOWN = 40;

const ROOT = "\\sqrt{\\frac{\\prod_{i=1}^{3}(j_i+m_i)!\\,(j_i-m_i)!}{(j_1+j_2+j_3+1)!\\,A!\\,B!\\,C!}}";
const SUM = "\\sum_k(-1)^k\\binom{A}{k}\\binom{B}{j_1-m_1-k}\\binom{C}{j_2+m_2-k}";
const LETTERS = "A=j_1+j_2-j_3,\\quad B=j_1-j_2+j_3,\\quad C=-j_1+j_2+j_3";
const THREE_J = "\\begin{pmatrix}j_1&j_2&j_3\\\\m_1&m_2&m_3\\end{pmatrix}";

const FORMULA: Record<Kind, { latex: string; source: string }> = {
  "3j": {
    latex: `${THREE_J}=(-1)^{j_1-j_2-m_3}${ROOT}${SUM},\\quad ${LETTERS}`,
    source:
      "Racah's sum, DLMF 34.2.4 (Varshalovich, Moskalev and Khersonskii, section 8.2), each term multiplied by A! B! C! so that it is a whole number",
  },
  cg: {
    latex: `\\left\\langle j_1m_1j_2m_2\\middle|JM\\right\\rangle=(-1)^{j_1-j_2+M}\\sqrt{2J+1}\\begin{pmatrix}j_1&j_2&J\\\\m_1&m_2&-M\\end{pmatrix},\\quad ${THREE_J}=(-1)^{j_1-j_2-m_3}${ROOT}${SUM},\\quad ${LETTERS}`,
    source:
      "DLMF 34.1.1 and Racah's sum, DLMF 34.2.4 (Varshalovich, Moskalev and Khersonskii, sections 8.1 and 8.2), with j3 = J and m3 = −M, each term multiplied by A! B! C! so that it is a whole number",
  },
};

const CONVENTIONS: Record<Kind, string[]> = {
  "3j": [
    "Condon-Shortley phase",
    "3j symbol of Wigner: (−1)^(j1−j2−m3)/√(2j3+1) times the Clebsch-Gordan coefficient with M = −m3",
  ],
  cg: ["Condon-Shortley phase: ⟨j1 j1 j2 J−j1|J J⟩ is positive", "j1 is coupled first, then j2"],
};

/**
 * What a person needs to redo the value with pencil and paper. Plain data: whole numbers that may be long are strings.
 * @param routes the values that the routes gave, already compared
 */
export function evidenceOf(q: Quantity, value: Exact, routes: { name: string; value: Exact }[]): Evidence {
  const entries = threeJEntries(q);
  const square = reggeSquare(entries);
  const parts = square ? racahParts(square) : null;
  if (parts && q.kind === "cg") timesInteger(parts.prefactor, entries[2] + 1, 1);
  const terms = square && parts ? integerTerms(square, parts) : [];
  const primes = parts ? listPrimes(parts.prefactor) : [];
  const sign = parts ? signOf(q.kind, entries) : null;
  return {
    quantity: { kind: q.kind, text: quantityText(q), latex: quantityLatex(q) },
    rules: selectionRules(q),
    formula: FORMULA[q.kind],
    reggeSquare: square ? [square.slice(0, 3), square.slice(3, 6), square.slice(6, 9)] : null,
    sum: square ? (entries[0] + entries[1] + entries[2]) / 2 : null,
    terms: terms.length > MOST_TERMS_SHOWN ? [] : terms,
    summary: terms.length > MOST_TERMS_SHOWN ? summary(terms) : null,
    total: (parts?.total ?? 0n).toString(),
    prefactor: { primes, latex: primesLatex(primes) },
    sign,
    value: { text: toText(value), latex: toLatex(value), decimal: toDecimal(value, 20) },
    zero: whyZero(q),
    steps: parts && sign ? steps(q, entries, parts, sign, terms, primes, value) : [`${quantityLatex(q)} = 0`],
    routes: routes.map((r) => ({ name: r.name, value: toText(r.value) })),
    conventions: CONVENTIONS[q.kind],
    version: ENGINE_VERSION,
  };
}

/** The k-th term of Racah's formula as published, (−1)^k over six factorials, and the whole number it is after times A! B! C!. */
function integerTerms(square: readonly number[], parts: RacahParts): EvidenceTerm[] {
  const [C, B, A, , p2, , q1] = square as [number, number, number, number, number, number, number];
  return parts.terms.map((value, n) => {
    const k = parts.from + n;
    const factors = [k, A - k, q1 - k, B - q1 + k, p2 - k, C - p2 + k];
    return {
      k,
      numerator: k % 2 === 0 ? "1" : "-1",
      denominators: factors.map((f) => `${f}!`),
      binomials: [
        [A, k],
        [B, q1 - k],
        [C, p2 - k],
      ].map(([n, r]) => ({
        over: n as number,
        under: r as number,
        value: binomial(n as number, r as number).toString(),
      })),
      value: value.toString(),
    };
  });
}

function summary(terms: EvidenceTerm[]): Evidence["summary"] {
  const size = (t: EvidenceTerm) => BigInt(t.value.replace("-", ""));
  const first = terms[0] as EvidenceTerm;
  const largest = terms.reduce((most, t) => (size(t) > size(most) ? t : most), first);
  return { count: terms.length, first, last: terms[terms.length - 1] as EvidenceTerm, largest };
}

/** The sign in front: (−1)^(j1−j2−m3) of the 3j, times (−1)^(j1−j2+M) for a CG. */
function signOf(kind: Kind, [a, b, c, , , z]: ThreeJ): NonNullable<Evidence["sign"]> {
  const one = (a - b - z) / 2;
  const total = kind === "3j" ? one : 2 * one;
  const inside = `${show(a)} − ${bracket(b)} − ${bracket(z)}`;
  return {
    exponent:
      kind === "3j"
        ? `j1 − j2 − m3 = ${inside} = ${one}`
        : `(j1 − j2 + M) + (j1 − j2 − m3) = ${total}, with m3 = −M and j3 = J = ${show(c)}`,
    value: total % 2 === 0 ? 1 : -1,
  };
}

function steps(
  q: Quantity,
  entries: ThreeJ,
  parts: RacahParts,
  sign: NonNullable<Evidence["sign"]>,
  terms: EvidenceTerm[],
  primes: [number, number][],
  value: Exact,
): string[] {
  const [a, b, c] = entries;
  const letters = [a + b - c, a - b + c, b + c - a].map((d) => d / 2);
  const sum =
    terms.length > MOST_TERMS_SHOWN
      ? `\\text{the sum of the }${terms.length}\\text{ terms}`
      : terms.map((t, n) => (n === 0 || t.value.startsWith("-") ? t.value : `+${t.value}`)).join("");
  const front = sign.value === 1 ? "" : "-";
  return [
    `A=${letters[0]},\\quad B=${letters[1]},\\quad C=${letters[2]},\\quad k=${parts.from},\\ldots,${parts.to}`,
    `\\textstyle\\sum = ${sum}${terms.length === 1 && sum === parts.total.toString() ? "" : ` = ${parts.total}`}`,
    `${q.kind === "cg" ? `\\text{under the root, with the factor }2J+1=${c + 1}\\text{: }` : "\\text{under the root: }"}${primesLatex(primes)}`,
    `${quantityLatex(q)} = ${front}${parts.total < 0n ? `\\left(${parts.total}\\right)` : parts.total}\\cdot\\sqrt{${primesLatex(primes)}} = ${toLatex(value)}`,
  ];
}

/** ∏ p^e as a fraction of prime powers. */
function primesLatex(primes: readonly [number, number][]): string {
  const side = (sign: 1 | -1) =>
    primes
      .filter(([, e]) => Math.sign(e) === sign)
      .map(([p, e]) => (Math.abs(e) === 1 ? `${p}` : `${p}^{${Math.abs(e)}}`))
      .join("\\cdot ");
  const [above, below] = [side(1) || "1", side(-1)];
  return below ? `\\frac{${above}}{${below}}` : above;
}

function show(t: Twice): string {
  return showHalf(t).replace("-", "−");
}

function bracket(t: Twice): string {
  return t < 0 ? `(${show(t)})` : show(t);
}
