import { audit } from "@/lib/audit";
import { addClaim } from "@/lib/claims/add-claim";
import { addProblem } from "@/lib/problems/add-problem";
import { transact } from "@/lib/transact";
import { Chapter, ConventionsSheet, Membership, Work } from "@/models";

import { DEMO_PEOPLE, type Cast } from "./demo-people";
import { DEMO_TITLE, type DemoChapter, type DemoProblem } from "./demo-text";
import { claimedValue, DEMO_CONVENTIONS } from "./demo-values";

/** The work with its conventions sheet, chapters and people; nothing in it yet. */
export async function makeWork(cast: Cast, chapters: readonly DemoChapter[]) {
  return transact(async (transaction) => {
    const work = await Work.create(
      { title: DEMO_TITLE, kind: "book", confidential: false, createdById: cast.lead.id },
      { transaction },
    );
    const workId = work.id;
    await ConventionsSheet.create(
      { workId, version: work.conventionsVersion, choices: DEMO_CONVENTIONS, createdById: cast.lead.id },
      { transaction },
    );
    const rows = await Chapter.bulkCreate(
      chapters.map(({ number, title }) => ({ workId, number, title })),
      { transaction },
    );
    for (const { key, role } of DEMO_PEOPLE)
      if (role !== "administrator")
        await Membership.create(
          {
            workId,
            userId: cast[key].id,
            role,
            // The outside reader sees the second and third chapters.
            chapterIds: role === "referee" ? rows.slice(1).map(({ id }) => id) : null,
          },
          { transaction },
        );
    await audit(transaction, {
      workId,
      actorId: cast.lead.id,
      action: "work.create",
      subjectType: "work",
      subjectId: workId,
      after: { title: DEMO_TITLE },
    });
    return { workId, chapterIds: new Map(rows.map(({ number, id }) => [number, id])) };
  });
}

/** Problems in their order, then the claims of all of them side by side, each written by its claimant. */
export async function writeProblems(
  cast: Cast,
  workId: string,
  chapterId: string,
  problems: readonly DemoProblem[],
): Promise<void> {
  const ids: string[] = [];
  for (const { label, statement, claimant } of problems)
    ids.push((await addProblem({ workId, chapterId, label, statement }, cast[claimant])).id);
  await Promise.all(problems.map((problem, i) => writeClaims(cast, workId, ids[i] ?? "", problem)));
}

async function writeClaims(
  cast: Cast,
  workId: string,
  problemId: string,
  problem: DemoProblem,
): Promise<void> {
  for (const [i, typed] of problem.quantities.entries())
    await addClaim(
      {
        workId,
        problemId,
        ref: `${problem.label}(${"abcdefghijklmnop"[i] ?? i})`,
        quantity: typed,
        claimed: claimedValue(typed, problem.places, problem.slips?.[i]),
        note: null,
        page: problem.page,
      },
      cast[problem.claimant],
    );
}
