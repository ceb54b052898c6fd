import { z } from "zod";

const id = z.uuid();
const address = z.string().min(3).max(254);

/** The mails that the outbox sends. Each carries only what may leave the house: names, counts and a link, never a claim. */
export const MailPayload = z.discriminatedUnion("template", [
  z.object({
    template: z.literal("invitation"),
    to: address,
    data: z.object({
      /** who invites; as printed */
      invitedBy: z.string(),
      /** null for an account without a work */
      workTitle: z.string().nullable(),
      /** null for an account without a work */
      role: z.string().nullable(),
      /** path with the token in its fragment, such as /join#… */
      path: z.string().startsWith("/"),
      expiresAt: z.iso.datetime(),
    }),
  }),
  z.object({
    template: z.literal("claim-corrected"),
    to: address,
    data: z.object({
      workTitle: z.string(),
      /** who settled the flag; as printed */
      settledBy: z.string(),
      path: z.string().startsWith("/"),
    }),
  }),
]);
export type MailPayload = z.output<typeof MailPayload>;
export type MailData<T extends MailPayload["template"]> = Extract<MailPayload, { template: T }>["data"];

/** What each kind of outbox row carries. Ids only, but for mails: nothing of a manuscript or a key. */
export const PAYLOADS = {
  "run-batch": z.object({ runId: id, batch: z.int().min(0) }),
  "run-finish": z.object({ runId: id }),
  mail: MailPayload,
  "flag-digest": z.object({ userId: id, workId: id }),
} as const;

export type JobKind = keyof typeof PAYLOADS;
export type Payload<K extends JobKind> = z.output<(typeof PAYLOADS)[K]>;

export type RetryRule = {
  /** How often a row is begun before it is set aside as dead. */
  attempts: number;
  /** Wait before the second attempt; each later wait is `factor` times the one before, up to `longestMs`. */
  firstMs: number;
  factor: number;
  longestMs: number;
};

/**
 * How patiently each kind is tried. A batch is tried often, because a killed worker spends an attempt each time;
 * what bounds a claim that fells its worker is the count kept with its finding.
 */
export const RETRY: Record<JobKind, RetryRule> = {
  "run-batch": { attempts: 60, firstMs: 500, factor: 2, longestMs: 15_000 },
  "run-finish": { attempts: 60, firstMs: 500, factor: 2, longestMs: 15_000 },
  mail: { attempts: 8, firstMs: 2_000, factor: 3, longestMs: 3_600_000 },
  "flag-digest": { attempts: 8, firstMs: 2_000, factor: 3, longestMs: 3_600_000 },
};

/** The wait after the given number of failed attempts (1 or more), in milliseconds. */
export function waitAfter(kind: JobKind, attempts: number): number {
  const { firstMs, factor, longestMs } = RETRY[kind];
  return Math.min(longestMs, firstMs * factor ** Math.max(0, attempts - 1));
}
