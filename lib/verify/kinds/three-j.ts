import type { Twice } from "@/lib/symbols/half";
import { refuse } from "../read-error";
import type { Entry, Part, Shape } from "../quantity-shape";
import type { KindReader } from "./kind-reader";
import { refuseNegative } from "./shared";

/** (j1 j2 j3; m1 m2 m3) */
export const threeJ: KindReader = {
  name: "3j symbol",
  claims: (shape) => shape.open.text === "(",
  read: (shape) => {
    const [top, bottom] = rows(shape);
    for (const j of top) refuseNegative(shape.text, j);
    return { kind: "3j", args: [...top, ...bottom].map((entry): Twice => entry.value) };
  },
};

const EXPECTED = "three entries, a semicolon, three entries";

function rows(shape: Shape): [Entry[], Entry[]] {
  const { text, parts, close } = shape;
  const all = parts.flatMap((part) => part.entries);
  if (parts.length === 1) {
    const [middle] = all.slice(3);
    refuse(
      text,
      middle?.at ?? close.at,
      middle?.length ?? 1,
      "a semicolon between the two rows",
      "A 3j symbol has two rows with a semicolon between them: (1 1 2; 0 0 0).",
      all.length === 6 ? { suggestion: typed(shape) } : {},
    );
  }
  const wrong = parts.find((part) => part.after !== null && part.after.text !== ";")?.after;
  if (wrong) {
    refuse(
      text,
      wrong.at,
      wrong.length,
      "a semicolon between the two rows",
      `The rows of a 3j symbol are separated by a semicolon, not by ${wrong.text}; a Clebsch-Gordan coefficient is typed in < >.`,
      suggestionFor(shape),
    );
  }
  if (parts.length > 2) {
    const second = (parts[1] as Part).after;
    refuse(
      text,
      second?.at ?? close.at,
      1,
      EXPECTED,
      `A 3j symbol has two rows, and this one has ${parts.length}.`,
    );
  }
  const [top, bottom] = parts as [Part, Part];
  checkRow(shape, top, "top");
  checkRow(shape, bottom, "bottom");
  return [top.entries, bottom.entries];
}

function checkRow(shape: Shape, part: Part, name: string): void {
  const count = part.entries.length;
  if (count === 3) return;
  const extra = part.entries[3];
  const end = part.after ?? shape.close;
  refuse(
    shape.text,
    extra?.at ?? end.at,
    extra?.length ?? end.length,
    EXPECTED,
    `The ${name} row has ${count === 0 ? "no entry" : count === 1 ? "1 entry" : `${count} entries`}; a 3j symbol has three in each row.`,
  );
}

function suggestionFor(shape: Shape): { suggestion?: string } {
  const [left, right, more] = shape.parts;
  if (!left || !right || more) return {};
  if (left.entries.length === 3 && right.entries.length === 3) return { suggestion: typed(shape) };
  if (left.entries.length === 4 && right.entries.length === 2) {
    return { suggestion: `<${shape.spelt.slice(0, 4).join(" ")} | ${shape.spelt.slice(4).join(" ")}>` };
  }
  return {};
}

function typed(shape: Shape): string {
  return `(${shape.spelt.slice(0, 3).join(" ")}; ${shape.spelt.slice(3).join(" ")})`;
}
