import { keyOf, signedRootOf, squarePart, type SignedRoot } from "./signed-root";
import type { Option } from "./slip-option";
import { SLIPS } from "./slips";

/** outer numerator · √(inner numerator) over outer denominator · √(inner denominator) */
type Printed = readonly [out: bigint, inn: bigint, outBelow: bigint, innBelow: bigint];

/** The usual printed forms of a signed root: one root, rationalised, root left below. */
function printedForms({ n, d }: SignedRoot): Printed[] {
  const above = squarePart(n);
  const below = squarePart(d);
  const forms: Printed[] = [
    [1n, n, 1n, d],
    [above.outside, above.inside, below.outside, below.inside],
  ];
  if (below.inside !== 1n) {
    forms.push([above.outside, above.inside * below.inside, below.outside * below.inside, 1n]);
  }
  return forms;
}

/** Slips of the printed form: how far a root reaches, and a fraction before a root turned over. */
export function printOptions(value: SignedRoot): Option[] {
  const sign = value.sign < 0 ? "-" : "";
  const options: Option[] = [];
  const extents = new Map<string, Option>();
  for (const form of printedForms(value)) {
    const [out, inn, outBelow, innBelow] = form;
    const wrong: Printed[] = [
      [out, inn, outBelow * innBelow, 1n],
      [1n, out * inn, outBelow, innBelow],
      [out, inn, 1n, outBelow * innBelow],
      [1n, out * inn, 1n, outBelow * innBelow],
      [out * inn, 1n, outBelow, innBelow],
    ];
    for (const each of wrong) {
      const result = ofPrinted(value.sign, each);
      const key = keyOf(result);
      if (key === keyOf(value) || extents.has(key) || result.n === result.d) continue;
      const [right, read] = [latexOfPrinted(form), latexOfPrinted(each)];
      extents.set(key, {
        ids: ["root-extent"],
        weight: 0,
        value: result,
        family: "print",
        clause: () =>
          `the root covers the wrong part of the fraction: ${textOfPrinted(each)} stands for ${textOfPrinted(form)}`,
        relation: (of) => `${of} = ${sign}${right} \\;\\to\\; ${sign}${read}`,
        whole: true,
      });
    }
    // only the outer fraction inverted, k√n/m -> m√n/k
    if (inn !== 1n && innBelow === 1n && out !== outBelow) {
      options.push({
        ids: ["upside-down"],
        weight: SLIPS["upside-down"].prior / 3,
        value: ofPrinted(value.sign, [outBelow, inn, out, 1n]),
        family: "square",
        clause: () => "the fraction before the root is upside down",
        relation: (of) =>
          `${of} = ${sign}${latexOfPrinted(form)} \\;\\to\\; ${sign}${latexOfPrinted([outBelow, inn, out, 1n])}`,
        whole: true,
      });
    }
  }
  for (const option of extents.values()) {
    options.push({ ...option, weight: SLIPS["root-extent"].prior / extents.size });
  }
  return options;
}

function ofPrinted(sign: -1 | 0 | 1, [out, inn, outBelow, innBelow]: Printed): SignedRoot {
  return signedRootOf(sign, out * out * inn, outBelow * outBelow * innBelow);
}

function textOfPrinted([out, inn, outBelow, innBelow]: Printed): string {
  if (out === 1n && outBelow === 1n && inn !== 1n && innBelow !== 1n) return `√(${inn}/${innBelow})`;
  const above = side(out, inn, "√", "");
  const below = side(outBelow, innBelow, "√", "");
  return below === "1" ? above : `${above}/${outBelow !== 1n && innBelow !== 1n ? `(${below})` : below}`;
}

function latexOfPrinted([out, inn, outBelow, innBelow]: Printed): string {
  if (out === 1n && outBelow === 1n && inn !== 1n && innBelow !== 1n)
    return `\\sqrt{\\frac{${inn}}{${innBelow}}}`;
  const above = side(out, inn, "\\sqrt{", "}");
  const below = side(outBelow, innBelow, "\\sqrt{", "}");
  return below === "1" ? above : `\\frac{${above}}{${below}}`;
}

function side(out: bigint, inn: bigint, open: string, close: string): string {
  if (inn === 1n) return String(out);
  return `${out === 1n ? "" : out}${open}${inn}${close}`;
}
