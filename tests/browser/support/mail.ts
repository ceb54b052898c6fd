import { readFile, readdir } from "node:fs/promises";
import path from "node:path";
import { simpleParser, type ParsedMail } from "mailparser";

const folder = () => process.env.MAIL_FOLDER ?? ".local/mail";

/** All mails the local server has received for one address, oldest first. */
export async function mailsTo(address: string): Promise<ParsedMail[]> {
  const names = (await readdir(folder()).catch(() => [])).filter((name) => name.endsWith(".eml")).sort();
  const mails = await Promise.all(
    names.map(async (name) => simpleParser(await readFile(path.join(folder(), name)))),
  );
  return mails.filter(({ to }) =>
    [to].flat().some((list) => list?.value.some((one) => one.address === address)),
  );
}

/** Waits for the first mail to an address whose subject fits. */
export async function waitForMail(address: string, subject: RegExp, seconds = 30): Promise<ParsedMail> {
  const until = Date.now() + seconds * 1000;
  for (;;) {
    const found = (await mailsTo(address)).find((mail) => subject.test(mail.subject ?? ""));
    if (found) return found;
    if (Date.now() > until) throw new Error(`no mail to ${address} with a subject like ${String(subject)}`);
    await new Promise((resolve) => setTimeout(resolve, 250));
  }
}

/** The one link a mail asks its reader to open. */
export function linkIn(mail: ParsedMail): string {
  const link = /https?:\/\/\S+/.exec(mail.text ?? "")?.[0];
  if (!link) throw new Error(`no link in “${mail.subject}”`);
  return link;
}
