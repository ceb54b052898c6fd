import { workOn } from "@/lib/jobs/work";
import { judge } from "@/lib/runs/judge";
import { startRun } from "@/lib/runs/start-run";
import type { Verifier } from "@/lib/runs/verifier";
import type { SessionUser } from "@/lib/auth/user";
import { Outbox } from "@/models";
import { handlersWith } from "../workers/handlers";

/** Judges in this process: a few dozen small claims need no thread of their own. */
const here: Verifier = {
  verify: (tasks, conventions) => Promise.resolve(tasks.map((task) => judge(task, conventions))),
  close: () => Promise.resolve(),
};

/** Starts a run and carries it to its end, as the worker would; mails stay for the worker. */
export async function runToTheEnd(
  workId: string,
  chapterId: string | null,
  user: SessionUser,
): Promise<string> {
  const { runId } = await startRun({ workId, chapterId }, user);
  const handlers = handlersWith(here);
  const never = new AbortController().signal;
  for (;;) {
    const rows = await Outbox.findAll({
      attributes: ["id"],
      where: { kind: ["run-batch", "run-finish"], state: "pending" },
    });
    let begun = 0;
    for (const { id } of rows) if (await workOn(id, handlers, never)) begun += 1;
    if (begun === 0) return runId;
  }
}
