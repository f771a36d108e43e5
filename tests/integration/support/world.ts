import { randomBytes } from "node:crypto";
import { sql } from "drizzle-orm";
import type { RootDatabase, Scope } from "@/db/client";
import { MEMBER_ROLES, type MemberRole } from "@/lib/access/table";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { hashToken } from "@/lib/server/tokens";
import { SHORT_RUN } from "./short-run";

/** Two workspaces of invented people, and ways to put scenarios and links into them, written by the owner of the tables. */
export type World = {
  scopes: Record<MemberRole, Scope>;
  /** A designer whose things are nobody else's, and another student. */
  colleague: Scope;
  otherStudent: Scope;
  /** The admin of another workspace. */
  foreigner: Scope;
  addScenario: (
    owner: Scope,
    options?: { isApproved?: boolean; isArchived?: boolean; title?: string; tags?: string[] },
  ) => Promise<string>;
  addLink: (
    maker: Scope,
    scenarioId: string,
    options?: { revisionNumber?: number | null; expiresInS?: number; isRevoked?: boolean },
  ) => Promise<{ id: string; token: string }>;
};

/** A checked document with a run of one millisecond: quick to summarise. Title and voltage make documents differ. */
export function shortDocument(title = "Sluice gate drive", voltageV = 24): ScenarioDocument {
  return { ...SHORT_RUN, title, supply: { ...SHORT_RUN.supply, voltageV } };
}

export async function makeWorld(owner: RootDatabase): Promise<World> {
  const home = await addWorkspace(owner, "Sluice drives");
  const away = await addWorkspace(owner, "Harbour cranes");
  const people = await Promise.all(
    MEMBER_ROLES.map(async (role) => [role, await addMember(owner, home, role, `The ${role}`)] as const),
  );
  return {
    scopes: Object.fromEntries(people) as Record<MemberRole, Scope>,
    colleague: await addMember(owner, home, "designer", "The colleague"),
    otherStudent: await addMember(owner, home, "student", "The other student"),
    foreigner: await addMember(owner, away, "admin", "The foreigner"),
    addScenario: (scope, options = {}) => addScenario(owner, scope, options),
    addLink: (scope, scenarioId, options = {}) => addLink(owner, scope, scenarioId, options),
  };
}

async function insertOne(owner: RootDatabase, statement: ReturnType<typeof sql>): Promise<string> {
  const [row] = await owner.execute<{ id: string }>(statement);
  if (!row) throw new Error("nothing was inserted");
  return row.id;
}

async function addWorkspace(owner: RootDatabase, name: string): Promise<{ id: string; name: string }> {
  return { id: await insertOne(owner, sql`insert into workspaces (name) values (${name}) returning id`), name };
}

async function addMember(
  owner: RootDatabase,
  workspace: { id: string; name: string },
  role: MemberRole,
  name: string,
): Promise<Scope> {
  const email = `${randomBytes(5).toString("hex")}@example.org`;
  const userId = await insertOne(owner, sql`insert into users (email, name) values (${email}, ${name}) returning id`);
  await owner.execute(
    sql`insert into memberships (workspace_id, user_id, role) values (${workspace.id}, ${userId}, ${role})`,
  );
  return {
    userId,
    userName: name,
    workspaceId: workspace.id,
    workspaceName: workspace.name,
    role,
    correlationId: `test-${role}`,
  };
}

async function addScenario(
  owner: RootDatabase,
  scope: Scope,
  options: Parameters<World["addScenario"]>[1] = {},
): Promise<string> {
  const title = options.title ?? "Sluice gate drive";
  return owner.transaction(async (tx) => {
    const [row] = await tx.execute<{ id: string }>(sql`
      insert into scenarios (workspace_id, owner_id, title, tags, newest_number, state, approved_number, archived_at)
      values (${scope.workspaceId}, ${scope.userId}, ${title}, ${`{${(options.tags ?? []).join(",")}}`}::text[], 1, ${options.isApproved ? "approved" : "draft"},
        ${options.isApproved ? 1 : null}, ${options.isArchived ? new Date().toISOString() : null}::timestamptz)
      returning id`);
    await tx.execute(sql`
      insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name)
      values (${scope.workspaceId}, ${row!.id}, 1, ${JSON.stringify(shortDocument(title))}::jsonb, ${scope.userId}, ${scope.userName})`);
    return row!.id;
  });
}

async function addLink(
  owner: RootDatabase,
  scope: Scope,
  scenarioId: string,
  options: Parameters<World["addLink"]>[2] = {},
): Promise<{ id: string; token: string }> {
  const token = randomBytes(32).toString("base64url");
  const id = await insertOne(
    owner,
    sql`
    insert into share_links (workspace_id, scenario_id, token_hash, label, revision_number, maker_id, expires_at, revoked_at)
    values (${scope.workspaceId}, ${scenarioId}, ${hashToken(token)}, 'For the works', ${options.revisionNumber ?? null}, ${scope.userId},
      now() + make_interval(secs => ${options.expiresInS ?? null}::float8), ${options.isRevoked ? new Date().toISOString() : null}::timestamptz)
    returning id`,
  );
  return { id, token };
}
