import { z } from "zod";

export const AcceptSource = z.object({
  workId: z.uuid(),
  sourceId: z.uuid(),
  /** "good": the rows that can be read; "all": those that cannot be read too, as they are written */
  rows: z.enum(["good", "all"]),
  /** of the preview that the person looked at */
  fingerprint: z.string().regex(/^[0-9a-f]{64}$/),
  conventionsVersion: z.number().int().min(1),
  seenAt: z.iso.datetime(),
  /** must be given when the file states conventions that differ from the sheet */
  conventions: z.enum(["sheet", "file"]).optional(),
});
export type AcceptSource = z.output<typeof AcceptSource>;

export const SourceAt = z.object({ workId: z.uuid(), sourceId: z.uuid() });
export type SourceAt = z.output<typeof SourceAt>;
