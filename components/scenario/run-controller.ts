import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { EngineClient } from "@/workers/protocol";
import type { ScenarioStore } from "./store";

/** Columns of a picture: about one for each pixel of a wide screen; while dragging a quarter of that is enough. */
const COLUMNS = { full: 1200, coarse: 320, overview: 480 };
/** look.md section 7. */
const REST_MS = 120;
const SLOW_MS = 300;
const LONG_MS = 2000;
/** A run of more periods than this is not followed frame by frame, unless the last one is known to have been quick. */
const LIVE_PERIODS = 4000;
const LIVE_MS = 24;

export type RunController = { runNow: () => void; cancel: () => void; dispose: () => void };

const periodCountOf = (document: ScenarioDocument): number => document.run.durationS * document.pwm.frequencyHz;

/**
 * Keeps the shown run in step with the draft. While a slider moves, one coarse run at a time follows the newest value;
 * 120 ms after the last move comes the full run. A run that would be long is not followed: the last result stays, and the
 * full run can be cancelled. View and cursor requests are answered newest first; older ones are dropped.
 */
export function createRunController(store: ScenarioStore, client: EngineClient): RunController {
  let isDisposed = false;
  let restTimer: ReturnType<typeof setTimeout> | undefined;
  let coarseFrame: number | undefined;
  let isCoarseBusy = false;
  let runId = 0;

  const isLive = (document: ScenarioDocument): boolean => {
    const { run, shown } = store.getState();
    if (periodCountOf(document) <= LIVE_PERIODS) return true;
    return run.computeMs !== null && run.computeMs <= LIVE_MS && shown !== null && periodCountOf(document) <= 2 * periodCountOf(shown.document);
  };

  const request = (document: ScenarioDocument, columnCount: number) => {
    const { shown, viewWindow } = store.getState();
    const toS = Math.min(viewWindow.toS, document.run.durationS);
    const isUsable = shown !== null && viewWindow.fromS < toS;
    return { document, overviewColumnCount: COLUMNS.overview, ...(isUsable ? { view: { fromS: viewWindow.fromS, toS, columnCount } } : {}) };
  };

  const runCoarse = async () => {
    coarseFrame = undefined;
    const document = store.getState().goodDocument;
    isCoarseBusy = true;
    const outcome = await client.run(request(document, COLUMNS.coarse));
    isCoarseBusy = false;
    if (isDisposed) return;
    const state = store.getState();
    // after the drag the full run is on its way and must not be overwritten by what was asked before it
    if (outcome.ok && state.gesture) state.runEnded(outcome.value, document, true);
    else if (!outcome.ok && state.gesture) state.runStopped(outcome.failure);
    if (state.gesture && state.goodDocument !== document) followDrag();
  };
  const followDrag = () => {
    if (isCoarseBusy || coarseFrame !== undefined) return;
    coarseFrame = requestAnimationFrame(() => void runCoarse());
  };

  const runFull = async () => {
    clearTimeout(restTimer);
    restTimer = undefined;
    const id = ++runId;
    const isNewest = () => !isDisposed && id === runId;
    const { goodDocument: document, runStarted } = store.getState();
    runStarted();
    const slow = setTimeout(() => isNewest() && store.getState().runBecame("isSlow"), SLOW_MS);
    const long = setTimeout(() => isNewest() && store.getState().runBecame("isLong"), LONG_MS);
    const isFirst = store.getState().shown === null;
    const outcome = await client.run(request(document, COLUMNS.full), (progress) => isNewest() && store.getState().runProgressed(progress));
    clearTimeout(slow);
    clearTimeout(long);
    if (!isNewest()) return;
    if (!outcome.ok) return store.getState().runStopped(outcome.failure);
    store.getState().runEnded(outcome.value, document, false);
    if (isFirst || !coversWindow()) views.ask();
    readings.ask();
  };

  const coversWindow = (): boolean => {
    const { shown, viewWindow } = store.getState();
    return shown !== null && !shown.isCoarse && shown.view.fromS === viewWindow.fromS && shown.view.toS === viewWindow.toS;
  };
  const views = newestOnly(async () => {
    const { shown, viewWindow } = store.getState();
    if (!shown || coversWindow()) return;
    const id = runId;
    const outcome = await client.view({ ...viewWindow, columnCount: COLUMNS.full });
    if (outcome.ok && !isDisposed && id === runId) store.getState().viewArrived(outcome.value);
  });
  const readings = newestOnly(async () => {
    const { shown, cursorS } = store.getState();
    if (!shown) return;
    const id = runId;
    const outcome = await client.readAt([cursorS]);
    const reading = outcome.ok ? outcome.value[0] : undefined;
    if (reading && !isDisposed && id === runId) store.getState().readingArrived(reading);
  });

  const unsubscribe = store.subscribe((state, before) => {
    if (state.goodDocument !== before.goodDocument) {
      clearTimeout(restTimer);
      if (state.gesture) {
        if (isLive(state.goodDocument)) followDrag();
        restTimer = setTimeout(() => void runFull(), REST_MS);
      } else restTimer = setTimeout(() => void runFull(), isLive(state.goodDocument) ? 0 : REST_MS);
    } else if (before.gesture && !state.gesture && state.shown?.isCoarse) {
      clearTimeout(restTimer);
      restTimer = setTimeout(() => void runFull(), REST_MS);
    }
    if (state.viewWindow !== before.viewWindow) views.ask();
    if (state.cursorS !== before.cursorS) readings.ask();
  });
  void runFull();

  return {
    runNow: () => void runFull(),
    cancel: () => client.cancel(),
    dispose: () => {
      isDisposed = true;
      clearTimeout(restTimer);
      if (coarseFrame !== undefined) cancelAnimationFrame(coarseFrame);
      unsubscribe();
      client.dispose();
    },
  };
}

/** At most one answer under way; whatever was asked meanwhile is asked once more with the newest state. */
function newestOnly(work: () => Promise<void>): { ask: () => void } {
  let isBusy = false;
  let isWanted = false;
  const ask = async () => {
    if (isBusy) {
      isWanted = true;
      return;
    }
    isBusy = true;
    do {
      isWanted = false;
      await work();
    } while (isWanted);
    isBusy = false;
  };
  return { ask: () => void ask() };
}
