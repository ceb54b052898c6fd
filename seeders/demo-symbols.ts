import { showHalf, twice } from "@/lib/symbols/half";

/** Typed notation of a 3j symbol and of a CG coefficient (j1 m1 j2 m2 | J M). */
export const threeJ = (...j: [number, number, number, number, number, number]) => {
  const [a, b, c, d, e, f] = j.map((x) => showHalf(twice(x)));
  return `(${a} ${b} ${c}; ${d} ${e} ${f})`;
};
export const cg = (...j: [number, number, number, number, number, number]) => {
  const [a, b, c, d, e, f] = j.map((x) => showHalf(twice(x)));
  return `<${a} ${b} ${c} ${d} | ${e} ${f}>`;
};

const range = (from: number, to: number) =>
  Array.from({ length: Math.round(to - from) + 1 }, (_, i) => from + i);

/** The coefficients of j1 × j2 with M ≥ 0 that the selection rules allow, in the order of printed tables, at most `most` of them. */
export function table(j1: number, j2: number, most: number): string[] {
  const found = range(Math.abs(j1 - j2), j1 + j2)
    .reverse()
    .flatMap((J) =>
      range(-j1, j1)
        .reverse()
        .flatMap((m1) =>
          range(-j2, j2)
            .reverse()
            .map((m2) => ({ J, m1, m2 })),
        ),
    )
    .filter(({ J, m1, m2 }) => m1 + m2 >= 0 && m1 + m2 <= J)
    .map(({ J, m1, m2 }) => cg(j1, m1, j2, m2, J, m1 + m2));
  // Spread over the whole table, not only its beginning.
  const step = Math.max(1, found.length / most);
  return Array.from({ length: Math.min(most, found.length) }, (_, i) => found[Math.floor(i * step)] ?? "");
}
