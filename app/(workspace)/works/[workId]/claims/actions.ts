"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { addClaim } from "@/lib/claims/add-claim";
import { editClaim } from "@/lib/claims/edit-claim";
import { moveClaim } from "@/lib/claims/move-claim";
import { ClaimAt, EditClaim, MoveClaim, NewClaim } from "@/lib/claims/schema";
import { restoreClaim, withdrawClaim } from "@/lib/claims/withdraw-claim";

const refresh = ({ workId }: { workId: string }) => revalidatePath(`/works/${workId}`, "layout");

export const addClaimAction = userAction(NewClaim, async (input, user) => {
  const added = await addClaim(input, user);
  refresh(input);
  return added;
});

export const editClaimAction = userAction(EditClaim, async (input, user) => {
  const edited = await editClaim(input, user);
  refresh(input);
  return edited;
});

export const moveClaimAction = userAction(MoveClaim, async (input, user) => {
  const moved = await moveClaim(input, user);
  refresh(input);
  return moved;
});

export const withdrawClaimAction = userAction(ClaimAt, async (input, user) => {
  const withdrawn = await withdrawClaim(input, user);
  refresh(input);
  return withdrawn;
});

export const restoreClaimAction = userAction(ClaimAt, async (input, user) => {
  const restored = await restoreClaim(input, user);
  refresh(input);
  return restored;
});
