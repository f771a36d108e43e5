import { sql } from "drizzle-orm";
import type { RootDatabase, Scope } from "@/db/client";
import { hashPassword } from "@/lib/server/passwords";

/** Gives a person of the world a password; answers the e-mail. */
export async function givePassword(owner: RootDatabase, scope: Scope, password: string): Promise<string> {
  await owner.execute(
    sql`insert into credentials (user_id, password_hash) values (${scope.userId}, ${await hashPassword(password)})`,
  );
  const [row] = await owner.execute<{ email: string }>(sql`select email from users where id = ${scope.userId}`);
  return row!.email;
}
