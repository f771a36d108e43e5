"use client";

import { formatQuantity } from "@/lib/units/format";
import { useScenario, useWorkbench } from "./provider";
import styles from "./workbench.module.css";

/** Long work fills the graduated border: nothing under 300 ms, the bar from then on, words, time left and Cancel from 2 s. */
export function ProgressBorder() {
  const { cancelRun } = useWorkbench();
  const { phase, isSlow, isLong, progress } = useScenario((state) => state.run);
  if (phase !== "recomputing" || !isSlow) return null;
  const share = progress?.doneShare ?? 0;
  const leftMs = progress && share > 0.02 ? (progress.elapsedMs * (1 - share)) / share : null;
  return (
    <div className={styles.progress}>
      <div
        className={styles.border}
        role="progressbar"
        aria-label="Run"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={Math.round(share * 100)}
      >
        <b style={{ width: `${share * 100}%` }} />
      </div>
      {isLong && (
        <p className={styles.progressWords}>
          <span>
            {Math.round(share * 100)} % of the run
            {leftMs === null ? "" : `, ${formatQuantity(leftMs / 1000, "s", { digits: 2 }).text} left`}
          </span>
          <button type="button" className="button" onClick={() => cancelRun()}>
            Cancel
          </button>
        </p>
      )}
    </div>
  );
}
