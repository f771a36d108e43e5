import type { ErrorCode } from "@/lib/errors";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { withDocument } from "./checked-document";
import { pushEdit } from "./history";
import { isSameData } from "./same-data";
import type { BaseRevision, Conflict, RestoredDraft } from "./scenario-state";
import type { GetState, SetState } from "./store";

export type KeepingActions = {
  saveStarted: () => void;
  /** `document` is what was saved: edits made meanwhile stay unsaved. */
  saveDone: (saved: BaseRevision) => void;
  saveFailed: (problem: { code: ErrorCode; text: string }) => void;
  saveConflicted: (conflict: Conflict) => void;
  /** The other's revision becomes the base and the document, as one step that undo takes back. */
  takeTheirs: () => void;
  /** The other's revision becomes the base; the document stays, and is saved on top of it later. */
  keepEditing: () => void;
  restoreDraft: (draft: RestoredDraft & { base: BaseRevision }) => void;
  /** Away with what was restored: back to the newest revision, as one step that undo takes back. */
  discardRestored: () => void;
  acceptRestored: () => void;
  /** Starts a draft on top of an approved revision. */
  unlock: () => void;
  setOffline: (isOffline: boolean) => void;
  setIdentity: (change: { title?: string; tags?: string[] }) => void;
};

export function keepingActions(set: SetState, get: GetState): KeepingActions {
  const setSave = (change: Partial<ReturnType<GetState>["save"]>) => set({ save: { ...get().save, ...change } });
  const baseOf = (conflict: Conflict): BaseRevision => {
    const { number, document, createdAtMs, authorName } = conflict.newest;
    return { number, document, savedAtMs: createdAtMs, authorName };
  };
  const step = (after: ScenarioDocument, label: string) => {
    const state = get();
    if (isSameData(after, state.document)) return;
    set({
      ...withDocument(state, after),
      history: pushEdit(state.history, { label, before: state.document, after }),
      refusedText: {},
      dragStart: null,
    });
  };
  return {
    saveStarted: () => setSave({ isSaving: true, problem: null }),
    saveDone: (saved) => {
      // whatever the one before was, a new revision starts as a draft
      set({ base: saved, newest: saved, revisionState: "draft" });
      setSave({ isSaving: false, problem: null, conflict: null, restored: null, isOffline: false });
    },
    saveFailed: (problem) =>
      setSave({ isSaving: false, problem, isOffline: problem.code === "server.unreachable" || get().save.isOffline }),
    saveConflicted: (conflict) => setSave({ isSaving: false, problem: null, conflict, isOffline: false }),
    takeTheirs: () => {
      const { conflict } = get().save;
      if (!conflict) return;
      step(conflict.newest.document, `take rev ${conflict.newest.number}`);
      set({ base: baseOf(conflict), newest: baseOf(conflict) });
      setSave({ conflict: null, restored: null });
    },
    keepEditing: () => {
      const { conflict } = get().save;
      if (!conflict) return;
      set({ base: baseOf(conflict), newest: baseOf(conflict) });
      setSave({ conflict: null });
    },
    restoreDraft: ({ base, ...restored }) => {
      set({ ...withDocument(get(), restored.document), base, isLocked: false });
      setSave({ restored });
    },
    discardRestored: () => {
      step(get().newest.document, "discard the kept changes");
      set({ base: get().newest });
      setSave({ restored: null });
    },
    acceptRestored: () => setSave({ restored: null }),
    unlock: () => set({ isLocked: false }),
    setOffline: (isOffline) => get().save.isOffline !== isOffline && setSave({ isOffline }),
    setIdentity: (change) => set(change),
  };
}
