import type { SessionUser } from "@/lib/auth/user";
import { bytesOf, findSource } from "./find-source";

/**
 * A source as it came, for downloading.
 * @throws AppError not_found
 */
export async function getSourceBytes(
  workId: string,
  sourceId: string,
  user: SessionUser,
): Promise<{ name: string; sha256: string; bytes: Buffer }> {
  const { source } = await findSource(workId, sourceId, user);
  return { name: source.name, sha256: source.sha256, bytes: await bytesOf(source.id) };
}
