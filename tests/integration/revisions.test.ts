import { sql } from "drizzle-orm";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findRevisions } from "@/db/queries/revisions";
import { requireScenario } from "@/db/queries/scenarios";
import { keepMineAsRevision, listKeptDrafts, saveRevision, type ConflictDetail } from "@/lib/server/deeds/revisions";
import { archiveScenario, createScenario, duplicateScenario } from "@/lib/server/deeds/scenarios";
import { createTestDatabase, type TestDatabase } from "./support/database";
import { makeWorld, shortDocument, type World } from "./support/world";

let database: TestDatabase;
let world: World;
beforeAll(async () => {
  database = await createTestDatabase();
  world = await makeWorld(database.owner.db);
});
afterAll(() => database.drop());

const newScenario = () => world.addScenario(world.scopes.designer);

describe("saving a revision", () => {
  it("adds a numbered revision with author, message and the document as it was checked", async () => {
    const { designer } = world.scopes;
    const scenarioId = await newScenario();
    const document = shortDocument("Sluice gate drive", 26);
    const saved = await saveRevision(database.app.db, designer, {
      scenarioId,
      baseRevisionNumber: 1,
      document,
      message: "26 V battery",
    });
    expect(saved).toMatchObject({ ok: true, value: { number: 2 } });
    const view = await requireScenario(database.app.db, designer, scenarioId);
    expect(view.revision).toMatchObject({ number: 2, authorName: "The designer", message: "26 V battery", document });
    expect(view).toMatchObject({ newestNumber: 2, state: "draft", mayEdit: true });
  });

  it("refuses a document out of range with every path, and saves nothing", async () => {
    const { designer } = world.scopes;
    const scenarioId = await newScenario();
    const document = shortDocument();
    const broken = {
      ...document,
      supply: { ...document.supply, voltageV: -5 },
      run: { durationS: 1e9 },
      colour: "blue",
    };
    const refused = await saveRevision(database.app.db, designer, {
      scenarioId,
      baseRevisionNumber: 1,
      document: broken,
    });
    expect(refused).toMatchObject({ ok: false, code: "input.invalid" });
    const paths = refused.ok ? [] : refused.findings?.map((finding) => finding.path);
    expect(paths).toEqual(expect.arrayContaining(["supply.voltageV", "run.durationS", "colour"]));
    expect(await findRevisions(database.app.db, designer, scenarioId)).toHaveLength(1);
  });

  it("on an older revision is refused with both versions kept, and the loser can be kept as a new revision", async () => {
    const { designer, lead } = world.scopes;
    const scenarioId = await newScenario();
    const [mine, theirs] = [shortDocument("Mine", 20), shortDocument("Theirs", 30)];
    await saveRevision(database.app.db, lead, { scenarioId, baseRevisionNumber: 1, document: theirs });
    const conflict = await saveRevision(database.app.db, designer, {
      scenarioId,
      baseRevisionNumber: 1,
      document: mine,
      message: "Lower",
    });
    expect(conflict).toMatchObject({
      ok: false,
      code: "edit.conflict",
      detail: { newest: { number: 2, authorName: "The lead", document: theirs }, kept: { document: mine } },
    });
    const { kept } = (conflict as { detail: ConflictDetail }).detail;
    expect(await listKeptDrafts(database.app.db, designer, { scenarioId })).toMatchObject({
      ok: true,
      value: [{ id: kept.draftId, baseNumber: 1, message: "Lower", document: mine }],
    });
    expect(await listKeptDrafts(database.app.db, lead, { scenarioId })).toEqual({ ok: true, value: [] });

    expect(
      await keepMineAsRevision(database.app.db, lead, { scenarioId, draftId: kept.draftId, baseRevisionNumber: 2 }),
    ).toMatchObject({ code: "thing.missing" });
    expect(
      await keepMineAsRevision(database.app.db, designer, { scenarioId, draftId: kept.draftId, baseRevisionNumber: 1 }),
    ).toMatchObject({ code: "edit.conflict" });
    expect(
      await keepMineAsRevision(database.app.db, designer, { scenarioId, draftId: kept.draftId, baseRevisionNumber: 2 }),
    ).toMatchObject({ ok: true, value: { number: 3 } });
    expect((await requireScenario(database.app.db, designer, scenarioId)).revision).toMatchObject({
      number: 3,
      document: mine,
      message: "Lower",
    });
    expect((await requireScenario(database.app.db, designer, scenarioId, 2)).revision.document).toEqual(theirs);
    expect(await listKeptDrafts(database.app.db, designer, { scenarioId })).toEqual({ ok: true, value: [] });
  });

  it("by eight at once on two connections lets exactly one through and keeps seven drafts", async () => {
    const { designer, lead } = world.scopes;
    const scenarioId = await newScenario();
    const [one, two] = [database.openApp(), database.openApp()];
    const results = await Promise.all(
      Array.from({ length: 8 }, (_, n) =>
        saveRevision(n % 2 ? one.db : two.db, n % 2 ? designer : lead, {
          scenarioId,
          baseRevisionNumber: 1,
          document: shortDocument(`Version ${n}`, 20 + n),
        }),
      ),
    );
    expect(results.filter((result) => result.ok)).toHaveLength(1);
    expect(results.filter((result) => !result.ok && result.code === "edit.conflict")).toHaveLength(7);
    const numbers = (await findRevisions(database.app.db, designer, scenarioId)).map((row) => row.number);
    expect(numbers).toEqual([2, 1]);
    const drafts = await database.owner.db.execute(sql`select id from kept_drafts where scenario_id = ${scenarioId}`);
    expect(drafts).toHaveLength(7);
  });

  it("waits for a saver on another connection and then finds the number gone", async () => {
    const { designer, lead } = world.scopes;
    const scenarioId = await newScenario();
    let second: Promise<unknown> | undefined;
    // the owner holds the row as a saver would, until the second has begun to wait
    await database.owner.db.transaction(async (tx) => {
      await tx.execute(sql`update scenarios set newest_number = 2 where id = ${scenarioId}`);
      second = saveRevision(database.openApp().db, designer, {
        scenarioId,
        baseRevisionNumber: 1,
        document: shortDocument("Second", 21),
      });
      await waitForLock();
      await tx.execute(sql`
        insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name)
        select workspace_id, scenario_id, 2, document, ${lead.userId}, 'The lead' from revisions where scenario_id = ${scenarioId} and number = 1`);
    });
    expect(await second).toMatchObject({
      ok: false,
      code: "edit.conflict",
      detail: { newest: { number: 2, authorName: "The lead" } },
    });
  });

  it("a second time, because the first answer was lost, answers the revision that is there and keeps no draft", async () => {
    const { designer, lead } = world.scopes;
    const scenarioId = await newScenario();
    const again = { scenarioId, baseRevisionNumber: 1, document: shortDocument("Twice", 22) };
    const first = await saveRevision(database.app.db, designer, again);
    expect(first).toMatchObject({ ok: true, value: { number: 2 } });
    expect(await saveRevision(database.app.db, designer, again)).toEqual(first);
    expect(await listKeptDrafts(database.app.db, designer, { scenarioId })).toEqual({ ok: true, value: [] });
    // the same document from someone else is a conflict: that person has not saved anything yet
    expect(await saveRevision(database.app.db, lead, again)).toMatchObject({ code: "edit.conflict" });
  });

  it("from a kept draft needs the right to save, also for the draft's own author", async () => {
    const { trainer } = world.scopes;
    const scenarioId = await newScenario();
    const [draft] = await database.owner.db.execute<{ id: string }>(sql`
      insert into kept_drafts (workspace_id, scenario_id, author_id, base_number, document)
      select workspace_id, scenario_id, ${trainer.userId}, 1, document from revisions where scenario_id = ${scenarioId} returning id`);
    const kept = { scenarioId, draftId: draft!.id, baseRevisionNumber: 1 };
    expect(await keepMineAsRevision(database.app.db, trainer, kept)).toMatchObject({
      ok: false,
      code: "access.denied",
    });
    expect(await keepMineAsRevision(database.app.db, null, kept)).toMatchObject({ ok: false, code: "auth.required" });
  });

  it("of an archived scenario is refused", async () => {
    const { designer } = world.scopes;
    const scenarioId = await newScenario();
    await archiveScenario(database.app.db, designer, { scenarioId });
    expect(
      await saveRevision(database.app.db, designer, { scenarioId, baseRevisionNumber: 1, document: shortDocument() }),
    ).toMatchObject({ code: "edit.archived" });
  });

  it("writes one audit row in the same transaction, also for a conflict", async () => {
    const { designer } = world.scopes;
    const scenarioId = await newScenario();
    for (const voltageV of [25, 26])
      await saveRevision(database.app.db, designer, {
        scenarioId,
        baseRevisionNumber: 1,
        document: shortDocument("Sluice gate drive", voltageV),
      });
    const audited = await database.owner.db.execute(
      sql`select actor_name, deed, detail, correlation_id from audit where thing_id = ${scenarioId} order by id`,
    );
    expect(audited).toMatchObject([
      { actor_name: "The designer", deed: "revision.save", detail: { number: 2 }, correlation_id: "test-designer" },
      { actor_name: "The designer", deed: "revision.save", detail: { baseNumber: 1, refused: "edit.conflict" } },
    ]);
  });

  async function waitForLock(): Promise<void> {
    for (let n = 0; n < 200; n += 1) {
      const waiting = await database.owner.db.execute(
        sql`select from pg_stat_activity where datname = current_database() and wait_event_type = 'Lock'`,
      );
      if (waiting.length > 0) return;
      await new Promise((resume) => setTimeout(resume, 25));
    }
    throw new Error("nobody waits for the row");
  }
});

describe("revisions, once written,", () => {
  const statements = {
    "the application changes one": () => database.app.db.execute(sql`update revisions set message = 'x'`),
    "the application removes one": () => database.app.db.execute(sql`delete from revisions`),
    "the owner of the tables changes one": () => database.owner.db.execute(sql`update revisions set message = 'x'`),
    "the owner of the tables removes one": () => database.owner.db.execute(sql`delete from revisions`),
    "the owner of the tables empties the table": () => database.owner.db.execute(sql`truncate revisions cascade`),
    "the owner of the tables removes a scenario": () => database.owner.db.execute(sql`delete from scenarios`),
    "the application changes the audit": () => database.app.db.execute(sql`update audit set deed = 'x'`),
    "the owner of the tables removes from the audit": () => database.owner.db.execute(sql`delete from audit`),
  };
  it.each(Object.entries(statements))("stay when %s", async (_name, run) => {
    await newScenario();
    await database.owner.db.execute(
      sql`insert into audit (actor_id, actor_name, deed, correlation_id) values (${world.scopes.admin.userId}, 'x', 'session.start', 'c')`,
    );
    const count = async () =>
      (
        await database.owner.db.execute<{ n: string }>(
          sql`select (select count(*) from revisions) + (select count(*) from audit) as n`,
        )
      )[0]!.n;
    const before = await count();
    await expect(run()).rejects.toMatchObject({ cause: { code: expect.stringMatching(/^(42501|23001|23503)$/) } });
    expect(await count()).toBe(before);
  });

  it("exist for every scenario at the end of a transaction", async () => {
    const { designer } = world.scopes;
    const lone = sql`insert into scenarios (workspace_id, owner_id, title, newest_number) values (${designer.workspaceId}, ${designer.userId}, 'Lone', 1)`;
    await expect(database.owner.db.execute(lone)).rejects.toMatchObject({ cause: { code: "23503" } });
  });
});

describe("copies and new scenarios", () => {
  it("copy what the person sees: a student the approved revision, everyone else the newest", async () => {
    const { designer, student } = world.scopes;
    const scenarioId = await world.addScenario(designer, { isApproved: true });
    await saveRevision(database.app.db, designer, {
      scenarioId,
      baseRevisionNumber: 1,
      document: shortDocument("Sluice gate drive", 29),
    });
    expect((await requireScenario(database.app.db, student, scenarioId)).revision.number).toBe(1);
    await expect(requireScenario(database.app.db, student, scenarioId, 2)).rejects.toMatchObject({
      code: "thing.missing",
    });
    for (const [scope, voltageV] of [
      [student, 24],
      [designer, 29],
    ] as const) {
      const copied = await duplicateScenario(database.app.db, scope, { scenarioId });
      if (!copied.ok) throw new Error(copied.code);
      const copy = await requireScenario(database.app.db, scope, copied.value.id);
      expect(copy).toMatchObject({
        title: "Copy of Sluice gate drive",
        ownerId: scope.userId,
        mayEdit: true,
        revision: { number: 1, document: { title: "Copy of Sluice gate drive", supply: { voltageV } } },
      });
    }
  });

  it("take the figures of a run along, and none for a run too long to wait for", async () => {
    const { designer } = world.scopes;
    const short = await createScenario(database.app.db, designer, { document: shortDocument(), title: "Short" });
    if (!short.ok) throw new Error(short.code);
    const { summary, title } = await requireScenario(database.app.db, designer, short.value.id);
    expect(title).toBe("Short");
    expect(summary?.spark.minA).toHaveLength(64);
    expect(summary?.motorRmsA).toBeGreaterThan(0);

    const document = shortDocument();
    const long = await createScenario(database.app.db, designer, {
      document: { ...document, run: { durationS: 40_001 / document.pwm.frequencyHz } },
    });
    if (!long.ok) throw new Error(long.code);
    expect((await requireScenario(database.app.db, designer, long.value.id)).summary).toBeNull();
  });

  it("need a template that exists, or a document", async () => {
    expect(
      await createScenario(database.app.db, world.scopes.designer, { templateId: "no-such-template" }),
    ).toMatchObject({ code: "input.invalid", findings: [{ path: "templateId" }] });
  });
});
