import { describe, expect, it } from "vitest";
import { isDirty } from "@/components/scenario/checked-document";
import { HISTORY_MAX } from "@/components/scenario/history";
import { createScenarioStore } from "@/components/scenario/store";
import { initialOf, shortDocument } from "../../dom/scenario/support";

const SHUNT = "sensing.shunt.resistanceOhm";
const makeStore = () => createScenarioStore(initialOf(shortDocument()));
type Store = ReturnType<typeof makeStore>;
const shuntOf = (store: Store) => store.getState().document.sensing.shunt.resistanceOhm;

describe("editing a scenario", () => {
  it("takes a change back and brings it again, each with its words", () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    expect(store.getState().history.past.at(-1)?.label).toBe("shunt resistance 13.1 to 20 mΩ");
    expect(isDirty(store.getState())).toBe(true);
    store.getState().undo();
    expect(shuntOf(store)).toBe(0.0131);
    expect(isDirty(store.getState())).toBe(false);
    expect(store.getState().said?.text).toBe("Undone: shunt resistance 13.1 to 20 mΩ");
    store.getState().redo();
    expect(shuntOf(store)).toBe(0.02);
  });

  it("makes one step of a whole drag, and none of a drag that ends where it began", () => {
    const store = makeStore();
    store.getState().beginDrag(SHUNT);
    for (const value of [0.0135, 0.015, 0.0172, 0.019]) store.getState().drag(SHUNT, value);
    store.getState().endDrag();
    expect(store.getState().history.past).toHaveLength(1);
    expect(store.getState().dragStart).toEqual({ path: SHUNT, value: 0.0131 });
    store.getState().undo();
    expect(shuntOf(store)).toBe(0.0131);

    store.getState().beginDrag(SHUNT);
    store.getState().drag(SHUNT, 0.03);
    store.getState().drag(SHUNT, 0.0131);
    store.getState().endDrag();
    expect(store.getState().history.past).toHaveLength(0);
  });

  it("puts the old value back when a drag is cancelled", () => {
    const store = makeStore();
    store.getState().beginDrag(SHUNT);
    store.getState().drag(SHUNT, 0.05);
    store.getState().cancelDrag();
    expect(shuntOf(store)).toBe(0.0131);
    expect(store.getState().history.past).toHaveLength(0);
  });

  it("joins a series of key steps on one field into one step, and starts another for another field", () => {
    const store = makeStore();
    store.getState().nudge(SHUNT, 0.0132);
    store.getState().nudge(SHUNT, 0.0133);
    store.getState().nudge(SHUNT, 0.0134);
    store.getState().nudge("bridge.deadTimeS", 8e-7);
    expect(store.getState().history.past.map((edit) => edit.label)).toEqual([
      "shunt resistance 13.1 to 13.4 mΩ",
      "dead time 730 to 800 ns",
    ]);
  });

  it("forgets the steps beyond two hundred, the oldest first", () => {
    const store = makeStore();
    for (let index = 1; index <= HISTORY_MAX + 5; index += 1) store.getState().change(SHUNT, 0.02 + index * 1e-4);
    expect(store.getState().history.past).toHaveLength(HISTORY_MAX);
    for (let index = 0; index < HISTORY_MAX + 5; index += 1) store.getState().undo();
    expect(shuntOf(store)).toBeCloseTo(0.0205, 12);
  });

  it("forgets what was undone once something else is changed", () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    store.getState().undo();
    store.getState().change(SHUNT, 0.03);
    expect(store.getState().history.future).toHaveLength(0);
  });

  it("says what a choice changed along with it", () => {
    const store = makeStore();
    store.getState().change("sensing.site", "line");
    expect(store.getState().document.sensing.amplifier.arrangement).toBe("bipolarMidscale");
    expect(store.getState().findings).toEqual([]);
    expect(store.getState().said?.text).toContain("Changed along with it: Arrangement");
    expect(store.getState().said?.canUndo).toBe(true);
  });

  it("keeps the last good document for the run when the new one is refused", () => {
    const store = makeStore();
    const good = store.getState().goodDocument;
    store.getState().change("run.durationS", 999);
    expect(store.getState().document.run.durationS).toBe(999);
    expect(store.getState().findings.map((finding) => finding.path)).toContain("run.durationS");
    expect(store.getState().goodDocument).toBe(good);
    store.getState().undo();
    expect(store.getState().findings).toEqual([]);
  });

  it("counts a document as unchanged when every value is back, whichever way it came there", () => {
    const store = makeStore();
    store.getState().change(SHUNT, 0.02);
    store.getState().change(SHUNT, 0.0131);
    expect(isDirty(store.getState())).toBe(false);
  });

  it("adds and removes rows of a list as single steps", () => {
    const store = makeStore();
    store.getState().addRow("faults", "add a fault");
    expect(store.getState().document.faults).toHaveLength(1);
    store.getState().removeRow("faults", 0, "remove fault 1");
    expect(store.getState().document.faults).toHaveLength(0);
    store.getState().undo();
    expect(store.getState().document.faults).toHaveLength(1);
    expect(store.getState().said?.text).toBe("Undone: remove fault 1");
  });

  it("keeps two pages apart", () => {
    const [one, other] = [makeStore(), makeStore()];
    one.getState().change(SHUNT, 0.02);
    expect(shuntOf(other)).toBe(0.0131);
  });
});
