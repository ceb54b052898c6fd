import type { KeyContent } from "@/lib/keys/key-content";

/**
 * A frozen key as the plain JSON key that people write: conventions and claims, each with the answer that is printed.
 * What is no frozen key comes back as it is, so that a reader of keys can pass everything through here.
 */
export function plainKey(read: unknown): unknown {
  if (!isFrozenKey(read)) return read;
  return {
    conventions: read.conventions,
    claims: read.claims.map(({ ref, quantity, answer, problem, page }) => ({
      ref,
      quantity,
      claimed: answer.text,
      problem,
      ...(page === null ? {} : { page }),
    })),
  };
}

function isFrozenKey(read: unknown): read is KeyContent {
  return (
    typeof read === "object" &&
    read !== null &&
    (read as Partial<KeyContent>).format === "surdmark-key-1" &&
    Array.isArray((read as Partial<KeyContent>).claims)
  );
}
