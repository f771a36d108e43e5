import { sql } from "drizzle-orm";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { saveRevision } from "@/lib/server/deeds/revisions";
import { archiveScenario } from "@/lib/server/deeds/scenarios";
import { changeExpiry, createShareLink, listShareLinks, revokeShareLink } from "@/lib/server/deeds/shares";
import { openShareLink, openShareLinkFrom } from "@/lib/server/share";
import { hashToken } from "@/lib/server/tokens";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, shortDocument, type World } from "./support/world";

let database: TestDatabase;
let world: World;
let scenarioId: string;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
});
beforeEach(async () => {
  scenarioId = await world.addScenario(world.scopes.designer);
});
afterAll(() => database.drop());

async function makeLink(more: {
  follows: "pinned" | "newest";
  revisionNumber?: number;
  expiresAt?: Date;
}): Promise<{ id: string; token: string }> {
  const made = await createShareLink(database.app.db, world.scopes.designer, {
    scenarioId,
    label: "For the works",
    ...more,
  });
  if (!made.ok) throw new Error(made.code);
  return { id: made.value.id, token: made.value.url.split("/s/")[1]! };
}
const open = (token: string) => openShareLink(database.app.db, token);
const save = (baseRevisionNumber: number, voltageV: number) =>
  saveRevision(database.app.db, world.scopes.designer, {
    scenarioId,
    baseRevisionNumber,
    document: shortDocument("Sluice gate drive", voltageV),
  });

describe("a share link", () => {
  it("opens without anyone being signed in, with what it names and nothing else", async () => {
    const { token } = await makeLink({ follows: "newest" });
    expect(await open(token)).toEqual({
      ok: true,
      value: {
        title: "Sluice gate drive",
        document: shortDocument(),
        revisionNumber: 1,
        label: "For the works",
        follows: "newest",
        workspaceName: "Sluice drives",
      },
    });
  });

  it("that follows the newest moves on, one that is pinned stays", async () => {
    const [following, pinned] = [
      await makeLink({ follows: "newest" }),
      await makeLink({ follows: "pinned", revisionNumber: 1 }),
    ];
    await save(1, 31);
    expect(await open(following.token)).toMatchObject({
      value: { revisionNumber: 2, follows: "newest", document: { supply: { voltageV: 31 } } },
    });
    expect(await open(pinned.token)).toMatchObject({
      value: { revisionNumber: 1, follows: "pinned", document: { supply: { voltageV: 24 } } },
    });
  });

  it("that is wrong, expired or revoked opens nothing and says which", async () => {
    const revoked = await makeLink({ follows: "newest" });
    await revokeShareLink(database.app.db, world.scopes.designer, { linkId: revoked.id });
    const expired = await world.addLink(world.scopes.designer, scenarioId, { expiresInS: -1 });
    expect(await open("x".repeat(43))).toEqual({ ok: false, code: "link.unknown" });
    expect(await open("too short")).toEqual({ ok: false, code: "link.unknown" });
    expect(await open(revoked.token)).toEqual({ ok: false, code: "link.revoked" });
    expect(await open(expired.token)).toEqual({ ok: false, code: "link.expired" });
  });

  it("counts its openings and not its refusals", async () => {
    const link = await makeLink({ follows: "newest" });
    await Promise.all([open(link.token), open(link.token), open(link.token)]);
    await revokeShareLink(database.app.db, world.scopes.designer, { linkId: link.id });
    await open(link.token);
    const listed = await listShareLinks(database.app.db, world.scopes.designer, { scenarioId });
    expect(listed).toMatchObject({
      ok: true,
      value: [
        {
          id: link.id,
          openedCount: 3,
          status: "revoked",
          lastOpenedAt: expect.any(Date),
          makerName: "The designer",
          mayRevoke: false,
        },
      ],
    });
  });

  it("keeps its token nowhere, and no list shows token or hash", async () => {
    const { token } = await makeLink({ follows: "newest" });
    const stored = await database.owner.db.execute<{ row: string }>(
      sql`select share_links::text as row from share_links where scenario_id = ${scenarioId}`,
    );
    expect(stored[0]!.row).toContain(hashToken(token));
    expect(stored[0]!.row).not.toContain(token);
    const listed = JSON.stringify(await listShareLinks(database.app.db, world.scopes.admin, { scenarioId }));
    expect(listed).not.toContain(token);
    expect(listed).not.toContain(hashToken(token));
    await expect(database.app.db.execute(sql`select token_hash from share_links`)).rejects.toMatchObject({
      cause: { code: "42501" },
    });
    const audited = await database.owner.db.execute<{ row: string }>(sql`select audit::text as row from audit`);
    expect(audited.some(({ row }) => row.includes(token))).toBe(false);
  });

  it("takes a new expiry, in the future only, until it is revoked; a revoked one stays so", async () => {
    const { scopes } = world;
    const link = await makeLink({ follows: "newest", expiresAt: new Date(Date.now() + 3_600_000) });
    expect(
      await changeExpiry(database.app.db, scopes.designer, { linkId: link.id, expiresAt: new Date(Date.now() - 1000) }),
    ).toMatchObject({ code: "input.invalid", findings: [{ path: "expiresAt" }] });
    expect(await changeExpiry(database.app.db, scopes.designer, { linkId: link.id, expiresAt: null })).toEqual({
      ok: true,
      value: { expiresAt: null },
    });
    await revokeShareLink(database.app.db, scopes.designer, { linkId: link.id });
    expect(await changeExpiry(database.app.db, scopes.designer, { linkId: link.id, expiresAt: null })).toMatchObject({
      code: "link.revoked",
    });
    await expect(
      database.owner.db.execute(sql`update share_links set revoked_at = null where id = ${link.id}`),
    ).rejects.toMatchObject({ cause: { code: "23001" } });
    expect(await revokeShareLink(database.app.db, scopes.designer, { linkId: link.id })).toEqual({
      ok: true,
      value: null,
    });
  });

  it("can be pinned only to a revision that exists", async () => {
    const made = await createShareLink(database.app.db, world.scopes.designer, {
      scenarioId,
      label: "Works",
      follows: "pinned",
      revisionNumber: 7,
    });
    expect(made).toMatchObject({ ok: false, code: "input.invalid", findings: [{ path: "revisionNumber" }] });
    expect(
      await createShareLink(database.app.db, world.scopes.designer, { scenarioId, label: "Works", follows: "pinned" }),
    ).toMatchObject({ code: "input.invalid" });
  });

  it("goes on opening when its scenario is archived", async () => {
    const { token } = await makeLink({ follows: "newest" });
    await archiveScenario(database.app.db, world.scopes.designer, { scenarioId });
    expect(await open(token)).toMatchObject({ ok: true });
  });

  it("cannot be tried out: the sixty-first opening in a minute from one address is refused, another address goes on", async () => {
    const { token } = await makeLink({ follows: "newest" });
    let refused = 0;
    // a minute may turn over in between; then the window before still counts for most of it
    for (let n = 0; n < 130; n += 1)
      if (!(await openShareLinkFrom(database.app.db, "198.51.100.7", token)).ok) refused += 1;
    expect(refused).toBeGreaterThanOrEqual(10);
    expect(refused).toBeLessThanOrEqual(70);
    expect(await openShareLinkFrom(database.app.db, "198.51.100.8", token)).toMatchObject({ ok: true });
  });
});
