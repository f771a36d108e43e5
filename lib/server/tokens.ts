import { createHash, randomBytes } from "node:crypto";

/** 32 random bytes, URL-safe: for session cookies and share links. */
export const createToken = (): string => randomBytes(32).toString("base64url");

/** What is stored of a token. A token has 256 random bits, so a plain digest cannot be searched back; no slow hash is needed. */
export const hashToken = (token: string): string => createHash("sha256").update(token).digest("hex");
