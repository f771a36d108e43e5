import type { Database } from "@/db/client";
import { countAttempt, returnAttempt } from "@/db/queries/limits";
import { failure, success, type Result } from "@/lib/result";
import { hashToken } from "./tokens";

/** How often what may be tried. Sign-ins that succeed are given back, so these count failures. */
const LIMITS = {
  "sign-in.address": { windowS: 900, limit: 30 },
  "sign-in.email": { windowS: 900, limit: 10 },
  "link.open": { windowS: 60, limit: 60 },
  "simulation.run": { windowS: 60, limit: 60 },
  "revision.save": { windowS: 60, limit: 60 },
} as const;
export type LimitName = keyof typeof LIMITS;

const keyOf = (name: LimitName, subject: string): string => `${name}:${hashToken(subject)}`;

/** Counts an attempt; `limit.reached` with the seconds to wait in `detail` when there were too many. */
export async function takeAttempt(db: Database, name: LimitName, subject: string): Promise<Result<null>> {
  const attempt = await countAttempt(db, { key: keyOf(name, subject), ...LIMITS[name] });
  return attempt.isAllowed ? success(null) : failure("limit.reached", { detail: { retryAfterS: attempt.retryAfterS } });
}

export const giveAttemptBack = (db: Database, name: LimitName, subject: string): Promise<void> =>
  returnAttempt(db, { key: keyOf(name, subject), windowS: LIMITS[name].windowS });
