import { z } from "zod";
import { line, optionalLine } from "./text";

export const CLAIM_LIMITS = { ref: 60, typed: 4_000, note: 500, page: 20 } as const;

const workId = z.uuid();
const claimId = z.uuid();
/** The optimistic lock: what the person was looking at. */
const version = z.number().int().min(0);

/** What an author writes of one claim; the form, the action and the file reader use the same. */
export const ClaimText = z.object({
  ref: line("a reference such as 7.3(b)", CLAIM_LIMITS.ref),
  quantity: line("the quantity, such as (1 1 2; 0 0 0)", CLAIM_LIMITS.typed),
  claimed: line("the claimed value, such as sqrt(2/15)", CLAIM_LIMITS.typed),
  note: optionalLine(CLAIM_LIMITS.note),
  page: optionalLine(CLAIM_LIMITS.page),
});
export type ClaimText = z.output<typeof ClaimText>;

export const NewClaim = ClaimText.extend({ workId, problemId: z.uuid() });
export type NewClaim = z.output<typeof NewClaim>;

export const EditClaim = ClaimText.extend({ workId, claimId, version });
export type EditClaim = z.output<typeof EditClaim>;

export const MoveClaim = z.object({ workId, claimId, to: z.enum(["earlier", "later"]) });
export type MoveClaim = z.output<typeof MoveClaim>;

/** For withdrawing and restoring. */
export const ClaimAt = z.object({ workId, claimId, version });
export type ClaimAt = z.output<typeof ClaimAt>;
