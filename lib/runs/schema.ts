import { z } from "zod";

/** What a run is started for: one chapter, or with null the whole work. */
export const NewRun = z.object({ workId: z.uuid(), chapterId: z.uuid().nullable() });
export type NewRun = z.output<typeof NewRun>;

export const ThisRun = z.object({ workId: z.uuid(), runId: z.uuid() });
export type ThisRun = z.output<typeof ThisRun>;
