import { createHash, randomUUID } from "node:crypto";
import { Op } from "sequelize";
import { afterAll } from "vitest";
import { Chapter, Claim, ClaimVersion, Finding, Run } from "@/models";
import type { SessionUser } from "@/lib/auth/user";
import { drain } from "@/lib/jobs/drain";
import { openVerifier } from "@/lib/runs/verifier";
import { evaluate, quantity, quantityText, type Quantity } from "@/lib/symbols/quantity";
import { toText } from "@/lib/symbols/exact-print";
import type { Twice } from "@/lib/symbols/half";
import { handlersWith } from "@/workers/handlers";
import { buildChapter, buildMember, buildProblem, buildWork, leadOf } from "../../factories";

export type Scene = { workId: string; chapterId: string; lead: SessionUser; author: SessionUser };

/** A work with a lead, a second author and one chapter. */
export async function buildScene(): Promise<Scene> {
  const work = await buildWork({ title: "Angular momentum" });
  const chapter = await buildChapter({ workId: work.id });
  return {
    workId: work.id,
    chapterId: chapter.id,
    lead: await leadOf(work),
    author: await buildMember(work, "author"),
  };
}

export type Written = { quantity: string; claimed: string };

/** Writes claims into a chapter, many at a time. */
export async function writeClaims({ workId, chapterId, lead }: Scene, written: Written[]): Promise<string[]> {
  const problem = await buildProblem({ workId, chapterId });
  const chapter = await Chapter.findByPk(chapterId, { rejectOnEmpty: true });
  const claims = written.map((each, i) => ({
    ...each,
    id: randomUUID() as string,
    workId,
    chapterId,
    problemId: problem.id,
    ref: `${chapter.number}.${problem.position}(${i + 1})`,
    position: i + 1,
    claimantId: lead.id,
  }));
  await Claim.bulkCreate(claims);
  await ClaimVersion.bulkCreate(
    claims.map(({ id, quantity: q, claimed }) => ({
      workId,
      claimId: id,
      number: 1,
      quantity: q,
      claimed,
      authorId: lead.id,
      origin: "typed" as const,
    })),
  );
  return claims.map(({ id }) => id);
}

/** Many different claims, every tenth of them with its sign turned (or made non-zero). */
export function manyClaims(count: number): Written[] {
  const written: Written[] = [];
  for (const q of manySymbols()) {
    const wrong = written.length % 10 === 9;
    const value = toText(evaluate(q));
    const turned = value === "0" ? "1/2" : value.startsWith("-") ? value.slice(1) : `-${value}`;
    written.push({ quantity: quantityText(q), claimed: wrong ? turned : value });
    if (written.length === count) return written;
  }
  throw new RangeError("There are not that many symbols here");
}

function* manySymbols(): Generator<Quantity> {
  for (let a = 1; a <= 12; a++)
    for (let b = 1; b <= a; b++)
      for (let c = a - b; c <= a + b; c += 2)
        for (let x = -a; x <= a; x += 2)
          for (let y = -b; y <= b; y += 2)
            if (Math.abs(x + y) <= c)
              yield quantity(
                "3j",
                [a, b, c, x, y, -x - y].map((n) => n as Twice),
              );
}

/** One thread for a test file: starting one takes longer than most tests. */
export const verifier = openVerifier();
export const handlers = handlersWith(verifier);
afterAll(() => verifier.close());

/** Carries out what is due, in this process and without Redis, until nothing is left. */
export const workOff = () => drain(handlers, new AbortController().signal);

/** Waits until it holds, looking every tenth of a second; the test's own time limit ends it. */
export async function until(holds: () => Promise<boolean>): Promise<void> {
  while (!(await holds())) await new Promise((resolve) => setTimeout(resolve, 100));
}

export const stateOf = async (runId: string) => (await Run.findByPk(runId, { rejectOnEmpty: true })).state;
export const judgedIn = (runId: string) => Finding.count({ where: { runId, verdict: { [Op.not]: null } } });

/** Everything that a finding says, without ids and moments: two runs of the same claims must agree in this. */
export async function saidIn(runId: string): Promise<string[]> {
  const findings = await Finding.findAll({
    where: { runId },
    order: [["claimId", "ASC"]],
  });
  return findings.map((finding) => {
    const {
      claimId,
      verdict,
      reason,
      exactText,
      exactLatex,
      exactDecimal,
      slips,
      details,
      evidence,
      orbitKey,
    } = finding;
    const rest = JSON.stringify([exactText, exactLatex, exactDecimal, slips, details, evidence, orbitKey]);
    return `${claimId} ${verdict}: ${reason} ${createHash("sha256").update(rest).digest("hex")}`;
  });
}
