import { revealTime } from "@/components/plot/scale";
import type { InstantReading, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { EngineFailure, Progress, RunReply } from "@/workers/protocol";
import type { TimeWindow } from "./scenario-state";
import type { GetState, SetState } from "./store";
import { openingPlace } from "./opening-place";

export type RunActions = {
  runStarted: () => void;
  runProgressed: (progress: Progress) => void;
  runBecame: (what: "isSlow" | "isLong") => void;
  runEnded: (reply: RunReply, document: ScenarioDocument, isCoarse: boolean) => void;
  runStopped: (failure: EngineFailure) => void;
  viewArrived: (view: View) => void;
  readingArrived: (reading: InstantReading) => void;
  setCursor: (timeS: number) => void;
  /** To an instant that may lie outside the window: the window moves only as far as it has to. */
  goTo: (timeS: number) => void;
  setPin: (timeS: number | null) => void;
  setViewWindow: (next: TimeWindow) => void;
  pinFigure: (name: string | null) => void;
  setLetters: (areLettersOn: boolean) => void;
};

const calm = { isSlow: false, isLong: false, progress: null };

export function runActions(set: SetState, get: GetState): RunActions {
  return {
    runStarted: () => set({ run: { ...get().run, phase: "recomputing", progress: null, problem: null } }),
    runProgressed: (progress) => set({ run: { ...get().run, progress } }),
    runBecame: (what) => get().run.phase === "recomputing" && set({ run: { ...get().run, [what]: true } }),
    runEnded: (reply, document, isCoarse) => {
      const state = get();
      const { simulation, view, overview, computeMs } = reply;
      const isFirst = state.shown === null;
      const place = isFirst ? openingPlace(document, simulation) : fitPlace(state, simulation.durationS);
      set({
        run: { phase: state.goodDocument === document ? "upToDate" : "recomputing", ...calm, problem: null, computeMs },
        shown: { simulation, view, overview, document, isCoarse },
        ...place,
      });
    },
    runStopped: (failure) => {
      const { run } = get();
      if (failure.code === "engine.superseded") return;
      if (failure.code === "engine.cancelled") set({ run: { ...run, ...calm, phase: "stale" } });
      else if (failure.code === "input.invalid")
        set({ run: { ...run, ...calm, phase: "stale" }, findings: failure.findings });
      else
        set({
          run: {
            ...run,
            ...calm,
            phase: "failed",
            problem: {
              title: "The run did not finish",
              text: failure.code === "engine.failed" ? failure.text : "There is no run to read from yet.",
            },
          },
        });
    },
    viewArrived: (view) => {
      const { shown } = get();
      if (shown) set({ shown: { ...shown, view, isCoarse: false } });
    },
    readingArrived: (reading) => set({ reading }),
    setCursor: (timeS) =>
      set({ cursorS: clampTo(timeS, get().shown?.simulation.durationS ?? get().document.run.durationS) }),
    goTo: (timeS) => {
      const { viewWindow, shown, document } = get();
      const durationS = shown?.simulation.durationS ?? document.run.durationS;
      set({
        cursorS: clampTo(timeS, durationS),
        viewWindow: revealTime(viewWindow, clampTo(timeS, durationS), durationS),
      });
    },
    setPin: (pinS) => set({ pinS }),
    setViewWindow: (viewWindow) => set({ viewWindow }),
    pinFigure: (pinnedFigure) => set({ pinnedFigure }),
    setLetters: (areLettersOn) => set({ areLettersOn }),
  };
}

const clampTo = (timeS: number, durationS: number): number => Math.min(durationS, Math.max(0, timeS));

/** A shorter run than the one before pulls cursor, pin and window inside; a longer one leaves them, unless the whole run was shown. */
function fitPlace(
  state: {
    cursorS: number;
    pinS: number | null;
    viewWindow: TimeWindow;
    shown: { simulation: { durationS: number } } | null;
  },
  durationS: number,
) {
  const { viewWindow, pinS } = state;
  const wasWhole = viewWindow.fromS === 0 && viewWindow.toS === state.shown?.simulation.durationS;
  const lengthS = Math.min(viewWindow.toS - viewWindow.fromS, durationS);
  const fromS = Math.min(viewWindow.fromS, durationS - lengthS);
  const isInside = viewWindow.toS <= durationS;
  return {
    cursorS: clampTo(state.cursorS, durationS),
    pinS: pinS !== null && pinS > durationS ? null : pinS,
    viewWindow: wasWhole ? { fromS: 0, toS: durationS } : isInside ? viewWindow : { fromS, toS: fromS + lengthS },
  };
}
