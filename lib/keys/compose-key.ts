import { settledNow, type ClaimState, type InForce } from "@/lib/keys/key-claims";
import type { KeyClaim, KeyContent, KeySettlement } from "@/lib/keys/key-content";
import type { SheetInForce } from "@/lib/keys/judge-readiness";
import type { Recheck } from "@/lib/keys/recheck";
import { ENGINE_VERSION } from "@/lib/symbols/version";
import type { Conventions } from "@/lib/verify/conventions";
import type { Finding } from "@/lib/verify/verify-claim";
import type { FrozenKey, Work } from "@/models";

/** What the snapshot says, from claims that are locked and fit. Pure. */
export function composeKey(input: {
  work: Pick<Work, "title" | "kind">;
  number: number;
  frozenAt: Date;
  frozenBy: string;
  conventions: Conventions;
  sheet: SheetInForce;
  previous: Pick<FrozenKey, "number" | "sha256"> | null;
  states: readonly ClaimState[];
  findings: Recheck;
}): KeyContent {
  const { work, number, frozenAt, frozenBy, conventions, sheet, previous, states, findings } = input;
  const kept = states.filter(({ claim }) => claim.withdrawnAt === null);
  const chapters = new Map(
    states.map(({ chapter }) => [chapter.id, { number: String(chapter.number), title: chapter.title }]),
  );
  return {
    format: "surdmark-key-1",
    work: { title: work.title, kind: work.kind },
    number: String(number),
    frozenAt: frozenAt.toISOString(),
    frozenBy,
    engine: ENGINE_VERSION,
    conventions,
    conventionsVersion: String(sheet.version),
    previous: previous ? { number: String(previous.number), sha256: previous.sha256 } : null,
    chapters: [...chapters.values()],
    claims: kept.map((state) => composeClaim(state, findings.byClaim.get(state.claim.id))),
    withdrawn: states
      .filter(({ claim }) => claim.withdrawnAt !== null)
      .map((state) => ({
        chapter: String(state.chapter.number),
        problem: state.problem.label,
        ref: state.claim.ref,
        settlement: keepSettlement(
          state.settlements.find(({ settlement }) => settlement.word === "withdraw") ?? null,
        ),
      })),
  };
}

function composeClaim(state: ClaimState, finding: Finding | undefined): KeyClaim {
  const { claim, chapter, problem, waiver } = state;
  if (!finding) throw new Error(`Claim ${claim.id} was not recomputed.`);
  const printed = finding.houseForm ?? finding.exact;
  const asClaimed = { text: claim.claimed, latex: finding.reading?.claimedLatex ?? null };
  const settled =
    settledNow(state) ?? state.settlements.find(({ settlement }) => settlement.word === "reword") ?? null;
  return {
    id: claim.id,
    chapter: String(chapter.number),
    problem: problem.label,
    ref: claim.ref,
    page: claim.page,
    quantity: claim.quantity,
    quantityLatex: finding.reading?.quantityLatex ?? null,
    claimed: claim.claimed,
    claimedLatex: asClaimed.latex,
    answer:
      finding.verdict === "confirmed-not-house-form" && printed
        ? { text: printed.text, latex: printed.latex }
        : asClaimed,
    value: finding.exact && {
      text: printed?.text ?? finding.exact.text,
      latex: printed?.latex ?? finding.exact.latex,
      decimal: finding.exact.decimal,
    },
    // A stet stands against the verdict that a run gave; that verdict is kept beside it.
    verdict: claim.verdict ?? finding.verdict,
    settlement: keepSettlement(settled),
    waiver:
      waiver && claim.verdict === "undecided"
        ? { reason: waiver.row.reason, by: waiver.by, at: waiver.row.createdAt.toISOString() }
        : null,
  };
}

function keepSettlement(entry: InForce | null): KeySettlement | null {
  if (!entry) return null;
  const { word, reason, convention, createdAt } = entry.settlement;
  return { word, reason, convention, by: entry.by, at: createdAt.toISOString() };
}
