/** Somebody of the work who could read the flag. */
export type Candidate = {
  userId: string;
  role: "lead" | "author" | "referee";
  /** for a referee: the chapters they may read; null means all */
  chapterIds: string[] | null;
};

/**
 * Whom a flag falls to: never the claimant; an author, or a referee who has the chapter, with the fewest open flags;
 * the lead only when there is nobody else; nobody (null) when the claimant is alone.
 * @param openFlags how many open flags each person has; the caller counts the one given out here in.
 */
export function chooseAssignee(
  claimantId: string,
  chapterId: string,
  candidates: readonly Candidate[],
  openFlags: ReadonlyMap<string, number>,
): string | null {
  const able = candidates.filter(
    ({ userId, chapterIds }) =>
      userId !== claimantId && (chapterIds === null || chapterIds.includes(chapterId)),
  );
  const seconds = able.filter(({ role }) => role !== "lead");
  const chosen = (seconds.length > 0 ? seconds : able)
    .map(({ userId }) => ({ userId, load: openFlags.get(userId) ?? 0 }))
    .sort((a, b) => a.load - b.load || (a.userId < b.userId ? -1 : 1))[0];
  return chosen?.userId ?? null;
}
