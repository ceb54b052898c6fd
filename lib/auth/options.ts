import type { NextAuthOptions } from "next-auth";
import Credentials from "next-auth/providers/credentials";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { log } from "@/lib/log";
import { addressOf } from "./address";
import { ownPath } from "./own-path";
import { ABSOLUTE_MS, endSession, findSession } from "./sessions";
import { signIn } from "./sign-in";
import type { SessionUser } from "./user";

const secure = env.APP_URL.startsWith("https:");
/** On https the `__Host-` prefix keeps a neighbouring host from planting a cookie of the same name. */
const cookie = (name: string) => ({
  name: secure ? `__Host-${name}` : name,
  options: { httpOnly: true, sameSite: "lax" as const, path: "/", secure },
});

/** The JWT carries nothing but the session's secret; who it is stands in the database. */
export const authOptions: NextAuthOptions = {
  secret: env.NEXTAUTH_SECRET,
  session: { strategy: "jwt", maxAge: ABSOLUTE_MS / 1000 },
  useSecureCookies: secure,
  cookies: {
    sessionToken: cookie("surdmark-session"),
    csrfToken: cookie("surdmark-csrf"),
    callbackUrl: cookie("surdmark-return"),
  },
  pages: { signIn: "/sign-in", error: "/sign-in", signOut: "/sign-out" },
  logger: {
    error: (code, detail) =>
      log.error({ code, error: detail instanceof Error ? detail : undefined }, "sign-in fault"),
    warn: () => undefined,
    debug: () => undefined,
  },
  providers: [
    Credentials({
      name: "Password",
      credentials: { email: {}, password: {} },
      async authorize(given, request) {
        try {
          const { userId, token } = await signIn(
            { email: given?.email ?? "", password: given?.password ?? "" },
            { address: addressOf(request.headers), userAgent: String(request.headers?.["user-agent"] ?? "") },
          );
          return { id: userId, sessionToken: token } as SignedIn;
        } catch (error) {
          if (!(error instanceof AppError)) throw error;
          throw new Error(`${error.code}:${String(error.details?.retryAfter ?? 0)}`);
        }
      },
    }),
  ],
  callbacks: {
    jwt: ({ token, user }) =>
      user ? { session: (user as SignedIn).sessionToken } : { session: token.session },
    async session({ session, token }) {
      const user = typeof token.session === "string" ? await findSession(token.session) : null;
      return { expires: session.expires, user: user ?? undefined };
    },
    redirect: ({ url }) => {
      const path = url.startsWith(`${env.APP_URL}/`) ? url.slice(env.APP_URL.length) : url;
      return env.APP_URL + ownPath(path);
    },
  },
  events: {
    async signOut({ token }) {
      const user = typeof token.session === "string" ? await findSession(token.session) : null;
      if (user) await endSession(user.sessionId);
    },
  },
};

type SignedIn = { id: string; sessionToken: string };

declare module "next-auth" {
  interface Session {
    user?: SessionUser | undefined;
  }
}

declare module "next-auth/jwt" {
  interface JWT {
    session?: unknown;
  }
}
