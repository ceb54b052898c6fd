import { once } from "node:events";
import { Worker } from "node:worker_threads";
import { log } from "@/lib/log";
import type { Conventions } from "@/lib/verify/conventions";
import type { Outcome, Task } from "./judge";
import type { Batch } from "./verify-thread";

/** What came of a task; `stopped`: the thread was ended over it. */
export type Result = Outcome | { kind: "stopped"; id: string; says: string };

export type Verifier = {
  /** Judges the tasks in order and says something about each. Calls wait for one another. */
  verify: (tasks: Task[], conventions: Conventions) => Promise<Result[]>;
  close: () => Promise<void>;
};

/** A machine that is busy may take long to load the engine; no claim is blamed for that. */
const START_MS = 60_000;
/** Starts of a thread over one claim before the claim is left undecided. */
const MOST_CRASHES = 3;

/**
 * A thread that judges claims, so that this process goes on answering while it computes. The engine counts operations
 * and refuses what is too long before it begins; this is the last resort behind that: a claim over which the thread
 * is silent for `claimMs`, runs out of memory or dies takes only its thread with it, and the next claim gets a new one.
 */
export function openVerifier({
  script = new URL("./verify-thread.ts", import.meta.url),
  claimMs = 10_000,
  megabytes = 512,
} = {}): Verifier {
  let thread: Worker | null = null;
  let turn: Promise<unknown> = Promise.resolve();

  async function start(): Promise<Worker> {
    const made = new Worker(new URL("./thread.mjs", import.meta.url), {
      argv: [script.href],
      execArgv: [],
      resourceLimits: { maxOldGenerationSizeMb: megabytes },
    });
    made.unref();
    // Between two batches nobody else listens, and an unheard error would end this process.
    made.on("error", (error) => log.debug({ error }, "a thread failed"));
    made.once("exit", () => {
      if (thread === made) thread = null;
    });
    await once(made, "message", { signal: AbortSignal.timeout(START_MS) });
    return made;
  }

  async function verifyAll(tasks: Task[], conventions: Conventions): Promise<Result[]> {
    const results: Result[] = [];
    let crashes = 0;
    while (results.length < tasks.length) {
      const before = results.length;
      thread ??= await start();
      const fault = await hand(thread, { conventions, tasks: tasks.slice(before) }, claimMs, (r) =>
        results.push(r),
      );
      if (fault === null) continue;
      await thread?.terminate();
      thread = null;
      const task = tasks[results.length];
      if (!task) continue;
      crashes = results.length === before ? crashes + 1 : 1;
      log.error({ claimId: task.id, fault: fault.says, crashes }, "a claim ended its thread");
      if (!fault.again || crashes >= MOST_CRASHES) {
        results.push({ kind: "stopped", id: task.id, says: fault.says });
        crashes = 0;
      }
    }
    return results;
  }

  return {
    verify: (tasks, conventions) => {
      const next = turn.then(() => verifyAll(tasks, conventions));
      turn = next.catch(() => undefined);
      return next;
    },
    close: async () => {
      await thread?.terminate();
      thread = null;
    },
  };
}

type Fault = { says: string; again: boolean };

/** Hands tasks to a thread until all are answered (null) or something is wrong with the next one. */
function hand(
  thread: Worker,
  batch: Batch,
  claimMs: number,
  take: (outcome: Outcome) => void,
): Promise<Fault | null> {
  return new Promise((resolve) => {
    let left = batch.tasks.length;
    let timer = setTimeout(late, claimMs);
    function late() {
      end({ says: `the check took longer than ${Math.round(claimMs / 1000)} seconds`, again: false });
    }
    function end(fault: Fault | null) {
      clearTimeout(timer);
      thread.off("message", message).off("error", failed).off("exit", gone);
      resolve(fault);
    }
    function message(outcome: Outcome) {
      take(outcome);
      left -= 1;
      if (left === 0) return end(null);
      clearTimeout(timer);
      timer = setTimeout(late, claimMs);
    }
    function failed(error: Error & { code?: string }) {
      const memory = error.code === "ERR_WORKER_OUT_OF_MEMORY";
      end({ says: memory ? "the check needed more memory than it is given" : error.message, again: !memory });
    }
    function gone() {
      end({ says: "the check ended its thread", again: true });
    }
    thread.on("message", message).on("error", failed).on("exit", gone);
    thread.postMessage(batch);
  });
}
