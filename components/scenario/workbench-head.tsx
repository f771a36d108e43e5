"use client";

import { useMemo, type ReactNode } from "react";
import type { ScenarioView } from "@/db/queries/scenarios";
import { diffDocuments } from "@/lib/scenario/diff";
import { MoreMenu } from "./more-menu";
import { useScenario, useWorkbench } from "./provider";
import { savedWords } from "./saved-words";
import { useNow } from "./use-now";
import { RunWords } from "./workbench-foot";
import type { Opened } from "./workbench-dialogs";
import styles from "./workbench.module.css";

type State = ScenarioView["state"];
const STATE_WORDS: Record<State, string> = {
  draft: "Draft",
  inReview: "In review",
  approved: "Approved",
  superseded: "Superseded",
};

type Props = {
  onOpen: (dialog: Opened) => void;
  share?: ReactNode;
  mayDuplicate: boolean;
  isPhone: boolean;
};

/** Sub-head: title, state, what is saved and what is not, undo and redo, save. */
export function WorkbenchHead({ onOpen, share, mayDuplicate, isPhone }: Props) {
  const title = useScenario((one) => one.title);
  const mode = useScenario((one) => one.mode);
  const state = useScenario((one) => one.revisionState);
  return (
    <header className={styles.subhead} data-region="head" tabIndex={-1} aria-label="Scenario">
      <h1 className={styles.title} title={title}>
        {title}
      </h1>
      <div className={styles.facts}>
        {state && (
          <span className="state" data-state={state}>
            {STATE_WORDS[state]}
          </span>
        )}
        <SavedState />
        {isPhone && (
          <span className={styles.ran}>
            <RunWords />
          </span>
        )}
      </div>
      <span className={styles.grow} />
      <UndoButtons />
      {share}
      <MoreMenu onOpen={onOpen} mayDuplicate={mayDuplicate} />
      {mode === "edit" && <SaveButton onOpen={onOpen} />}
    </header>
  );
}

function useChangeCount(): number {
  const base = useScenario((state) => state.base.document);
  const document = useScenario((state) => state.document);
  return useMemo(() => (base === document ? 0 : diffDocuments(base, document).length), [base, document]);
}

export function SavedState() {
  const changeCount = useChangeCount();
  const number = useScenario((state) => state.base.number);
  const savedAtMs = useScenario((state) => state.base.savedAtMs);
  const isOffline = useScenario((state) => state.save.isOffline);
  const isSaving = useScenario((state) => state.save.isSaving);
  const mode = useScenario((state) => state.mode);
  const nowMs = useNow();
  return (
    <span className={styles.saved} data-unsaved={changeCount > 0 || undefined} role="status">
      {isSaving
        ? "Saving …"
        : nowMs === null
          ? `rev ${number}`
          : savedWords({ number, savedAtMs, changeCount, isOffline, mode, nowMs })}
    </span>
  );
}

function UndoButtons() {
  const { store } = useWorkbench();
  const undo = useScenario((state) => state.history.past.at(-1)?.label);
  const redo = useScenario((state) => state.history.future.at(-1)?.label);
  const undoText = undo === undefined ? "Undo" : `Undo: ${undo}`;
  const redoText = redo === undefined ? "Redo" : `Redo: ${redo}`;
  return (
    <>
      <button
        type="button"
        className="button"
        data-kind="quiet"
        disabled={undo === undefined}
        aria-label={undoText}
        title={undoText}
        onClick={() => store.getState().undo()}
      >
        <svg width="15" height="12" viewBox="0 0 15 12" aria-hidden="true">
          <path
            d="M5 1 1.5 4.3 5 7.6M2 4.3H9.5C15 4.3 15 11 9.5 11H7"
            fill="none"
            stroke="currentColor"
            strokeWidth="1.5"
          />
        </svg>
      </button>
      <button
        type="button"
        className={`button ${styles.redo}`}
        data-kind="quiet"
        disabled={redo === undefined}
        aria-label={redoText}
        title={redoText}
        onClick={() => store.getState().redo()}
      >
        <svg width="15" height="12" viewBox="0 0 15 12" aria-hidden="true">
          <path
            d="M10 1 13.5 4.3 10 7.6M13 4.3H5.5C0 4.3 0 11 5.5 11H8"
            fill="none"
            stroke="currentColor"
            strokeWidth="1.5"
          />
        </svg>
      </button>
    </>
  );
}

/** The one primary button of the view: save, or start a draft on top of what was approved, or settle the conflict. */
function SaveButton({ onOpen }: { onOpen: (dialog: Opened) => void }) {
  const { store } = useWorkbench();
  const changeCount = useChangeCount();
  const isLocked = useScenario((state) => state.isLocked);
  const number = useScenario((state) => state.base.number);
  const hasConflict = useScenario((state) => state.save.conflict !== null);
  if (isLocked) {
    return (
      <button type="button" className="button" data-kind="primary" onClick={() => store.getState().unlock()}>
        Start rev {number + 1}
      </button>
    );
  }
  return (
    <button
      type="button"
      className="button"
      data-kind="primary"
      aria-label={hasConflict ? "Compare" : "Save revision"}
      disabled={changeCount === 0}
      onClick={() => onOpen(hasConflict ? "conflict" : "save")}
    >
      <span>
        {hasConflict ? "Compare" : "Save"}
        {!hasConflict && <span className={styles.longWord}> revision</span>}
      </span>
    </button>
  );
}
