import type { Claim } from "@/models";
import { buildClaim, buildFinding, buildProblem } from "../../factories";
import type { Stage } from "../flags/stage";

/** A claim that a run has judged, in a problem of its own. */
export async function buildJudged(
  stage: Stage,
  given: {
    quantity?: string;
    claimed?: string;
    verdict?: Parameters<typeof buildFinding>[0]["verdict"];
    ref?: string;
  } = {},
): Promise<Claim> {
  const problem = await buildProblem({ chapterId: stage.chapter.id });
  const claim = await buildClaim({
    problemId: problem.id,
    claimantId: stage.claimant.id,
    quantity: given.quantity ?? "(1 1 2; 0 0 0)",
    claimed: given.claimed ?? "sqrt(30)/15",
    ...(given.ref && { ref: given.ref }),
  });
  await buildFinding({ claimId: claim.id, verdict: given.verdict ?? "confirmed" });
  return claim.reload();
}
