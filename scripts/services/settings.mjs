import { existsSync } from "node:fs";
import path from "node:path";
import { Fault } from "./report.mjs";

/** Reads .env where there is one; what the environment already has wins. */
export function loadDotenv(root) {
  const file = path.join(root, ".env");
  if (existsSync(file)) process.loadEnvFile(file);
}

const given = (env, name) => env[name] !== undefined && env[name] !== "";
const isLocal = (address) =>
  URL.canParse(address) && ["localhost", "127.0.0.1", "[::1]"].includes(new URL(address).hostname);

/**
 * Demo or production: a person who names a database, a mail server or a public address means production.
 * SURDMARK_DEMO says it outright.
 */
export function isDemo(env) {
  if (given(env, "SURDMARK_DEMO")) return env.SURDMARK_DEMO === "1" || env.SURDMARK_DEMO === "true";
  const publicAddress = given(env, "APP_URL") && !isLocal(env.APP_URL);
  return !given(env, "DATABASE_URL") && !given(env, "SMTP_URL") && !publicAddress;
}

/** The web server's port. @throws Fault */
export function portOf(env) {
  const text = given(env, "PORT") ? env.PORT : "3000";
  const port = /^\d{1,5}$/.test(text) ? Number(text) : 0;
  if (port >= 1 && port <= 65535) return port;
  throw new Fault(`PORT must be a whole number from 1 to 65535: start with PORT=3000 npm start.`);
}

/** Whether a person set anything that lib/env.ts should judge before the servers start. */
export const isConfigured = (env) =>
  [
    "DATABASE_URL",
    "REDIS_URL",
    "SMTP_URL",
    "APP_URL",
    "NEXTAUTH_SECRET",
    "MAIL_FROM",
    "LOG_LEVEL",
    "SURDMARK_DEMO",
  ].some((name) => given(env, name)) ||
  Object.keys(env).some((name) => name.endsWith("_PER_MINUTE") || name === "DIGEST_DELAY_SECONDS");

/** The environment of all our processes: what a person gave, and our own servers and secrets for the rest. */
export function processEnvironment(env, { dev, demo, port, own }) {
  const address = given(env, "APP_URL") ? env.APP_URL : `http://localhost:${port}`;
  const ours = {
    APP_URL: address,
    NEXTAUTH_URL: address,
    ...own,
    ...(demo ? { DIGEST_DELAY_SECONDS: "5" } : {}),
  };
  const unset = Object.entries(ours).filter(([name, value]) => value !== undefined && !given(env, name));
  return {
    ...env,
    ...Object.fromEntries(unset),
    PORT: String(port),
    NODE_ENV: dev ? "development" : "production",
    SURDMARK_DEMO: demo ? "1" : "0",
    NEXT_TELEMETRY_DISABLED: "1",
  };
}
