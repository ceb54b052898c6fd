import "server-only";
import { randomUUID } from "node:crypto";
import { notFound as showNotFound, unstable_rethrow } from "next/navigation";
import { z } from "zod";
import { getUser } from "@/lib/auth/session";
import type { SessionUser } from "@/lib/auth/user";
import { AppError, expected, toFailure, type Failure } from "@/lib/errors";
import { log } from "@/lib/log";

export type Result<T> = { ok: true; data: T } | Failure;

const SIGNED_OUT: Failure = {
  ok: false,
  code: "forbidden",
  message:
    "Your session has ended. Sign in again in another tab, then send this once more: what you typed stays here.",
  details: { signedOut: true },
};

/** Runs one checked call; a bug is logged under a reference that the person can quote. */
async function answer<T>(run: () => Promise<T>): Promise<Result<T>> {
  try {
    return { ok: true, data: await run() };
  } catch (error) {
    unstable_rethrow(error);
    if (expected(error)) return toFailure(error);
    const reference = randomUUID().slice(0, 8);
    log.error({ error, reference }, "an action failed");
    return {
      ok: false,
      code: "failed",
      message: `Something went wrong on our side and nothing was saved. Quote ${reference} when you report it.`,
    };
  }
}

function refuse(error: z.ZodError): Failure {
  const fields: Record<string, string[]> = {};
  for (const issue of error.issues) (fields[issue.path.join(".")] ??= []).push(issue.message);
  return { ok: false, code: "invalid", message: "Some of this needs another look.", fields };
}

/**
 * The one door for writes of somebody signed in. Every export of a "use server" file is made by this.
 * Expected failures become values; redirect() and notFound() pass through.
 */
export function userAction<S extends z.ZodType, T>(
  schema: S,
  run: (input: z.output<S>, user: SessionUser) => Promise<T>,
): (raw: z.input<S>) => Promise<Result<T>> {
  return async (raw) => {
    const user = await getUser();
    if (!user) return SIGNED_OUT;
    const input = schema.safeParse(raw);
    if (!input.success) return refuse(input.error);
    return answer(() => run(input.data, user));
  };
}

/** The same for somebody who is not signed in, such as a person accepting an invitation. */
export function visitorAction<S extends z.ZodType, T>(
  schema: S,
  run: (input: z.output<S>) => Promise<T>,
): (raw: z.input<S>) => Promise<Result<T>> {
  return async (raw) => {
    const input = schema.safeParse(raw);
    if (!input.success) return refuse(input.error);
    return answer(() => run(input.data));
  };
}

/** For pages: what the promise gives, or the page for what is not there. */
export async function orNotFound<T>(promise: Promise<T>): Promise<T> {
  try {
    return await promise;
  } catch (error) {
    if (error instanceof AppError && error.code === "not_found") showNotFound();
    throw error;
  }
}
