import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { createRunController } from "@/components/scenario/run-controller";
import { createScenarioStore } from "@/components/scenario/store";
import type { EngineClient, Outcome, RunReply, RunRequest } from "@/workers/protocol";
import { directClient, initialOf, shortDocument } from "./support";

const SHUNT = "sensing.shunt.resistanceOhm";

/** The engine with its answers held back until a test lets them go. */
function heldClient() {
  const engine = directClient();
  const held: { request: RunRequest; answer: () => Promise<void>; refuse: (outcome: Outcome<never>) => void }[] = [];
  const cancel = vi.fn();
  const client: EngineClient = {
    ...engine,
    cancel,
    run: (request, onProgress) =>
      new Promise<Outcome<RunReply>>((resolve) => {
        held.push({ request, answer: async () => resolve(await engine.run(request, onProgress)), refuse: resolve });
      }),
  };
  return { client, held, cancel };
}

const rest = (waitMs = 0) => new Promise((resolve) => setTimeout(resolve, waitMs));
let dispose: () => void = () => undefined;
beforeEach(() => vi.stubGlobal("requestAnimationFrame", (call: () => void) => setTimeout(call, 4)));
afterEach(() => {
  dispose();
  vi.unstubAllGlobals();
});

function openPage(document = shortDocument()) {
  const store = createScenarioStore(initialOf(document));
  const { client, held, cancel } = heldClient();
  const controller = createRunController(store, client);
  dispose = controller.dispose;
  return { store, held, controller, cancel };
}

describe("the run that follows the draft", () => {
  it("runs at once, then shows the window of the reversal and a reading at the cursor", async () => {
    const { store, held } = openPage();
    expect(store.getState().run.phase).toBe("recomputing");
    await held[0]!.answer();
    await vi.waitFor(() => expect(store.getState().reading).not.toBeNull());
    const { shown, cursorS, reading, run } = store.getState();
    expect(run.phase).toBe("upToDate");
    expect(shown?.simulation.status).toBe("reached-end");
    expect(cursorS).toBeGreaterThan(0.0004);
    expect(reading?.timeS).toBeCloseTo(cursorS, 12);
    expect(Math.abs(reading?.motorCurrentA ?? 1)).toBeLessThan(1e-6);
  });

  it("follows a drag with one coarse run at a time and ends on the newest value in full", async () => {
    const { store, held } = openPage();
    await held[0]!.answer();
    await rest(5);
    store.getState().beginDrag(SHUNT);
    store.getState().drag(SHUNT, 0.02);
    await rest(20);
    expect(held).toHaveLength(2);
    expect(held[1]!.request.view?.columnCount).toBeLessThan(500);
    store.getState().drag(SHUNT, 0.03);
    store.getState().drag(SHUNT, 0.04);
    await rest(20);
    expect(held).toHaveLength(2);
    await held[1]!.answer();
    await rest(20);
    expect(store.getState().shown?.document.sensing.shunt.resistanceOhm).toBe(0.02);
    expect(held).toHaveLength(3);
    expect(held[2]!.request.document.sensing.shunt.resistanceOhm).toBe(0.04);
    store.getState().endDrag();
    await held[2]!.answer();
    await vi.waitFor(() => expect(held).toHaveLength(4));
    expect(held[3]!.request.view?.columnCount).toBeGreaterThan(1000);
    await held[3]!.answer();
    await vi.waitFor(() => expect(store.getState().run.phase).toBe("upToDate"));
    expect(store.getState().shown).toMatchObject({ isCoarse: false });
  });

  it("does not follow a long run, keeps the last result, and takes the newest value at once", async () => {
    const { store, held } = openPage();
    await held[0]!.answer();
    await rest(5);
    store.getState().change("run.durationS", 2);
    await vi.waitFor(() => expect(held).toHaveLength(2));
    const before = store.getState().shown;
    store.getState().beginDrag(SHUNT);
    store.getState().drag(SHUNT, 0.02);
    await rest(30);
    expect(held).toHaveLength(2);
    await vi.waitFor(() => expect(held).toHaveLength(3));
    expect(held[2]!.request.view?.columnCount ?? 0).not.toBe(320);
    expect(store.getState().shown).toBe(before);
  });

  it("keeps the last run and offers to run again after a cancel", async () => {
    const { store, held, controller, cancel } = openPage();
    await held[0]!.answer();
    await rest(5);
    const before = store.getState().shown;
    store.getState().change(SHUNT, 0.02);
    await vi.waitFor(() => expect(held).toHaveLength(2));
    controller.cancel();
    expect(cancel).toHaveBeenCalled();
    held[1]!.refuse({ ok: false, failure: { code: "engine.cancelled" } });
    await vi.waitFor(() => expect(store.getState().run.phase).toBe("stale"));
    expect(store.getState().shown).toBe(before);
    controller.runNow();
    await held[2]!.answer();
    await vi.waitFor(() => expect(store.getState().run.phase).toBe("upToDate"));
  });

  it("says what the engine said when a run fails, and keeps the last good one", async () => {
    const { store, held } = openPage();
    await held[0]!.answer();
    await rest(5);
    store.getState().change(SHUNT, 0.02);
    await vi.waitFor(() => expect(held).toHaveLength(2));
    held[1]!.refuse({ ok: false, failure: { code: "engine.failed", text: "The current is not finite at 3 ms." } });
    await vi.waitFor(() => expect(store.getState().run.problem?.text).toBe("The current is not finite at 3 ms."));
    expect(store.getState().shown?.document.sensing.shunt.resistanceOhm).toBe(0.0131);
  });

  it("never sends a document that is refused", async () => {
    const { store, held } = openPage();
    await held[0]!.answer();
    await rest(5);
    store.getState().change("run.durationS", 999);
    await rest(150);
    expect(held).toHaveLength(1);
    expect(store.getState().run.phase).toBe("upToDate");
  });

  it("asks for the new window when it changes and drops what was asked before", async () => {
    const { store, held } = openPage();
    await held[0]!.answer();
    await rest(5);
    for (const toS of [0.0009, 0.0007, 0.0005]) store.getState().setViewWindow({ fromS: 0.0003, toS });
    await vi.waitFor(() => expect(store.getState().shown?.view.toS).toBe(0.0005));
    expect(store.getState().shown?.view.fromS).toBe(0.0003);
  });
});
