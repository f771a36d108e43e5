import { and, eq, sql } from "drizzle-orm";
import type { Thing } from "@/lib/access/table";
import { Refusal } from "@/lib/errors";
import { withScope, type Database, type Scope } from "../client";
import { scenarios } from "../schema/index";

export type ScenarioState = "draft" | "inReview" | "approved" | "superseded";

/** A student sees the approved revision of what belongs to someone else; everyone else sees the newest. */
export const seesApproved = (scope: Scope) =>
  sql<boolean>`(${scope.role === "student"} and ${scenarios.ownerId} <> ${scope.userId})`;
export const visibleNumber = (scope: Scope) =>
  sql<number>`case when ${seesApproved(scope)} then ${scenarios.approvedNumber} else ${scenarios.newestNumber} end`;
export const visibleState = (scope: Scope) =>
  sql<ScenarioState>`case when ${seesApproved(scope)} then 'approved' else ${scenarios.state}::text end`;
export const inWorkspace = (scope: Scope) => eq(scenarios.workspaceId, scope.workspaceId);

export const thingOf = (
  scope: Scope,
  row: { ownerId: string; approvedNumber: number | null; archivedAt: Date | null },
): Thing => ({
  isOwn: row.ownerId === scope.userId,
  hasApproved: row.approvedNumber !== null && row.archivedAt === null,
});

export type ScenarioThing = Thing & { id: string; isArchived: boolean; newestNumber: number };

/** What `can` needs to know about a scenario; throws Refusal `thing.missing`. */
export function requireScenarioThing(database: Database, scope: Scope, id: string): Promise<ScenarioThing> {
  return withScope(database, scope, async (tx) => {
    const [row] = await tx
      .select({
        id: scenarios.id,
        ownerId: scenarios.ownerId,
        approvedNumber: scenarios.approvedNumber,
        archivedAt: scenarios.archivedAt,
        newestNumber: scenarios.newestNumber,
      })
      .from(scenarios)
      .where(and(inWorkspace(scope), eq(scenarios.id, id)));
    if (!row) throw new Refusal("thing.missing");
    return { ...thingOf(scope, row), id: row.id, isArchived: row.archivedAt !== null, newestNumber: row.newestNumber };
  });
}
