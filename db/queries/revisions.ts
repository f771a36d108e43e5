import { and, desc, eq, isNull, sql } from "drizzle-orm";
import { Refusal } from "@/lib/errors";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { withScope, type Database, type Scope } from "../client";
import { keptDrafts, revisions, scenarios, type RunSummary } from "../schema/index";
import { isKey, readStoredDocument } from "./stored";

export type RevisionRow = {
  id: string;
  number: number;
  authorName: string;
  message: string;
  createdAt: Date;
  hasSummary: boolean;
};
export type NewestRevision = {
  id: string;
  number: number;
  authorId: string;
  authorName: string;
  createdAt: Date;
  document: ScenarioDocument;
};
export type KeptDraft = {
  id: string;
  scenarioId: string;
  baseNumber: number;
  message: string;
  createdAt: Date;
  document: ScenarioDocument;
};

/** The revisions of a scenario that the person sees, newest first. */
export function findRevisions(database: Database, scope: Scope, scenarioId: string): Promise<RevisionRow[]> {
  if (!isKey(scenarioId)) return Promise.resolve([]);
  return withScope(database, scope, (tx) =>
    tx
      .select({
        id: revisions.id,
        number: revisions.number,
        authorName: revisions.authorName,
        message: revisions.message,
        createdAt: revisions.createdAt,
        hasSummary: sql<boolean>`${revisions.summary} is not null`,
      })
      .from(revisions)
      .where(and(eq(revisions.workspaceId, scope.workspaceId), eq(revisions.scenarioId, scenarioId)))
      .orderBy(desc(revisions.number)),
  );
}

/** Writes one revision row; the caller has counted the scenario's newest number up in the same transaction. */
export async function insertRevision(
  database: Database,
  scope: Scope,
  args: { scenarioId: string; number: number; document: ScenarioDocument; message: string; summary: RunSummary | null },
): Promise<string> {
  const summary = args.summary === null ? null : JSON.stringify(args.summary);
  const [row] = await database.execute<{ id: string }>(sql`
    insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name, message, summary)
    values (${scope.workspaceId}, ${args.scenarioId}, ${args.number}, ${JSON.stringify(args.document)}::jsonb, ${scope.userId}, ${scope.userName}, ${args.message}, ${summary}::jsonb)
    returning id`);
  if (!row) throw new Refusal("access.denied");
  return row.id;
}

/**
 * Saves a revision on top of `baseNumber`; null if that is no longer the newest. The update takes the row's lock, so of
 * two savers the second waits, then finds the number gone and changes nothing.
 */
export function createRevision(
  database: Database,
  scope: Scope,
  args: {
    scenarioId: string;
    baseNumber: number;
    document: ScenarioDocument;
    message: string;
    summary: RunSummary | null;
  },
): Promise<{ id: string; number: number } | null> {
  return withScope(database, scope, async (tx) => {
    const [counted] = await tx
      .update(scenarios)
      .set({ newestNumber: sql`${scenarios.newestNumber} + 1`, state: "draft", changedAt: sql`now()` })
      .where(
        and(
          eq(scenarios.workspaceId, scope.workspaceId),
          eq(scenarios.id, args.scenarioId),
          eq(scenarios.newestNumber, args.baseNumber),
          isNull(scenarios.archivedAt),
        ),
      )
      .returning({ number: scenarios.newestNumber });
    if (!counted) return null;
    const id = await insertRevision(tx, scope, { ...args, number: counted.number });
    return { id, number: counted.number };
  });
}

/** The newest revision, for whoever comes second. */
export function requireNewestRevision(database: Database, scope: Scope, scenarioId: string): Promise<NewestRevision> {
  return withScope(database, scope, async (tx) => {
    const [newest] = await tx
      .select({
        id: revisions.id,
        number: revisions.number,
        authorId: revisions.authorId,
        authorName: revisions.authorName,
        createdAt: revisions.createdAt,
        document: revisions.document,
      })
      .from(revisions)
      .where(and(eq(revisions.workspaceId, scope.workspaceId), eq(revisions.scenarioId, scenarioId)))
      .orderBy(desc(revisions.number))
      .limit(1);
    if (!newest) throw new Refusal("thing.missing");
    return {
      ...newest,
      document: readStoredDocument(newest.document, `revision ${newest.number} of scenario ${scenarioId}`),
    };
  });
}

/** Keeps the version that came second; answers its id. */
export function createKeptDraft(
  database: Database,
  scope: Scope,
  args: { scenarioId: string; baseNumber: number; document: ScenarioDocument; message: string },
): Promise<string> {
  return withScope(database, scope, async (tx) => {
    const [row] = await tx.execute<{ id: string }>(sql`
      insert into kept_drafts (workspace_id, scenario_id, author_id, base_number, document, message)
      values (${scope.workspaceId}, ${args.scenarioId}, ${scope.userId}, ${args.baseNumber}, ${JSON.stringify(args.document)}::jsonb, ${args.message})
      returning id`);
    if (!row) throw new Refusal("access.denied");
    return row.id;
  });
}

const ownOpenDrafts = (scope: Scope) =>
  and(
    eq(keptDrafts.workspaceId, scope.workspaceId),
    eq(keptDrafts.authorId, scope.userId),
    isNull(keptDrafts.keptAsNumber),
  );
const draftColumns = {
  id: keptDrafts.id,
  scenarioId: keptDrafts.scenarioId,
  baseNumber: keptDrafts.baseNumber,
  message: keptDrafts.message,
  createdAt: keptDrafts.createdAt,
  document: keptDrafts.document,
};

/** The person's own drafts of a scenario that lost against a newer revision and were not kept yet, newest first. */
export function findKeptDrafts(database: Database, scope: Scope, scenarioId: string): Promise<KeptDraft[]> {
  if (!isKey(scenarioId)) return Promise.resolve([]);
  return withScope(database, scope, async (tx) => {
    const rows = await tx
      .select(draftColumns)
      .from(keptDrafts)
      .where(and(ownOpenDrafts(scope), eq(keptDrafts.scenarioId, scenarioId)))
      .orderBy(desc(keptDrafts.createdAt))
      .limit(20);
    return rows.map((row) => ({ ...row, document: readStoredDocument(row.document, `kept draft ${row.id}`) }));
  });
}

export function requireKeptDraft(database: Database, scope: Scope, draftId: string): Promise<KeptDraft> {
  return withScope(database, scope, async (tx) => {
    const [row] = await tx
      .select(draftColumns)
      .from(keptDrafts)
      .where(and(ownOpenDrafts(scope), eq(keptDrafts.id, draftId)));
    if (!row) throw new Refusal("thing.missing");
    return { ...row, document: readStoredDocument(row.document, `kept draft ${row.id}`) };
  });
}

export async function markDraftKept(database: Database, scope: Scope, draftId: string, number: number): Promise<void> {
  await withScope(database, scope, (tx) =>
    tx
      .update(keptDrafts)
      .set({ keptAsNumber: number })
      .where(and(ownOpenDrafts(scope), eq(keptDrafts.id, draftId))),
  );
}
