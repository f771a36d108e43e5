import { sql } from "drizzle-orm";
import type { Database } from "../client";

/** One round trip to the database; fails as a query fails. Belongs to no workspace, so it takes no scope. */
export async function pingDatabase(db: Database): Promise<void> {
  await db.execute(sql`select 1`);
}
