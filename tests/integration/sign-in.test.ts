import { sql } from "drizzle-orm";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { endSession, getSessionHolder } from "@/db/queries/people";
import { verifyPassword, type VerifyPassword } from "@/lib/server/passwords";
import { listOwnSessions, revokeOwnSession } from "@/lib/server/sessions";
import { startSession } from "@/lib/server/sign-in";
import { hashToken } from "@/lib/server/tokens";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { givePassword } from "./support/sign-in";
import { makeWorld, type World } from "./support/world";

const PASSWORD = "seven slow herons";
let database: TestDatabase;
let world: World;
let email: string;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
  email = await givePassword(database.owner.db, world.scopes.designer, PASSWORD);
});
beforeEach(async () => {
  await database.owner.db.execute(sql`delete from rate_limits`);
});
afterAll(() => database.drop());

const visitFrom = (address: string) => ({ address, userAgent: "Test browser", correlationId: "test" });
const attempt = (
  given: { email: string; password: string },
  address = "192.0.2.10",
  verify: VerifyPassword = verifyPassword,
) => startSession(database.app.db, given, visitFrom(address), verify);

describe("signing in", () => {
  it("answers the right password with a session that only its token opens", async () => {
    const started = await attempt({ email: ` ${email.toUpperCase()} `, password: PASSWORD });
    if (!started.ok) throw new Error(started.code);
    const holder = await getSessionHolder(database.app.db, hashToken(started.value.sessionToken));
    expect(holder).toMatchObject({ userId: world.scopes.designer.userId, userEmail: email });
    expect(await getSessionHolder(database.app.db, hashToken(`${started.value.sessionToken}x`))).toBeNull();
  });

  it("keeps the token as a hash only", async () => {
    const started = await attempt({ email, password: PASSWORD });
    if (!started.ok) throw new Error(started.code);
    const stored = await database.owner.db.execute<{ row: string }>(sql`select sessions::text as row from sessions`);
    expect(stored.some(({ row }) => row.includes(hashToken(started.value.sessionToken)))).toBe(true);
    expect(stored.some(({ row }) => row.includes(started.value.sessionToken))).toBe(false);
  });

  it("gives an unknown e-mail and a wrong password the same answer for the same work", async () => {
    const counts: number[] = [];
    const answers: unknown[] = [];
    for (const given of [
      { email, password: "wrong" },
      { email: "nobody@example.org", password: "wrong" },
    ]) {
      let count = 0;
      answers.push(
        await attempt(given, "192.0.2.11", (hash, password) => {
          count += 1;
          expect(hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
          return verifyPassword(hash, password);
        }),
      );
      counts.push(count);
    }
    expect(counts).toEqual([1, 1]);
    expect(answers[0]).toEqual({ ok: false, code: "auth.refused" });
    expect(answers[1]).toEqual(answers[0]);
  });

  it("names the field of an entry that is no e-mail", async () => {
    expect(await attempt({ email: "nobody", password: "" })).toMatchObject({
      ok: false,
      code: "input.invalid",
      findings: [{ path: "email" }, { path: "password" }],
    });
  });

  it("refuses the eleventh failure for one e-mail, from whichever address, known or not, even with the right password", async () => {
    for (const target of [email, "nobody@example.org"]) {
      for (let n = 0; n < 10; n += 1)
        expect(await attempt({ email: target, password: "wrong" }, `192.0.2.${n}`)).toMatchObject({
          code: "auth.refused",
        });
      const refused = await attempt({ email: target, password: PASSWORD }, "192.0.2.99");
      expect(refused).toMatchObject({ ok: false, code: "limit.reached", detail: { retryAfterS: expect.any(Number) } });
    }
  });

  it("refuses the thirty-first failure from one address, and lets others in", async () => {
    for (let n = 0; n < 30; n += 1)
      expect(await attempt({ email: `nobody${n}@example.org`, password: "wrong" }, "192.0.2.50")).toMatchObject({
        code: "auth.refused",
      });
    expect(await attempt({ email, password: PASSWORD }, "192.0.2.50")).toMatchObject({ code: "limit.reached" });
    expect(await attempt({ email, password: PASSWORD }, "192.0.2.51")).toMatchObject({ ok: true });
  });

  it("does not count what succeeds", async () => {
    for (let n = 0; n < 12; n += 1) expect(await attempt({ email, password: PASSWORD })).toMatchObject({ ok: true });
  });

  it("leaves an audit row per session, and none for a refusal", async () => {
    const countRows = async () =>
      (await database.owner.db.execute(sql`select id from audit where deed = 'session.start'`)).length;
    const before = await countRows();
    await attempt({ email, password: "wrong" });
    expect(await countRows()).toBe(before);
    await attempt({ email, password: PASSWORD });
    expect(await countRows()).toBe(before + 1);
  });
});

describe("sessions", () => {
  async function signIn() {
    const started = await attempt({ email, password: PASSWORD });
    if (!started.ok) throw new Error(started.code);
    const tokenHash = hashToken(started.value.sessionToken);
    const holder = await getSessionHolder(database.app.db, tokenHash);
    return { tokenHash, person: { ...holder!, correlationId: "test" } };
  }

  it("are listed for their person only, with the current one marked", async () => {
    const { person } = await signIn();
    const listed = await listOwnSessions(database.app.db, person);
    if (!listed.ok) throw new Error(listed.code);
    expect(listed.value.filter((session) => session.isCurrent)).toMatchObject([
      { id: person.sessionId, address: "192.0.2.10", userAgent: "Test browser" },
    ]);
    expect(JSON.stringify(listed.value)).not.toMatch(/[0-9a-f]{64}/);
    const other = { ...person, userId: world.scopes.lead.userId };
    expect(await listOwnSessions(database.app.db, other)).toEqual({ ok: true, value: [] });
  });

  it("stop counting with the next request once revoked, and leave the others alone", async () => {
    const [first, second] = [await signIn(), await signIn()];
    expect(await revokeOwnSession(database.app.db, second.person, { sessionId: first.person.sessionId })).toEqual({
      ok: true,
      value: null,
    });
    expect(await getSessionHolder(database.app.db, first.tokenHash)).toBeNull();
    expect(await getSessionHolder(database.app.db, second.tokenHash)).not.toBeNull();
  });

  it("of someone else cannot be revoked", async () => {
    const { person, tokenHash } = await signIn();
    const stranger = { ...person, userId: world.scopes.admin.userId };
    expect(await revokeOwnSession(database.app.db, stranger, { sessionId: person.sessionId })).toMatchObject({
      ok: false,
      code: "thing.missing",
    });
    expect(await revokeOwnSession(database.app.db, null, { sessionId: person.sessionId })).toMatchObject({
      ok: false,
      code: "auth.required",
    });
    expect(await getSessionHolder(database.app.db, tokenHash)).not.toBeNull();
  });

  it("end by signing out and by age", async () => {
    const [left, aged] = [await signIn(), await signIn()];
    await endSession(database.app.db, left.tokenHash);
    expect(await getSessionHolder(database.app.db, left.tokenHash)).toBeNull();
    await database.owner.db.execute(sql`update sessions set expires_at = now() where token_hash = ${aged.tokenHash}`);
    expect(await getSessionHolder(database.app.db, aged.tokenHash)).toBeNull();
  });
});
