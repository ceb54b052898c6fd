import type { Handlers } from "@/lib/jobs/work";
import { handleFlagDigest } from "@/lib/mail/flag-digest";
import { handleMail } from "@/lib/mail/mail-handler";
import { finishRun } from "@/lib/runs/finish-run";
import type { Verifier } from "@/lib/runs/verifier";
import { buryBatch, verifyBatch } from "@/lib/runs/verify-batch";

/** Who does what the outbox asks for. Only the worker imports this: the web process knows names and payloads. */
export const handlersWith = (verifier: Verifier): Handlers => ({
  "run-batch": { run: (payload, job) => verifyBatch(payload, job, verifier), dead: buryBatch },
  "run-finish": { run: finishRun },
  mail: { run: handleMail },
  "flag-digest": { run: handleFlagDigest },
});
