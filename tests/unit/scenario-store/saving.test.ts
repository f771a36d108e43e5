import { describe, expect, it, vi } from "vitest";
import { isDirty } from "@/components/scenario/checked-document";
import { keepMine, saveDraft } from "@/components/scenario/saving";
import type { ScenarioActions } from "@/components/scenario/scenario-actions";
import { createScenarioStore } from "@/components/scenario/store";
import { failure, success } from "@/lib/result";
import { initialOf, shortDocument } from "../../dom/scenario/support";

const SHUNT = "sensing.shunt.resistanceOhm";
const makeStore = () => createScenarioStore(initialOf(shortDocument()));
const theirs = () => shortDocument((document) => (document.sensing.amplifier.gain = { fixed: 23 }));

/** What lib/server/deeds/revisions.ts answers when someone else was first; dates cross as text. */
const conflictAnswer = (mine: unknown) =>
  failure("edit.conflict", {
    detail: {
      newest: { number: 8, authorName: "Jonas", createdAt: "2026-05-04T14:20:00.000Z", document: theirs() },
      kept: { draftId: "draft-1", document: mine },
    },
  });

describe("saving a revision", () => {
  it("saves on top of the revision the draft started from and counts as saved afterwards", async () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    const saveRevision = vi
      .fn<ScenarioActions["saveRevision"]>()
      .mockResolvedValue(success({ number: 8, revisionId: "r8" }));
    expect(await saveDraft(store, { saveRevision }, "larger shunt")).toBe(true);
    expect(saveRevision).toHaveBeenCalledWith(
      expect.objectContaining({ baseRevisionNumber: 7, message: "larger shunt" }),
    );
    expect(store.getState().base.number).toBe(8);
    expect(isDirty(store.getState())).toBe(false);
  });

  it("keeps an edit made while saving as not saved", async () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    const saveRevision: ScenarioActions["saveRevision"] = async () => {
      store.getState().change(SHUNT, 0.03);
      return success({ number: 8, revisionId: "r8" });
    };
    await saveDraft(store, { saveRevision }, "");
    expect(store.getState().base.document.sensing.shunt.resistanceOhm).toBe(0.02);
    expect(isDirty(store.getState())).toBe(true);
  });

  it("says that it works here when the server cannot be reached, and loses nothing", async () => {
    const store = makeStore();
    vi.spyOn(console, "warn").mockImplementation(() => undefined);
    store.getState().change(SHUNT, 0.02);
    expect(await saveDraft(store, { saveRevision: () => Promise.reject(new TypeError("fetch failed")) }, "")).toBe(
      false,
    );
    expect(store.getState().save.isOffline).toBe(true);
    expect(store.getState().save.problem?.code).toBe("server.unreachable");
    expect(isDirty(store.getState())).toBe(true);
  });

  it("names what the server refused", async () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    await saveDraft(store, { saveRevision: async () => failure("access.denied") }, "");
    expect(store.getState().save.problem?.text).toContain("Your role");
  });
});

describe("two people, one draft", () => {
  const conflicted = async () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    const mine = store.getState().document;
    await saveDraft(store, { saveRevision: async () => conflictAnswer(mine) }, "mine");
    return { store, mine };
  };

  it("shows both versions and loses neither", async () => {
    const { store, mine } = await conflicted();
    expect(store.getState().save.conflict?.newest).toMatchObject({ number: 8, authorName: "Jonas" });
    expect(store.getState().document).toBe(mine);
  });

  it("keeps mine as a new revision on top of theirs", async () => {
    const { store } = await conflicted();
    const keepMineAsRevision = vi
      .fn<ScenarioActions["keepMineAsRevision"]>()
      .mockResolvedValue(success({ number: 9, revisionId: "r9" }));
    expect(await keepMine(store, { keepMineAsRevision, saveRevision: vi.fn() })).toBe(true);
    expect(keepMineAsRevision).toHaveBeenCalledWith(
      expect.objectContaining({ draftId: "draft-1", baseRevisionNumber: 8, message: "mine" }),
    );
    expect(store.getState().base.number).toBe(9);
    expect(store.getState().save.conflict).toBeNull();
    expect(isDirty(store.getState())).toBe(false);
  });

  it("takes what was edited since the refusal along when mine is kept", async () => {
    const { store } = await conflicted();
    store.getState().change(SHUNT, 0.03);
    const saveRevision = vi
      .fn<ScenarioActions["saveRevision"]>()
      .mockResolvedValue(success({ number: 9, revisionId: "r9" }));
    const keepMineAsRevision = vi.fn<ScenarioActions["keepMineAsRevision"]>();
    await keepMine(store, { keepMineAsRevision, saveRevision });
    expect(keepMineAsRevision).not.toHaveBeenCalled();
    expect(saveRevision.mock.calls[0]?.[0]).toMatchObject({
      baseRevisionNumber: 8,
      document: { sensing: { shunt: { resistanceOhm: 0.03 } } },
    });
  });

  it("takes theirs as one step that undo takes back", async () => {
    const { store } = await conflicted();
    store.getState().takeTheirs();
    expect(store.getState().document.sensing.amplifier.gain).toEqual({ fixed: 23 });
    expect(store.getState().base.number).toBe(8);
    expect(isDirty(store.getState())).toBe(false);
    store.getState().undo();
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.02);
    expect(store.getState().base.number).toBe(8);
  });
});
