import { readFileSync } from "node:fs";
import path from "node:path";
import { parseEnv } from "node:util";
import { describe, expect, it } from "vitest";
import { ENV_NAMES, readEnv } from "@/lib/env";

const example = parseEnv(
  readFileSync(path.resolve(import.meta.dirname, "../../.env.example"), "utf8"),
) as Record<string, string>;
const strong = "q7Zr-4mWx9_Kp2LvT0bNc6HdYs8JgEfUa1iOo3Rt";
const production = {
  ...example,
  NODE_ENV: "production",
  APP_URL: "https://keys.example.org",
  NEXTAUTH_SECRET: strong,
  MAIL_FOLDER: "",
};

describe(".env.example", () => {
  it("names every variable and no other", () => {
    expect(Object.keys(example).sort()).toEqual([...ENV_NAMES].sort());
  });

  it("is good for development as it stands", () => {
    expect(readEnv(example)).toMatchObject({
      NODE_ENV: "development",
      PORT: 3000,
      APP_URL: "http://localhost:3000",
    });
  });
});

describe("readEnv", () => {
  it("names every variable that is missing, in a line each", () => {
    expect(() => readEnv({})).toThrow(
      /^DATABASE_URL is missing.*\nREDIS_URL is missing.*\nSMTP_URL is missing.*\nNEXTAUTH_SECRET is missing.*$/,
    );
  });

  it.each([
    ["DATABASE_URL", "mysql://a:b@h/d"],
    ["DATABASE_URL", "mariadb://a:b@h"],
    ["REDIS_URL", "localhost:6379"],
    ["SMTP_URL", "relay.invalid"],
    ["APP_URL", "https://example.org/below"],
    ["PORT", "0"],
    ["PORT", "3e3"],
    ["PORT", "65536"],
    ["MAIL_FROM", "a@b\r\nBcc: c@d"],
    ["NEXTAUTH_SECRET", "short"],
    ["DIGEST_DELAY_SECONDS", "-1"],
    ["LOG_LEVEL", "loud"],
    ["CHECK_LIMIT_PER_MINUTE", "many"],
    ["SIGN_IN_LIMIT_PER_MINUTE", "0"],
    ["SURDMARK_DEMO", "maybe"],
    ["LISTEN_HOST", "a b"],
  ])("refuses %s=%s by name, without repeating it", (name, value) => {
    expect(() => readEnv({ ...example, [name]: value })).toThrow(new RegExp(`^${name} [^\\n]+$`));
    if (value.length > 4) expect(() => readEnv({ ...example, [name]: value })).not.toThrow(value);
  });

  it("takes a sound production setting", () => {
    expect(readEnv(production)).toMatchObject({ NODE_ENV: "production", SURDMARK_DEMO: false });
  });

  it.each([
    [
      "the published example secret",
      { NEXTAUTH_SECRET: example.NEXTAUTH_SECRET },
      "NEXTAUTH_SECRET is a known",
    ],
    ["a repeated secret", { NEXTAUTH_SECRET: "abcabc".repeat(8) }, "NEXTAUTH_SECRET is a known"],
    ["a placeholder", { NEXTAUTH_SECRET: `${strong}-changeme` }, "NEXTAUTH_SECRET is a known"],
    ["no secret", { NEXTAUTH_SECRET: "" }, "NEXTAUTH_SECRET is missing"],
    ["no address", { APP_URL: "" }, "APP_URL is missing"],
    ["a database without a password", { DATABASE_URL: "mariadb://a@h/d" }, "DATABASE_URL has no password"],
    ["a folder of received mail", { MAIL_FOLDER: "mail" }, "MAIL_FOLDER is for development"],
  ])("refuses production with %s", (_what, change, message) => {
    expect(() => readEnv({ ...production, ...change })).toThrow(message);
  });

  it("needs no variable while building", () => {
    expect(readEnv({ NODE_ENV: "production", NEXT_PHASE: "phase-production-build" }).PORT).toBe(3000);
  });
});
