"use server";

import { revalidatePath } from "next/cache";
import { userAction } from "@/lib/action";
import { changeRole } from "@/lib/people/change-role";
import { resendInvitation, withdrawInvitation } from "@/lib/people/end-invitation";
import { invitePerson } from "@/lib/people/invite-person";
import { removeMember } from "@/lib/people/remove-member";
import { InvitationOfWork, MemberOfWork, NewInvitation, RoleChange } from "@/lib/people/schema";

const refresh = (workId: string) => revalidatePath(`/works/${workId}/people`);

export const invitePersonAction = userAction(NewInvitation, async (input, user) => {
  const invited = await invitePerson(input, user);
  refresh(input.workId);
  return invited;
});

export const resendInvitationAction = userAction(InvitationOfWork, async (input, user) => {
  await resendInvitation(input, user);
  refresh(input.workId);
});

export const withdrawInvitationAction = userAction(InvitationOfWork, async (input, user) => {
  await withdrawInvitation(input, user);
  refresh(input.workId);
});

export const changeRoleAction = userAction(RoleChange, async (input, user) => {
  await changeRole(input, user);
  refresh(input.workId);
});

export const removeMemberAction = userAction(MemberOfWork, async (input, user) => {
  await removeMember(input, user);
  // Whoever leaves may not see this page any more: the browser goes to the desk.
  if (input.userId !== user.id) refresh(input.workId);
});
