import { afterAll, beforeEach, describe, expect, it } from "vitest";
import { buildChapter, buildMember, buildUser, buildWork, leadOf, asUser } from "../../factories";
import { inviteToSite } from "@/lib/admin/invite-to-site";
import { hashPassword } from "@/lib/auth/password";
import { acceptAsNewPerson, acceptSignedIn } from "@/lib/people/accept-invitation";
import { resendInvitation, withdrawInvitation } from "@/lib/people/end-invitation";
import { invitePerson } from "@/lib/people/invite-person";
import { lookAtInvitation } from "@/lib/people/look-at-invitation";
import type { SessionUser } from "@/lib/auth/user";
import { queue } from "@/lib/jobs/queue";
import { AuditEvent, Invitation, Membership, Outbox, User, sequelize, type Work } from "@/models";

let work: Work;
let lead: SessionUser;
const PASSWORD = "seven copper kettles hum";

beforeEach(async () => {
  work = await buildWork();
  lead = await leadOf(work);
});

afterAll(async () => {
  await queue().close(true);
  await sequelize.close();
});

const invite = (email: string, role: "author" | "referee" = "author", chapterIds: string[] | null = null) =>
  invitePerson({ workId: work.id, email, role, chapterIds }, lead);

/** The secret of the latest mail to an address. */
async function tokenFor(email: string): Promise<string> {
  const rows = await Outbox.findAll({ where: { kind: "mail" }, order: [["createdAt", "DESC"]] });
  const payloads = rows.map(({ payload }) => payload as { to: string; data: { path: string } });
  const path = payloads.find(({ to }) => to === email)?.data.path ?? "";
  expect(path).toMatch(/^\/join#[A-Za-z0-9_-]{43}$/);
  return path.slice("/join#".length);
}

const settled = async (tries: Promise<unknown>[]) => {
  const ends = await Promise.allSettled(tries);
  return { won: ends.filter(({ status }) => status === "fulfilled").length, ends };
};

describe("an invitation", () => {
  it("makes an account and a membership, once", async () => {
    await invite("new@example.org");
    const token = await tokenFor("new@example.org");
    expect(await lookAtInvitation(token)).toMatchObject({
      hasAccount: false,
      workTitle: work.title,
      role: "author",
    });
    const accepted = await acceptAsNewPerson({ token, name: "Nell New", password: PASSWORD });
    expect(accepted).toEqual({ path: `/works/${work.id}`, email: "new@example.org" });
    const person = await User.findOne({ where: { email: "new@example.org" }, rejectOnEmpty: true });
    expect(person).toMatchObject({ name: "Nell New", isAdmin: false });
    expect(await Membership.findOne({ where: { workId: work.id, userId: person.id } })).toMatchObject({
      role: "author",
    });
    await expect(acceptAsNewPerson({ token, name: "Again", password: PASSWORD })).rejects.toMatchObject({
      code: "invalid",
    });
  });

  it("accepted 50 times at once by somebody signed in gives one membership", async () => {
    const person = asUser(await buildUser());
    await invite(person.email);
    const token = await tokenFor(person.email);
    const { won } = await settled(Array.from({ length: 50 }, () => acceptSignedIn(token, person)));
    expect(won).toBe(1);
    expect(await Membership.count({ where: { workId: work.id, userId: person.id } })).toBe(1);
    expect(await AuditEvent.count({ where: { workId: work.id, action: "invitation.accept" } })).toBe(1);
  });

  it("accepted at once by ten who make the same account gives one account", async () => {
    await invite("rush@example.org");
    const token = await tokenFor("rush@example.org");
    const { won, ends } = await settled(
      Array.from({ length: 10 }, () => acceptAsNewPerson({ token, name: "Rush", password: PASSWORD })),
    );
    expect(won).toBe(1);
    for (const end of ends)
      if (end.status === "rejected") expect((end.reason as { name: string }).name).toBe("AppError");
    expect(await User.count({ where: { email: "rush@example.org" } })).toBe(1);
  });

  it("says the same of a wrong, used, expired, withdrawn and replaced link", async () => {
    const said: string[] = [];
    const saidOf = async (token: string) => {
      const looked = await lookAtInvitation(token).catch((error: Error) => error.message);
      const took = await acceptAsNewPerson({ token, name: "X", password: PASSWORD }).catch(
        (error: Error) => error.message,
      );
      said.push(String(looked), String(took));
    };
    await saidOf("nonsense");
    await saidOf("A".repeat(43));
    await invite("used@example.org");
    const used = await tokenFor("used@example.org");
    await acceptAsNewPerson({ token: used, name: "Used", password: PASSWORD });
    await saidOf(used);
    const { id: late } = await invite("late@example.org");
    await Invitation.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { id: late } });
    await saidOf(await tokenFor("late@example.org"));
    const { id: gone } = await invite("gone@example.org");
    await withdrawInvitation({ workId: work.id, invitationId: gone }, lead);
    await saidOf(await tokenFor("gone@example.org"));
    const { id: twice } = await invite("twice@example.org");
    const first = await tokenFor("twice@example.org");
    await resendInvitation({ workId: work.id, invitationId: twice }, lead);
    await saidOf(first);
    expect(new Set(said).size).toBe(1);
    expect(said[0]).toMatch(/^This link cannot be used/);
    const second = await tokenFor("twice@example.org");
    expect(second).not.toBe(first);
    expect(await lookAtInvitation(second)).toMatchObject({ email: "twice@example.org" });
  });

  it("is not for somebody signed in with another address", async () => {
    await invite("meant@example.org");
    const other = asUser(await buildUser());
    const token = await tokenFor("meant@example.org");
    await expect(acceptSignedIn(token, other)).rejects.toMatchObject({ code: "forbidden" });
    expect(await Membership.count({ where: { workId: work.id, userId: other.id } })).toBe(0);
    expect(await lookAtInvitation(token)).toMatchObject({ hasAccount: false });
  });

  it("lets nobody set a new password on an account that exists", async () => {
    const person = await buildUser({ passwordHash: await hashPassword(PASSWORD) });
    await invite(person.email);
    const token = await tokenFor(person.email);
    expect(await lookAtInvitation(token)).toMatchObject({ hasAccount: true });
    await expect(
      acceptAsNewPerson({ token, name: "Thief", password: "another good pass phrase" }),
    ).rejects.toMatchObject({
      code: "conflict",
    });
    await person.reload();
    expect(person.name).not.toBe("Thief");
    expect(await lookAtInvitation(token)).toBeTruthy();
  });

  it("keeps neither the secret nor a role above what was given", async () => {
    const { id } = await invite("quiet@example.org");
    const token = await tokenFor("quiet@example.org");
    const row = await Invitation.findByPk(id, { raw: true });
    expect(JSON.stringify(row)).not.toContain(token);
    await acceptAsNewPerson({ token, name: "Q", password: PASSWORD, ...{ role: "lead", isAdmin: true } });
    const person = await User.findOne({ where: { email: "quiet@example.org" }, rejectOnEmpty: true });
    expect(person.isAdmin).toBe(false);
    expect(await Membership.findOne({ where: { userId: person.id } })).toMatchObject({ role: "author" });
  });

  it("is sent by a lead alone, to chapters of this work alone, and to no member", async () => {
    const author = await buildMember(work, "author");
    const mail = { workId: work.id, email: "a@example.org", role: "referee" as const, chapterIds: null };
    await expect(invitePerson(mail, author)).rejects.toMatchObject({ code: "forbidden" });
    const stranger = asUser(await buildUser());
    await expect(invitePerson(mail, stranger)).rejects.toMatchObject({ code: "not_found" });
    const elsewhere = await buildChapter();
    await expect(invitePerson({ ...mail, chapterIds: [elsewhere.id] }, lead)).rejects.toMatchObject({
      code: "invalid",
    });
    await expect(invitePerson({ ...mail, email: author.email }, lead)).rejects.toMatchObject({
      code: "conflict",
    });
    expect(await Invitation.count({ where: { workId: work.id } })).toBe(0);
  });

  it("to the site makes an administrator only when the administrator says so", async () => {
    const admin = asUser(await buildUser({ isAdmin: true }));
    await expect(inviteToSite({ email: "b@example.org", role: "administrator" }, lead)).rejects.toMatchObject(
      {
        code: "not_found",
      },
    );
    await inviteToSite({ email: "b@example.org", role: "administrator" }, admin);
    await acceptAsNewPerson({ token: await tokenFor("b@example.org"), name: "Bea", password: PASSWORD });
    expect(await User.findOne({ where: { email: "b@example.org" } })).toMatchObject({ isAdmin: true });
  });
});
