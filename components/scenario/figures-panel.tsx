"use client";

import { Tooltip } from "radix-ui";
import { useState } from "react";
import { readSensing } from "@/components/plot/sensing-facts";
import { formatFigure, type FigureName } from "@/lib/explain/figure-list";
import { formatQuantity } from "@/lib/units/format";
import { MAIN_FIGURES, MORE_FIGURES, withSign } from "./figure-layout";
import { HeadroomBar } from "./headroom-bar";
import { useScenario } from "./provider";
import { PinnedWhy, Why } from "./why";
import styles from "./figures.module.css";

/** Figures of the run: serif numerals in two columns, the old value beside the new one while a slider moves, and a why behind each. */
export function FiguresPanel() {
  const [isFull, setFull] = useState(false);
  const hasRun = useScenario((state) => state.shown !== null);
  return (
    <Tooltip.Provider delayDuration={400} skipDelayDuration={200}>
      <section className={styles.figures} aria-label="Figures">
        <h2 className={styles.head}>
          <span className={styles.caps}>Figures</span> <WindowWords />
        </h2>
        {hasRun && (
          <>
            <dl className={styles.grid}>
              <Figures list={MAIN_FIGURES} />
              <div className={styles.wide}>
                <dt>
                  <Why name="headroomV">Headroom</Why>
                </dt>
                <HeadroomBar />
              </div>
              <WorstError />
              {isFull && <Figures list={MORE_FIGURES} />}
            </dl>
            <button type="button" className={styles.more} aria-expanded={isFull} onClick={() => setFull(!isFull)}>
              {isFull ? "Fewer figures" : `${MORE_FIGURES.length} more figures`}
            </button>
            <PinnedWhy />
          </>
        )}
      </section>
    </Tooltip.Provider>
  );
}

function WindowWords() {
  const words = useScenario((state) => {
    if (!state.shown) return "";
    const { window, durationS } = state.shown.simulation;
    if (window.fromS === 0 && window.toS === durationS) return "whole run";
    const time = (timeS: number) => formatQuantity(timeS, "s", { digits: 4 }).text;
    return `${time(window.fromS)} to ${time(window.toS)}`;
  });
  return <span className={styles.window}>{words}</span>;
}

function Figures({ list }: { list: readonly { name: FigureName; label: string }[] }) {
  return list.map((figure) => <Figure key={figure.name} {...figure} />);
}

function Figure({ name, label }: { name: FigureName; label: string }) {
  const value = useScenario((state) => state.shown?.simulation.figures[name] ?? null);
  const old = useScenario((state) => state.gesture?.figures?.[name] ?? null);
  if (value === null) return null;
  const written = formatFigure(name, value);
  const isMoving = old !== null && old !== value;
  return (
    <div>
      <dt>
        <Why name={name}>{label}</Why>
      </dt>
      <dd className={styles.figure} data-figure={name}>
        {isMoving && <span className={styles.old}>{formatFigure(name, old).text} to</span>}
        {withSign(name, value, written.number)}
        <small>{written.unit}</small>
      </dd>
    </div>
  );
}

/** The largest error of what the converter's codes say, red where it passes what counts as a miss. */
function WorstError() {
  const value = useScenario((state) => state.shown?.simulation.figures.reconstructionErrorMaxA ?? null);
  const old = useScenario((state) => state.gesture?.figures?.reconstructionErrorMaxA ?? null);
  const limitA = useScenario((state) => (state.shown ? readSensing(state.shown.document).sampleLimitA : 0));
  if (value === null) return null;
  const written = formatFigure("reconstructionErrorMaxA", value);
  return (
    <div className={styles.wide}>
      <dt>
        <Why name="reconstructionErrorMaxA">Reconstructed current, worst error</Why>
      </dt>
      <dd className={styles.figure} data-figure="reconstructionErrorMaxA" data-fault={value > limitA || undefined}>
        {old !== null && old !== value && (
          <span className={styles.old}>{formatFigure("reconstructionErrorMaxA", old).text} to</span>
        )}
        {written.number}
        <small>
          {written.unit} <span className={styles.limit}>limit {formatQuantity(limitA, "A", { digits: 2 }).text}</span>
        </small>
      </dd>
    </div>
  );
}
