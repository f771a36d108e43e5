import { sql } from "drizzle-orm";
import { PgTransaction } from "drizzle-orm/pg-core";
import { drizzle, type PostgresJsDatabase, type PostgresJsQueryResultHKT } from "drizzle-orm/postgres-js";
import type { ExtractTablesWithRelations } from "drizzle-orm";
import postgres from "postgres";
import type { MemberRole } from "@/lib/access/table";
import * as schema from "./schema/index";

type Schema = typeof schema;
export type RootDatabase = PostgresJsDatabase<Schema>;
export type Transaction = PgTransaction<PostgresJsQueryResultHKT, Schema, ExtractTablesWithRelations<Schema>>;
/** What every query takes: the pool (the query opens its own scoped transaction) or a transaction that withScope opened. */
export type Database = RootDatabase | Transaction;

/** Who asks, in which workspace, with which role, for which request. Made by lib/server/actor.ts from the session and the membership row. */
export type Scope = {
  userId: string;
  userName: string;
  workspaceId: string;
  workspaceName: string;
  role: MemberRole;
  correlationId: string;
};

/** The person alone, where no workspace is involved (sessions, the list of own workspaces). */
export type PersonScope = { userId: string; workspaceId?: undefined };

export type Connection = { db: RootDatabase; close: () => Promise<void> };

/** Opens a pool on `url`. The application uses `db` below; migrations, the seed and tests open their own. */
export function connect(url: string, poolSize = 10): Connection {
  const client = postgres(url, { max: poolSize, idle_timeout: 60, connect_timeout: 10, onnotice: () => {} });
  return { db: drizzle(client, { schema }), close: () => client.end({ timeout: 5 }) };
}

// `next build` imports route modules without a database; postgres.js connects on the first query, so a name that leads nowhere will do there.
const BUILD_URL = "postgres://build@127.0.0.1:9/none";

declare global {
  var slackwaterConnection: Connection | undefined;
}

function openApplicationPool(): RootDatabase {
  const url = process.env.DATABASE_URL ?? (process.env.NEXT_PHASE === "phase-production-build" ? BUILD_URL : undefined);
  if (!url) throw new Error("DATABASE_URL is not set: the application's own role, not the owner of the tables");
  // kept on globalThis so that a reload in development does not open a pool per edit
  globalThis.slackwaterConnection ??= connect(url);
  return globalThis.slackwaterConnection.db;
}

/** The application's pool, opened on first use. */
export const db: RootDatabase = new Proxy({} as RootDatabase, {
  get(_target, property) {
    const pool = openApplicationPool();
    const value: unknown = Reflect.get(pool, property, pool);
    return typeof value === "function" ? value.bind(pool) : value;
  },
});

const scopeOfTransaction = new WeakMap<object, { userId: string; workspaceId?: string }>();

/**
 * Runs `work` in a transaction in which PostgreSQL knows the actor: every row-level-security policy reads these settings,
 * and they end with the transaction. Inside a transaction that already has this scope, `work` joins it; another scope is a
 * programmer's mistake.
 */
export async function withScope<T>(
  database: Database,
  scope: Scope | PersonScope,
  work: (tx: Transaction) => Promise<T>,
): Promise<T> {
  if (database instanceof PgTransaction) {
    const current = scopeOfTransaction.get(database);
    if (current?.userId !== scope.userId || current.workspaceId !== scope.workspaceId)
      throw new Error("withScope: this transaction belongs to another scope");
    return work(database);
  }
  return database.transaction(async (tx) => {
    await tx.execute(
      sql`select set_config('app.user_id', ${scope.userId}, true), set_config('app.workspace_id', ${scope.workspaceId ?? ""}, true)`,
    );
    scopeOfTransaction.set(tx, { userId: scope.userId, workspaceId: scope.workspaceId });
    return work(tx);
  });
}

/**
 * Refuses a connection that row-level security would not bind: a superuser, a role with BYPASSRLS, or the owner of the
 * tables. Called when the server starts.
 */
export async function assertBoundByRowSecurity(database: Database): Promise<void> {
  const [role] = await database.execute<{ name: string; is_free: boolean }>(sql`
    select current_user as name,
      (rolsuper or rolbypassrls or exists (select from pg_class where relname = 'scenarios' and relnamespace = 'public'::regnamespace and pg_has_role(current_user, relowner, 'MEMBER'))) as is_free
    from pg_roles where rolname = current_user`);
  if (!role || role.is_free)
    throw new Error(
      `DATABASE_URL names a role (${role?.name ?? "unknown"}) that row-level security does not bind; give the application a role of its own`,
    );
}
