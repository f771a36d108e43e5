import { z } from "zod";
import { withScope, type RootDatabase } from "@/db/client";
import { createAuditRow } from "@/db/queries/audit";
import { findSessions, revokeSession, type SessionView } from "@/db/queries/people";
import { failure, success, type Result } from "@/lib/result";
import { refusalOf } from "./deed";
import { findingsOf, keyField } from "./findings";

/** A signed-in person, whichever workspace is open. */
export type Person = { userId: string; userName: string; userEmail: string; sessionId: string; correlationId: string };
export type OwnSession = SessionView & { isCurrent: boolean };

export async function listOwnSessions(db: RootDatabase, person: Person | null): Promise<Result<OwnSession[]>> {
  if (!person) return failure("auth.required");
  const rows = await findSessions(db, { userId: person.userId });
  return success(rows.map((row) => ({ ...row, isCurrent: row.id === person.sessionId })));
}

/** Ends one of the person's own sessions; it stops counting with its next request. */
export async function revokeOwnSession(db: RootDatabase, person: Person | null, input: unknown): Promise<Result<null>> {
  const parsed = z.object({ sessionId: keyField }).safeParse(input);
  if (!person) return failure("auth.required");
  if (!parsed.success) return failure("input.invalid", { findings: findingsOf(parsed.error) });
  try {
    return await withScope(db, { userId: person.userId }, async (tx) => {
      const isEnded = await revokeSession(tx, { userId: person.userId }, parsed.data.sessionId);
      if (!isEnded) return failure("thing.missing");
      await createAuditRow(tx, person, { deed: "session.revoke", thingId: parsed.data.sessionId });
      return success(null);
    });
  } catch (cause) {
    return refusalOf(cause, "session.revoke", person.correlationId);
  }
}
