import { DEFAULT_CONVENTIONS, type Conventions } from "./conventions";
import { contradictions } from "./contradictions";
import { VERDICTS, type ClaimText, type Finding, type Verdict } from "./finding";
import { verifyClaim, type VerifyOptions } from "./verify-claim";

export type Summary = Record<Verdict, number> & { total: number };
export type KeyVerification = { findings: Finding[]; summary: Summary };

/**
 * Verifies every claim of a key, then compares the claims with each other through their orbits: a wrong claim that
 * another one contradicts becomes `contradicted`, and both findings name the other.
 */
export function verifyKey(
  key: { conventions?: Partial<Conventions> | null; claims: readonly ClaimText[] },
  options: VerifyOptions = {},
): KeyVerification {
  const conventions = { ...DEFAULT_CONVENTIONS, ...key.conventions };
  const known = new Map<string, Finding>();
  const findings = key.claims.map((claim) => {
    const text = JSON.stringify([claim.quantity, claim.claimed]);
    const finding = known.get(text) ?? verifyClaim(claim, conventions, options);
    known.set(text, finding);
    return { ...finding, ref: claim.ref };
  });
  return withContradictions(findings);
}

/** Adds what the claims say against each other, and counts the verdicts. */
export function withContradictions(findings: readonly Finding[]): KeyVerification {
  const clashes = contradictions(
    findings.map((finding, index) => ({
      id: String(index),
      ref: finding.ref,
      verdict: finding.verdict,
      orbitKey: finding.orbitKey,
      impliedCanonical: finding.canonicalClaim,
    })),
  );
  const judged = findings.map((finding, index) => {
    const clash = clashes.get(String(index));
    return clash
      ? { ...finding, verdict: clash.verdict, reason: `${finding.reason} ${clash.says}` }
      : { ...finding };
  });
  return { findings: judged, summary: summaryOf(judged) };
}

/** How many findings there are of each verdict, and in all. */
export function summaryOf(findings: readonly { verdict: Verdict }[]): Summary {
  const summary = Object.fromEntries([...VERDICTS, "total"].map((name) => [name, 0])) as Summary;
  for (const { verdict } of findings) {
    summary[verdict] += 1;
    summary.total += 1;
  }
  return summary;
}
