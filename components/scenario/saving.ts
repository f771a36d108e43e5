import { errorText, type ErrorCode } from "@/lib/errors";
import { failure, type Result } from "@/lib/result";
import { parseScenario } from "@/lib/scenario/schema";
import type { ScenarioActions } from "./scenario-actions";
import { isSameData } from "./same-data";
import type { Conflict } from "./scenario-state";
import type { ScenarioStore } from "./store";

type SavedNumber = { number: number; revisionId: string };

/** A server that cannot be reached is an answer like any other: the draft stays here. */
export async function reach<T>(call: () => Promise<Result<T>>): Promise<Result<T>> {
  try {
    return await call();
  } catch (cause) {
    console.warn("the server did not answer", cause);
    return failure("server.unreachable");
  }
}

/** Saves the draft on top of the revision it started from. Edits made while it is on its way stay unsaved. */
export async function saveDraft(
  store: ScenarioStore,
  actions: Partial<ScenarioActions>,
  message: string,
): Promise<boolean> {
  const { scenarioId, document, base, save, personId } = store.getState();
  const { saveRevision } = actions;
  if (scenarioId === null || personId === null || !saveRevision || save.isSaving) return false;
  store.getState().saveStarted();
  const result = await reach(() => saveRevision({ scenarioId, baseRevisionNumber: base.number, document, message }));
  return settle(store, result, document, message);
}

/** After a conflict: mine on top of theirs, as a new revision. What was edited since goes with it. */
export async function keepMine(store: ScenarioStore, actions: Partial<ScenarioActions>): Promise<boolean> {
  const { scenarioId, document, save } = store.getState();
  const { conflict } = save;
  const { keepMineAsRevision, saveRevision } = actions;
  if (scenarioId === null || !conflict || !keepMineAsRevision || !saveRevision || save.isSaving) return false;
  store.getState().saveStarted();
  const { newest, mine, message } = conflict;
  const isUntouched = isSameData(document, mine.document);
  const result = await reach(() =>
    isUntouched
      ? keepMineAsRevision({ scenarioId, draftId: mine.draftId, baseRevisionNumber: newest.number, message })
      : saveRevision({ scenarioId, baseRevisionNumber: newest.number, document, message }),
  );
  return settle(store, result, document, message);
}

function settle(store: ScenarioStore, result: Result<SavedNumber>, document: unknown, message: string): boolean {
  const state = store.getState();
  if (result.ok) {
    const parsed = parseScenario(document);
    if (!parsed.ok) throw new Error("a document was saved that the schema refuses");
    // the draft's own object stays the base, so that "unsaved" compares by identity first
    state.saveDone({
      number: result.value.number,
      document: state.document === document ? state.document : parsed.document,
      savedAtMs: Date.now(),
      authorName: "you",
    });
    state.say(`Saved as rev ${result.value.number}`);
    return true;
  }
  const conflict = result.code === "edit.conflict" ? readConflict(result.detail, message) : null;
  if (conflict) state.saveConflicted(conflict);
  else
    state.saveFailed({
      code: result.code,
      text: describe(
        result.code,
        result.findings?.map((finding) => `${finding.path}: ${finding.text}`),
      ),
    });
  return false;
}

const describe = (code: ErrorCode, findings: string[] | undefined): string =>
  [errorText(code), ...(findings ?? []).slice(0, 3)].join(" ");

/** `detail` of `edit.conflict` (lib/server/deeds/revisions.ts). Dates cross the action as Date or as text. */
export function readConflict(detail: unknown, message: string): Conflict | null {
  if (typeof detail !== "object" || detail === null || !("newest" in detail) || !("kept" in detail)) return null;
  const newest = detail.newest as { number: number; authorName: string; createdAt: Date | string; document: unknown };
  const kept = detail.kept as { draftId: string; document: unknown };
  const [theirs, mine] = [parseScenario(newest.document), parseScenario(kept.document)];
  if (!theirs.ok || !mine.ok) return null;
  return {
    newest: {
      number: newest.number,
      authorName: newest.authorName,
      createdAtMs: new Date(newest.createdAt).getTime(),
      document: theirs.document,
    },
    mine: { draftId: kept.draftId, document: mine.document },
    message,
  };
}
