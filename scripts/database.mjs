// The database a run works on: made when missing, brought up to date, filled with the demo. Two roles: the owner, which
// migrates and seeds, and the application's, which row-level security binds.
import { join } from "node:path";
import { Refusal, tailOf } from "./messages.mjs";
import { logFolder, root, watchedNode } from "./paths.mjs";
import { OWNER, databaseUrl } from "./postgres.mjs";
import { run } from "./processes.mjs";

const APPLICATION_ROLE = "slackwater_server";

/** The two addresses of `database` on a server of ours, as the environment of every program that needs them. */
export function databaseEnvironment({ port }, secrets, database) {
  return {
    DATABASE_OWNER_URL: databaseUrl({ port, user: OWNER, password: secrets.ownerPassword, database }),
    DATABASE_URL: databaseUrl({ port, user: APPLICATION_ROLE, password: secrets.applicationPassword, database }),
  };
}

/**
 * The same for a server that was given to us. With both addresses set they are used as they are. With DATABASE_URL alone it
 * is the owner's, and the application gets a role of its own on that server with a password of ours.
 */
export function givenDatabaseEnvironment(environment, secrets) {
  const { DATABASE_URL, DATABASE_OWNER_URL } = environment;
  if (DATABASE_OWNER_URL) return { DATABASE_OWNER_URL, DATABASE_URL };
  const application = new URL(DATABASE_URL);
  application.username = APPLICATION_ROLE;
  application.password = secrets.applicationPassword;
  return { DATABASE_OWNER_URL: DATABASE_URL, DATABASE_URL: application.href };
}

export async function ensureDatabase({ port }, secrets, database) {
  const { default: postgres } = await import("postgres");
  const sql = postgres(databaseUrl({ port, user: OWNER, password: secrets.ownerPassword, database: "postgres" }), { max: 1, onnotice: () => {} });
  try {
    const known = await sql`select from pg_database where datname = ${database}`;
    if (known.length === 0) await sql`create database ${sql(database)}`;
  } finally {
    await sql.end({ timeout: 5 });
  }
}

export const migrate = (urls) => runDatabaseProgram("migrate", urls);
export const seed = (urls) => runDatabaseProgram("seed", urls);

async function runDatabaseProgram(name, urls) {
  const log = join(logFolder, `${name}.log`);
  const args = [...watchedNode, "--import", "tsx", `db/${name}.ts`];
  const code = await run(process.execPath, args, { cwd: root, env: { ...process.env, ...urls }, log });
  if (code === 0) return;
  const printed = tailOf(log);
  const hint = /permission denied to create role/.test(printed) ? "\n\nThe owner of the database must be able to make roles; README.md says what to do where it may not." : "";
  throw new Refusal(`db/${name}.ts failed (whole log: ${log}):\n${printed}${hint}`);
}
