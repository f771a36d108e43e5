import { sql } from "drizzle-orm";
import type { Database } from "../client";

export type Attempt = { isAllowed: boolean; retryAfterS: number };

/** Counts one attempt under a key. Not inside the transaction of the action: the count must stand when the action fails. */
export async function countAttempt(
  database: Database,
  args: { key: string; windowS: number; limit: number },
): Promise<Attempt> {
  const [row] = await database.execute<{ is_allowed: boolean; retry_after_s: number }>(
    sql`select * from app.count_attempt(${args.key}, ${args.windowS}::int, ${args.limit}::int)`,
  );
  if (!row) throw new Error("app.count_attempt gave no row");
  return { isAllowed: row.is_allowed, retryAfterS: row.retry_after_s };
}

export async function returnAttempt(database: Database, args: { key: string; windowS: number }): Promise<void> {
  await database.execute(sql`select app.return_attempt(${args.key}, ${args.windowS}::int)`);
}
