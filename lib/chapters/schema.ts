import { z } from "zod";

const title = z
  .string()
  .trim()
  .min(1, "Give the chapter its title.")
  .max(200, "Use at most 200 characters.")
  .transform((text) => text.normalize("NFC"));
const number = z
  .number("Give the number as printed.")
  .int("Give a whole number.")
  .min(0, "Give a number from 0 to 9999.")
  .max(9_999, "Give a number from 0 to 9999.");

export const NewChapter = z.object({ workId: z.uuid(), number, title });
export type NewChapter = z.output<typeof NewChapter>;

export const ChapterChange = z.object({ workId: z.uuid(), chapterId: z.uuid(), number, title });
export type ChapterChange = z.output<typeof ChapterChange>;

export const ChapterMove = z.object({
  workId: z.uuid(),
  chapterId: z.uuid(),
  direction: z.enum(["earlier", "later"]),
});
export type ChapterMove = z.output<typeof ChapterMove>;

export const ChapterOfWork = z.object({ workId: z.uuid(), chapterId: z.uuid() });
