import { evidenceOf } from "@/lib/symbols/evidence";
import { equals, type Exact } from "@/lib/symbols/exact";
import { toText } from "@/lib/symbols/exact-print";
import { RouteDisagreement, TooCostly } from "@/lib/symbols/failures";
import type { Twice } from "@/lib/symbols/half";
import type { Cost, Evidence, Kind, Quantity, VanishingReason, Variant, Orbit } from "@/lib/symbols/kinds";
import { clebschGordanByLadder, ladderSteps, threeJByLadder } from "@/lib/symbols/ladder";
import { quantityText } from "@/lib/symbols/quantity-print";
import * as regge from "@/lib/symbols/regge";
import { clebschGordan, reggeSquare, threeJ, type ThreeJ } from "@/lib/symbols/three-j";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import * as zero from "@/lib/symbols/why-zero";

export type {
  CgOrder,
  Cost,
  Evidence,
  EvidenceTerm,
  Kind,
  Orbit,
  Quantity,
  Rule,
  Variant,
  VanishingReason,
  VanishingRule,
} from "@/lib/symbols/kinds";
export { quantityLatex, quantityText } from "@/lib/symbols/quantity-print";

/** One way of computing a symbol from the entries of its 3j. */
type Route = { name: string; value: (entries: ThreeJ) => Exact };

/** For each kind: how many entries it has and the two independent routes to its value, the everyday one first. */
const KINDS: Record<Kind, { entries: number; routes: readonly [Route, Route] }> = {
  "3j": {
    entries: 6,
    routes: [
      { name: "Racah's sum", value: threeJ },
      { name: "ladder recursion", value: threeJByLadder },
    ],
  },
  cg: {
    entries: 6,
    routes: [
      { name: "Racah's sum", value: clebschGordan },
      { name: "ladder recursion", value: clebschGordanByLadder },
    ],
  },
};

/** Stated limits. What lies past them throws TooCostly before any work is done. */
export const LIMITS = {
  /** Largest j that is evaluated. */
  largestJ: 5_000,
  /** Largest j for which checked() runs the second route too. */
  largestCheckedJ: 1_000,
  /** Largest j for which the 72 variants and the evidence are made. */
  largestExplainedJ: 1_000,
} as const;

/** A quantity with its entries counted. @throws RangeError on a wrong number of entries */
export function quantity(kind: Kind, args: readonly Twice[]): Quantity {
  const wanted = KINDS[kind].entries;
  if (args.length !== wanted) {
    throw new RangeError(
      `A ${kind === "cg" ? "CG coefficient" : `${kind} symbol`} has ${wanted} entries; ${args.length} were given.`,
    );
  }
  return { kind, args };
}

/**
 * An upper bound of the work on one value, known before it begins: terms of the sum (or steps of the second route, whichever are
 * more) and digits of the longest integer. A forbidden symbol costs nothing.
 */
export function costOf(q: Quantity): Cost {
  const entries = regge.threeJEntries(q);
  const square = reggeSquare(entries);
  if (!square) return { terms: 0, digits: 1 };
  const [C, B, A] = square as [number, number, number];
  const J = A + B + C;
  // The numbers are products of three binomials, and the prefactor has at most the digits of ((J+1)!)².
  const digits = Math.ceil(2 * (J + 1) * Math.log10(J + 2)) + 1;
  return { terms: Math.max(Math.min(...square) + 1, ladderSteps(entries)), digits };
}

/** Exact value by the everyday route; 0 when a selection rule fails. @throws TooCostly past LIMITS.largestJ */
export function evaluate(q: Quantity): Exact {
  refuseBeyond(q, LIMITS.largestJ, "evaluated");
  return KINDS[q.kind].routes[0].value(regge.threeJEntries(q));
}

/**
 * The value by two independent routes, which must agree. Above LIMITS.largestCheckedJ only the first is run, and `routes` has one entry.
 * @throws RouteDisagreement when they differ (an alarm about the program, with the entries, both values and the version)
 * @throws TooCostly past LIMITS.largestJ
 */
export function checked(q: Quantity): { value: Exact; routes: { name: string; value: Exact }[] } {
  refuseBeyond(q, LIMITS.largestJ, "evaluated");
  const entries = regge.threeJEntries(q);
  const both = largestOf(q) <= LIMITS.largestCheckedJ;
  const routes = KINDS[q.kind].routes
    .slice(0, both ? 2 : 1)
    .map((r) => ({ name: r.name, value: r.value(entries) }));
  return { value: agreed(q, routes), routes };
}

/** The one value that all routes gave. @throws RouteDisagreement */
export function agreed(q: Quantity, routes: readonly { name: string; value: Exact }[]): Exact {
  const [first] = routes;
  if (!first) throw new RangeError("There is no route to compare.");
  if (routes.some((r) => !equals(r.value, first.value))) {
    const values = routes.map((r) => ({ name: r.name, text: toText(r.value) }));
    throw new RouteDisagreement(quantityText(q), values, ENGINE_VERSION);
  }
  return first.value;
}

/** Every reason why a symbol is 0, in the order in which an author checks them; [] when it is not 0. See why-zero.ts. */
export function whyZero(q: Quantity): VanishingReason[] {
  refuseBeyond(q, LIMITS.largestJ, "evaluated");
  return zero.whyZero(q);
}

/** The 72 symbols that symmetries make of q, each recomputed (12 for a forbidden symbol). See regge.ts. */
export function variants(q: Quantity): Variant[] {
  refuseBeyond(q, LIMITS.largestExplainedJ, "explained");
  return regge.variants(q);
}

/** The orbit of q under its symmetries: value(q) = factor · value(canonical symbol of key). See regge.ts. */
export function orbit(q: Quantity): Orbit {
  refuseBeyond(q, LIMITS.largestJ, "evaluated");
  return regge.orbit(q);
}

/** What a person needs to redo the value by hand, as plain data. @throws RouteDisagreement, TooCostly */
export function evidence(q: Quantity): Evidence {
  refuseBeyond(q, LIMITS.largestExplainedJ, "explained");
  const { value, routes } = checked(q);
  return evidenceOf(q, value, routes);
}

function largestOf(q: Quantity): number {
  return Math.max(...regge.threeJEntries(q).slice(0, 3)) / 2;
}

function refuseBeyond(q: Quantity, limit: number, verb: string): void {
  const largest = largestOf(q);
  if (largest > limit) {
    throw new TooCostly(
      `Symbols with entries up to ${limit.toLocaleString("en-GB")} are ${verb}; this one has ${largest.toLocaleString("en-GB")}.`,
    );
  }
}
