import Fraction from "fraction.js";

/**
 * One addend of an exact value: coefficient · √radicand · π^(pi/2) · i^i.
 * Canonical: coefficient ≠ 0, radicand ≥ 1 and square-free, pi an integer, i 0 or 1.
 */
export type Term = Readonly<{ coefficient: Fraction; radicand: bigint; pi: number; i: 0 | 1 }>;

/** Order of the terms of a canonical sum: real before imaginary, then by power of π, then by radicand. */
export function compareTerms(a: Term, b: Term): number {
  return a.i - b.i || a.pi - b.pi || (a.radicand < b.radicand ? -1 : a.radicand > b.radicand ? 1 : 0);
}

/** Adds up terms of the same kind, drops what cancels, and sorts. The radicands must be square-free already. */
export function collect(terms: readonly Term[]): readonly Term[] {
  if (terms.length <= 1) return terms.filter((t) => t.coefficient.n !== 0n);
  const byKind = new Map<string, Term>();
  for (const term of terms) {
    const kind = `${term.i} ${term.pi} ${term.radicand}`;
    const same = byKind.get(kind);
    byKind.set(kind, same ? { ...same, coefficient: same.coefficient.add(term.coefficient) } : term);
  }
  return [...byKind.values()].filter((t) => t.coefficient.n !== 0n).sort(compareTerms);
}
