"use client";

import { useState } from "react";
import { FiguresPanel } from "./figures-panel";
import { InputsPanel } from "./inputs-panel";
import { NoticesPanel } from "./notices-panel";
import { useScenario } from "./provider";
import { RunRegion } from "./run-region";
import styles from "./workbench.module.css";

/** Inputs, run, figures side by side; on a narrow screen figures and notices share the place of the inputs, by a tab. */
export function DeskLayout({ isNarrow }: { isNarrow: boolean }) {
  const [tab, setTab] = useState<"inputs" | "results">("inputs");
  const wanted = useScenario((state) => state.wantedPath);
  const [servedId, setServedId] = useState(0);
  if (wanted && wanted.id !== servedId) {
    setServedId(wanted.id);
    setTab("inputs");
  }
  const results = (
    <>
      <FiguresPanel />
      <NoticesPanel />
    </>
  );
  const isResults = isNarrow && tab === "results";
  return (
    <div className={styles.desk} data-narrow={isNarrow || undefined}>
      <div className={styles.left}>
        {isNarrow && (
          <div className={styles.sideTabs} role="tablist" aria-label="Side column">
            {(["inputs", "results"] as const).map((one) => (
              <button key={one} type="button" role="tab" aria-selected={tab === one} onClick={() => setTab(one)}>
                {one === "inputs" ? "Inputs" : "Figures and notices"}
              </button>
            ))}
          </div>
        )}
        <div
          className={styles.scroll}
          hidden={isResults}
          data-region="inputs"
          tabIndex={-1}
          role="region"
          aria-label="Inputs"
        >
          <InputsPanel />
        </div>
        {isNarrow && (
          <div
            className={styles.scroll}
            hidden={!isResults}
            data-region="results"
            tabIndex={-1}
            role="region"
            aria-label="Figures and notices"
          >
            {results}
          </div>
        )}
      </div>
      <section className={styles.middle} data-region="run" tabIndex={-1} aria-label="Run">
        <RunRegion />
      </section>
      {!isNarrow && (
        <aside className={styles.right} data-region="results" tabIndex={-1} aria-label="Figures and notices">
          {results}
        </aside>
      )}
    </div>
  );
}
