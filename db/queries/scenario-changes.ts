import { and, eq, sql, type SQL } from "drizzle-orm";
import { Refusal } from "@/lib/errors";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { withScope, type Database, type Scope } from "../client";
import { scenarios, type RunSummary } from "../schema/index";
import { insertRevision } from "./revisions";

// The inserts here name their columns: the application has rights on those columns only, and Drizzle's insert would list every column of the table.

/** A new scenario with its first revision; answers its id. */
export function createScenario(
  database: Database,
  scope: Scope,
  args: {
    title: string;
    tags: string[];
    document: ScenarioDocument;
    message: string;
    summary: RunSummary | null;
    copiedFromId?: string;
  },
): Promise<string> {
  return withScope(database, scope, async (tx) => {
    const [created] = await tx.execute<{ id: string }>(sql`
      insert into scenarios (workspace_id, owner_id, copied_from_id, title, tags, newest_number)
      values (${scope.workspaceId}, ${scope.userId}, ${args.copiedFromId ?? null}, ${args.title}, ${sql.param(args.tags, scenarios.tags)}, 1)
      returning id`);
    if (!created) throw new Refusal("access.denied");
    await insertRevision(tx, scope, {
      scenarioId: created.id,
      number: 1,
      document: args.document,
      message: args.message,
      summary: args.summary,
    });
    return created.id;
  });
}

type Change = { title: string } | { tags: string[] } | { archivedAt: SQL | null };

/** Changes the row of a scenario, never its revisions. A row that the policies hide is missing. */
async function changeScenario(database: Database, scope: Scope, id: string, change: Change): Promise<void> {
  await withScope(database, scope, async (tx) => {
    const changed = await tx
      .update(scenarios)
      .set({ ...change, changedAt: sql`now()` })
      .where(and(eq(scenarios.workspaceId, scope.workspaceId), eq(scenarios.id, id)))
      .returning({ id: scenarios.id });
    if (changed.length === 0) throw new Refusal("thing.missing");
  });
}

export const changeTitle = (database: Database, scope: Scope, id: string, title: string) =>
  changeScenario(database, scope, id, { title });
export const changeTags = (database: Database, scope: Scope, id: string, tags: string[]) =>
  changeScenario(database, scope, id, { tags });
export const changeArchived = (database: Database, scope: Scope, id: string, isArchived: boolean) =>
  changeScenario(database, scope, id, { archivedAt: isArchived ? sql`now()` : null });
