import { startThrowAwayDatabase } from "../../scripts/throw-away-database.mjs";

/**
 * Before the integration tests: a migrated, empty database, its two addresses in the environment. `npm test` has started a
 * server already; a single file run by hand gets one here.
 */
export default async function setUp(): Promise<(() => Promise<void>) | undefined> {
  // never the database that a DATABASE_URL in someone's shell may name
  if (process.env.SLACKWATER_TEST_RUN === "1") return undefined;
  const database = await startThrowAwayDatabase();
  Object.assign(process.env, await database.makeDatabase("slackwater_test"));
  return database.stop;
}
