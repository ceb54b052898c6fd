import { z } from "zod";
import { line, lines } from "@/lib/claims/text";

export const PROBLEM_LIMITS = { label: 40, statement: 4_000 } as const;

export const ProblemText = z.object({
  label: line("a label such as 7.3", PROBLEM_LIMITS.label),
  statement: lines(PROBLEM_LIMITS.statement),
});
export type ProblemText = z.output<typeof ProblemText>;

const workId = z.uuid();
const problemId = z.uuid();

export const NewProblem = ProblemText.extend({ workId, chapterId: z.uuid() });
export type NewProblem = z.output<typeof NewProblem>;

export const EditProblem = ProblemText.extend({ workId, problemId, version: z.number().int().min(0) });
export type EditProblem = z.output<typeof EditProblem>;

export const MoveProblem = z.object({ workId, problemId, to: z.enum(["earlier", "later"]) });
export type MoveProblem = z.output<typeof MoveProblem>;

export const RemoveProblem = z.object({ workId, problemId });
export type RemoveProblem = z.output<typeof RemoveProblem>;
