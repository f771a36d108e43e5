import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { assertBoundByRowSecurity, withScope, type Scope } from "@/db/client";
import { findMembers, findWorkspaces } from "@/db/queries/people";
import { givePassword } from "./support/sign-in";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, type World } from "./support/world";

let database: TestDatabase;
let world: World;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
  await givePassword(database.owner.db, world.scopes.designer, "seven slow herons");
});
afterAll(() => database.drop());

const as = (scope: Scope, statement: ReturnType<typeof sql>) =>
  withScope(database.app.db, scope, (tx) => tx.execute<Record<string, unknown>>(statement));
const DENIED = { cause: { code: "42501" } };

describe("the application's role", () => {
  it("is bound by row-level security, and the owner's would be refused at the start", async () => {
    await expect(assertBoundByRowSecurity(database.app.db)).resolves.toBeUndefined();
    await expect(assertBoundByRowSecurity(database.owner.db)).rejects.toThrow(/row-level security does not bind/);
  });

  it("has row-level security on every table, forced", async () => {
    const open = await database.owner.db.execute<{ relname: string }>(sql`
      select relname from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r' and not (relrowsecurity and relforcerowsecurity)`);
    expect(open.map((table) => table.relname)).toEqual([]);
  });

  it.each([
    ["read a password hash", sql`select password_hash from credentials`],
    ["read a session's hash", sql`select token_hash from sessions`],
    ["make a person", sql`insert into users (email, name) values ('x@example.org', 'x')`],
    ["change a role", sql`update memberships set role = 'admin'`],
    [
      "join a workspace",
      sql`insert into memberships (workspace_id, user_id) select workspace_id, user_id from memberships`,
    ],
    ["approve by hand", sql`update scenarios set approved_number = 1`],
    ["set a link's count", sql`update share_links set opened_count = 0`],
    ["give a scenario away", sql`update scenarios set owner_id = gen_random_uuid()`],
    ["remove a scenario", sql`delete from scenarios`],
    ["switch row-level security off", sql`alter table scenarios disable row level security`],
    ["become the owner of the narrow functions", sql`set role slackwater_definer`],
  ])("may not %s, even for an admin", async (_name, statement) => {
    await expect(as(world.scopes.admin, statement)).rejects.toMatchObject(DENIED);
  });

  it("may not call a scenario approved, nor count two revisions at once, though it may write the column", async () => {
    const { admin } = world.scopes;
    const id = await world.addScenario(admin);
    await expect(as(admin, sql`update scenarios set state = 'approved' where id = ${id}`)).rejects.toMatchObject(
      DENIED,
    );
    await expect(as(admin, sql`update scenarios set newest_number = 3 where id = ${id}`)).rejects.toMatchObject({
      cause: { code: "23514" },
    });
  });

  it("may not write a revision, audit row or link in another's name", async () => {
    const { admin, designer } = world.scopes;
    const id = await world.addScenario(admin);
    const { workspaceId } = admin;
    await expect(
      as(
        designer,
        sql`insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name) values (${workspaceId}, ${id}, 2, '{}', ${admin.userId}, 'x')`,
      ),
    ).rejects.toMatchObject(DENIED);
    await expect(
      as(
        designer,
        sql`insert into audit (workspace_id, actor_id, actor_name, deed, correlation_id) values (${workspaceId}, ${admin.userId}, 'x', 'x', 'x')`,
      ),
    ).rejects.toMatchObject(DENIED);
    await expect(
      as(
        designer,
        sql`insert into share_links (workspace_id, scenario_id, token_hash, label, maker_id) values (${workspaceId}, ${id}, ${"0".repeat(64)}, 'x', ${admin.userId})`,
      ),
    ).rejects.toMatchObject(DENIED);
  });

  it("cannot put a revision of one workspace under a scenario of another", async () => {
    const { designer } = world.scopes;
    const foreign = await world.addScenario(world.foreigner);
    const attempt = as(
      designer,
      sql`insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name) values (${designer.workspaceId}, ${foreign}, 2, '{}', ${designer.userId}, 'x')`,
    );
    await expect(attempt).rejects.toMatchObject({ cause: { code: "23503" } });
  });
});

describe("people", () => {
  it("are visible to colleagues, not to other workspaces, and a student sees himself and owners of what he may read", async () => {
    const { designer, student, lead } = world.scopes;
    const names = async (scope: Scope) =>
      (await as(scope, sql`select name from users order by name`)).map((row) => row.name);
    expect(await names(designer)).toHaveLength(7);
    expect(await names(world.foreigner)).toEqual(["The foreigner"]);
    expect(await names(student)).toEqual(["The student"]);
    await world.addScenario(lead, { isApproved: true });
    expect(await names(student)).toEqual(["The lead", "The student"]);
    expect(await findMembers(database.app.db, student)).toMatchObject([{ userId: student.userId, role: "student" }]);
  });

  it("list their own workspaces with the role in each", async () => {
    const { designer } = world.scopes;
    await database.owner.db.execute(
      sql`insert into memberships (workspace_id, user_id, role, created_at) values (${world.foreigner.workspaceId}, ${designer.userId}, 'trainer', now() + interval '1 hour')`,
    );
    expect(await findWorkspaces(database.app.db, { userId: designer.userId })).toEqual([
      { id: designer.workspaceId, name: "Sluice drives", role: "designer" },
      { id: world.foreigner.workspaceId, name: "Harbour cranes", role: "trainer" },
    ]);
  });
});

describe("a scope", () => {
  it("ends with its transaction: the next one on the connection acts for nobody", async () => {
    const single = database.openApp();
    await withScope(single.db, world.scopes.admin, (tx) => tx.execute(sql`select 1`));
    for (let n = 0; n < 8; n += 1)
      expect(await single.db.execute(sql`select app.user_id() as id, app.workspace_id() as workspace`)).toEqual([
        { id: null, workspace: null },
      ]);
  });

  it("cannot be exchanged inside a transaction", async () => {
    await expect(
      withScope(database.app.db, world.scopes.student, (tx) =>
        withScope(tx, world.scopes.admin, (inner) => inner.execute(sql`select 1`)),
      ),
    ).rejects.toThrow(/another scope/);
  });
});
