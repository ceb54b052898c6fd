import { z } from "zod";
import { isCommonPassword } from "@/lib/auth/common-passwords";
import { EmailAddress, PersonName } from "./schema";

/** The only rules: long enough, not endless, and nothing that is guessed first. Spaces and every script are welcome. */
export const Password = z
  .string()
  .min(12, "Use at least 12 characters; four or five unrelated words are easy to remember.")
  .max(256, "Use at most 256 characters.")
  .refine((text) => !isCommonPassword(text), "This is among the first that are guessed. Choose another.");

/** 32 random bytes in the fragment of a link; anything else is refused as an unusable link. */
export const LinkToken = z.string().max(200);

/** A person who is new here. `email` only where the link does not know it (the first administrator's). */
export const NewPerson = z.object({
  token: LinkToken,
  email: EmailAddress.optional(),
  name: PersonName,
  password: Password,
});
export type NewPerson = z.output<typeof NewPerson>;
