"use server";

import { headers } from "next/headers";
import { z } from "zod";
import { userAction, visitorAction } from "@/lib/action";
import { addressOf } from "@/lib/auth/address";
import { takePoint } from "@/lib/limits";
import { acceptAsNewPerson, acceptSignedIn } from "@/lib/people/accept-invitation";
import { lookAtInvitation } from "@/lib/people/look-at-invitation";
import { LinkToken, NewPerson } from "@/lib/people/password-schema";

/** Guessing a link is hopeless; this keeps anybody from trying all day. */
const slowly = async () => takePoint({ name: "join", points: 20, seconds: 60 }, addressOf(await headers()));

export const lookAtInvitationAction = visitorAction(z.object({ token: LinkToken }), async ({ token }) => {
  await slowly();
  return lookAtInvitation(token);
});

export const acceptAsNewPersonAction = visitorAction(NewPerson, async (input) => {
  await slowly();
  return acceptAsNewPerson(input);
});

export const acceptSignedInAction = userAction(z.object({ token: LinkToken }), async ({ token }, user) => {
  await slowly();
  return acceptSignedIn(token, user);
});
