"use server";

import { revalidatePath } from "next/cache";
import { z } from "zod";
import { userAction } from "@/lib/action";
import { administer } from "@/lib/admin/administer";
import { inviteToSite, resendSiteInvitation, withdrawSiteInvitation } from "@/lib/admin/invite-to-site";
import { AccountSwitch, setAccountEnabled } from "@/lib/admin/set-account-enabled";
import { tryAgain } from "@/lib/jobs/dead-letters";
import { InvitationOfSite, SiteInvitation } from "@/lib/people/schema";

export const inviteToSiteAction = userAction(SiteInvitation, async (input, user) => {
  const invited = await inviteToSite(input, user);
  revalidatePath("/admin");
  return invited;
});

export const resendSiteInvitationAction = userAction(InvitationOfSite, async ({ invitationId }, user) => {
  await resendSiteInvitation(invitationId, user);
  revalidatePath("/admin");
});

export const withdrawSiteInvitationAction = userAction(InvitationOfSite, async ({ invitationId }, user) => {
  await withdrawSiteInvitation(invitationId, user);
  revalidatePath("/admin");
});

export const setAccountEnabledAction = userAction(AccountSwitch, async (input, user) => {
  await setAccountEnabled(input, user);
  revalidatePath("/admin");
});

export const tryAgainAction = userAction(z.object({ id: z.uuid() }), async ({ id }, user) => {
  administer(user);
  await tryAgain(id, user.id);
  revalidatePath("/admin/mail");
});
