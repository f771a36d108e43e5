import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findScenarios, type ScenarioFilter } from "@/db/queries/scenarios";
import type { Scope } from "@/db/client";
import { archiveScenario, renameScenario, restoreScenario, setTags } from "@/lib/server/deeds/scenarios";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, type World } from "./support/world";

let database: TestDatabase;
let world: World;
const ids: Record<string, string> = {};
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
  const { designer, lead } = world.scopes;
  ids.gate = await world.addScenario(designer, { title: "Gate 50 % open", tags: ["gate", "24 V"] });
  ids.weir = await world.addScenario(lead, { title: "Weir_drive", tags: ["weir"], isApproved: true });
  ids.old = await world.addScenario(designer, { title: "Old gate", tags: ["gate"], isArchived: true });
  ids.crane = await world.addScenario(world.foreigner, { title: "Gate crane", tags: ["crane"] });
  // changes one minute apart, so that the order is known
  for (const [minutes, name] of ["gate", "weir", "old"].entries()) {
    await database.owner.db.execute(
      sql`update scenarios set changed_at = now() - make_interval(mins => ${minutes}) where id = ${ids[name]!}`,
    );
  }
});
afterAll(() => database.drop());

const find = (scope: Scope, filter: Partial<ScenarioFilter> = {}) =>
  findScenarios(database.app.db, scope, { page: 1, ...filter });
const titles = async (filter: Partial<ScenarioFilter>) =>
  (await find(world.scopes.designer, filter)).rows.map((row) => row.title);

describe("the scenario table", () => {
  it("shows the workspace's scenarios, newest change first, without archived ones and without another workspace's", async () => {
    const list = await find(world.scopes.designer);
    expect(list.rows.map((row) => row.id)).toEqual([ids.gate, ids.weir]);
    expect(list).toMatchObject({
      total: 2,
      page: 1,
      pageCount: 1,
      counts: { all: 2, mine: 1, archived: 1, draft: 1, approved: 1, inReview: 0, superseded: 0 },
      tags: ["24 V", "gate", "weir"],
    });
    expect(list.owners).toEqual([
      { id: world.scopes.designer.userId, name: "The designer" },
      { id: world.scopes.lead.userId, name: "The lead" },
    ]);
    expect(list.rows[0]).toMatchObject({
      ownerName: "The designer",
      revisionNumber: 1,
      isArchived: false,
      summary: null,
      mayEdit: true,
      mayDuplicate: true,
      mayArchive: true,
    });
    expect(list.rows[1]).toMatchObject({ state: "approved", mayEdit: true, mayArchive: false });
  });

  it("searches by the name of the owner too", async () => {
    expect(await titles({ search: "the LEAD" })).toEqual(["Weir_drive"]);
  });

  it("searches titles and tags, taking % and _ for themselves", async () => {
    expect(await titles({ search: "WEIR" })).toEqual(["Weir_drive"]);
    expect(await titles({ search: "24" })).toEqual(["Gate 50 % open"]);
    expect(await titles({ search: "50 %" })).toEqual(["Gate 50 % open"]);
    expect(await titles({ search: "_" })).toEqual(["Weir_drive"]);
    expect(await titles({ search: "'; drop table scenarios; --" })).toEqual([]);
  });

  it("filters by owner, state, tag and archive, also together", async () => {
    expect(await titles({ owner: "me" })).toEqual(["Gate 50 % open"]);
    expect(await titles({ owner: world.scopes.lead.userId })).toEqual(["Weir_drive"]);
    expect(await titles({ owner: "nobody" })).toEqual([]);
    expect(await titles({ state: "approved" })).toEqual(["Weir_drive"]);
    expect(await titles({ tag: "gate" })).toEqual(["Gate 50 % open"]);
    expect(await titles({ archived: true })).toEqual(["Old gate"]);
    expect(await titles({ tag: "weir", owner: "me" })).toEqual([]);
  });

  it("pages, and gives the last page for one beyond it", async () => {
    const second = await find(world.scopes.designer, { pageSize: 1, page: 2 });
    expect(second).toMatchObject({ total: 2, page: 2, pageCount: 2, rows: [{ title: "Weir_drive" }] });
    expect(await find(world.scopes.designer, { pageSize: 1, page: 9 })).toMatchObject({
      page: 2,
      rows: [{ title: "Weir_drive" }],
    });
    expect(await find(world.scopes.designer, { page: Number.NaN })).toMatchObject({ page: 1 });
  });

  it("shows a student what is approved, as approved, and who owns it", async () => {
    const list = await find(world.scopes.student);
    expect(list).toMatchObject({
      total: 1,
      counts: { all: 1, mine: 0, archived: 0, draft: 0 },
      tags: ["weir"],
      owners: [{ name: "The lead" }],
    });
    expect(list.rows[0]).toMatchObject({
      title: "Weir_drive",
      state: "approved",
      ownerName: "The lead",
      mayEdit: false,
      mayDuplicate: true,
      mayArchive: false,
    });
  });

  it("follows renaming, tagging, archiving and restoring", async () => {
    const { designer } = world.scopes;
    const scenarioId = await world.addScenario(designer, { title: "Pump" });
    expect(await renameScenario(database.app.db, designer, { scenarioId, title: "  Pump drive " })).toEqual({
      ok: true,
      value: { title: "Pump drive" },
    });
    expect(await setTags(database.app.db, designer, { scenarioId, tags: ["pump", " pump", 'a,b"c'] })).toEqual({
      ok: true,
      value: { tags: ["pump", 'a,b"c'] },
    });
    expect((await find(designer, { tag: 'a,b"c' })).rows).toMatchObject([
      { title: "Pump drive", tags: ["pump", 'a,b"c'] },
    ]);
    await archiveScenario(database.app.db, designer, { scenarioId });
    expect(await titles({ search: "pump" })).toEqual([]);
    expect(await renameScenario(database.app.db, designer, { scenarioId, title: "X" })).toMatchObject({
      code: "edit.archived",
    });
    await restoreScenario(database.app.db, designer, { scenarioId });
    expect(await titles({ search: "pump" })).toEqual(["Pump drive"]);
  });

  it("refuses empty and overlong titles and tags, by field", async () => {
    const scenarioId = ids.gate!;
    const { designer } = world.scopes;
    expect(await renameScenario(database.app.db, designer, { scenarioId, title: "   " })).toMatchObject({
      code: "input.invalid",
      findings: [{ path: "title" }],
    });
    expect(await setTags(database.app.db, designer, { scenarioId, tags: ["x".repeat(33)] })).toMatchObject({
      code: "input.invalid",
      findings: [{ path: "tags.0" }],
    });
    expect(
      await setTags(database.app.db, designer, { scenarioId, tags: Array.from({ length: 13 }, (_, n) => `t${n}`) }),
    ).toMatchObject({ code: "input.invalid", findings: [{ path: "tags" }] });
  });
});
