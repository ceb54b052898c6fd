import { gate } from "@/lib/auth/gate";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { compareKeys, type KeyChanges } from "@/lib/keys/compare-keys";
import { sha256, type KeyContent } from "@/lib/keys/key-content";
import { FrozenKey } from "@/models";

export type KeyView = {
  work: { id: string; title: string; confidential: boolean };
  number: number;
  sha256: string;
  /** the hash, computed again from the stored content just now, is the one that was written when it was frozen */
  intact: boolean;
  content: KeyContent;
  /** null for the first key */
  changes: KeyChanges | null;
  latest: number;
};

/**
 * One frozen key as it was written.
 * @throws AppError not_found outside the work, for a referee, and for a number that was never frozen
 */
export async function getKey(workId: string, number: number, user: SessionUser): Promise<KeyView> {
  const access = await gate(user, "key.read", workId);
  const [key, previous, latest] = await Promise.all([
    FrozenKey.findOne({ where: { workId, number } }),
    FrozenKey.findOne({ where: { workId, number: number - 1 } }),
    FrozenKey.max<number, FrozenKey>("number", { where: { workId } }),
  ]);
  if (!key) throw notFound();
  const content = readContent(key);
  return {
    work: { id: access.work.id, title: access.work.title, confidential: access.work.confidential },
    number: key.number,
    sha256: key.sha256,
    intact: sha256(key.canonicalJson) === key.sha256,
    content,
    changes: previous ? compareKeys(readContent(previous), content) : null,
    latest,
  };
}

const readContent = ({ canonicalJson }: FrozenKey) => JSON.parse(canonicalJson) as KeyContent;
