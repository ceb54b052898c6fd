import type { Access } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { VerdictCounts } from "./counts";

/** The one thing that brings the work on from where it stands. */
export type NextStep = { says: string; label: string; href: string };

type Standing = {
  workId: string;
  access: Access;
  chapters: readonly { id: string; number: number; counts: VerdictCounts }[];
  counts: VerdictCounts;
  openFlags: number;
  people: number;
  hasKey: boolean;
};

/** What this person should do next on this work, or null when nothing is theirs to do. */
export function nextStep({
  workId,
  access,
  chapters,
  counts,
  openFlags,
  people,
  hasKey,
}: Standing): NextStep | null {
  const person = { ...access, isAdmin: false };
  const base = `/works/${workId}`;
  const writes = can(person, "claim.edit");
  if (writes && chapters.length === 0) return null;
  const empty = chapters.find((chapter) => chapter.counts.total === 0);
  if (writes && empty && counts.total === 0)
    return {
      says: "No claims yet: type the first or upload a key file.",
      label: `Open chapter ${empty.number}`,
      href: `${base}/chapters/${empty.id}`,
    };
  const unchecked = chapters.find((chapter) => chapter.counts.unchecked > 0);
  if (writes && unchecked)
    return {
      says: `${many(counts.unchecked, "claim is", "claims are")} not checked as they stand now.`,
      label: `Check chapter ${unchecked.number}`,
      href: `${base}/chapters/${unchecked.id}`,
    };
  if (openFlags > 0 && people < 2 && can(person, "people.manage"))
    return {
      says: "Flags need a second author, and you are alone on this work.",
      label: "Invite somebody",
      href: `${base}/people`,
    };
  if (openFlags > 0)
    return {
      says: `${many(openFlags, "flag waits", "flags wait")} to be settled by somebody other than the claimant.`,
      label: "Open the review queue",
      href: `${base}/flags`,
    };
  if (counts.total > 0 && !hasKey && can(person, "key.freeze"))
    return {
      says: "Every claim is checked and no flag is open.",
      label: "Freeze the key",
      href: `${base}/keys`,
    };
  return null;
}

const many = (count: number, one: string, several: string) =>
  `${count.toLocaleString("en-GB")} ${count === 1 ? one : several}`;
