import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { buildUser } from "../../factories";
import { setAccountEnabled } from "@/lib/admin/set-account-enabled";
import { hashPassword } from "@/lib/auth/password";
import { ABSOLUTE_MS, IDLE_MS, endAllSessions, endSession, findSession } from "@/lib/auth/sessions";
import { signIn } from "@/lib/auth/sign-in";
import { env } from "@/lib/env";
import { closeLimits } from "@/lib/limits";
import { Session, User, sequelize } from "@/models";

const PASSWORD = "seven copper kettles hum";
let passwordHash = "";
let last = 0;
const somewhere = () => ({ address: `10.1.${++last}.1`, userAgent: "a browser" });

beforeAll(async () => {
  passwordHash = await hashPassword(PASSWORD);
});
afterAll(async () => {
  await closeLimits();
  await sequelize.close();
});

const person = () => buildUser({ passwordHash });

describe("a sign-in", () => {
  it("starts a session whose secret the database does not hold", async () => {
    const { id, email } = await person();
    const { token } = await signIn({ email: `  ${email.toUpperCase()} `, password: PASSWORD }, somewhere());
    expect(await findSession(token)).toMatchObject({ id, email });
    expect(JSON.stringify(await Session.findAll({ where: { userId: id }, raw: true }))).not.toContain(token);
    const again = await signIn({ email, password: PASSWORD }, somewhere());
    expect(again.token).not.toBe(token);
  });

  it("tells nothing about which accounts exist", async () => {
    const known = await person();
    const disabled = await buildUser({ passwordHash, disabledAt: new Date() });
    const invited = await buildUser({ passwordHash: null });
    const said = await Promise.all(
      [
        { email: known.email, password: "not the right one" },
        { email: "nobody@example.org", password: PASSWORD },
        { email: disabled.email, password: PASSWORD },
        { email: invited.email, password: PASSWORD },
        { email: invited.email, password: "" },
      ].map((given) => signIn(given, somewhere()).catch((error: unknown) => error)),
    );
    for (const answer of said) expect(answer).toEqual(said[0]);
    expect(said[0]).toMatchObject({
      code: "invalid",
      message: "The e-mail address or the password is wrong.",
    });
  });

  it("is refused after too many tries from one address, and works from another", async () => {
    const { email } = await person();
    const here = somewhere();
    const codes: string[] = [];
    for (let i = 0; i < env.SIGN_IN_LIMIT_PER_MINUTE + 4; i++)
      await signIn({ email, password: "wrong" }, here).catch((error: { code: string }) =>
        codes.push(error.code),
      );
    expect(codes.slice(0, env.SIGN_IN_LIMIT_PER_MINUTE)).toEqual(
      Array(env.SIGN_IN_LIMIT_PER_MINUTE).fill("invalid"),
    );
    expect(codes.slice(env.SIGN_IN_LIMIT_PER_MINUTE)).toEqual(Array(4).fill("too_many"));
    await expect(signIn({ email, password: PASSWORD }, here)).rejects.toMatchObject({
      code: "too_many",
      details: { retryAfter: expect.any(Number) as number },
    });
    expect(await signIn({ email, password: PASSWORD }, somewhere())).toBeTruthy();
  });

  it("is refused to one address that tries one password on many accounts", async () => {
    const here = somewhere();
    const codes: string[] = [];
    for (let i = 0; i < env.SIGN_IN_LIMIT_PER_MINUTE * 5 + 3; i++)
      await signIn({ email: `many-${i}@example.org`, password: "x" }, here).catch((error: { code: string }) =>
        codes.push(error.code),
      );
    expect(codes.filter((code) => code === "too_many")).toHaveLength(3);
  });
});

describe("a session", () => {
  const start = async () => {
    const user = await person();
    const { token } = await signIn({ email: user.email, password: PASSWORD }, somewhere());
    const session = await findSession(token);
    return { user, token, sessionId: session?.sessionId ?? "" };
  };

  it("that is ended is refused at once, others of the person are not", async () => {
    const { user, token, sessionId } = await start();
    const other = await signIn({ email: user.email, password: PASSWORD }, somewhere());
    await endSession(sessionId);
    expect(await findSession(token)).toBeNull();
    expect(await findSession(other.token)).not.toBeNull();
    await endAllSessions(user.id);
    expect(await findSession(other.token)).toBeNull();
  });

  it("of a disabled account is refused at once, and stays so when it is enabled again", async () => {
    const { user, token } = await start();
    const row = await buildUser({ isAdmin: true });
    const admin = { id: row.id, name: row.name, email: row.email, isAdmin: true, sessionId: "" };
    await setAccountEnabled({ userId: user.id, enabled: false }, admin);
    expect(await findSession(token)).toBeNull();
    await setAccountEnabled({ userId: user.id, enabled: true }, admin);
    expect(await findSession(token)).toBeNull();
    await expect(setAccountEnabled({ userId: admin.id, enabled: false }, admin)).rejects.toMatchObject({
      code: "conflict",
    });
  });

  it("is refused when it is idle too long, and in the end whatever happens", async () => {
    const { token } = await start();
    const now = Date.now();
    expect(await findSession(token, new Date(now + IDLE_MS + 1000))).toBeNull();
    for (let t = 0; t < ABSOLUTE_MS; t += IDLE_MS / 2)
      expect(await findSession(token, new Date(now + t))).not.toBeNull();
    expect(await findSession(token, new Date(now + ABSOLUTE_MS + 1000))).toBeNull();
  });

  it("is nobody's for a made-up, empty or hashed secret", async () => {
    const { token, sessionId } = await start();
    const row = await Session.findByPk(sessionId, { rejectOnEmpty: true });
    for (const wrong of ["", "x", token.slice(1), `${token}x`, row.tokenHash, sessionId])
      expect(await findSession(wrong)).toBeNull();
  });

  it("shows the name as it is now", async () => {
    const { user, token } = await start();
    await User.update({ name: "A New Name", isAdmin: true }, { where: { id: user.id } });
    expect(await findSession(token)).toMatchObject({ name: "A New Name", isAdmin: true });
  });
});
