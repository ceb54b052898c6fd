/** What an expected failure may be, and its HTTP status. */
export const STATUS = {
  invalid: 422,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  too_large: 413,
  too_many: 429,
  unavailable: 503,
} as const;

export type ErrorCode = keyof typeof STATUS;

/** Messages by field name, as a form shows them. */
export type FieldMessages = Record<string, string[]>;

/** What a form or a client is told. `failed` is a fault of ours; everything else is an AppError. */
export type Failure = {
  ok: false;
  code: ErrorCode | "failed";
  message: string;
  fields?: FieldMessages;
  details?: Record<string, unknown>;
};

/** A failure that we expect and may show to people, with a sentence for them. Anything else is a bug. */
export class AppError extends Error {
  override name = "AppError";
  readonly code: ErrorCode;
  readonly fields: FieldMessages | undefined;
  readonly details: Record<string, unknown> | undefined;

  constructor(
    code: ErrorCode,
    message: string,
    extra: { fields?: FieldMessages; details?: Record<string, unknown> } = {},
  ) {
    super(message);
    this.code = code;
    this.fields = extra.fields;
    this.details = extra.details;
  }
}

/** The one sentence for everything that is not there or not for this person: both look the same from outside. */
export const notFound = () => new AppError("not_found", "There is nothing here for you at this address.");

const DATABASE_AWAY = /^SequelizeConnection|^SequelizeHostNot|^SequelizeInvalidConnection/;
/** MariaDB: deadlock, lock wait timeout. */
const LOCKED = new Set([1205, 1213]);

function errnoOf(error: Error): number | null {
  const { original } = error as { original?: { errno?: unknown } };
  return typeof original?.errno === "number" ? original.errno : null;
}

/** Whether the database ended the transaction because two of them waited for each other. */
export const isDeadlock = (error: unknown) => error instanceof Error && errnoOf(error) === 1213;

/** Whether a unique key refused the row. */
export const isDuplicate = (error: unknown) =>
  error instanceof Error && error.name === "SequelizeUniqueConstraintError";

/** The error as one that we expect, or null for a bug. */
export function expected(error: unknown): AppError | null {
  if (error instanceof AppError) return error;
  if (!(error instanceof Error)) return null;
  if (DATABASE_AWAY.test(error.name))
    return new AppError(
      "unavailable",
      "The store of works cannot be reached just now. Try again in a minute.",
      {
        details: { retryAfter: 10 },
      },
    );
  if (error.name === "SequelizeOptimisticLockError")
    return new AppError(
      "conflict",
      "Somebody else changed this while you were looking at it. Reload to see it.",
    );
  const errno = errnoOf(error);
  if (errno !== null && LOCKED.has(errno))
    return new AppError("conflict", "Somebody else is saving the same thing. Try again.");
  return null;
}

/**
 * An expected failure as a value for a form.
 * @throws the error itself when it is a bug
 */
export function toFailure(error: unknown): Failure {
  const known = expected(error);
  if (!known) throw error;
  const { code, message, fields, details } = known;
  return { ok: false, code, message, ...(fields && { fields }), ...(details && { details }) };
}
