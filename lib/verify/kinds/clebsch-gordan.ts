import { showHalf } from "@/lib/symbols/half";
import { orderInWords, type Conventions } from "../conventions";
import type { Entry, Part, Shape } from "../quantity-shape";
import { refuse } from "../read-error";
import type { KindReader } from "./kind-reader";
import { refuseNegative } from "./shared";

/**
 * <j1 m1 j2 m2 | J M> or <j1 j2 m1 m2 | J M> by the conventions sheet, with an optional semicolon between the two
 * pairs, and the long form that repeats both j on the right: <j1 m1 j2 m2 | j1 j2 J M>.
 */
export const clebschGordan: KindReader = {
  name: "Clebsch-Gordan coefficient",
  claims: (shape) => shape.open.text === "<" && !shape.parts.some((part) => part.after?.text === "||"),
  read: (shape, { cgOrder }) => {
    const [left, right] = sides(shape, cgOrder);
    const [a, b, c, d] = left as [Entry, Entry, Entry, Entry];
    const [j1, m1, j2, m2] = cgOrder === "j1m1j2m2" ? [a, b, c, d] : [a, c, b, d];
    const [J, M] = right.slice(-2) as [Entry, Entry];
    for (const j of [j1, j2, J]) refuseNegative(shape.text, j);
    if (right.length === 4) {
      sameAgain(shape.text, right[0] as Entry, j1, "j1");
      sameAgain(shape.text, right[1] as Entry, j2, "j2");
    }
    return { kind: "cg", args: [j1, m1, j2, m2, J, M].map((entry) => entry.value) };
  },
};

function sides(shape: Shape, cgOrder: Conventions["cgOrder"]): [Entry[], Entry[]] {
  const { text, parts, close, spelt } = shape;
  const order = orderInWords(cgOrder);
  const expected = `${order} | J M`;
  const bars = parts.filter((part) => part.after?.text === "|");
  if (bars.length === 0) {
    const fifth = parts.flatMap((part) => part.entries)[4];
    refuse(
      text,
      fifth?.at ?? close.at,
      fifth?.length ?? 1,
      "a bar | before J M",
      `A Clebsch-Gordan coefficient has a bar before J and M: <${order} | J M>.`,
      spelt.length === 6 ? { suggestion: typed(spelt) } : {},
    );
  }
  const second = bars[1]?.after;
  if (second)
    refuse(
      text,
      second.at,
      second.length,
      expected,
      "A Clebsch-Gordan coefficient has one bar, and here is a second one.",
    );
  const cut = parts.findIndex((part) => part.after?.text === "|") + 1;
  const left = join(shape, parts.slice(0, cut), expected);
  const right = join(shape, parts.slice(cut), expected);
  if (left.length === 2 && right.length === 4) {
    refuse(
      text,
      shape.open.at,
      close.at + 1 - shape.open.at,
      expected,
      "The coupled state stands on the left here; it is typed on the right of the bar. The coefficient is real, so its value is the same.",
      {
        suggestion: `<${spelt.slice(2).join(" ")} | ${spelt.slice(0, 2).join(" ")}>`,
      },
    );
  }
  if (left.length !== 4) {
    const bar = parts[cut - 1]?.after ?? close;
    const extra = left[4];
    refuse(
      text,
      extra?.at ?? bar.at,
      extra?.length ?? bar.length,
      expected,
      `Left of the bar there ${left.length === 1 ? "is 1 entry" : `are ${left.length} entries`}; four are needed: ${order}.`,
    );
  }
  if (right.length !== 2 && right.length !== 4) {
    const extra = right.length > 4 ? right[4] : right.length === 3 ? right[2] : undefined;
    refuse(
      text,
      extra?.at ?? close.at,
      extra?.length ?? 1,
      expected,
      `Right of the bar there ${right.length === 1 ? "is 1 entry" : `are ${right.length} entries`}; J M are needed (or j1 j2 J M in the long form).`,
    );
  }
  return [left, right];
}

/** Joins the parts of one side, where semicolons may stand between pairs. */
function join(shape: Shape, parts: Part[], expected: string): Entry[] {
  for (const [index, part] of parts.entries()) {
    if (parts.length > 1 && part.entries.length % 2 !== 0) {
      const mark = part.after ?? parts[index - 1]?.after ?? shape.close;
      refuse(
        shape.text,
        mark.at,
        mark.length,
        expected,
        "A semicolon in a Clebsch-Gordan coefficient stands between two pairs of entries.",
      );
    }
  }
  return parts.flatMap((part) => part.entries);
}

function sameAgain(text: string, again: Entry, first: Entry, name: string): void {
  if (again.value !== first.value) {
    refuse(
      text,
      again.at,
      again.length,
      `${showHalf(first.value)} again`,
      `The long form repeats ${name} on the right of the bar: it is ${showHalf(first.value)} on the left and ${showHalf(again.value)} here.`,
    );
  }
}

function typed(spelt: string[]): string {
  return `<${spelt.slice(0, 4).join(" ")} | ${spelt.slice(4).join(" ")}>`;
}
