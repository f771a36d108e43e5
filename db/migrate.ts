import { fileURLToPath, pathToFileURL } from "node:url";
import { sql } from "drizzle-orm";
import { migrate } from "drizzle-orm/postgres-js/migrator";
import { connect, type RootDatabase } from "./client";

const MIGRATIONS = fileURLToPath(new URL("../drizzle", import.meta.url));
// one number for "Slackwater migrates", so that two starts at once wait for each other
const LOCK = 7_311_204;

/** Brings the database of `ownerUrl` up to date and makes sure the role of `applicationUrl` exists, may sign in and is bound by row-level security. */
export async function migrateDatabase(ownerUrl: string, applicationUrl: string): Promise<void> {
  const { db, close } = connect(ownerUrl, 1);
  try {
    await db.execute(sql`select pg_advisory_lock(${LOCK})`);
    await migrate(db, { migrationsFolder: MIGRATIONS });
    await ensureApplicationRole(db, new URL(applicationUrl));
  } finally {
    await close();
  }
}

/**
 * The login role of the application: a member of slackwater_app and nothing more. If the owner may make roles it is made
 * (or given the password of the URL); if not, it must be there already.
 */
async function ensureApplicationRole(db: RootDatabase, url: URL): Promise<void> {
  const name = decodeURIComponent(url.username);
  const password = decodeURIComponent(url.password);
  const [owner] = await db.execute<{ name: string; may_make: boolean }>(
    sql`select current_user as name, (rolsuper or rolcreaterole) as may_make from pg_roles where rolname = current_user`,
  );
  if (!name || name === owner?.name)
    throw new Error("DATABASE_URL must name a role of its own, not the owner in DATABASE_OWNER_URL");
  if (owner?.may_make) {
    const [statement] = await db.execute<{ make: string; change: string }>(sql`
      select format('create role %I nosuperuser nocreatedb nocreaterole nobypassrls', ${name}::text) as make,
             format('alter role %I login password %L', ${name}::text, ${password}::text) as change`);
    const known = await db.execute(sql`select from pg_roles where rolname = ${name}`);
    if (known.length === 0) await db.execute(sql.raw(statement!.make));
    await db.execute(sql.raw(statement!.change));
    await db.execute(sql`grant slackwater_app to ${sql.identifier(name)}`);
  }
  const [role] = await db.execute<{ is_bound: boolean; is_member: boolean }>(sql`
    select not (rolsuper or rolbypassrls) as is_bound, pg_has_role(oid, 'slackwater_app', 'MEMBER') as is_member from pg_roles where rolname = ${name}`);
  if (!role) throw new Error(`the role ${name} of DATABASE_URL does not exist, and the owner may not make roles`);
  if (!role.is_bound)
    throw new Error(
      `the role ${name} of DATABASE_URL is a superuser or has BYPASSRLS: row-level security would not bind it`,
    );
  if (!role.is_member)
    throw new Error(
      `the role ${name} of DATABASE_URL is not a member of slackwater_app: grant slackwater_app to ${name}`,
    );
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const { DATABASE_OWNER_URL, DATABASE_URL } = process.env;
  if (!DATABASE_OWNER_URL || !DATABASE_URL)
    throw new Error(
      "DATABASE_OWNER_URL (migrates and seeds) and DATABASE_URL (the application's role) must both be set",
    );
  await migrateDatabase(DATABASE_OWNER_URL, DATABASE_URL);
  console.log("database is up to date");
}
