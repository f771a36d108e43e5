import { randomBytes } from "node:crypto";
import { sql } from "drizzle-orm";
import { connect, type Connection } from "@/db/client";
import { migrateDatabase } from "@/db/migrate";

export type TestDatabase = {
  ownerUrl: string;
  owner: Connection;
  app: Connection;
  openApp: () => Connection;
  drop: () => Promise<void>;
};

/**
 * A database of its own for one test file, on the server of DATABASE_OWNER_URL, migrated like the real one; `app` is
 * connected as a role that row-level security binds, `owner` makes what a test starts from.
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  const serverUrl = process.env.DATABASE_OWNER_URL;
  if (!serverUrl) throw new Error("DATABASE_OWNER_URL is not set: `npm test` starts a PostgreSQL and sets it");
  const name = `slackwater_test_${randomBytes(6).toString("hex")}`;
  const server = connect(serverUrl, 1);
  await server.db.execute(sql`create database ${sql.identifier(name)}`);

  const ownerUrl = new URL(serverUrl);
  ownerUrl.pathname = `/${name}`;
  const appUrl = new URL(ownerUrl);
  appUrl.username = "slackwater_test_web";
  appUrl.password = "test only";
  await migrateDatabase(ownerUrl.href, appUrl.href);

  const opened: Connection[] = [];
  const open = (url: URL) => {
    const connection = connect(url.href, 4);
    opened.push(connection);
    return connection;
  };
  return {
    ownerUrl: ownerUrl.href,
    owner: open(ownerUrl),
    app: open(appUrl),
    openApp: () => open(appUrl),
    async drop() {
      await Promise.all(opened.map((connection) => connection.close()));
      await server.db.execute(sql`drop database ${sql.identifier(name)} with (force)`);
      await server.close();
    },
  };
}
