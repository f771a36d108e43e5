import { afterEach, describe, expect, it, vi } from "vitest";
import { draftKey, keepDraft } from "@/components/scenario/draft-keeper";
import { createScenarioStore } from "@/components/scenario/store";
import { initialOf, memoryStorage, shortDocument } from "./support";

const SHUNT = "sensing.shunt.resistanceOhm";
const initial = initialOf(shortDocument());
const key = draftKey(initial.personId!, initial.scenarioId!);
const settled = () => new Promise((resolve) => setTimeout(resolve, 10));
const noProblem = (cause: unknown) => {
  throw cause;
};
const ends: (() => void)[] = [];
afterEach(() => ends.splice(0).forEach((end) => end()));

async function openPage(storage: ReturnType<typeof memoryStorage>, from = initial) {
  const store = createScenarioStore(from);
  const end = keepDraft(store, storage, noProblem);
  ends.push(end);
  await settled();
  return { store, end };
}

describe("the draft kept in this browser", () => {
  it("comes back after the tab was closed, and says how old it is", async () => {
    const storage = memoryStorage();
    const first = await openPage(storage);
    first.store.getState().change(SHUNT, 0.02);
    first.end();
    const { store } = await openPage(storage);
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.02);
    expect(store.getState().save.restored).toMatchObject({ baseNumber: 7 });
    expect(store.getState().base.document.sensing.shunt.resistanceOhm).toBe(0.0131);
  });

  it("keeps the revision it was based on when a newer one was saved meanwhile, so that saving is a conflict and not a loss", async () => {
    const storage = memoryStorage();
    const first = await openPage(storage);
    first.store.getState().change(SHUNT, 0.02);
    first.end();
    const newer = shortDocument((document) => (document.sensing.amplifier.gain = { fixed: 23 }));
    const { store } = await openPage(
      storage,
      initialOf(newer, { base: { ...initial.base, number: 8, document: newer } }),
    );
    expect(store.getState().base.number).toBe(7);
    expect(store.getState().newest.number).toBe(8);
    store.getState().discardRestored();
    expect(store.getState().base.number).toBe(8);
    expect(store.getState().document.sensing.amplifier.gain).toEqual({ fixed: 23 });
    store.getState().undo();
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.02);
  });

  it("is written shortly after a change and removed once everything is saved", async () => {
    const storage = memoryStorage();
    const { store } = await openPage(storage);
    store.getState().change(SHUNT, 0.02);
    await vi.waitFor(() => expect(storage.kept.get(key)?.document.sensing.shunt.resistanceOhm).toBe(0.02));
    store.getState().saveDone({ number: 8, document: store.getState().document, savedAtMs: 1, authorName: "you" });
    await vi.waitFor(() => expect(storage.kept.has(key)).toBe(false));
  });

  it("keeps nothing of a guest", async () => {
    const storage = memoryStorage();
    const { store, end } = await openPage(storage, { ...initial, mode: "guest" });
    store.getState().change(SHUNT, 0.02);
    end();
    await settled();
    expect(storage.kept.size).toBe(0);
  });

  it("leaves alone what a person typed before the storage answered", async () => {
    const storage = memoryStorage();
    const first = await openPage(storage);
    first.store.getState().change(SHUNT, 0.02);
    first.end();
    const store = createScenarioStore(initial);
    ends.push(keepDraft(store, storage, noProblem));
    store.getState().change(SHUNT, 0.04);
    await settled();
    expect(store.getState().document.sensing.shunt.resistanceOhm).toBe(0.04);
  });

  it("ignores what it cannot read", async () => {
    const storage = memoryStorage();
    storage.kept.set(key, { base: {}, document: { title: 5 }, keptAtMs: 3 } as never);
    const { store } = await openPage(storage);
    expect(store.getState().save.restored).toBeNull();
    expect(store.getState().document).toBe(initial.base.document);
  });
});
