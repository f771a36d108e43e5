"use client";

import { useEffect } from "react";
import { useScenario, useWorkbench } from "./provider";
import styles from "./workbench.module.css";

/** look.md section 7: what was removed can be taken back for ten seconds. */
const STAY_MS = 10_000;

/** The last thing done, in words, with its way back. */
export function SaidLine() {
  const { store } = useWorkbench();
  const said = useScenario((state) => state.said);
  useEffect(() => {
    if (!said) return;
    const timer = setTimeout(() => store.getState().unsay(), STAY_MS);
    return () => clearTimeout(timer);
  }, [said, store]);
  return (
    <div role="status" className={styles.saidPlace}>
      {said && (
        <p className={styles.said}>
          <span>{said.text}</span>
          {said.canUndo && (
            <button type="button" onClick={() => store.getState().undo()}>
              Undo
            </button>
          )}
          <button type="button" aria-label="Close this message" onClick={() => store.getState().unsay()}>
            ×
          </button>
        </p>
      )}
    </div>
  );
}
