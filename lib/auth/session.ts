import "server-only";
import { cache } from "react";
import { notFound, redirect } from "next/navigation";
import { headers } from "next/headers";
import { getServerSession } from "next-auth";
import { authOptions } from "./options";
import { ownPath } from "./own-path";
import type { SessionUser } from "./user";

export type { SessionUser } from "./user";

/** The person signed in, or null. Reads the session's row: an ended session is refused at once. Once a request. */
export const getUser = cache(async (): Promise<SessionUser | null> => {
  const session = await getServerSession(authOptions);
  return session?.user ?? null;
});

/** The person signed in; anybody else is sent to sign in and comes back to this page afterwards. */
export async function requireUser(): Promise<SessionUser> {
  const user = await getUser();
  if (user) return user;
  const here = ownPath((await headers()).get("x-surdmark-path"), "");
  redirect(here === "" ? "/sign-in" : `/sign-in?next=${encodeURIComponent(here)}`);
}

/** An administrator of the site; to everybody else the page does not exist. */
export async function requireAdmin(): Promise<SessionUser> {
  const user = await requireUser();
  if (!user.isAdmin) notFound();
  return user;
}
