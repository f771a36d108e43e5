"use client";

import { createContext, useContext, useEffect, useMemo, useRef, useState, type ReactNode } from "react";
import { useStore } from "zustand";
import type { EngineClient } from "@/workers/protocol";
import { browserStorage, keepDraft, type DraftStorage } from "./draft-keeper";
import { createRunController, type RunController } from "./run-controller";
import type { ScenarioActions } from "./scenario-actions";
import type { InitialScenario } from "./scenario-state";
import { createScenarioStore, type ScenarioStore, type ScenarioStoreState } from "./store";

export type Workbench = {
  store: ScenarioStore;
  actions: Partial<ScenarioActions>;
  runNow: () => void;
  cancelRun: () => void;
};

const WorkbenchContext = createContext<Workbench | null>(null);

type Props = {
  initial: InitialScenario;
  /** Server actions, given by the page; a guest has none. */
  actions?: Partial<ScenarioActions>;
  createClient: () => EngineClient;
  storage?: DraftStorage;
  children: ReactNode;
};

/** The store of this page, the engine that follows it and the draft kept in this browser: all end with the page. */
export function ScenarioProvider({ initial, actions = {}, createClient, storage = browserStorage, children }: Props) {
  const [store] = useState(() => createScenarioStore(initial));
  const controller = useRef<RunController | null>(null);
  useEffect(() => {
    controller.current = createRunController(store, createClient());
    return () => controller.current?.dispose();
  }, [store, createClient]);
  useEffect(
    () => keepDraft(store, storage, (cause) => console.warn("the draft is not kept in this browser", cause)),
    [store, storage],
  );
  useEffect(() => followConnection(store), [store]);
  const workbench = useMemo(
    (): Workbench => ({
      store,
      actions,
      runNow: () => controller.current?.runNow(),
      cancelRun: () => controller.current?.cancel(),
    }),
    [store, actions],
  );
  return <WorkbenchContext.Provider value={workbench}>{children}</WorkbenchContext.Provider>;
}

function followConnection(store: ScenarioStore): () => void {
  const online = () => store.getState().setOffline(false);
  const offline = () => store.getState().setOffline(true);
  if (!navigator.onLine) offline();
  window.addEventListener("online", online);
  window.addEventListener("offline", offline);
  return () => {
    window.removeEventListener("online", online);
    window.removeEventListener("offline", offline);
  };
}

export function useWorkbench(): Workbench {
  const workbench = useContext(WorkbenchContext);
  if (!workbench) throw new Error("useWorkbench outside ScenarioProvider");
  return workbench;
}

/** The part of the state a component shows; it is drawn again only when that part changes. */
export const useScenario = <T,>(select: (state: ScenarioStoreState) => T): T => useStore(useWorkbench().store, select);
