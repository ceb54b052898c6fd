import { parentPort } from "node:worker_threads";
import type { Conventions } from "@/lib/verify/conventions";
import { judge, type Task } from "./judge";

/** What a thread is given. It says once that it is ready, then one outcome for each task, in order. */
export type Batch = { conventions: Conventions; tasks: Task[] };

parentPort?.on("message", ({ conventions, tasks }: Batch) => {
  for (const task of tasks) parentPort?.postMessage(judge(task, conventions));
});
parentPort?.postMessage("ready");
