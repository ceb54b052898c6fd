"use server";

import { revalidatePath } from "next/cache";

import { userAction } from "@/lib/action";
import { acceptSource } from "@/lib/sources/accept-source";
import { AcceptSource, SourceAt } from "@/lib/sources/schema";
import { setAsideSource, takeUpSource } from "@/lib/sources/set-aside-source";

const refresh = ({ workId }: { workId: string }) => revalidatePath(`/works/${workId}`, "layout");

export const acceptSourceAction = userAction(AcceptSource, async (input, user) => {
  const accepted = await acceptSource(input, user);
  refresh(input);
  return accepted;
});

export const setAsideSourceAction = userAction(SourceAt, async (input, user) => {
  const aside = await setAsideSource(input, user);
  refresh(input);
  return aside;
});

export const takeUpSourceAction = userAction(SourceAt, async (input, user) => {
  const taken = await takeUpSource(input, user);
  refresh(input);
  return taken;
});
