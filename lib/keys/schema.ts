import { z } from "zod";

/** Freezing is asked for by typing the name of the key, such as "key 3". */
export const FreezeKey = z.object({
  workId: z.uuid(),
  number: z.number().int().min(1),
  confirmation: z.string().trim().max(40),
});
export type FreezeKey = z.output<typeof FreezeKey>;

export const NameWaiver = z.object({
  workId: z.uuid(),
  claimId: z.uuid(),
  claimVersion: z.number().int().min(1),
  reason: z
    .string()
    .trim()
    .min(10, "Say why the claim may be frozen undecided, in at least 10 characters")
    .max(1_000, "Keep it to 1000 characters"),
});
export type NameWaiver = z.output<typeof NameWaiver>;

export const KeyNumber = z
  .string()
  .regex(/^[1-9]\d{0,5}$/)
  .transform(Number);

export const KEY_FORMATS = ["json", "csv", "latex"] as const;
export const KeyFormat = z.enum(KEY_FORMATS);
export type KeyFormat = z.output<typeof KeyFormat>;
