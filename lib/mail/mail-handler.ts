import type { MailPayload } from "@/lib/jobs/definitions";
import type { Job } from "@/lib/jobs/work";
import type { SetLetter } from "./letter";
import { sendMail } from "./send-mail";
import { claimCorrectedMail, invitationMail } from "./templates";

/** Sends the mail of one outbox row. */
export async function handleMail(payload: MailPayload, job: Job): Promise<void> {
  await sendMail(payload.to, letterOf(payload), job.id);
}

function letterOf(payload: MailPayload): SetLetter {
  switch (payload.template) {
    case "invitation":
      return invitationMail(payload.data);
    case "claim-corrected":
      return claimCorrectedMail(payload.data);
  }
}
