import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { resetPoints, takePoint, type Limit } from "@/lib/limits";
import { log } from "@/lib/log";
import { User } from "@/models";
import { hashToken } from "./tokens";
import { verifyPassword } from "./password";
import { startSession } from "./sessions";

/** One account from one address. Counting the two together means that nobody can lock out somebody elsewhere. */
const byAccount = (): Limit => ({ name: "sign-in", points: env.SIGN_IN_LIMIT_PER_MINUTE, seconds: 60 });
/** One address, whatever the account: one password tried on many names. */
const byAddress = (): Limit => ({
  name: "sign-in-address",
  points: env.SIGN_IN_LIMIT_PER_MINUTE * 5,
  seconds: 60,
});

const WRONG = "The e-mail address or the password is wrong.";

export const normalEmail = (text: string) => text.trim().normalize("NFC").toLowerCase();

/**
 * Checks a password and starts a session. An unknown address costs the same time and gives the same answer as a
 * wrong password; so does an account that is disabled or not yet accepted.
 * @throws AppError invalid; too_many with details.retryAfter
 */
export async function signIn(
  given: { email: string; password: string },
  from: { address: string; userAgent: string | null },
): Promise<{ userId: string; token: string }> {
  const email = normalEmail(given.email).slice(0, 254);
  // E-mail addresses stay out of Redis.
  const account = `${hashToken(email).slice(0, 32)}:${from.address}`;
  await takePoint(byAddress(), from.address);
  await takePoint(byAccount(), account);
  const user = await User.findOne({ where: { email } });
  const right = await verifyPassword(user?.passwordHash ?? null, given.password);
  if (!user || !right || user.disabledAt) {
    log.info({ event: "authn_login_fail", address: from.address, userId: user?.id }, "sign-in refused");
    throw new AppError("invalid", WRONG);
  }
  await resetPoints(byAccount(), account);
  const { token } = await startSession(user.id, from.userAgent);
  log.info({ event: "authn_login_success", userId: user.id }, "signed in");
  return { userId: user.id, token };
}
