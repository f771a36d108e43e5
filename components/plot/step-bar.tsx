"use client";

import { useMemo, useState } from "react";
import type { Simulation, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { rowAt } from "./event-rows";
import { runStops } from "./run-stops";
import { readSensing } from "./sensing-facts";
import { STEP_WORDS, stepFrom, type StepKind } from "./steps";
import { cursorFormat, formatTime } from "./ticks";
import { usePlayback } from "./use-playback";
import styles from "./steps.module.css";

/** Steps through the run by event, PWM period, milestone or sample. `isPhone`: one kind at a time in thumb reach, chosen in the middle. */
export type StepBarProps = {
  view: View;
  simulation: Simulation;
  document: ScenarioDocument;
  cursorS: number;
  onCursor: (timeS: number) => void;
  isPhone?: boolean;
};

const KEYS: Record<StepKind, string> = { event: "Left, Right", period: "Shift+Left, Shift+Right", milestone: "[ and ]", sample: ", and ." };

export function StepBar({ view, simulation, document, cursorS, onCursor, isPhone = false }: StepBarProps) {
  const facts = useMemo(() => readSensing(document), [document]);
  const stops = useMemo(() => runStops(simulation, view, facts), [simulation, view, facts]);
  const [kind, setKind] = useState<StepKind>("event");
  const { isPlaying, toggle } = usePlayback(stops, cursorS, onCursor);
  const go = (which: StepKind, direction: 1 | -1) => onCursor(stepFrom(cursorS, which, direction, stops));
  const canGo = (which: StepKind, direction: 1 | -1) => stepFrom(cursorS, which, direction, stops) !== cursorS;
  if (isPhone) {
    const index = rowAt(stops.events.map((timeS) => ({ timeS })), cursorS, facts.instantS) + 1;
    return (
      <div className={styles.phone} role="group" aria-label="Step through the run">
        <button type="button" aria-label={`Previous ${kind}`} disabled={!canGo(kind, -1)} onClick={() => go(kind, -1)}>
          <Chevron direction={-1} />
        </button>
        <div className={styles.middle}>
          <b>{formatTime(cursorS, cursorFormat({ fromS: 0, toS: simulation.durationS }, facts.periodS))}</b>
          <label>
            event {index} of {stops.events.length} · step by{" "}
            <select value={kind} onChange={(event) => setKind(event.target.value as StepKind)}>
              {(Object.keys(STEP_WORDS) as StepKind[]).map((which) => (
                <option key={which} value={which}>
                  {STEP_WORDS[which].toLowerCase()}
                </option>
              ))}
            </select>
          </label>
        </div>
        <button type="button" className={styles.primary} aria-label={`Next ${kind}`} disabled={!canGo(kind, 1)} onClick={() => go(kind, 1)}>
          <Chevron direction={1} />
        </button>
      </div>
    );
  }
  return (
    <div className={styles.bar} role="group" aria-label="Step through the run">
      {(["event", "period", "milestone"] as const).map((which) => (
        <span key={which} className={styles.triple} title={`Keys: ${KEYS[which]}`}>
          <button type="button" aria-label={`Previous ${which}`} disabled={!canGo(which, -1)} onClick={() => go(which, -1)}>
            <Chevron direction={-1} />
          </button>
          <span aria-hidden="true">{STEP_WORDS[which]}</span>
          <button type="button" aria-label={`Next ${which}`} disabled={!canGo(which, 1)} onClick={() => go(which, 1)}>
            <Chevron direction={1} />
          </button>
        </span>
      ))}
      <button type="button" className={styles.play} aria-pressed={isPlaying} title="One event a second (Space)" onClick={toggle}>
        {isPlaying ? "Pause" : "Play"}
      </button>
    </div>
  );
}

function Chevron({ direction }: { direction: 1 | -1 }) {
  return (
    <svg width="8" height="12" viewBox="0 0 8 12" aria-hidden="true">
      <path d={direction === 1 ? "M1.5 1.5 6 6 1.5 10.5" : "M6.5 1.5 2 6 6.5 10.5"} fill="none" stroke="currentColor" strokeWidth="1.6" />
    </svg>
  );
}
