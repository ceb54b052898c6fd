import pino from "pino";
import { env } from "@/lib/env";

/**
 * The process's log: one JSON object a line on standard output, times in UTC.
 * What could be a secret or a claimed value is cut out by name, wherever it sits in the first two levels.
 */
export const log = pino({
  level: env.LOG_LEVEL,
  base: { process: process.env.SURDMARK_PROCESS ?? "web" },
  timestamp: pino.stdTimeFunctions.isoTime,
  formatters: { level: (level) => ({ level }) },
  serializers: { error: pino.stdSerializers.err, err: pino.stdSerializers.err },
  redact: {
    paths: [
      "password",
      "token",
      "secret",
      "cookie",
      "authorization",
      "claimed",
      "exact",
      "email",
      "to",
    ].flatMap((name) => [name, `*.${name}`]),
    censor: "[cut]",
  },
});
