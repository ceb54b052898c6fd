import { z } from "zod";

import { SLIPS } from "@/lib/verify/slips";

const Typeset = z.object({ text: z.string(), latex: z.string() });

/** The part of a stored finding that the queue and a flag's page show; what an older engine did not write is null. */
const Details = z.object({
  reading: z.object({ quantityLatex: z.string(), claimedLatex: z.string() }).nullable().catch(null),
  houseForm: Typeset.nullable().catch(null),
  zero: z.array(z.object({ rule: z.string(), says: z.string() })).catch([]),
  errors: z
    .array(
      z.object({
        field: z.enum(["quantity", "claimed"]),
        at: z.number(),
        length: z.number(),
        says: z.string(),
        suggestion: z.string().optional(),
      }),
    )
    .catch([]),
  place: z.object({ file: z.string(), line: z.number(), column: z.number() }).nullable().catch(null),
});
export type Details = z.output<typeof Details>;

const NOTHING: Details = { reading: null, houseForm: null, zero: [], errors: [], place: null };

/** Reads the `details` column of a finding. */
export function readDetails(stored: unknown): Details {
  const read = Details.safeParse(stored ?? {});
  return read.success ? read.data : NOTHING;
}

const Diagnosis = z.object({
  causes: z.array(z.string()),
  says: z.string(),
  formulaLatex: z.string().catch(""),
  certainty: z.enum(["likely", "possible"]).catch("possible"),
});
export type Diagnosis = z.output<typeof Diagnosis> & { names: string[] };

/** Reads the `slips` column of a finding, with the name of each cause. */
export function readSlips(stored: unknown): Diagnosis[] {
  const read = z.array(Diagnosis).safeParse(stored ?? []);
  const names: Record<string, { name: string }> = SLIPS;
  return read.success
    ? read.data.map((slip) => ({ ...slip, names: slip.causes.map((id) => names[id]?.name ?? id) }))
    : [];
}
