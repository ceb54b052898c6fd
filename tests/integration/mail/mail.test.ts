import { simpleParser, type ParsedMail } from "mailparser";
import { SMTPServer } from "smtp-server";
import { afterAll, beforeAll, beforeEach, expect, it } from "vitest";
import { Claim, Flag, Outbox } from "@/models";
import { env } from "@/lib/env";
import { listTroubled, outboxDepth, tryAgain } from "@/lib/jobs/dead-letters";
import { RETRY } from "@/lib/jobs/definitions";
import { drain } from "@/lib/jobs/drain";
import { post } from "@/lib/jobs/outbox";
import type { Handlers } from "@/lib/jobs/work";
import { handleFlagDigest } from "@/lib/mail/flag-digest";
import { handleMail } from "@/lib/mail/mail-handler";
import { postDigest } from "@/lib/flags/raise-flags";
import { transact } from "@/lib/transact";
import {
  asUser,
  buildAdmin,
  buildChapter,
  buildClaim,
  buildFlag,
  buildMember,
  buildUser,
  buildWork,
} from "../../factories";

const received: ParsedMail[] = [];
let refusing = false;
let whileReceiving: (() => Promise<void>) | null = null;
const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ["STARTTLS", "AUTH"],
  onRcptTo: (_to, _session, callback) =>
    callback(refusing ? Object.assign(new Error("not now"), { responseCode: 451 }) : null),
  onData: (stream, _session, callback) => {
    simpleParser(stream)
      .then(async (mail) => {
        received.push(mail);
        await whileReceiving?.();
      })
      .then(() => callback(), callback);
  },
});

beforeAll(async () => {
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const address = server.server.address();
  if (address === null || typeof address === "string") throw new Error("no port");
  env.SMTP_URL = `smtp://127.0.0.1:${address.port}`;
});
afterAll(() => new Promise<void>((resolve) => server.close(resolve)));
beforeEach(async () => {
  received.length = 0;
  refusing = false;
  whileReceiving = null;
  await Outbox.destroy({ where: {} });
});

const unused = { run: () => Promise.reject(new Error("no runs here")) };
const handlers: Handlers = {
  mail: { run: handleMail },
  "flag-digest": { run: handleFlagDigest },
  "run-batch": unused,
  "run-finish": unused,
};
const work = () => drain(handlers, new AbortController().signal);
/** Everything that waits for its next try is due now. */
const hurry = () => Outbox.update({ dueAt: new Date() }, { where: { state: "pending" } });

const invitation = {
  kind: "mail" as const,
  payload: {
    template: "invitation" as const,
    to: "ada@example.org",
    data: {
      invitedBy: "Zoë\r\nBcc: everybody@example.org <b>Z</b>",
      workTitle: "Angular momentum",
      role: "author",
      path: "/join#a-secret",
      expiresAt: "2026-12-08T12:00:00.000Z",
    },
  },
};

it("sends an invitation as text and HTML, with nothing smuggled into its headers", async () => {
  const id = await transact((transaction) => post(transaction, invitation));
  await work();
  expect(received).toHaveLength(1);
  const [mail] = received as [ParsedMail];
  expect(mail.messageId).toBe(`<${id}@${new URL(env.APP_URL).hostname}>`);
  expect(mail.headers.get("auto-submitted")).toBe("auto-generated");
  expect(mail.headers.has("bcc")).toBe(false);
  expect(mail.subject).toMatch(/^Zoë Bcc: everybody@example.org .* invites you to “Angular momentum”$/);
  expect(mail.text).toContain(`${env.APP_URL}/join#a-secret`);
  expect(mail.text).toContain("8 December 2026, 12:00 UTC");
  expect(mail.html).toContain(`href="${env.APP_URL}/join#a-secret"`);
  expect(mail.html).not.toContain("<b>Z</b>");
  const row = await Outbox.findByPk(id, { rejectOnEmpty: true });
  expect(row.state).toBe("done");
  expect(JSON.stringify(row.payload)).not.toContain("a-secret");
});

it("sends a mail exactly once after a mail server that refused", async () => {
  refusing = true;
  const id = await transact((transaction) => post(transaction, invitation));
  await work();
  await hurry();
  await work();
  expect(received).toHaveLength(0);
  expect(await listTroubled()).toMatchObject([{ id, state: "pending", attempts: 2, lastError: /not now/ }]);
  refusing = false;
  await hurry();
  await work();
  await work();
  expect(received).toHaveLength(1);
  expect(await listTroubled()).toEqual([]);
});

it("sets a mail aside after its last try, for the administrator to send again", async () => {
  refusing = true;
  const id = await transact((transaction) => post(transaction, invitation));
  for (let i = 0; i < RETRY.mail.attempts; i++) {
    await hurry();
    await work();
  }
  expect(await listTroubled()).toMatchObject([{ id, state: "dead", mail: { template: "invitation" } }]);
  expect(await outboxDepth()).toMatchObject({ pending: 0, dead: 1 });
  refusing = false;
  const admin = asUser(await buildAdmin());
  await tryAgain(id, admin.id);
  await expect(tryAgain(id, admin.id)).rejects.toMatchObject({ code: "conflict" });
  await work();
  expect(received).toHaveLength(1);
});

async function sceneWithFlags(count: number) {
  const book = await buildWork({ title: "Spins", createdById: (await buildUser()).id });
  const second = await buildMember(book, "author");
  const chapter = await buildChapter({ workId: book.id });
  const raise = async () => {
    const claim = await buildClaim({ workId: book.id, chapterId: chapter.id });
    const flag = await buildFlag({ claimId: claim.id, assigneeId: second.id });
    await transact((transaction) => postDigest(second.id, book.id, transaction));
    return flag;
  };
  for (let i = 0; i < count; i++) await raise();
  return { book, second, raise };
}

it("tells of five flags in one mail that names none of their values", async () => {
  const { book, second } = await sceneWithFlags(5);
  expect(await Outbox.count({ where: { kind: "flag-digest" } })).toBe(1);
  await work();
  expect(received).toHaveLength(1);
  const [mail] = received as [ParsedMail];
  expect(mail.subject).toBe("5 flags in “Spins” wait for you");
  expect(mail.text).toContain(`${env.APP_URL}/works/${book.id}/flags`);
  const claims = await Claim.findAll({ where: { workId: book.id } });
  const whole = `${mail.subject} ${mail.text} ${mail.html as string}`;
  for (const { claimed, quantity, ref } of claims)
    expect([claimed, quantity, ref].filter((secret) => whole.includes(secret))).toEqual([]);
  expect(await Flag.count({ where: { assigneeId: second.id, toldAt: null } })).toBe(0);
  await transact((transaction) => postDigest(second.id, book.id, transaction));
  await work();
  expect(received).toHaveLength(1);
});

it("tells of a flag that is raised while the mail is on its way in the next mail", async () => {
  const { second, raise } = await sceneWithFlags(2);
  whileReceiving = async () => {
    whileReceiving = null;
    await raise();
  };
  await work();
  await work();
  expect(received.map(({ subject }) => subject)).toEqual([
    "2 flags in “Spins” wait for you",
    "One flag in “Spins” waits for you",
  ]);
  expect(await Flag.count({ where: { assigneeId: second.id, toldAt: null } })).toBe(0);
});

it("sends no digest to somebody who has left the work", async () => {
  const { book, second } = await sceneWithFlags(1);
  const { Membership } = await import("@/models");
  await Membership.destroy({ where: { workId: book.id, userId: second.id } });
  await work();
  expect(received).toEqual([]);
  expect(await Outbox.count({ where: { state: "pending" } })).toBe(0);
});
