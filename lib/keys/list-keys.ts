import { gate } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { preflight, type Preflight } from "@/lib/keys/preflight";
import { FrozenKey, User } from "@/models";

export type KeyLine = { number: number; sha256: string; claims: number; frozenBy: string; frozenAt: string };

export type KeysView = {
  work: { id: string; title: string; confidential: boolean };
  keys: KeyLine[];
  /** null for production, who see keys and nothing of what is behind them */
  preflight: Preflight | null;
  may: { freeze: boolean; waive: boolean };
};

/**
 * The keys of a work, the latest first, and for lead and authors what still prevents the next.
 * @throws AppError not_found outside the work, and for a referee
 */
export async function listKeys(workId: string, user: SessionUser): Promise<KeysView> {
  const access = await gate(user, "key.read", workId);
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  const rows = await FrozenKey.findAll({
    attributes: ["number", "sha256", "claims", "createdAt"],
    where: { workId },
    include: [{ model: User, as: "frozenBy", attributes: ["name"], required: true }],
    order: [["number", "DESC"]],
    limit: 200,
  });
  return {
    work: { id: access.work.id, title: access.work.title, confidential: access.work.confidential },
    keys: rows.map((row) => ({
      number: row.number,
      sha256: row.sha256,
      claims: row.claims,
      frozenBy: (row as FrozenKey & { frozenBy: User }).frozenBy.name,
      frozenAt: row.createdAt.toISOString(),
    })),
    preflight: can(person, "chapter.read") ? await preflight(workId, user) : null,
    may: { freeze: can(person, "key.freeze"), waive: can(person, "waiver.name") },
  };
}
