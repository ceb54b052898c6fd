import { addMessage } from "@/lib/flags/add-message";
import type { SettleFlag } from "@/lib/flags/schema";
import { settleFlag } from "@/lib/flags/settle-flag";
import { editClaim } from "@/lib/claims/edit-claim";
import { freezeKey } from "@/lib/keys/freeze-key";
import type { SessionUser } from "@/lib/auth/user";
import { Claim, Flag } from "@/models";

import type { Cast } from "./demo-people";
import { runToTheEnd } from "./demo-run";
import { DEMO_CHAPTERS, DEMO_LATE_PROBLEM } from "./demo-text";
import { claimedValue } from "./demo-values";
import { makeWork, writeProblems } from "./demo-work";

type Answer = Pick<SettleFlag, "word"> & { reason?: string; convention?: string; said?: [string, string][] };

/** How the second authors settled what the first run found; everything else is corrected. */
const SETTLED: Record<string, Answer> = {
  "1.1(e)": {
    word: "stet",
    reason:
      "The singlet is written with the second spin first, as in the figure beside the problem; the text says so.",
    convention: "singlet written as (down up − up down)/√2",
    said: [
      ["second", "The singlet comes out with the other sign. Did you couple the second spin first?"],
      [
        "first",
        "Yes, figure 1.2 has it that way round: $|0\\,0\\rangle = (|{\\downarrow\\uparrow}\\rangle - |{\\uparrow\\downarrow}\\rangle)/\\sqrt2$. I would rather keep it.",
      ],
    ],
  },
  "1.4(g)": {
    word: "reword",
    reason: "The fraction is upside down, and the problem should say that M is at least 1/2.",
  },
  "2.2(g)": {
    word: "withdraw",
    reason: "Same difficulty as the one before; we have enough of these.",
  },
  "2.1(c)": {
    word: "correct",
    reason: "This was the Clebsch-Gordan coefficient, without the factor 1/√7.",
    said: [["lead", "Please look at the neighbours too: the same slip is easily made twice."]],
  },
};

/** The whole story: two chapters to a frozen key, then a third under way. */
export async function tellStory(cast: Cast): Promise<{ workId: string }> {
  const { workId, chapterIds } = await makeWork(cast, DEMO_CHAPTERS);
  const chapterOf = (number: number) => chapterIds.get(number) ?? "";
  const write = (number: number) => {
    const problems = DEMO_CHAPTERS.find((chapter) => chapter.number === number)?.problems ?? [];
    return writeProblems(cast, workId, chapterOf(number), problems);
  };
  await Promise.all([write(1), write(2)]);
  await runToTheEnd(workId, null, cast.lead);
  for (const flag of await openFlags(workId))
    await answer(cast, flag, SETTLED[flag.claim.ref] ?? { word: "correct" });
  await rewrite(workId, "1.4(g)", cast);
  await runToTheEnd(workId, chapterOf(1), cast.second);
  await freezeKey({ workId, number: 1, confirmation: "key 1" }, cast.lead);

  await write(3);
  await runToTheEnd(workId, chapterOf(3), cast.first);
  const open = await openFlags(workId);
  for (const flag of open) {
    if (flag.claim.ref === "3.2(e)") await answer(cast, flag, { word: "correct" });
    if (flag.claim.ref === "3.3(c)") await discuss(cast, flag);
  }
  await writeProblems(cast, workId, chapterOf(3), [DEMO_LATE_PROBLEM]);
  return { workId };
}

type WithClaim = Flag & { claim: Claim };

async function openFlags(workId: string): Promise<WithClaim[]> {
  const flags = await Flag.findAll({
    where: { workId, state: "open" },
    include: [{ model: Claim, as: "claim", required: true }],
    order: [["claim", "ref", "ASC"]],
  });
  return flags as WithClaim[];
}

/** Settled by whom it was assigned to, or by a lead where nobody was left. */
async function answer(
  cast: Cast,
  flag: WithClaim,
  { word, reason, convention, said = [] }: Answer,
): Promise<void> {
  const settler = byId(cast, flag.assigneeId) ?? cast.lead;
  for (const [who, body] of said) {
    const speaker = who === "second" ? settler : cast[who as keyof Cast];
    await addMessage({ workId: flag.workId, flagId: flag.id, body }, speaker);
  }
  await settleFlag(
    { workId: flag.workId, flagId: flag.id, version: flag.version, word, reason, convention },
    settler,
  );
}

async function discuss(cast: Cast, flag: WithClaim): Promise<void> {
  const say = (who: SessionUser, body: string) =>
    addMessage({ workId: flag.workId, flagId: flag.id, body }, who);
  await say(
    byId(cast, flag.assigneeId) ?? cast.lead,
    "The sign differs from its neighbour (b). Is $m'$ counted from the upper or from the lower level here?",
  );
  await say(
    cast.first,
    "From the lower one, as everywhere in the chapter. I think I lost a factor $(-1)^{j_1-j_2-m_3}$; please check.",
  );
}

const byId = (cast: Cast, id: string | null): SessionUser | undefined =>
  Object.values(cast).find((user) => user.id === id);

/** The claimant writes the claim anew, this time rightly. */
async function rewrite(workId: string, ref: string, cast: Cast): Promise<void> {
  const claim = await Claim.findOne({ where: { workId, ref }, rejectOnEmpty: true });
  const claimant = byId(cast, claim.claimantId) ?? cast.lead;
  const { id: claimId, version, quantity, note, page } = claim;
  await editClaim(
    {
      workId,
      claimId,
      version,
      ref,
      quantity,
      claimed: claimedValue(quantity, undefined, undefined),
      note,
      page,
    },
    claimant,
  );
}
