import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { demoKey, demoShareToken } from "@/db/demo/keys";
import { findMembers, findWorkspaces, getCredential } from "@/db/queries/people";
import { findScenarios, requireScenario } from "@/db/queries/scenarios";
import type { Scope } from "@/db/client";
import { seedDatabase } from "@/db/seed";
import { DEMO_ACCOUNTS, DEMO_PASSWORD, DEMO_WORKSPACES } from "@/lib/access/demo-accounts";
import { MEMBER_ROLES } from "@/lib/access/table";
import { TEMPLATES } from "@/lib/scenario/templates";
import { openShareLink } from "@/lib/server/share";
import { startSession } from "@/lib/server/sign-in";
import { createTestDatabase, type TestDatabase } from "./support/database";

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
  expect(await seedDatabase(database.ownerUrl)).toBe("seeded");
});
afterAll(() => database.drop());

function scopeOf(email: (typeof DEMO_ACCOUNTS)[number]["email"]): Scope {
  const account = DEMO_ACCOUNTS.find((one) => one.email === email)!;
  return {
    userId: demoKey(email),
    userName: account.name,
    workspaceId: demoKey(account.workspace),
    workspaceName: DEMO_WORKSPACES[account.workspace],
    role: account.role,
    correlationId: "test",
  };
}
const everything = async () =>
  (
    await database.owner.db.execute<{ rows: string }>(sql`
    select jsonb_build_array((select jsonb_agg(s order by id) from scenarios s), (select jsonb_agg(r order by id) from revisions r), (select jsonb_agg(u order by id) from users u),
      (select jsonb_agg(c order by user_id) from credentials c), (select jsonb_agg(m order by user_id, workspace_id) from memberships m), (select jsonb_agg(l order by id) from share_links l),
      (select jsonb_agg(a order by id) from audit a))::text as rows`)
  )[0]!.rows;

describe("the demo", () => {
  it("has people in every role, and every one of them signs in with the documented password", async () => {
    const members = await findMembers(database.app.db, scopeOf("admin@lowmeadow.example.org"));
    expect(new Set(members.map((member) => member.role))).toEqual(new Set(MEMBER_ROLES));
    for (const { email } of DEMO_ACCOUNTS) {
      expect(
        await startSession(
          database.app.db,
          { email, password: DEMO_PASSWORD },
          { address: "192.0.2.1", userAgent: "", correlationId: "test" },
        ),
        email,
      ).toMatchObject({ ok: true });
    }
  });

  it("has one person in both workspaces, with different roles", async () => {
    const workspaces = await findWorkspaces(database.app.db, { userId: demoKey("lead@lowmeadow.example.org") });
    expect(workspaces.map(({ name, role }) => [name, role])).toEqual([
      [DEMO_WORKSPACES.home, "lead"],
      [DEMO_WORKSPACES.away, "designer"],
    ]);
  });

  it("has a scenario per template, each with figures, in every state, with several revisions and one archived", async () => {
    const list = await findScenarios(database.app.db, scopeOf("designer@lowmeadow.example.org"), {
      page: 1,
      pageSize: 100,
    });
    expect(list.rows.map((row) => row.title)).toEqual(
      expect.arrayContaining(TEMPLATES.map((template) => template.title)),
    );
    for (const row of list.rows) expect(row.summary?.spark.minA, row.title).toHaveLength(64);
    for (const state of ["draft", "inReview", "approved", "superseded"] as const)
      expect(list.counts[state], state).toBeGreaterThan(0);
    expect(list.counts.archived).toBe(1);
    expect(Math.max(...list.rows.map((row) => row.revisionNumber))).toBeGreaterThanOrEqual(3);
  });

  it("ends each history in the template's own document", async () => {
    for (const template of TEMPLATES) {
      const view = await requireScenario(
        database.app.db,
        scopeOf("lead@lowmeadow.example.org"),
        demoKey(`template ${template.id}`),
      );
      expect(view.revision.document).toEqual(JSON.parse(JSON.stringify(template.document)));
    }
  });

  it("shows the other workspace nothing of the first", async () => {
    const list = await findScenarios(database.app.db, scopeOf("admin@northquay.example.org"), { page: 1 });
    expect(list.rows.map((row) => row.title).sort()).toEqual([
      "Hoist, lowering and lifting",
      "Slewing drive, both directions",
    ]);
  });

  it("has links of every kind", async () => {
    const open = async (name: string) => {
      const opened = await openShareLink(database.app.db, demoShareToken(name));
      return opened.ok ? `${opened.value.follows} ${opened.value.revisionNumber}` : opened.code;
    };
    expect([await open("newest"), await open("pinned"), await open("expired"), await open("revoked")]).toEqual([
      "newest 3",
      "pinned 3",
      "link.expired",
      "link.revoked",
    ]);
  });

  it("is not changed by seeding again", async () => {
    const before = await everything();
    expect(await seedDatabase(database.ownerUrl)).toBe("seeded");
    expect(await everything()).toBe(before);
  });
});

describe("a database that other people work in", () => {
  it("gets no accounts with a published password", async () => {
    const other = await createTestDatabase();
    await other.owner.db.execute(sql`insert into users (email, name) values ('someone@example.org', 'Someone')`);
    expect(await seedDatabase(other.ownerUrl)).toBe("left alone");
    expect(await getCredential(other.app.db, DEMO_ACCOUNTS[0].email)).toBeNull();
    await other.drop();
  });
});
