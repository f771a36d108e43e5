import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { ListPath } from "@/lib/scenario/starts";
import { editLabel } from "./edit-label";
import { withDocument } from "./checked-document";
import { pushEdit, redoEdit, replaceLast, runningEdit, undoEdit, type Turn } from "./history";
import { addRow, applyChange, removeRow, type AppliedChange } from "@/lib/scenario/changes";
import { getAt } from "@/lib/scenario/paths";
import { isSameData } from "./same-data";
import type { GetState, SetState } from "./store";

export type EditActions = {
  /** One value, one step, with all that has to follow. `undefined` leaves out an optional field. */
  change: (path: string, value: unknown) => void;
  /** A step by key: a series of them on one field is one step of the history. */
  nudge: (path: string, value: number) => void;
  addRow: (list: ListPath, label: string) => void;
  removeRow: (list: ListPath, index: number, label: string) => void;
  /** Anything larger as one step: an import, taking over a revision. */
  replaceDocument: (document: ScenarioDocument, label: string) => void;
  beginDrag: (path: string) => void;
  drag: (path: string, value: number) => void;
  endDrag: () => void;
  cancelDrag: () => void;
  undo: () => void;
  redo: () => void;
  refuseText: (path: string, text: string | null) => void;
  wantField: (path: string) => void;
  say: (text: string, canUndo?: boolean) => void;
  unsay: () => void;
};

/** Numbers of messages and wishes: the same field may be asked for twice in a row. */
const nextId = (previous: { id: number } | null): number => (previous?.id ?? 0) + 1;

export function editActions(set: SetState, get: GetState): EditActions {
  const commit = (after: ScenarioDocument, label: string) => {
    const state = get();
    if (isSameData(after, state.document)) return;
    set({
      ...withDocument(state, after),
      history: pushEdit(state.history, { label, before: state.document, after }),
      dragStart: null,
      save: { ...state.save, problem: null },
    });
  };
  const turn = (made: Turn | null, word: string) => {
    if (!made) return;
    const state = get();
    set({
      ...withDocument(state, made.document),
      history: made.history,
      gesture: null,
      dragStart: null,
      refusedText: {},
    });
    get().say(`${word}: ${made.label}`);
  };
  /** A change that pulled others along says so: nothing in the document changes unseen. */
  const tellAlso = ({ alsoChanged }: AppliedChange) => {
    if (alsoChanged.length > 0)
      get().say(
        `Changed along with it: ${alsoChanged
          .slice(0, 3)
          .map((one) => one.text)
          .join("; ")}`,
        true,
      );
  };
  return {
    change: (path, value) => {
      get().refuseText(path, null);
      const before = get().document;
      const applied = applyChange(before, path, value);
      commit(applied.document, editLabel(path, before, applied.document));
      tellAlso(applied);
    },
    addRow: (list, label) => {
      const applied = addRow(get().document, list);
      commit(applied.document, label);
      tellAlso(applied);
    },
    removeRow: (list, index, label) => {
      set({ refusedText: {} });
      commit(removeRow(get().document, list, index).document, label);
    },
    nudge: (path, value) => {
      get().refuseText(path, null);
      const state = get();
      const after = applyChange(state.document, path, value).document;
      if (isSameData(after, state.document)) return;
      const atMs = Date.now();
      const running = runningEdit(state.history, path, atMs);
      const before = running?.before ?? state.document;
      const edit = { label: editLabel(path, before, after), before, after, run: { path, atMs } };
      set({
        ...withDocument(state, after),
        history: running ? replaceLast(state.history, edit) : pushEdit(state.history, edit),
        dragStart: null,
        save: { ...state.save, problem: null },
      });
    },
    replaceDocument: (document, label) => {
      set({ refusedText: {} });
      commit(document, label);
    },
    beginDrag: (path) => {
      const state = get();
      if (state.gesture?.path === path) return;
      get().refuseText(path, null);
      set({
        gesture: { path, before: state.document, figures: state.shown?.simulation.figures ?? null },
        dragStart: null,
      });
    },
    drag: (path, value) => {
      const state = get();
      if (getAt(state.document, path) === value) return;
      set({
        ...withDocument(state, applyChange(state.document, path, value).document),
        save: { ...state.save, problem: null },
      });
    },
    endDrag: () => {
      const state = get();
      const { gesture, document } = state;
      if (!gesture) return;
      set({ gesture: null });
      if (isSameData(gesture.before, document)) return;
      const before = getAt(gesture.before, gesture.path);
      set({
        history: pushEdit(state.history, {
          label: editLabel(gesture.path, gesture.before, document),
          before: gesture.before,
          after: document,
        }),
        dragStart: typeof before === "number" ? { path: gesture.path, value: before } : null,
      });
    },
    cancelDrag: () => {
      const { gesture } = get();
      if (gesture) set({ ...withDocument(get(), gesture.before), gesture: null });
    },
    undo: () => turn(undoEdit(get().history), "Undone"),
    redo: () => turn(redoEdit(get().history), "Redone"),
    refuseText: (path, text) => {
      const { refusedText } = get();
      if (text === null && !Object.hasOwn(refusedText, path)) return;
      const { [path]: _taken, ...others } = refusedText;
      set({ refusedText: text === null ? others : { ...others, [path]: text } });
    },
    wantField: (path) => set({ wantedPath: { path, id: nextId(get().wantedPath) } }),
    say: (text, canUndo = false) => set({ said: { id: nextId(get().said), text, canUndo } }),
    unsay: () => set({ said: null }),
  };
}
