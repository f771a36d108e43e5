import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { Scope, Transaction } from "@/db/client";
import {
  ACCESS,
  can,
  DEEDS,
  MEMBER_ROLES,
  ROLES,
  type Deed,
  type MemberRole,
  type Role,
  type Thing,
} from "@/lib/access/table";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, type World } from "./support/world";
import { THROUGH_BARE_SQL, THROUGH_THE_SERVER, type Target } from "./support/attempts";

/** Every cell of the table, on a thing of one's own, of a colleague (approved or draft), and of another workspace. */
const KINDS = ["own", "approved of a colleague", "draft of a colleague", "foreign"] as const;
type Kind = (typeof KINDS)[number];
/** Deeds on the workspace itself rather than on a scenario or link: whose it is makes no difference within one's own. */
const AT_LARGE: Deed[] = ["workspace.read", "members.read", "audit.read", "scenario.create", "simulation.run"];

let database: TestDatabase;
let world: World;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
  const { scopes, foreigner } = world;
  for (const { workspaceId, userId } of [scopes.admin, foreigner]) {
    await database.owner.db.execute(
      sql`insert into audit (workspace_id, actor_id, actor_name, deed, correlation_id) values (${workspaceId}, ${userId}, 'x', 'scenario.create', 'c')`,
    );
  }
});
afterAll(() => database.drop());

const thingOf = (kind: Kind): Thing => ({ isOwn: kind === "own", hasApproved: kind === "approved of a colleague" });

async function makeTarget(role: Role, kind: Kind): Promise<Target> {
  const { scopes, colleague, foreigner } = world;
  const owner = kind === "foreign" ? foreigner : kind === "own" && role !== "guest" ? scopes[role] : colleague;
  const scenarioId = await world.addScenario(owner, { isApproved: kind !== "draft of a colleague" && kind !== "own" });
  const link = await world.addLink(owner, scenarioId);
  const [draft] = await database.owner.db.execute<{ id: string }>(sql`
    insert into kept_drafts (workspace_id, scenario_id, author_id, base_number, document)
    select workspace_id, scenario_id, author_id, 1, document from revisions where scenario_id = ${scenarioId} returning id`);
  return { scenarioId, linkId: link.id, linkToken: link.token, draftId: draft!.id, workspaceId: owner.workspaceId };
}

/** The deed is expected to go through: the table says so, and the thing is in the person's workspace. */
function isExpected(role: Role, deed: Deed, kind: Kind): boolean {
  if (deed === "link.open") return true; // whoever holds the token, from whichever workspace
  // a student's own things are seen even when the deed is about the workspace: himself as a member
  const thing = deed === "members.read" ? { isOwn: true } : thingOf(kind);
  const isReached = can(role, deed, thing);
  // these act on the person's own workspace, whichever thing is named: nothing foreign is touched
  if (kind === "foreign" && deed !== "workspace.read" && AT_LARGE.includes(deed)) return isReached;
  return isReached && kind !== "foreign";
}

describe("through the server's functions", () => {
  const cells = ROLES.flatMap((role) =>
    DEEDS.flatMap((deed) => KINDS.map((kind) => ({ role, deed, kind, isExpected: isExpected(role, deed, kind) }))),
  );

  it.each(cells)("$role, $deed, $kind: $isExpected", async ({ role, deed, kind, isExpected: expected }) => {
    const target = await makeTarget(role, kind);
    const scope = role === "guest" ? null : world.scopes[role];
    const result = await THROUGH_THE_SERVER[deed](database.app.db, scope, target);
    if (expected) expect(result).toMatchObject({ ok: true });
    else
      expect(result).toMatchObject({
        ok: false,
        code: expect.stringMatching(/^(access\.denied|auth\.required|thing\.missing)$/),
      });
  });
});

describe("through bare SQL of the application's role", () => {
  const cells = MEMBER_ROLES.flatMap((role) =>
    DEEDS.filter((deed) => THROUGH_BARE_SQL[deed]).flatMap((deed) =>
      KINDS.map((kind) => ({ role, deed, kind, isExpected: isExpectedInSql(role, deed, kind) })),
    ),
  );

  it.each(cells)("$role, $deed, $kind: $isExpected", async ({ role, deed, kind, isExpected: expected }) => {
    const target = await makeTarget(role, kind);
    expect(await tryBare(world.scopes[role], deed, target)).toBe(expected);
  });

  it("finds nothing at all when nobody acts", async () => {
    const target = await makeTarget("guest", "approved of a colleague");
    for (const deed of DEEDS.filter((one) => one !== "link.open")) {
      const attempt = THROUGH_BARE_SQL[deed];
      if (!attempt) continue;
      const stranger = { ...world.scopes.student, userId: randomUUID() };
      expect(await rolledBack((tx) => attempt(tx, stranger, target)), deed).toBe(false);
    }
  });

  it("believes no claim to be in a workspace: a member of one who names the other gets nothing", async () => {
    for (const role of MEMBER_ROLES) {
      const target = await makeTarget(role, "foreign");
      const claim: Scope = { ...world.scopes[role], workspaceId: world.foreigner.workspaceId };
      for (const deed of DEEDS.filter((one) => one !== "link.open" && THROUGH_BARE_SQL[one])) {
        expect(await tryBare(claim, deed, target), `${role} ${deed}`).toBe(false);
      }
    }
  });
});

/** In SQL "members.read" means others' rows, and inserting names the target's workspace, so foreign is refused outright. */
function isExpectedInSql(role: MemberRole, deed: Deed, kind: Kind): boolean {
  if (deed === "link.open") return true;
  if (kind === "foreign") return false;
  if (deed === "members.read") return ACCESS[deed][role] === "all";
  return can(role, deed, thingOf(kind));
}

async function tryBare(scope: Scope, deed: Deed, target: Target): Promise<boolean> {
  const attempt = THROUGH_BARE_SQL[deed];
  if (!attempt) throw new Error(`${deed} has no statement`);
  if (deed === "scenario.restore")
    await database.owner.db.execute(sql`update scenarios set archived_at = now() where id = ${target.scenarioId}`);
  return rolledBack(async (tx) => {
    await tx.execute(
      sql`select set_config('app.user_id', ${scope.userId}, true), set_config('app.workspace_id', ${scope.workspaceId}, true)`,
    );
    return attempt(tx, scope, target);
  });
}

class Undo extends Error {
  constructor(readonly isDone: boolean) {
    super("undo");
  }
}

/** Runs an attempt and takes it back; a refusal by rights, policy or guard (class 42501) is "not done". */
async function rolledBack(work: (tx: Transaction) => Promise<boolean>): Promise<boolean> {
  try {
    await database.app.db.transaction(async (tx) => {
      throw new Undo(await work(tx));
    });
  } catch (cause) {
    if (cause instanceof Undo) return cause.isDone;
    if (cause instanceof Error && (cause.cause as { code?: string } | undefined)?.code === "42501") return false;
    throw cause;
  }
  return false;
}
