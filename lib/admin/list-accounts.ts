import { Op, col, fn } from "sequelize";
import type { SessionUser } from "@/lib/auth/user";
import { Invitation, Session, User } from "@/models";
import { administer } from "./administer";

const PAGE = 50;

export type AccountView = {
  id: string;
  name: string;
  email: string;
  isAdmin: boolean;
  disabledAt: string | null;
  createdAt: string;
  lastUsedAt: string | null;
  isSelf: boolean;
};

export type SiteInvitationRow = {
  id: string;
  email: string;
  role: string;
  expiresAt: string;
  expired: boolean;
};

export type Accounts = {
  rows: AccountView[];
  total: number;
  page: number;
  pages: number;
  invitations: SiteInvitationRow[];
};

/** Everybody with an account, newest first, and the open invitations to the site itself. @throws AppError not_found */
export async function listAccounts(
  { page = 1, find = "" }: { page?: number; find?: string },
  user: SessionUser,
): Promise<Accounts> {
  administer(user);
  const wanted = `${find
    .trim()
    .slice(0, 100)
    .replace(/[\\%_]/g, "\\$&")}%`;
  const where =
    wanted === "%"
      ? {}
      : { [Op.or]: [{ email: { [Op.like]: wanted } }, { name: { [Op.like]: `%${wanted}` } }] };
  const [{ rows, count }, invitations] = await Promise.all([
    User.findAndCountAll({
      where,
      order: [
        ["createdAt", "DESC"],
        ["id", "ASC"],
      ],
      limit: PAGE,
      offset: (page - 1) * PAGE,
    }),
    Invitation.findAll({
      where: { workId: null, acceptedAt: null, withdrawnAt: null, email: { [Op.ne]: "" } },
      order: [["createdAt", "DESC"]],
      limit: 200,
    }),
  ]);
  const used = await lastUse(rows.map(({ id }) => id));
  return {
    rows: rows.map(({ id, name, email, isAdmin, disabledAt, createdAt }) => ({
      id,
      name,
      email,
      isAdmin,
      disabledAt: disabledAt?.toISOString() ?? null,
      createdAt: createdAt.toISOString(),
      lastUsedAt: used.get(id)?.toISOString() ?? null,
      isSelf: id === user.id,
    })),
    total: count,
    page,
    pages: Math.max(1, Math.ceil(count / PAGE)),
    invitations: invitations.map(({ id, email, role, expiresAt }) => ({
      id,
      email,
      role,
      expiresAt: expiresAt.toISOString(),
      expired: expiresAt <= new Date(),
    })),
  };
}

async function lastUse(userIds: string[]): Promise<Map<string, Date>> {
  const rows = (await Session.findAll({
    attributes: ["userId", [fn("MAX", col("last_used_at")), "last"]],
    where: { userId: userIds },
    group: ["user_id"],
    raw: true,
  })) as unknown as { userId: string; last: Date | string }[];
  return new Map(rows.map(({ userId, last }) => [userId, new Date(last)]));
}
