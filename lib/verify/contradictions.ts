import { isConfirmed, type Verdict } from "./finding";

export type OrbitEntry = {
  id: string;
  ref: string;
  verdict: Verdict;
  /** Null when the quantity could not be read or computed. */
  orbitKey: string | null;
  /** What the claim says of the canonical symbol of its orbit, as text; null when it says nothing exact. */
  impliedCanonical: string | null;
};

export type Clash = {
  /** The verdict after the comparison: a wrong claim becomes contradicted, a right one stays as it is. */
  verdict: Verdict;
  /** The ids of the claims that say otherwise, at most a stated number of them. */
  against: string[];
  /** One sentence that names them and says which the exact value supports. */
  says: string;
};

/** How many other claims one sentence names. */
const NAMED = 3;
/** How many are listed by id. */
const MOST_LISTED = 50;

/**
 * Compares claims whose quantities a symmetry joins. The answer has an entry for each claim that another one
 * contradicts; a claim that is exactly right is never called wrong, whatever others say.
 */
export function contradictions(entries: readonly OrbitEntry[]): Map<string, Clash> {
  const orbits = new Map<string, OrbitEntry[]>();
  for (const entry of entries) {
    if (entry.orbitKey === null || entry.impliedCanonical === null) continue;
    const members = orbits.get(entry.orbitKey);
    if (members) members.push(entry);
    else orbits.set(entry.orbitKey, [entry]);
  }
  const clashes = new Map<string, Clash>();
  for (const members of orbits.values()) {
    if (members.length < 2 || members.every((each) => each.impliedCanonical === members[0]?.impliedCanonical))
      continue;
    const byValue = groups(members);
    const sample = sampleOf(byValue);
    for (const [value, group] of byValue) {
      const others = sample.filter((each) => each.impliedCanonical !== value).slice(0, MOST_LISTED);
      for (const entry of group) clashes.set(entry.id, clashOf(entry, others, members.length - group.length));
    }
  }
  return clashes;
}

function groups(members: readonly OrbitEntry[]): Map<string, OrbitEntry[]> {
  const byValue = new Map<string, OrbitEntry[]>();
  for (const entry of members) {
    const value = entry.impliedCanonical ?? "";
    const group = byValue.get(value);
    if (group) group.push(entry);
    else byValue.set(value, [entry]);
  }
  return byValue;
}

/** A few claims of each value, the right ones before all others: enough to name those that say something else. */
function sampleOf(byValue: ReadonlyMap<string, readonly OrbitEntry[]>): OrbitEntry[] {
  const isRight = (group: readonly OrbitEntry[]) => group.some((entry) => isConfirmed(entry.verdict));
  const lists = [...byValue.values()];
  const right = lists.filter(isRight).slice(0, MOST_LISTED);
  const others = lists.filter((group) => !isRight(group)).slice(0, MOST_LISTED + 1);
  return [...right, ...others].flatMap((group) => group.slice(0, MOST_LISTED));
}

function clashOf(entry: OrbitEntry, others: readonly OrbitEntry[], count: number): Clash {
  const right = others.filter((other) => isConfirmed(other.verdict));
  const wrong = !isConfirmed(entry.verdict);
  const against = (right.length > 0 && wrong ? right : others).map((other) => other.id);
  const says = !wrong
    ? `By symmetry ${claims(others, count)} otherwise; the exact value supports this claim.`
    : right.length > 0
      ? `By symmetry it contradicts ${named(right, right.length)}, which the exact value supports.`
      : `By symmetry ${claims(others, count)} otherwise; the exact value supports neither.`;
  return { verdict: entry.verdict === "discrepant" ? "contradicted" : entry.verdict, against, says };
}

function named(list: readonly OrbitEntry[], count: number): string {
  const refs = list.slice(0, NAMED).map((entry) => entry.ref);
  const more = count - refs.length;
  if (more > 0) return `claims ${refs.join(", ")} and ${more} more`;
  const last = refs[refs.length - 1] ?? "";
  return refs.length === 1 ? `claim ${last}` : `claims ${refs.slice(0, -1).join(", ")} and ${last}`;
}

function claims(list: readonly OrbitEntry[], count: number): string {
  return `${named(list, count)} ${count === 1 ? "says" : "say"}`;
}
