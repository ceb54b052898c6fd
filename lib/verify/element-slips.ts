import { evaluate, quantityLatex, quantityText, type Quantity } from "@/lib/symbols/quantity";
import { columnsOf, fromColumns, show, type Columns } from "./columns";
import { asSignedRoot } from "./signed-root";
import type { Option, Setting } from "./slip-option";
import { SLIPS, type SlipId } from "./slips";

/** Slips that take another element in place of the one asked for. */
export function elementOptions({ quantity, conventions }: Setting): Option[] {
  const own = JSON.stringify(quantity.args);
  const seen = new Set<string>([own]);
  const options: Option[] = [];
  for (const { id, share, columns, clause } of otherElements(quantity)) {
    const other = fromColumns(quantity.kind, columns);
    const key = JSON.stringify(other.args);
    if (seen.has(key) || columns.j.some((j) => j < 0)) continue;
    seen.add(key);
    const value = asSignedRoot(evaluate(other));
    if (!value || (value.sign === 0 && id !== "m3-sign")) continue;
    options.push({
      ids: [id],
      weight: SLIPS[id].prior * share,
      value,
      element: other,
      family: "element",
      brief: () => clause,
      clause: () => `${clause}: this is the value of ${quantityText(other, conventions.cgOrder)}`,
      relation: () => quantityLatex(other, conventions.cgOrder),
    });
  }
  return options;
}

type Element = { id: SlipId; share: number; columns: Columns; clause: string };

function otherElements(quantity: Quantity): Element[] {
  const { j, m } = columnsOf(quantity);
  const [a, b, c] = j;
  const [x, y, z] = m;
  const J = quantity.kind === "cg" ? "J" : "j3";
  const M = quantity.kind === "cg" ? "M" : "m3";
  const elements: Element[] = [];
  const push = (id: SlipId, share: number, j: Columns["j"], m: Columns["m"], clause: string) =>
    elements.push({ id, share, columns: { j, m }, clause });

  push("m3-sign", 0.6, [a, b, c], [x, y, -z], `${M} was taken with the other sign`);
  push("arguments-reordered", 0.3, [a, b, c], [y, x, z], "m1 and m2 changed places");
  push("arguments-reordered", 0.15, [b, a, c], [x, y, z], "j1 and j2 changed places");
  push("arguments-reordered", 0.1, [a, b, c], [x, z, y], `m2 and ${M} changed places`);
  push("arguments-reordered", 0.1, [a, b, c], [z, y, x], `m1 and ${M} changed places`);
  push("arguments-reordered", 0.1, [a, c, b], [x, y, z], `j2 and ${J} changed places`);
  push("arguments-reordered", 0.1, [c, b, a], [x, y, z], `j1 and ${J} changed places`);
  if (quantity.kind === "cg") {
    push("arguments-reordered", 0.15, [a, c, b], [x, -z, -y], "j2 m2 and J M changed places");
    push("arguments-reordered", 0.1, [c, b, a], [-z, y, -x], "j1 m1 and J M changed places");
    push(
      "arguments-reordered",
      0.2,
      [a, x, c],
      [b, y, z],
      "m1 and j2 changed places, as in the other order of the arguments",
    );
  } else {
    push("arguments-reordered", 0.15, [a, c, y], [b, x, z], "rows and columns of the symbol were mixed up");
  }
  push("neighbour-entry", 0.18, [a, b, c + 2], [x, y, z], `the entry for ${J} = ${show(c + 2)} was taken`);
  push("neighbour-entry", 0.18, [a, b, c - 2], [x, y, z], `the entry for ${J} = ${show(c - 2)} was taken`);
  push(
    "neighbour-entry",
    0.14,
    [a, b, c],
    [x + 2, y - 2, z],
    `the entry for m1 = ${show(x + 2)}, m2 = ${show(y - 2)} was taken`,
  );
  push(
    "neighbour-entry",
    0.14,
    [a, b, c],
    [x - 2, y + 2, z],
    `the entry for m1 = ${show(x - 2)}, m2 = ${show(y + 2)} was taken`,
  );
  push("neighbour-entry", 0.06, [a, b, c], [x + 2, y, z - 2], `the entry for m1 = ${show(x + 2)} was taken`);
  push("neighbour-entry", 0.06, [a, b, c], [x - 2, y, z + 2], `the entry for m1 = ${show(x - 2)} was taken`);
  push("neighbour-entry", 0.06, [a, b, c], [x, y + 2, z - 2], `the entry for m2 = ${show(y + 2)} was taken`);
  push("neighbour-entry", 0.06, [a, b, c], [x, y - 2, z + 2], `the entry for m2 = ${show(y - 2)} was taken`);
  for (const step of [2, -2]) {
    push(
      "neighbour-entry",
      0.03,
      [a + step, b, c],
      [x, y, z],
      `the entry for j1 = ${show(a + step)} was taken`,
    );
    push(
      "neighbour-entry",
      0.03,
      [a, b + step, c],
      [x, y, z],
      `the entry for j2 = ${show(b + step)} was taken`,
    );
  }
  push(
    "doubled-arguments",
    0.7,
    [2 * a, 2 * b, 2 * c],
    [2 * x, 2 * y, 2 * z],
    "2j and 2m were used for j and m",
  );
  if ([a, b, c, x, y, z].every((each) => each % 2 === 0)) {
    push("doubled-arguments", 0.3, [a / 2, b / 2, c / 2], [x / 2, y / 2, z / 2], "the arguments were halved");
  }
  return elements;
}
