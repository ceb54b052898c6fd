"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { freezeKey } from "@/lib/keys/freeze-key";
import { nameWaiver } from "@/lib/keys/name-waiver";
import { FreezeKey, NameWaiver } from "@/lib/keys/schema";

export const freezeKeyAction = userAction(FreezeKey, async (input, user) => {
  const frozen = await freezeKey(input, user);
  revalidatePath(`/works/${input.workId}`, "layout");
  return frozen;
});

export const nameWaiverAction = userAction(NameWaiver, async (input, user) => {
  const waiver = await nameWaiver(input, user);
  revalidatePath(`/works/${input.workId}/keys`);
  return waiver;
});
