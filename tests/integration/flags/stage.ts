import type { Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import type { SettleFlag } from "@/lib/flags/schema";
import type { Chapter, Claim, Flag, Work } from "@/models";
import {
  buildChapter,
  buildClaim,
  buildFinding,
  buildFlag,
  buildMember,
  buildProblem,
  buildUser,
  buildWork,
  asUser,
  leadOf,
} from "../../factories";

export type Stage = {
  work: Work;
  chapter: Chapter;
  lead: SessionUser;
  claimant: SessionUser;
  second: SessionUser;
  /** sees the chapter */
  referee: SessionUser;
  production: SessionUser;
  stranger: SessionUser;
};

/** A work with its people, whose house form has no root in a denominator. */
export async function buildStage(): Promise<Stage> {
  const work = await buildWork({ conventions: { houseForm: "rationalised" } });
  const chapter = await buildChapter({ workId: work.id });
  const person = (role: Role, chapterIds: string[] | null = null) => buildMember(work, role, { chapterIds });
  return {
    work,
    chapter,
    lead: await leadOf(work),
    claimant: await person("author"),
    second: await person("author"),
    referee: await person("referee", [chapter.id]),
    production: await person("production"),
    stranger: asUser(await buildUser()),
  };
}

/** A wrong claim with an open flag: (1 1 2; 0 0 0) is sqrt(30)/15, claimed as sqrt(2)/15. */
export async function buildWrong(
  stage: Stage,
  given: { claimantId?: string; assigneeId?: string | null; claimed?: string; quantity?: string } = {},
): Promise<{ claim: Claim; flag: Flag }> {
  const problem = await buildProblem({ chapterId: stage.chapter.id });
  const claim = await buildClaim({
    problemId: problem.id,
    quantity: given.quantity ?? "(1 1 2; 0 0 0)",
    claimed: given.claimed ?? "sqrt(2)/15",
    claimantId: given.claimantId ?? stage.claimant.id,
  });
  await buildFinding({ claimId: claim.id, verdict: "discrepant" });
  await claim.reload();
  const flag = await buildFlag({
    claimId: claim.id,
    findingId: claim.findingId ?? "",
    assigneeId: given.assigneeId ?? null,
  });
  return { claim, flag };
}

/** A settling as the form sends it. */
export function settling(flag: Flag, word: SettleFlag["word"], given: Partial<SettleFlag> = {}): SettleFlag {
  return {
    workId: flag.workId,
    flagId: flag.id,
    version: flag.version,
    word,
    reason: "The book prints it without the phase.",
    convention: "symbols without the phase, table A.4",
    ...given,
  };
}
