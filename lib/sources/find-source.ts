import { gate, type Access } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { Source } from "@/models";

/**
 * A source without its bytes, for somebody who may upload to its chapter; to everybody else it does not exist, since
 * a source shows more of a work than its chapters do.
 * @throws AppError not_found
 */
export async function findSource(
  workId: string,
  sourceId: string,
  user: SessionUser,
): Promise<{ source: Source; access: Access }> {
  const access = await gate(user, "chapter.read", workId);
  if (!isId(sourceId)) throw notFound();
  const source = await Source.findOne({
    attributes: { exclude: ["bytes"] },
    where: { id: sourceId, workId },
  });
  if (!source) throw notFound();
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  if (!can(person, "source.upload", { chapterId: source.chapterId })) throw notFound();
  return { source, access };
}

/** The bytes as they came. Only after findSource. */
export async function bytesOf(sourceId: string): Promise<Buffer> {
  const row = await Source.findByPk(sourceId, { attributes: ["bytes"] });
  if (!row) throw notFound();
  return row.bytes;
}
