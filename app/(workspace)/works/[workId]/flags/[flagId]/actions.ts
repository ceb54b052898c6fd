"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { addMessage } from "@/lib/flags/add-message";
import { assignFlag, takeFlag } from "@/lib/flags/assign-flag";
import { AddMessage, AssignFlag, SettleFlag, TakeFlag, UndoSettlement } from "@/lib/flags/schema";
import { settleFlag } from "@/lib/flags/settle-flag";
import { undoSettlement } from "@/lib/flags/undo-settlement";

const refresh = ({ workId }: { workId: string }) => revalidatePath(`/works/${workId}`, "layout");

export const settleFlagAction = userAction(SettleFlag, async (input, user) => {
  const settled = await settleFlag(input, user);
  refresh(input);
  return settled;
});

export const undoSettlementAction = userAction(UndoSettlement, async (input, user) => {
  const undone = await undoSettlement(input, user);
  refresh(input);
  return undone;
});

export const assignFlagAction = userAction(AssignFlag, async (input, user) => {
  const assigned = await assignFlag(input, user);
  refresh(input);
  return assigned;
});

export const takeFlagAction = userAction(TakeFlag, async (input, user) => {
  const taken = await takeFlag(input, user);
  refresh(input);
  return taken;
});

export const addMessageAction = userAction(AddMessage, async (input, user) => {
  const added = await addMessage(input, user);
  refresh(input);
  return added;
});
