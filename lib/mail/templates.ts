import type { MailData } from "@/lib/jobs/definitions";
import { setLetter, type SetLetter } from "./letter";
import { mailLink } from "./link";

const DAY = new Intl.DateTimeFormat("en-GB", {
  day: "numeric",
  month: "long",
  year: "numeric",
  timeZone: "UTC",
});
const CLOCK = new Intl.DateTimeFormat("en-GB", { hour: "2-digit", minute: "2-digit", timeZone: "UTC" });

/** What a role is called in a sentence. */
const ROLE: Record<string, string> = {
  lead: "lead author",
  author: "author",
  referee: "referee",
  production: "member of production",
};

/** Asks somebody in. It says who asks, for what, and until when the link works. */
export function invitationMail(data: MailData<"invitation">): SetLetter {
  const { invitedBy, workTitle, role, path } = data;
  const expires = new Date(data.expiresAt);
  const to = workTitle === null ? "to Surdmark" : `to “${workTitle}”`;
  const as = role === null ? "" : ` as ${article(ROLE[role] ?? role)}`;
  return setLetter({
    subject: `${invitedBy} invites you ${to}`,
    paragraphs: [
      `${invitedBy} invites you ${to}${as}.`,
      "Surdmark recomputes the answers of a physics key exactly before it is printed, and two people settle what differs.",
      `The link below works once, until ${DAY.format(expires)}, ${CLOCK.format(expires)} UTC. Nothing happens before you confirm on the page that it opens.`,
    ],
    link: { label: "Accept the invitation", href: mailLink(path) },
    because: `You get this because ${invitedBy} gave your address. If you did not expect it, ignore it: no account is made.`,
  });
}

/** Tells an author that a second author took the recomputed value for their claim; not which claim, and not the value. */
export function claimCorrectedMail({ workTitle, settledBy, path }: MailData<"claim-corrected">): SetLetter {
  return setLetter({
    subject: `A claim of yours was corrected in “${workTitle}”`,
    paragraphs: [
      `${settledBy} settled a flag on one of your claims in “${workTitle}” with the word correct: the claim now has the recomputed value.`,
      "Its page shows the value before and after, the reason, and the evidence. What you wrote is kept in its history.",
    ],
    link: { label: "See the claim", href: mailLink(path) },
    because: "You get this because you wrote the claim.",
  });
}

/** One mail for all flags that wait for a person in one work: their number and where they are, nothing of what they say. */
export function flagDigestMail(data: { workId: string; workTitle: string; flags: number }): SetLetter {
  const { workId, workTitle, flags } = data;
  const [count, waits] = flags === 1 ? ["One flag", "waits"] : [`${flags} flags`, "wait"];
  return setLetter({
    subject: `${count} in “${workTitle}” ${waits} for you`,
    paragraphs: [
      `${count} in “${workTitle}” ${waits} for you as second author.`,
      "Each shows the claimed value beside the recomputed one, how the difference may have come about, and the evidence. You settle it by correct, stet, reword or withdraw.",
    ],
    link: {
      label: flags === 1 ? "Open the flag" : "Open the flags",
      href: mailLink(`/works/${workId}/flags`),
    },
    because:
      "You get this because the flags were assigned to you. They are gathered, so that there is one mail and not one for each.",
  });
}

const article = (words: string) => (/^[aeiou]/.test(words) ? `an ${words}` : `a ${words}`);
