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

type Kind = "full" | "coarse";

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
  let frame: number | undefined;
  let runId = 0;
  let isBusy = false;
  /** What to run next with the newest document, once the run under way has answered. */
  let next: Kind | null = null;

  /** Short enough to let it finish: a newer one that took its place at once would leave nothing to show while dragging. */
  const isLive = (document: ScenarioDocument): boolean => {
    const { run, shown } = store.getState();
    if (periodCountOf(document) <= LIVE_PERIODS) return true;
    return (
      run.computeMs !== null &&
      run.computeMs <= LIVE_MS &&
      shown !== null &&
      periodCountOf(document) <= 2 * periodCountOf(shown.document)
    );
  };

  const request = (document: ScenarioDocument, columnCount: number) => {
    const { shown, viewWindow } = store.getState();
    const toS = Math.min(viewWindow.toS, document.run.durationS);
    const isUsable = shown !== null && viewWindow.fromS < toS;
    return {
      document,
      overviewColumnCount: COLUMNS.overview,
      ...(isUsable ? { view: { fromS: viewWindow.fromS, toS, columnCount } } : {}),
    };
  };

  const start = async (kind: Kind) => {
    const id = ++runId;
    const isNewest = () => !isDisposed && id === runId;
    const { goodDocument: document, runStarted } = store.getState();
    const isFirst = store.getState().shown === null;
    const say = (what: "isSlow" | "isLong") => isNewest() && kind === "full" && store.getState().runBecame(what);
    const timers = [setTimeout(() => say("isSlow"), SLOW_MS), setTimeout(() => say("isLong"), LONG_MS)];
    isBusy = true;
    next = null;
    if (kind === "full") runStarted();
    const outcome = await client.run(
      request(document, COLUMNS[kind]),
      (progress) => isNewest() && kind === "full" && store.getState().runProgressed(progress),
    );
    timers.forEach(clearTimeout);
    if (!isNewest()) return;
    isBusy = false;
    if (outcome.ok) store.getState().runEnded(outcome.value, document, kind === "coarse");
    else store.getState().runStopped(outcome.failure);
    if (next !== null) return void start(next);
    if (!outcome.ok) return;
    if (isFirst || !coversWindow()) views.ask();
    readings.ask();
  };
  const ask = (kind: Kind) => {
    if (isDisposed) return;
    if (isBusy && isLive(store.getState().goodDocument)) next = kind === "full" || next === "full" ? "full" : "coarse";
    else void start(kind);
  };
  const askAfter = (waitMs: number) => {
    clearTimeout(restTimer);
    restTimer = setTimeout(() => ask("full"), waitMs);
  };
  const followDrag = () => {
    frame ??= requestAnimationFrame(() => {
      frame = undefined;
      // the drag may have ended within the frame: its full run is on its way
      if (store.getState().gesture) ask("coarse");
    });
  };

  const coversWindow = (): boolean => {
    const { shown, viewWindow } = store.getState();
    return (
      shown !== null && !shown.isCoarse && shown.view.fromS === viewWindow.fromS && shown.view.toS === viewWindow.toS
    );
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
      const isFollowed = isLive(state.goodDocument);
      if (state.gesture && isFollowed) followDrag();
      askAfter(state.gesture || !isFollowed ? REST_MS : 0);
    } else if (before.gesture && !state.gesture && state.shown?.isCoarse) askAfter(0);
    if (state.viewWindow !== before.viewWindow) views.ask();
    if (state.cursorS !== before.cursorS) readings.ask();
  });
  ask("full");

  return {
    runNow: () => void start("full"),
    cancel: () => {
      next = null;
      client.cancel();
    },
    dispose: () => {
      isDisposed = true;
      clearTimeout(restTimer);
      if (frame !== undefined) cancelAnimationFrame(frame);
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
