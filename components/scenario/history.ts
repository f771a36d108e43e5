import type { ScenarioDocument } from "@/lib/scenario/schema";

/** One step of the history, with the words of its button: `sample instant 3.0 to 25.0 µs`. */
export type Edit = {
  label: string;
  before: ScenarioDocument;
  after: ScenarioDocument;
  /** Quick steps of the same field by key are one step of the history. */
  run?: { path: string; atMs: number };
};
export type History = { past: readonly Edit[]; future: readonly Edit[] };

/** look.md section 7: one history per scenario of 200 steps. */
export const HISTORY_MAX = 200;
export const emptyHistory: History = { past: [], future: [] };

export const pushEdit = (history: History, edit: Edit): History => ({
  past: [...history.past, edit].slice(-HISTORY_MAX),
  future: [],
});

const RUN_MS = 1000;

/** The step that `path` may join: the last one, if it changed the same field by key less than a second ago. */
export function runningEdit(history: History, path: string, atMs: number): Edit | null {
  const last = history.past.at(-1);
  return last?.run && last.run.path === path && atMs - last.run.atMs < RUN_MS && history.future.length === 0
    ? last
    : null;
}

export const replaceLast = (history: History, edit: Edit): History => ({
  ...history,
  past: [...history.past.slice(0, -1), edit],
});

export type Turn = { history: History; document: ScenarioDocument; label: string };

export function undoEdit(history: History): Turn | null {
  const edit = history.past.at(-1);
  if (!edit) return null;
  return {
    history: { past: history.past.slice(0, -1), future: [...history.future, edit] },
    document: edit.before,
    label: edit.label,
  };
}

export function redoEdit(history: History): Turn | null {
  const edit = history.future.at(-1);
  if (!edit) return null;
  return {
    history: { past: [...history.past, edit], future: history.future.slice(0, -1) },
    document: edit.after,
    label: edit.label,
  };
}
