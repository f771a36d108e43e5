"use client";

import { formatQuantity } from "@/lib/units/format";
import { useScenario, useWorkbench } from "./provider";
import controls from "./controls.module.css";
import styles from "./workbench.module.css";

/** Footer: state of the run in words, its size, and what the two hues mean. */
export function WorkbenchFoot() {
  return (
    <footer className={styles.foot}>
      <RunWords />
      <RunSize />
      <span className={styles.grow} />
      <Legend />
    </footer>
  );
}

export function RunWords() {
  const { runNow } = useWorkbench();
  const run = useScenario((state) => state.run);
  const isHeld = useScenario((state) => state.findings.length > 0);
  const words = {
    waiting: "Starting",
    upToDate: "Up to date",
    recomputing: "Recomputing",
    stale: "Inputs changed, run again",
    failed: "The run did not finish",
  }[run.phase];
  const isSettled = run.phase === "upToDate" && !isHeld;
  return (
    <span className={styles.runWords} role="status">
      <svg width="10" height="10" viewBox="0 0 10 10" aria-hidden="true">
        <path
          d="M5 .8 9.2 5 5 9.2.8 5z"
          fill={isSettled ? "currentColor" : "none"}
          stroke="currentColor"
          strokeWidth="1.3"
        />
      </svg>
      {isHeld ? "Some inputs do not fit; the last good run is shown" : words}
      {(run.phase === "stale" || run.phase === "failed") && (
        <button type="button" className={controls.link} onClick={() => runNow()}>
          Run again
        </button>
      )}
    </span>
  );
}

function RunSize() {
  const words = useScenario((state) => {
    if (!state.shown) return "";
    const { durationS, eventCounts } = state.shown.simulation;
    const events = Object.values(eventCounts).reduce((sum, count) => sum + count, 0);
    const time =
      state.run.computeMs === null
        ? ""
        : ` · computed in ${formatQuantity(state.run.computeMs / 1000, "s", { digits: 2 }).text}`;
    return `${formatQuantity(durationS, "s", { digits: 4 }).text} · ${formatQuantity(events, "", { digits: 6 }).text} events${time}`;
  });
  return <span className={styles.wideOnly}>{words}</span>;
}

function Legend() {
  return (
    <span className={styles.legend}>
      <span>Colour is the direction of the motor current:</span>
      <span className={styles.sign}>
        <svg width="22" height="10" viewBox="0 0 22 10" aria-hidden="true">
          <path
            d="M4 5H20M15.5 1 20.5 5 15.5 9M1 1 4.5 5 1 9M5.5 1 9 5 5.5 9"
            fill="none"
            stroke="var(--fwd)"
            strokeWidth="1.5"
          />
        </svg>
        forward
      </span>
      <span className={styles.sign}>
        <svg width="22" height="10" viewBox="0 0 22 10" aria-hidden="true">
          <path d="M21 5H2M6.5 1 1.5 5 6.5 9" fill="none" stroke="var(--rev)" strokeWidth="1.5" />
        </svg>
        reverse
      </span>
      <span className={styles.sign}>
        <svg width="18" height="10" viewBox="0 0 18 10" aria-hidden="true">
          <path
            d="M1 5H17M4 5C6.5 1.4 11.5 1.4 14 5C11.5 8.6 6.5 8.6 4 5Z"
            fill="var(--paper)"
            stroke="var(--ink)"
            strokeWidth="1.3"
          />
        </svg>
        slack
      </span>
    </span>
  );
}
