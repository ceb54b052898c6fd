"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { addProblem } from "@/lib/problems/add-problem";
import { editProblem } from "@/lib/problems/edit-problem";
import { moveProblem } from "@/lib/problems/move-problem";
import { removeProblem } from "@/lib/problems/remove-problem";
import { EditProblem, MoveProblem, NewProblem, RemoveProblem } from "@/lib/problems/schema";

const refresh = ({ workId }: { workId: string }) => revalidatePath(`/works/${workId}`, "layout");

export const addProblemAction = userAction(NewProblem, async (input, user) => {
  const added = await addProblem(input, user);
  refresh(input);
  return added;
});

export const editProblemAction = userAction(EditProblem, async (input, user) => {
  const edited = await editProblem(input, user);
  refresh(input);
  return edited;
});

export const moveProblemAction = userAction(MoveProblem, async (input, user) => {
  const moved = await moveProblem(input, user);
  refresh(input);
  return moved;
});

export const removeProblemAction = userAction(RemoveProblem, async (input, user) => {
  const removed = await removeProblem(input, user);
  refresh(input);
  return removed;
});
