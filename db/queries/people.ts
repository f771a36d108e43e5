import { and, asc, desc, eq, isNull, sql } from "drizzle-orm";
import type { MemberRole } from "@/lib/access/table";
import { withScope, type Database, type PersonScope, type Scope } from "../client";
import { memberships, sessions, users, workspaces } from "../schema/index";

/** Exactly what signing in needs; the hash goes to the verifier and nowhere else. */
export type Credential = { userId: string; userName: string; passwordHash: string };
export type SessionHolder = { sessionId: string; userId: string; userName: string; userEmail: string };
export type SessionView = { id: string; userAgent: string; address: string; createdAt: Date; lastSeenAt: Date };
export type WorkspaceView = { id: string; name: string; role: MemberRole };
export type MemberView = { userId: string; name: string; email: string; role: MemberRole };

export async function getCredential(database: Database, email: string): Promise<Credential | null> {
  const [row] = await database.execute<{ user_id: string; user_name: string; password_hash: string }>(
    sql`select * from app.find_credential(${email})`,
  );
  return row ? { userId: row.user_id, userName: row.user_name, passwordHash: row.password_hash } : null;
}

/** Who holds this session, while it is neither revoked nor expired. */
export async function getSessionHolder(database: Database, tokenHash: string): Promise<SessionHolder | null> {
  const [row] = await database.execute<{ session_id: string; user_id: string; user_name: string; user_email: string }>(
    sql`select * from app.touch_session(${tokenHash})`,
  );
  return row
    ? { sessionId: row.session_id, userId: row.user_id, userName: row.user_name, userEmail: row.user_email }
    : null;
}

export async function createSession(
  database: Database,
  scope: PersonScope,
  args: { tokenHash: string; userAgent: string; address: string; lifeDays: number },
): Promise<void> {
  await withScope(database, scope, (tx) =>
    tx.execute(sql`
      insert into sessions (user_id, token_hash, user_agent, address, expires_at)
      values (${scope.userId}, ${args.tokenHash}, ${args.userAgent}, ${args.address}, now() + make_interval(days => ${args.lifeDays}))`),
  );
}

export async function endSession(database: Database, tokenHash: string): Promise<void> {
  await database.execute(sql`select app.end_session(${tokenHash})`);
}

/** The person's own sessions that still count, latest use first. */
export function findSessions(database: Database, scope: PersonScope): Promise<SessionView[]> {
  return withScope(database, scope, (tx) =>
    tx
      .select({
        id: sessions.id,
        userAgent: sessions.userAgent,
        address: sessions.address,
        createdAt: sessions.createdAt,
        lastSeenAt: sessions.lastSeenAt,
      })
      .from(sessions)
      .where(and(eq(sessions.userId, scope.userId), isNull(sessions.revokedAt), sql`${sessions.expiresAt} > now()`))
      .orderBy(desc(sessions.lastSeenAt)),
  );
}

/** True if there was such a session of this person. */
export function revokeSession(database: Database, scope: PersonScope, sessionId: string): Promise<boolean> {
  return withScope(database, scope, async (tx) => {
    const ended = await tx
      .update(sessions)
      .set({ revokedAt: sql`now()` })
      .where(and(eq(sessions.userId, scope.userId), eq(sessions.id, sessionId), isNull(sessions.revokedAt)))
      .returning({ id: sessions.id });
    return ended.length > 0;
  });
}

/** The workspaces a person belongs to, with the role in each. */
export function findWorkspaces(database: Database, scope: PersonScope): Promise<WorkspaceView[]> {
  return withScope(database, scope, (tx) =>
    tx
      .select({ id: workspaces.id, name: workspaces.name, role: memberships.role })
      .from(memberships)
      .innerJoin(workspaces, eq(workspaces.id, memberships.workspaceId))
      .where(eq(memberships.userId, scope.userId))
      .orderBy(asc(memberships.createdAt), asc(workspaces.name)),
  );
}

/** The members of the workspace that the person may see; a student sees himself only. */
export function findMembers(database: Database, scope: Scope): Promise<MemberView[]> {
  return withScope(database, scope, (tx) =>
    tx
      .select({ userId: users.id, name: users.name, email: users.email, role: memberships.role })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(eq(memberships.workspaceId, scope.workspaceId))
      .orderBy(asc(users.name)),
  );
}
