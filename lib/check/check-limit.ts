import { addressOf } from "@/lib/auth/address";
import { env } from "@/lib/env";
import { takePoint } from "@/lib/limits";

/** A person who types gets an answer at each pause; somebody signed in is counted by name, not by address. */
const SIGNED_IN_FACTOR = 10;

/**
 * Counts one check of the live form.
 * @throws AppError too_many
 */
export function countLiveCheck(request: Request, userId: string | null): Promise<void> {
  return userId === null
    ? takePoint(
        { name: "check", points: env.CHECK_LIMIT_PER_MINUTE, seconds: 60 },
        addressOf(request.headers),
      )
    : takePoint(
        { name: "check-user", points: SIGNED_IN_FACTOR * env.CHECK_LIMIT_PER_MINUTE, seconds: 60 },
        userId,
      );
}

/**
 * Counts one request of the HTTP interface.
 * @throws AppError too_many
 */
export function countKeyCheck(request: Request): Promise<void> {
  return takePoint(
    { name: "check-key", points: env.CHECK_LIMIT_PER_MINUTE, seconds: 60 },
    addressOf(request.headers),
  );
}
