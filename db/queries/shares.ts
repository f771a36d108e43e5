import { and, desc, eq, sql } from "drizzle-orm";
import { can, type Thing } from "@/lib/access/table";
import { Refusal } from "@/lib/errors";
import { failure, success, type Result } from "@/lib/result";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { withScope, type Database, type Scope } from "../client";
import { shareLinks, users } from "../schema/index";
import { readStoredDocument } from "./stored";

export type ShareLinkView = {
  id: string;
  label: string;
  follows: "pinned" | "newest";
  revisionNumber: number | null;
  makerName: string;
  createdAt: Date;
  expiresAt: Date | null;
  revokedAt: Date | null;
  status: "open" | "expired" | "revoked";
  openedCount: number;
  lastOpenedAt: Date | null;
  mayChange: boolean;
  mayRevoke: boolean;
};

export type SharedScenario = {
  title: string;
  document: ScenarioDocument;
  revisionNumber: number;
  label: string;
  follows: "pinned" | "newest";
  workspaceName: string;
};

/** The links of a scenario, newest first. No token and no hash: the application's role cannot read them. */
export function findShareLinks(database: Database, scope: Scope, scenarioId: string): Promise<ShareLinkView[]> {
  return withScope(database, scope, async (tx) => {
    const rows = await tx
      .select({
        id: shareLinks.id,
        label: shareLinks.label,
        revisionNumber: shareLinks.revisionNumber,
        makerId: shareLinks.makerId,
        makerName: users.name,
        createdAt: shareLinks.createdAt,
        expiresAt: shareLinks.expiresAt,
        revokedAt: shareLinks.revokedAt,
        isExpired: sql<boolean>`coalesce(${shareLinks.expiresAt} <= now(), false)`,
        openedCount: shareLinks.openedCount,
        lastOpenedAt: shareLinks.lastOpenedAt,
      })
      .from(shareLinks)
      .leftJoin(users, eq(users.id, shareLinks.makerId))
      .where(and(eq(shareLinks.workspaceId, scope.workspaceId), eq(shareLinks.scenarioId, scenarioId)))
      .orderBy(desc(shareLinks.createdAt), shareLinks.id);
    return rows.map(({ makerId, makerName, isExpired, ...row }) => {
      const thing = { isOwn: makerId === scope.userId };
      return {
        ...row,
        makerName: makerName ?? "Former member",
        follows: row.revisionNumber === null ? "newest" : "pinned",
        status: row.revokedAt ? "revoked" : isExpired ? "expired" : "open",
        mayChange: row.revokedAt === null && can(scope.role, "share.change", thing),
        mayRevoke: row.revokedAt === null && can(scope.role, "share.revoke", thing),
      };
    });
  });
}

export function createShareLink(
  database: Database,
  scope: Scope,
  args: { scenarioId: string; tokenHash: string; label: string; revisionNumber: number | null; expiresAt: Date | null },
): Promise<string> {
  return withScope(database, scope, async (tx) => {
    const [row] = await tx.execute<{ id: string }>(sql`
      insert into share_links (workspace_id, scenario_id, token_hash, label, revision_number, maker_id, expires_at)
      values (${scope.workspaceId}, ${args.scenarioId}, ${args.tokenHash}, ${args.label}, ${args.revisionNumber}, ${scope.userId}, ${args.expiresAt?.toISOString() ?? null}::timestamptz)
      returning id`);
    if (!row) throw new Refusal("access.denied");
    return row.id;
  });
}

export type LinkThing = Thing & { id: string; isRevoked: boolean };

/** What `can` needs to know about a link; throws Refusal `thing.missing`. */
export function requireLinkThing(database: Database, scope: Scope, linkId: string): Promise<LinkThing> {
  return withScope(database, scope, async (tx) => {
    const [row] = await tx
      .select({ id: shareLinks.id, makerId: shareLinks.makerId, revokedAt: shareLinks.revokedAt })
      .from(shareLinks)
      .where(and(eq(shareLinks.workspaceId, scope.workspaceId), eq(shareLinks.id, linkId)));
    if (!row) throw new Refusal("thing.missing");
    return { id: row.id, isOwn: row.makerId === scope.userId, isRevoked: row.revokedAt !== null };
  });
}

async function changeLink(
  database: Database,
  scope: Scope,
  linkId: string,
  change: Parameters<typeof setOf>[0],
): Promise<void> {
  await withScope(database, scope, async (tx) => {
    const changed = await tx
      .update(shareLinks)
      .set(setOf(change))
      .where(and(eq(shareLinks.workspaceId, scope.workspaceId), eq(shareLinks.id, linkId)))
      .returning({ id: shareLinks.id });
    if (changed.length === 0) throw new Refusal("thing.missing");
  });
}
const setOf = (change: { expiresAt: Date | null } | { revoke: true }) =>
  "revoke" in change ? { revokedAt: sql`coalesce(${shareLinks.revokedAt}, now())` } : change;

export const changeLinkExpiry = (database: Database, scope: Scope, linkId: string, expiresAt: Date | null) =>
  changeLink(database, scope, linkId, { expiresAt });
export const revokeLink = (database: Database, scope: Scope, linkId: string) =>
  changeLink(database, scope, linkId, { revoke: true });

type Opening = {
  status: "open" | "unknown" | "expired" | "revoked";
  title: string;
  document: unknown;
  revision_number: number;
  label: string;
  follows: "pinned" | "newest";
  workspace_name: string;
};

/** What a link opens, counted as one opening. For everyone, signed in or not: the function in PostgreSQL answers what the link names and no more. */
export async function openShareLinkByHash(database: Database, tokenHash: string): Promise<Result<SharedScenario>> {
  const [opening] = await database.execute<Opening>(sql`select * from app.open_share_link(${tokenHash})`);
  if (!opening || opening.status === "unknown") return failure("link.unknown");
  if (opening.status !== "open") return failure(opening.status === "expired" ? "link.expired" : "link.revoked");
  return success({
    title: opening.title,
    document: readStoredDocument(opening.document, `the revision of link ${opening.label}`),
    revisionNumber: opening.revision_number,
    label: opening.label,
    follows: opening.follows,
    workspaceName: opening.workspace_name,
  });
}
