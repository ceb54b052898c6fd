import { cookies } from "next/headers";
import { authOptions } from "@/lib/auth/options";
import { getUser } from "@/lib/auth/session";
import { endSession } from "@/lib/auth/sessions";
import { route } from "@/lib/http";

/** Ends the session for good: its row is marked, so that a copy of the cookie is worth nothing either. */
export const POST = route(async () => {
  const user = await getUser();
  if (user) await endSession(user.sessionId);
  const cookie = authOptions.cookies?.sessionToken;
  if (cookie) (await cookies()).set(cookie.name, "", { ...cookie.options, maxAge: 0 });
  return seeOther("/sign-in?signed-out=1");
});

/** A link cannot sign anybody out; it leads to where one can. */
export const GET = route(() => Promise.resolve(seeOther("/desk")));

const seeOther = (path: string) =>
  new Response(null, { status: 303, headers: { location: path, "cache-control": "no-store" } });
