import { and, arrayContains, count, desc, eq, ilike, isNotNull, isNull, or, sql, type SQL } from "drizzle-orm";
import { can } from "@/lib/access/table";
import { Refusal } from "@/lib/errors";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { withScope, type Database, type Scope } from "../client";
import { revisions, scenarios, users, type RunSummary } from "../schema/index";
import { inWorkspace, thingOf, visibleNumber, visibleState, type ScenarioState } from "./scenario-access";
import { isKey, readStoredDocument } from "./stored";

export type { RunSummary, ScenarioState };

export type ScenarioRow = {
  id: string;
  title: string;
  tags: string[];
  state: ScenarioState;
  ownerId: string;
  ownerName: string;
  revisionNumber: number;
  changedAt: Date;
  isArchived: boolean;
  summary: RunSummary | null;
  mayEdit: boolean;
  mayDuplicate: boolean;
  mayArchive: boolean;
};

export type ScenarioList = {
  rows: ScenarioRow[];
  /** Rows that match the filters, over all pages. */
  total: number;
  page: number;
  pageCount: number;
  /** Of everything the person sees, whatever the filters; `all`, `mine` and the states leave archived ones out. */
  counts: { all: number; mine: number; archived: number } & Record<ScenarioState, number>;
  owners: { id: string; name: string }[];
  tags: string[];
};

export type ScenarioFilter = {
  search?: string;
  /** An owner's id, or "me". */
  owner?: string;
  state?: ScenarioState;
  tag?: string;
  archived?: boolean;
  /** From 1. */
  page: number;
  pageSize?: number;
};

function matches(scope: Scope, filter: ScenarioFilter): SQL | undefined {
  const word = filter.search?.trim().slice(0, 120);
  const pattern = word ? `%${word.replace(/[\\%_]/g, "\\$&")}%` : undefined;
  const owner = filter.owner === "me" ? scope.userId : filter.owner;
  return and(
    inWorkspace(scope),
    filter.archived ? isNotNull(scenarios.archivedAt) : isNull(scenarios.archivedAt),
    pattern
      ? or(
          ilike(scenarios.title, pattern),
          sql`exists (select from unnest(${scenarios.tags}) as tag where tag ilike ${pattern})`,
          sql`exists (select from ${users} where ${users.id} = ${scenarios.ownerId} and ${users.name} ilike ${pattern})`,
        )
      : undefined,
    owner === undefined ? undefined : isKey(owner) ? eq(scenarios.ownerId, owner) : sql`false`,
    filter.state ? sql`${visibleState(scope)} = ${filter.state}` : undefined,
    filter.tag ? arrayContains(scenarios.tags, [filter.tag]) : undefined,
  );
}

/** The scenario table: filtered, newest change first, one page, with the figures stored at the last save. */
export function findScenarios(database: Database, scope: Scope, filter: ScenarioFilter): Promise<ScenarioList> {
  return withScope(database, scope, async (tx) => {
    const pageSize = Math.min(Math.max(filter.pageSize ?? 25, 1), 100);
    const where = matches(scope, filter);
    const [{ total } = { total: 0 }] = await tx.select({ total: count() }).from(scenarios).where(where);
    const pageCount = Math.max(1, Math.ceil(total / pageSize));
    const page = Math.min(Math.max(Math.trunc(filter.page) || 1, 1), pageCount);
    const found = await tx
      .select({
        id: scenarios.id,
        title: scenarios.title,
        tags: scenarios.tags,
        state: visibleState(scope),
        ownerId: scenarios.ownerId,
        ownerName: users.name,
        revisionNumber: revisions.number,
        changedAt: scenarios.changedAt,
        archivedAt: scenarios.archivedAt,
        approvedNumber: scenarios.approvedNumber,
        summary: revisions.summary,
      })
      .from(scenarios)
      .innerJoin(revisions, and(eq(revisions.scenarioId, scenarios.id), eq(revisions.number, visibleNumber(scope))))
      .leftJoin(users, eq(users.id, scenarios.ownerId))
      .where(where)
      .orderBy(desc(scenarios.changedAt), scenarios.id)
      .limit(pageSize)
      .offset((page - 1) * pageSize);
    const rows = found.map(({ approvedNumber, archivedAt, ownerName, ...row }): ScenarioRow => {
      const thing = thingOf(scope, { ownerId: row.ownerId, approvedNumber, archivedAt });
      return {
        ...row,
        ownerName: ownerName ?? "Former member",
        isArchived: archivedAt !== null,
        mayEdit: archivedAt === null && can(scope.role, "revision.save", thing),
        mayDuplicate: can(scope.role, "scenario.duplicate", thing),
        mayArchive: can(scope.role, "scenario.archive", thing),
      };
    });
    return { rows, total, page, pageCount, ...(await describeAll(tx, scope)) };
  });
}

/** Counts, owners and tags of everything the person sees: what the filters offer. */
async function describeAll(tx: Database, scope: Scope): Promise<Pick<ScenarioList, "counts" | "owners" | "tags">> {
  const all = await tx
    .select({
      ownerId: scenarios.ownerId,
      ownerName: users.name,
      state: visibleState(scope),
      tags: scenarios.tags,
      archivedAt: scenarios.archivedAt,
    })
    .from(scenarios)
    .leftJoin(users, eq(users.id, scenarios.ownerId))
    .where(inWorkspace(scope));
  const counts: ScenarioList["counts"] = {
    all: 0,
    mine: 0,
    archived: 0,
    draft: 0,
    inReview: 0,
    approved: 0,
    superseded: 0,
  };
  const owners = new Map<string, string>();
  const tags = new Set<string>();
  for (const row of all) {
    owners.set(row.ownerId, row.ownerName ?? "Former member");
    row.tags.forEach((tag) => tags.add(tag));
    if (row.archivedAt) {
      counts.archived += 1;
      continue;
    }
    counts.all += 1;
    counts[row.state] += 1;
    if (row.ownerId === scope.userId) counts.mine += 1;
  }
  const byName = (a: { name: string }, b: { name: string }) => a.name.localeCompare(b.name, "en");
  return {
    counts,
    owners: [...owners].map(([id, name]) => ({ id, name })).sort(byName),
    tags: [...tags].sort((a, b) => a.localeCompare(b, "en")),
  };
}

export type RevisionView = {
  id: string;
  number: number;
  document: ScenarioDocument;
  authorName: string;
  message: string;
  createdAt: Date;
};

export type ScenarioView = {
  id: string;
  workspaceId: string;
  title: string;
  tags: string[];
  state: ScenarioState;
  ownerId: string;
  ownerName: string;
  isArchived: boolean;
  newestNumber: number;
  approvedNumber: number | null;
  revision: RevisionView;
  summary: RunSummary | null;
  mayEdit: boolean;
  mayShare: boolean;
  mayArchive: boolean;
  mayDuplicate: boolean;
};

/** One scenario with the revision that the person sees (or revision `number`); throws Refusal `thing.missing` for what is not there or not theirs to see. */
export function requireScenario(database: Database, scope: Scope, id: string, number?: number): Promise<ScenarioView> {
  if (!isKey(id)) return Promise.reject(new Refusal("thing.missing"));
  return withScope(database, scope, async (tx) => {
    const [found] = await tx
      .select({
        scenario: {
          id: scenarios.id,
          workspaceId: scenarios.workspaceId,
          title: scenarios.title,
          tags: scenarios.tags,
          state: visibleState(scope),
          ownerId: scenarios.ownerId,
          archivedAt: scenarios.archivedAt,
          newestNumber: visibleNumber(scope),
          approvedNumber: scenarios.approvedNumber,
        },
        ownerName: users.name,
        revision: {
          id: revisions.id,
          number: revisions.number,
          document: revisions.document,
          authorName: revisions.authorName,
          message: revisions.message,
          createdAt: revisions.createdAt,
        },
        summary: revisions.summary,
      })
      .from(scenarios)
      .innerJoin(
        revisions,
        and(eq(revisions.scenarioId, scenarios.id), eq(revisions.number, number ?? visibleNumber(scope))),
      )
      .leftJoin(users, eq(users.id, scenarios.ownerId))
      .where(and(inWorkspace(scope), eq(scenarios.id, id)));
    if (!found) throw new Refusal("thing.missing");
    const { archivedAt, ...scenario } = found.scenario;
    const thing = thingOf(scope, found.scenario);
    return {
      ...scenario,
      ownerName: found.ownerName ?? "Former member",
      isArchived: archivedAt !== null,
      revision: {
        ...found.revision,
        document: readStoredDocument(found.revision.document, `revision ${found.revision.id}`),
      },
      summary: found.summary,
      mayEdit: archivedAt === null && can(scope.role, "revision.save", thing),
      mayShare: can(scope.role, "share.make", thing),
      mayArchive: can(scope.role, "scenario.archive", thing),
      mayDuplicate: can(scope.role, "scenario.duplicate", thing),
    };
  });
}
