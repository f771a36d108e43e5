import { createStore, type StoreApi } from "zustand/vanilla";
import { parseScenario } from "@/lib/scenario/schema";
import { emptyHistory } from "./history";
import type { InitialScenario, ScenarioState } from "./scenario-state";
import { editActions, type EditActions } from "./store-edit";
import { keepingActions, type KeepingActions } from "./store-keeping";
import { runActions, type RunActions } from "./store-run";

export type ScenarioStoreState = ScenarioState & EditActions & RunActions & KeepingActions;
export type ScenarioStore = StoreApi<ScenarioStoreState>;
export type SetState = ScenarioStore["setState"];
export type GetState = ScenarioStore["getState"];

/** The page's state: made once for each page that is opened, never at module level, so that no request sees another's. */
export function createScenarioStore(initial: InitialScenario): ScenarioStore {
  const document = initial.base.document;
  const parsed = parseScenario(document);
  return createStore<ScenarioStoreState>((set, get) => ({
    ...initial,
    revisionState: initial.revisionState ?? null,
    newest: initial.base,
    document,
    findings: parsed.ok ? [] : parsed.findings,
    goodDocument: document,
    refusedText: {},
    isLocked: initial.revisionState === "approved" && initial.mode === "edit",
    history: emptyHistory,
    gesture: null,
    dragStart: null,
    save: { isSaving: false, problem: null, isOffline: false, conflict: null, restored: null },
    run: { phase: "waiting", isSlow: false, isLong: false, progress: null, problem: null, computeMs: null },
    shown: null,
    reading: null,
    cursorS: 0,
    pinS: null,
    viewWindow: { fromS: 0, toS: document.run.durationS },
    wantedPath: null,
    pinnedFigure: null,
    areLettersOn: true,
    said: null,
    ...editActions(set, get),
    ...runActions(set, get),
    ...keepingActions(set, get),
  }));
}
