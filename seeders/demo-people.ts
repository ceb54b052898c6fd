import { randomBytes } from "node:crypto";
import { writeFileSync, mkdirSync } from "node:fs";
import path from "node:path";

import { hashPassword } from "@/lib/auth/password";
import type { Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { User } from "@/models";

export type DemoPerson = { key: DemoKey; name: string; email: string; role: Role | "administrator" };
export type DemoKey = "lead" | "first" | "second" | "referee" | "production" | "administrator";

/** Invented people; example.org takes no mail. */
export const DEMO_PEOPLE: readonly DemoPerson[] = [
  { key: "lead", name: "Mirel Ostrand", email: "mirel@example.org", role: "lead" },
  { key: "first", name: "Tamsin Arkwell", email: "tamsin@example.org", role: "author" },
  { key: "second", name: "Ilkka Vairo", email: "ilkka@example.org", role: "author" },
  { key: "referee", name: "Oriane Pelt", email: "oriane@example.org", role: "referee" },
  { key: "production", name: "Bram Keswick", email: "bram@example.org", role: "production" },
  { key: "administrator", name: "Hedda Norrow", email: "hedda@example.org", role: "administrator" },
];

export type Cast = Record<DemoKey, SessionUser>;

/**
 * Makes the demo people, or gives those who exist new passwords, and writes their sign-ins to `file`, which only its owner
 * can read. Passwords are random, so that no two installations share one.
 */
export async function makePeople(file: string): Promise<Cast> {
  const made = await Promise.all(
    DEMO_PEOPLE.map(async (person) => {
      const password = randomBytes(12).toString("base64url");
      const row = {
        name: person.name,
        passwordHash: await hashPassword(password),
        isAdmin: person.role === "administrator",
        disabledAt: null,
      };
      const [user, isNew] = await User.findOrCreate({
        where: { email: person.email },
        defaults: { email: person.email, ...row },
      });
      if (!isNew) await user.update(row);
      return { person, password, user };
    }),
  );
  mkdirSync(path.dirname(file), { recursive: true, mode: 0o700 });
  const signIns = made.map(({ person: { name, email, role }, password }) => ({
    name,
    email,
    password,
    role,
  }));
  writeFileSync(file, `${JSON.stringify(signIns, null, 2)}\n`, { mode: 0o600 });
  return Object.fromEntries(
    made.map(({ person: { key }, user: { id, name, email, isAdmin } }) => [
      key,
      { id, name, email, isAdmin, sessionId: "" },
    ]),
  ) as Cast;
}
