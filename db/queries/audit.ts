import { desc, eq, sql } from "drizzle-orm";
import { withScope, type Database, type Scope, type Transaction } from "../client";
import { audit } from "../schema/index";

export type AuditRow = {
  id: number;
  actorName: string;
  deed: string;
  thingId: string | null;
  detail: Record<string, unknown>;
  correlationId: string;
  createdAt: Date;
};
export type AuditEntry = { deed: string; thingId?: string; detail?: Record<string, unknown> };
export type AuditActor = { userId: string; userName: string; workspaceId?: string; correlationId: string };

/** Adds the row of one action; only ever called inside the action's own transaction. */
export async function createAuditRow(tx: Transaction, actor: AuditActor, entry: AuditEntry): Promise<void> {
  await tx.execute(sql`
    insert into audit (workspace_id, actor_id, actor_name, deed, thing_id, detail, correlation_id)
    values (${actor.workspaceId ?? null}, ${actor.userId}, ${actor.userName}, ${entry.deed}, ${entry.thingId ?? null}, ${JSON.stringify(entry.detail ?? {})}::jsonb, ${actor.correlationId})`);
}

/** The audit of the workspace, newest first; empty for everyone whose role may not read it. */
export function findAuditRows(database: Database, scope: Scope, limit = 100): Promise<AuditRow[]> {
  return withScope(database, scope, (tx) =>
    tx
      .select({
        id: audit.id,
        actorName: audit.actorName,
        deed: audit.deed,
        thingId: audit.thingId,
        detail: audit.detail,
        correlationId: audit.correlationId,
        createdAt: audit.createdAt,
      })
      .from(audit)
      .where(eq(audit.workspaceId, scope.workspaceId))
      .orderBy(desc(audit.id))
      .limit(limit),
  );
}
