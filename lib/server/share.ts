import type { RootDatabase } from "@/db/client";
import { openShareLinkByHash, type SharedScenario } from "@/db/queries/shares";
import { failure, type Result } from "@/lib/result";
import { takeAttempt } from "./limits";
import { hashToken } from "./tokens";

export type { SharedScenario };

// 32 bytes in base64url: anything else names nothing and needs no look-up
const TOKEN = /^[A-Za-z0-9_-]{43}$/;

/** What a share link opens; counts one opening, so a page calls it once per request. */
export async function openShareLink(db: RootDatabase, tokenPlain: string): Promise<Result<SharedScenario>> {
  return TOKEN.test(tokenPlain) ? openShareLinkByHash(db, hashToken(tokenPlain)) : failure("link.unknown");
}

/** The same for a visitor from outside: limited per address, so that tokens cannot be tried out. */
export async function openShareLinkFrom(
  db: RootDatabase,
  address: string,
  tokenPlain: string,
): Promise<Result<SharedScenario>> {
  const attempt = await takeAttempt(db, "link.open", address);
  return attempt.ok ? openShareLink(db, tokenPlain) : attempt;
}
