import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { countAttempt, returnAttempt } from "@/db/queries/limits";
import { createTestDatabase, type TestDatabase } from "./support/database";

// windows so long (over five years) that no border is near: now lies in the middle of the eleventh since 1970
const windowS = Math.floor(Date.now() / 1000 / 10.5);
let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(() => database.drop());

describe("a limit", () => {
  it("lets exactly its number through, also when all come at once on several connections", async () => {
    const connections = [database.app, database.openApp(), database.openApp()];
    const answers = await Promise.all(
      Array.from({ length: 40 }, (_, n) =>
        countAttempt(connections[n % 3]!.db, { key: "at once", windowS, limit: 15 }),
      ),
    );
    expect(answers.filter((answer) => answer.isAllowed)).toHaveLength(15);
  });

  it("says how long to wait and counts each key by itself", async () => {
    for (let n = 0; n < 2; n += 1) await countAttempt(database.app.db, { key: "one", windowS: 3600, limit: 2 });
    const refused = await countAttempt(database.app.db, { key: "one", windowS: 3600, limit: 2 });
    expect(refused.isAllowed).toBe(false);
    expect(refused.retryAfterS).toBeGreaterThanOrEqual(1);
    expect(refused.retryAfterS).toBeLessThanOrEqual(3600);
    expect((await countAttempt(database.app.db, { key: "two", windowS: 3600, limit: 2 })).isAllowed).toBe(true);
  });

  it("carries over the part of the window before that still reaches in", async () => {
    // as if 100 attempts had been made in the window before this one
    await database.owner.db.execute(sql`
      insert into rate_limits (key, window_start, attempt_count, stale_at)
      values ('before', to_timestamp(floor(extract(epoch from now()) / ${windowS}) * ${windowS} - ${windowS}), 100, now() + interval '1 day')`);
    const [elapsed] = await database.owner.db.execute<{ share: number }>(
      sql`select (extract(epoch from now()) / ${windowS} - floor(extract(epoch from now()) / ${windowS}))::float8 as share`,
    );
    const carried = 100 * (1 - elapsed!.share);
    expect(carried).toBeGreaterThan(2);
    expect(
      (await countAttempt(database.app.db, { key: "before", windowS, limit: Math.ceil(carried) + 1 })).isAllowed,
    ).toBe(true);
    expect(
      (await countAttempt(database.app.db, { key: "before", windowS, limit: Math.floor(carried) })).isAllowed,
    ).toBe(false);
  });

  it("gets back what was returned, never more than was taken", async () => {
    const take = () => countAttempt(database.app.db, { key: "back", windowS, limit: 1 });
    await returnAttempt(database.app.db, { key: "back", windowS });
    expect((await take()).isAllowed).toBe(true);
    expect((await take()).isAllowed).toBe(false);
    for (let n = 0; n < 3; n += 1) await returnAttempt(database.app.db, { key: "back", windowS });
    expect((await take()).isAllowed).toBe(true);
    expect((await take()).isAllowed).toBe(false);
  });

  it("cannot be read or lifted by the application's role", async () => {
    await expect(database.app.db.execute(sql`delete from rate_limits`)).rejects.toMatchObject({
      cause: { code: "42501" },
    });
    await expect(database.app.db.execute(sql`select key from rate_limits`)).rejects.toMatchObject({
      cause: { code: "42501" },
    });
  });
});
