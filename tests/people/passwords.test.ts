import { expect, it } from "vitest";
import { hashPassword, verifyPassword } from "@/lib/auth/password";
import { Password } from "@/lib/people/password-schema";

it.each([
  "short words",
  "password1234",
  "Passw0rd2024!",
  "aaaaaaaaaaaaaaaa",
  "abcabcabcabcabc",
  "123456789012345",
  "qwertyuiopasdfg",
  "letmeinletmein",
  "AdminAdmin2026",
  "correct horse battery staple",
  "welcome-summer-7",
  "1qaz2wsx3edc4rfv",
  "x".repeat(257),
])("refuses %s", (text) => {
  expect(Password.safeParse(text).success).toBe(false);
});

it.each([
  "seven copper kettles hum",
  "трое суток шагать",
  "ondes et matière grise",
  "Vx7-kk_29-Lqz-p",
  "lighthouse pickle tram",
])("takes %s", (text) => {
  expect(Password.safeParse(text).success).toBe(true);
});

it("knows the right password, in whichever form of Unicode it is typed, and no other", async () => {
  const hash = await hashPassword("cafe\u0301 au lait noir");
  expect(hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  expect(await verifyPassword(hash, "caf\u00e9 au lait noir")).toBe(true);
  expect(await verifyPassword(hash, "café au lait noi")).toBe(false);
  expect(await verifyPassword(null, "café au lait noir")).toBe(false);
});
