import { z } from "zod";

const line = (most: number) =>
  z
    .string()
    .trim()
    .max(most, `Keep it to ${most} characters`)
    .optional()
    .transform((text) => (text === "" ? undefined : text));

const place = { workId: z.uuid(), flagId: z.uuid() };
/** The version of the flag that the person was looking at. */
const version = z.number().int().min(0);

/** Settling a flag with one of the proof-reader's words. */
export const SettleFlag = z
  .object({
    ...place,
    version,
    word: z.enum(["correct", "stet", "reword", "withdraw"], { error: "Choose one of the four words" }),
    reason: line(2_000),
    convention: line(200),
  })
  .superRefine(({ word, reason, convention }, context) => {
    const say = (field: "reason" | "convention", message: string) =>
      context.addIssue({ code: "custom", path: [field], message });
    if (word === "stet" && (reason ?? "").length < 10)
      say("reason", "A stet needs its reason, in at least 10 characters");
    if (word === "stet" && (convention ?? "").length < 3)
      say("convention", "Name the convention or the source that the printed value relies on");
    if (word === "reword" && (reason ?? "").length < 10)
      say("reason", "Say what has to change in the problem, in at least 10 characters");
  });
export type SettleFlag = z.output<typeof SettleFlag>;

export const UndoSettlement = z.object({ ...place, version });
export type UndoSettlement = z.output<typeof UndoSettlement>;

/** `assigneeId` null takes the flag from everybody. */
export const AssignFlag = z.object({ ...place, version, assigneeId: z.uuid().nullable() });
export type AssignFlag = z.output<typeof AssignFlag>;

export const TakeFlag = z.object({ ...place, version });
export type TakeFlag = z.output<typeof TakeFlag>;

export const AddMessage = z.object({
  ...place,
  body: z.string().trim().min(1, "Write something first").max(4_000, "Keep it to 4000 characters"),
});
export type AddMessage = z.output<typeof AddMessage>;
