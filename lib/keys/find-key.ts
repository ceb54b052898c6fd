import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { KeyNumber } from "@/lib/keys/schema";
import { FrozenKey } from "@/models";

/**
 * The number of a frozen key that this person may read, from how it stands in the address.
 * @throws AppError not_found: no member, a referee, not a number in plain figures, never frozen
 */
export async function findKey(workId: string, number: string, user: SessionUser): Promise<number> {
  await gate(user, "key.read", workId);
  const asked = KeyNumber.safeParse(number);
  if (!asked.success) throw notFound();
  const there = await FrozenKey.count({ where: { workId, number: asked.data } });
  if (there === 0) throw notFound();
  return asked.data;
}
