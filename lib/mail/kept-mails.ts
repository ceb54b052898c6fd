import { readdir, readFile } from "node:fs/promises";
import path from "node:path";
import { simpleParser } from "mailparser";
import { env } from "@/lib/env";
import { notFound } from "@/lib/errors";

export type KeptMail = { name: string; subject: string; to: string; at: string };
export type OpenedMail = KeptMail & { from: string; text: string; html: string | null };

const SHOWN = 100;
const NAME = /^[0-9A-Za-z][\w.-]{0,120}\.eml$/;

/**
 * The folder of the local mail server.
 * @throws AppError not_found unless this is a development machine or the demo: elsewhere no mail is ever shown
 */
function folder(): string {
  const here = env.SURDMARK_DEMO || env.NODE_ENV === "development";
  if (!here || env.MAIL_FOLDER === undefined) throw notFound();
  return env.MAIL_FOLDER;
}

/** The mails that the local mail server kept, newest first. @throws AppError not_found */
export async function listKeptMails(): Promise<KeptMail[]> {
  const names = await readdir(folder()).catch(() => [] as string[]);
  const newest = names
    .filter((name) => NAME.test(name))
    .sort()
    .reverse()
    .slice(0, SHOWN);
  return (await Promise.all(newest.map((name) => openKeptMail(name).catch(() => null)))).flatMap((mail) =>
    mail ? [{ name: mail.name, subject: mail.subject, to: mail.to, at: mail.at }] : [],
  );
}

/** One kept mail. @throws AppError not_found */
export async function openKeptMail(name: string): Promise<OpenedMail> {
  const place = folder();
  if (!NAME.test(name)) throw notFound();
  const bytes = await readFile(path.join(place, name)).catch(() => null);
  if (!bytes) throw notFound();
  const mail = await simpleParser(bytes, { skipImageLinks: true });
  const to = Array.isArray(mail.to) ? mail.to[0] : mail.to;
  return {
    name,
    subject: mail.subject ?? "(no subject)",
    to: to?.text ?? "",
    from: mail.from?.text ?? "",
    at: (mail.date ?? new Date(0)).toISOString(),
    text: mail.text ?? "",
    html: typeof mail.html === "string" ? mail.html : null,
  };
}
