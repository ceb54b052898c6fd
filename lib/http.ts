import "server-only";
import { randomUUID } from "node:crypto";
import type { z } from "zod";
import { env } from "@/lib/env";
import { AppError, STATUS, expected, type ErrorCode } from "@/lib/errors";
import { log } from "@/lib/log";

const TITLES: Record<ErrorCode, string> = {
  invalid: "The request cannot be used as it is",
  forbidden: "Not allowed",
  not_found: "Not found",
  conflict: "Changed in the meantime",
  too_large: "Too large",
  too_many: "Too many requests",
  unavailable: "Not available just now",
};

type Problem = {
  type: string;
  title: string;
  status: number;
  detail: string;
  instance: string;
  errors?: Record<string, string[]>;
} & Record<string, unknown>;

function problem(body: Problem, headers: Record<string, string> = {}): Response {
  return new Response(JSON.stringify(body), {
    status: body.status,
    headers: { "content-type": "application/problem+json", "cache-control": "no-store", ...headers },
  });
}

/** An error as RFC 9457 problem details; a bug as a 500 that carries nothing but a reference. */
export function problemResponse(error: unknown, path: string): Response {
  const known = expected(error);
  if (!known) {
    const reference = randomUUID().slice(0, 8);
    log.error({ error, reference, path }, "a request failed");
    return problem({
      type: "urn:surdmark:problem:failed",
      title: "Something went wrong on our side",
      status: 500,
      detail: `Quote ${reference} when you report this.`,
      instance: path,
      reference,
    });
  }
  const { code, message, fields, details } = known;
  const retryAfter = details?.retryAfter;
  return problem(
    {
      type: `urn:surdmark:problem:${code.replaceAll("_", "-")}`,
      title: TITLES[code],
      status: STATUS[code],
      detail: message,
      instance: path,
      ...(fields && { errors: fields }),
      ...(details && { details }),
    },
    typeof retryAfter === "number" ? { "retry-after": String(Math.max(1, Math.ceil(retryAfter))) } : {},
  );
}

const SAFE = new Set(["GET", "HEAD", "OPTIONS"]);

/**
 * Refuses a writing request that another site made a browser send. A program that is no browser sends neither
 * header and carries no cookie of ours.
 * @throws AppError forbidden
 */
export function refuseOtherOrigins(request: Request): void {
  if (SAFE.has(request.method)) return;
  const site = request.headers.get("sec-fetch-site");
  const origin = request.headers.get("origin");
  const allowed = site !== null ? site === "same-origin" : origin === null || origin === env.APP_URL;
  if (!allowed) throw new AppError("forbidden", "This request came from another site.");
}

/** Wraps a route handler: other origins are refused, and whatever is thrown becomes a problem document. */
export function route<C>(
  handler: (request: Request, context: C) => Promise<Response>,
): (request: Request, context: C) => Promise<Response> {
  return async (request, context) => {
    try {
      refuseOtherOrigins(request);
      return await handler(request, context);
    } catch (error) {
      return problemResponse(error, new URL(request.url).pathname);
    }
  };
}

/**
 * The bytes of a body, read piece by piece so that a lying Content-Length costs nothing.
 * @throws AppError too_large past `maxBytes`
 */
export async function readBytes(request: Request, maxBytes: number): Promise<Uint8Array> {
  const tooLarge = () =>
    new AppError(
      "too_large",
      `This is larger than ${maxBytes.toLocaleString("en-GB")} bytes, the most we take.`,
    );
  if (Number(request.headers.get("content-length") ?? 0) > maxBytes) throw tooLarge();
  const pieces: Uint8Array[] = [];
  let size = 0;
  const reader = request.body?.getReader();
  for (;;) {
    const piece = await reader?.read();
    if (!piece || piece.done) break;
    size += piece.value.byteLength;
    if (size > maxBytes) {
      await reader?.cancel().catch(() => undefined);
      throw tooLarge();
    }
    pieces.push(piece.value);
  }
  return Buffer.concat(pieces);
}

/**
 * The JSON body of a request, checked by `schema`.
 * @throws AppError too_large past `maxBytes`; invalid when it is not UTF-8, not JSON, or not what the schema wants
 */
export async function readJson<S extends z.ZodType>(
  request: Request,
  schema: S,
  maxBytes: number,
): Promise<z.output<S>> {
  const bytes = await readBytes(request, maxBytes);
  let body: unknown;
  try {
    body = JSON.parse(new TextDecoder("utf-8", { fatal: true }).decode(bytes));
  } catch {
    throw new AppError("invalid", "The body is not JSON in UTF-8.");
  }
  const parsed = schema.safeParse(body);
  if (parsed.success) return parsed.data;
  const fields: Record<string, string[]> = {};
  for (const issue of parsed.error.issues.slice(0, 50))
    (fields[issue.path.map(String).join(".") || "body"] ??= []).push(issue.message);
  throw new AppError("invalid", "The body has fields that are missing or wrong.", { fields });
}
