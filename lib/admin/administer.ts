import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";

/**
 * The gate of the administration, which reads no works.
 * @throws AppError not_found for everybody but an administrator
 */
export function administer(user: SessionUser): void {
  const person = { userId: user.id, isAdmin: user.isAdmin, role: null, chapterIds: null };
  if (!can(person, "site.administer")) throw notFound();
}
