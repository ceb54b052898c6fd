import nodemailer from "nodemailer";
import { env } from "@/lib/env";
import type { SetLetter } from "./letter";

/**
 * Hands one mail to the mail server and returns when the server has taken it.
 * @param key makes the Message-ID: a mail that is sent twice, because a worker died between sending and writing it
 *   down, is recognised as the same by the receiver
 * @throws whatever the mail server or the way to it answers
 */
export async function sendMail(to: string, { subject, text, html }: SetLetter, key: string): Promise<void> {
  const transport = nodemailer.createTransport(env.SMTP_URL, { from: env.MAIL_FROM });
  try {
    await transport.sendMail({
      to: { name: "", address: to },
      subject,
      text,
      html,
      messageId: `<${key}@${new URL(env.APP_URL).hostname}>`,
      headers: { "Auto-Submitted": "auto-generated", "X-Auto-Response-Suppress": "All" },
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  } finally {
    transport.close();
  }
}
