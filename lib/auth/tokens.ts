import { createHash, randomBytes } from "node:crypto";

/** 32 random bytes, as they go into a link or a cookie. */
export const newToken = () => randomBytes(32).toString("base64url");

/** What the database keeps of a token. A fast hash is enough: there is nothing to guess in 256 random bits. */
export const hashToken = (token: string) => createHash("sha256").update(token).digest("hex");

/** Whether the text can be a token at all. */
export const isToken = (text: string) => /^[A-Za-z0-9_-]{43}$/.test(text);
