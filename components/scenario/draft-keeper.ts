import { del, get, set } from "idb-keyval";
import { scenarioSchema } from "@/lib/scenario/schema";
import { isDirty } from "./checked-document";
import type { BaseRevision, RestoredDraft } from "./scenario-state";
import type { ScenarioStore } from "./store";

/** What is kept in this browser for one person and scenario. */
export type KeptInBrowser = { base: BaseRevision; document: RestoredDraft["document"]; keptAtMs: number };

export type DraftStorage = {
  read: (key: string) => Promise<unknown>;
  write: (key: string, value: KeptInBrowser) => Promise<void>;
  remove: (key: string) => Promise<void>;
};

export const browserStorage: DraftStorage = {
  read: (key) => get(key),
  write: (key, value) => set(key, value),
  remove: (key) => del(key),
};

export const draftKey = (personId: string, scenarioId: string): string => `slackwater.draft/${personId}/${scenarioId}`;

/** How long the document may rest before it is kept: short enough for a closed tab, long enough for a drag. */
const REST_MS = 250;

const isBase = (value: unknown): value is BaseRevision =>
  typeof value === "object" &&
  value !== null &&
  "number" in value &&
  typeof value.number === "number" &&
  "document" in value &&
  scenarioSchema.safeParse(value.document).success;

/** A kept draft that this version of the page can still read; its cross-field findings are shown like any other. */
function readKept(value: unknown): KeptInBrowser | null {
  if (
    typeof value !== "object" ||
    value === null ||
    !("base" in value) ||
    !("document" in value) ||
    !("keptAtMs" in value)
  )
    return null;
  const document = scenarioSchema.safeParse(value.document);
  if (!document.success || !isBase(value.base) || typeof value.keptAtMs !== "number") return null;
  return { base: value.base, document: document.data, keptAtMs: value.keptAtMs };
}

/**
 * Brings back what a closed tab left behind, then keeps every later change. A guest's changes are never kept.
 * `onProblem` hears when the browser refuses to store anything (private windows, a full disk). Returns the way to end it.
 */
export function keepDraft(
  store: ScenarioStore,
  storage: DraftStorage,
  onProblem: (cause: unknown) => void,
): () => void {
  const { scenarioId, personId, mode } = store.getState();
  if (scenarioId === null || personId === null || mode === "guest") return () => undefined;
  const key = draftKey(personId, scenarioId);
  let timer: ReturnType<typeof setTimeout> | undefined;
  let isEnded = false;

  const keep = () => {
    clearTimeout(timer);
    timer = undefined;
    const state = store.getState();
    const done = isDirty(state)
      ? storage.write(key, { base: state.base, document: state.document, keptAtMs: Date.now() })
      : storage.remove(key);
    done.catch(onProblem);
  };
  const keepIfHidden = () => document.visibilityState === "hidden" && timer !== undefined && keep();
  let unsubscribe: () => void = () => undefined;

  storage
    .read(key)
    .then((value) => {
      if (isEnded) return;
      const kept = readKept(value);
      const state = store.getState();
      // whoever was quicker than the storage keeps what they typed
      if (kept && !isDirty(state) && isDirty(kept)) {
        store.getState().restoreDraft({
          base: kept.base.number === state.base.number ? state.base : kept.base,
          document: kept.document,
          keptAtMs: kept.keptAtMs,
          baseNumber: kept.base.number,
        });
      }
    })
    .catch(onProblem)
    .finally(() => {
      if (isEnded) return;
      unsubscribe = store.subscribe((state, before) => {
        if (state.document === before.document && state.base === before.base) return;
        clearTimeout(timer);
        timer = setTimeout(keep, REST_MS);
      });
      document.addEventListener("visibilitychange", keepIfHidden);
      window.addEventListener("pagehide", keepIfHidden);
    });

  return () => {
    isEnded = true;
    if (timer !== undefined) keep();
    unsubscribe();
    document.removeEventListener("visibilitychange", keepIfHidden);
    window.removeEventListener("pagehide", keepIfHidden);
  };
}
