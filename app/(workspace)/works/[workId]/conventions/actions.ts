"use server";

import { revalidatePath } from "next/cache";
import { userAction } from "@/lib/action";
import { changeConventions } from "@/lib/works/change-conventions";
import { ConventionsChange } from "@/lib/works/schema";

export const changeConventionsAction = userAction(ConventionsChange, async (input, user) => {
  const changed = await changeConventions(input, user);
  revalidatePath(`/works/${input.workId}`, "layout");
  return changed;
});
