import { z } from "zod";

/** Characters that a page would act on instead of showing: text direction is turned by them unseen. */
const DIRECTION = /[\u200e\u200f\u061c\u202a-\u202e\u2066-\u2069]/;
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f]/;
const HALF_CHARACTER = /\p{Cs}/u;

/**
 * What is wrong with the characters of a text, as a sentence, or null. Line ends and tabs are allowed only where
 * `lines` says so.
 */
export function troubleIn(text: string, lines = false): string | null {
  if (HALF_CHARACTER.test(text)) return "This contains half of a character; type it again.";
  if (CONTROL.test(text)) return "This contains a control character that cannot be seen; type it again.";
  if (DIRECTION.test(text))
    return "This contains an invisible mark that turns the direction of writing; type it again.";
  if (!lines && /[\n\r\t\u2028\u2029]/.test(text)) return "This must stand on one line.";
  return null;
}

function checked(lines: boolean) {
  return (text: string, context: z.RefinementCtx) => {
    const trouble = troubleIn(text, lines);
    if (trouble) context.addIssue({ code: "custom", message: trouble });
  };
}

/** A line that must not be empty. */
export const line = (what: string, most: number) =>
  z
    .string()
    .trim()
    .normalize("NFC")
    .min(1, `Give ${what}.`)
    .max(most, `At most ${most} characters; a full sentence belongs in the note or the statement.`)
    .superRefine(checked(false));

/** A line that may be left empty, which is then null. */
export const optionalLine = (most: number) =>
  z
    .string()
    .trim()
    .normalize("NFC")
    .max(most, `At most ${most} characters.`)
    .superRefine(checked(false))
    .nullish()
    .transform((text) => text || null);

/** Several lines that may be empty. */
export const lines = (most: number) =>
  z
    .string()
    .trim()
    .normalize("NFC")
    .max(most, `At most ${most.toLocaleString("en-GB")} characters.`)
    .superRefine(checked(true));

/** What makes two refs or labels the same: 7.3(a) and 7.3(A) are two, as in the database; a space at an end is none. */
export const keyOf = (text: string) => text.trim().normalize("NFC");
