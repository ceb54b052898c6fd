import { z } from "zod";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";

export const WORK_KINDS = ["book", "exam", "course-pack"] as const;

export const KIND_WORDS: Record<(typeof WORK_KINDS)[number], { name: string; hint: string }> = {
  book: { name: "book", hint: "A textbook or a collection of problems." },
  exam: { name: "exam paper", hint: "Its key is confidential until the sitting." },
  "course-pack": { name: "course pack", hint: "Problem sheets of a course." },
};

const Title = z
  .string()
  .trim()
  .min(1, "Give the work its title.")
  .max(200, "Use at most 200 characters.")
  .refine((text) => !/[\p{Cc}\u202a-\u202e\u2066-\u2069]/u.test(text), "Leave out control characters.")
  .transform((text) => text.normalize("NFC"));

/** The conventions sheet as a form gives it: radio buttons have no booleans. */
export const ConventionsSheetInput = z.object({
  cgOrder: z.enum(["j1m1j2m2", "j1j2m1m2"], "Choose the order."),
  phase: z.literal("condon-shortley", "Choose the phase."),
  houseForm: z.enum(
    ["any", "rationalised", "single-root", "root-below", "signed-square"],
    "Choose the form.",
  ),
  impliedRoot: z
    .union([z.boolean(), z.enum(["true", "false"])], "Choose one.")
    .transform((value) => value === true || value === "true"),
  decimalMark: z.enum([".", ","], "Choose the mark."),
}) satisfies z.ZodType<Conventions>;

/** What is stored, read back: a choice that an older sheet did not make is the default. */
export const readConventions = (stored: unknown): Conventions =>
  ConventionsSheetInput.parse({ ...DEFAULT_CONVENTIONS, ...(stored as Partial<Conventions>) });

export const NewWork = z.object({
  title: Title,
  kind: z.enum(WORK_KINDS, "Choose the kind."),
  confidential: z.boolean(),
  conventions: ConventionsSheetInput,
});
export type NewWork = z.output<typeof NewWork>;

export const WorkChange = z.object({
  workId: z.uuid(),
  title: Title,
  kind: z.enum(WORK_KINDS, "Choose the kind."),
  confidential: z.boolean(),
});
export type WorkChange = z.output<typeof WorkChange>;

export const ConventionsChange = z.object({
  workId: z.uuid(),
  /** the version that the person was looking at */
  version: z.int().min(1),
  conventions: ConventionsSheetInput,
});
export type ConventionsChange = z.output<typeof ConventionsChange>;
