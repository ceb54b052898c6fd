import { Op, type Transaction } from "sequelize";
import { Session, User } from "@/models";
import { hashToken, isToken, newToken } from "./tokens";
import type { SessionUser } from "./user";

const HOUR = 3_600_000;
/** A session ends after this long without a request. */
export const IDLE_MS = 8 * HOUR;
/** A session ends this long after signing in, whatever happens. */
export const ABSOLUTE_MS = 7 * 24 * HOUR;
/** The time of last use is written at most this often. */
const TOUCH_MS = 60_000;

/**
 * Starts a session and gives the secret for its cookie; the database keeps only its hash.
 */
export async function startSession(
  userId: string,
  userAgent: string | null,
  now = new Date(),
): Promise<{ id: string; token: string }> {
  const token = newToken();
  const row = await Session.create({
    userId,
    tokenHash: hashToken(token),
    userAgent: userAgent?.slice(0, 255) ?? null,
    lastUsedAt: now,
    expiresAt: new Date(now.getTime() + ABSOLUTE_MS),
  });
  return { id: row.id, token };
}

/**
 * The person of a session that is neither ended, expired nor idle too long, and whose account is enabled; else null.
 */
export async function findSession(token: string, now = new Date()): Promise<SessionUser | null> {
  if (!isToken(token)) return null;
  const row = await Session.findOne({
    where: {
      tokenHash: hashToken(token),
      revokedAt: null,
      expiresAt: { [Op.gt]: now },
      lastUsedAt: { [Op.gt]: new Date(now.getTime() - IDLE_MS) },
    },
  });
  const user = row && (await User.findByPk(row.userId));
  if (!row || !user || user.disabledAt) return null;
  if (now.getTime() - row.lastUsedAt.getTime() > TOUCH_MS) await row.update({ lastUsedAt: now });
  return { id: user.id, name: user.name, email: user.email, isAdmin: user.isAdmin, sessionId: row.id };
}

/** Ends one session; it is refused from the very next request on. */
export async function endSession(id: string): Promise<void> {
  await Session.update({ revokedAt: new Date() }, { where: { id, revokedAt: null } });
}

/** Ends every session of a person. */
export async function endAllSessions(userId: string, transaction?: Transaction): Promise<void> {
  await Session.update(
    { revokedAt: new Date() },
    { where: { userId, revokedAt: null }, transaction: transaction ?? null },
  );
}
