"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { cancelRun } from "@/lib/runs/cancel-run";
import { NewRun, ThisRun } from "@/lib/runs/schema";
import { startRun } from "@/lib/runs/start-run";

export const startRunAction = userAction(NewRun, async (input, user) => {
  const started = await startRun(input, user);
  revalidatePath(`/works/${input.workId}`, "layout");
  return started;
});

export const cancelRunAction = userAction(ThisRun, async (input, user) => {
  await cancelRun(input, user);
  revalidatePath(`/works/${input.workId}`, "layout");
  return { runId: input.runId };
});
