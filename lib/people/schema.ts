import { z } from "zod";
import { ROLES } from "@/lib/auth/permissions";

/** An e-mail address as we keep it: lower case, without spaces around it. */
export const EmailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, "This is longer than an e-mail address can be.")
  .pipe(z.email("Give an e-mail address, such as name@university.example."));

/** A name as it is printed: any script, no control characters or reversed text. */
export const PersonName = z
  .string()
  .trim()
  .min(1, "Give the name as it should be printed.")
  .max(120, "Use at most 120 characters.")
  .refine((text) => !/[\p{Cc}\u202a-\u202e\u2066-\u2069]/u.test(text), "Leave out control characters.")
  .transform((text) => text.normalize("NFC"));

const chapters = z.array(z.uuid()).max(500);
/** For a referee the chapters they read, or null for all; for everybody else null. */
const seat = {
  role: z.enum(ROLES, "Choose a role."),
  chapterIds: chapters.nullable(),
};
const seated = <T extends { role: string; chapterIds: string[] | null }>(input: T) =>
  input.role === "referee" || input.chapterIds === null;
const SEATED = { message: "Only a referee is held to chapters.", path: ["chapterIds"] };
const chosen = (input: { role: string; chapterIds: string[] | null }) =>
  input.chapterIds === null || input.chapterIds.length > 0;
const CHOSEN = { message: "Choose at least one chapter, or let them read all.", path: ["chapterIds"] };

export const NewInvitation = z
  .object({ workId: z.uuid(), email: EmailAddress, ...seat })
  .refine(seated, SEATED)
  .refine(chosen, CHOSEN);
export type NewInvitation = z.output<typeof NewInvitation>;

export const SiteInvitation = z.object({
  email: EmailAddress,
  role: z.enum(["person", "administrator"], "Choose what they may do."),
});
export type SiteInvitation = z.output<typeof SiteInvitation>;

export const InvitationOfWork = z.object({ workId: z.uuid(), invitationId: z.uuid() });
export const InvitationOfSite = z.object({ invitationId: z.uuid() });

export const RoleChange = z
  .object({ workId: z.uuid(), userId: z.uuid(), ...seat })
  .refine(seated, SEATED)
  .refine(chosen, CHOSEN);
export type RoleChange = z.output<typeof RoleChange>;

export const MemberOfWork = z.object({ workId: z.uuid(), userId: z.uuid() });

/** What a role may do, in the words of the people page. */
export const ROLE_WORDS: Record<(typeof ROLES)[number], { name: string; does: string }> = {
  lead: {
    name: "lead author",
    does: "Sets the conventions, invites people, assigns flags, freezes keys; writes and settles like an author.",
  },
  author: {
    name: "author",
    does: "Writes and uploads problems and claims, starts runs, settles flags on others' claims.",
  },
  referee: {
    name: "referee",
    does: "An outside second reader: settles the flags assigned to them, in the chapters chosen for them.",
  },
  production: {
    name: "production",
    does: "Reads and downloads frozen keys. Sees no drafts, flags or discussions.",
  },
};
