import { hash, verify } from "@node-rs/argon2";

/** argon2id (which is 2 in this package) with 19 MiB, two passes and one lane, the least that OWASP recommends. */
const COST = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export const hashPassword = (password: string) => hash(password.normalize("NFC"), COST);

let decoy: Promise<string> | undefined;

/**
 * Whether the password is the one of the hash. Without a hash the same work is done on a decoy, so that the time
 * does not tell whether an account exists.
 */
export async function verifyPassword(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hash("a password that nobody has", COST);
  const given = password.slice(0, 256).normalize("NFC");
  const right = await verify(passwordHash ?? (await decoy), given);
  return right && passwordHash !== null && password.length <= 256;
}
