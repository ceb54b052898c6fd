import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { Source, User } from "@/models";
import type { SourceState } from "@/models/source";

export type SourceListed = {
  id: string;
  name: string;
  size: number;
  state: SourceState;
  acceptedRows: number | null;
  uploadedBy: string;
  at: string;
};

/**
 * The newest sources of a chapter.
 * @throws AppError not_found; forbidden
 */
export async function listSources(
  workId: string,
  chapterId: string,
  user: SessionUser,
  limit = 12,
): Promise<SourceListed[]> {
  await gate(user, "source.upload", workId, { chapterId });
  const rows = await Source.findAll({
    attributes: ["id", "name", "size", "state", "acceptedRows", "uploadedById", "createdAt"],
    where: { workId, chapterId },
    order: [["createdAt", "DESC"]],
    limit,
  });
  const people = await User.findAll({
    attributes: ["id", "name"],
    where: { id: [...new Set(rows.map((row) => row.uploadedById))] },
  });
  const names = new Map(people.map(({ id, name }) => [id, name]));
  return rows.map(({ id, name, size, state, acceptedRows, uploadedById, createdAt }) => ({
    id,
    name,
    size,
    state,
    acceptedRows,
    uploadedBy: names.get(uploadedById) ?? "",
    at: createdAt.toISOString(),
  }));
}
