"use client";

import { useState } from "react";
import type { Lane, LaneId } from "./lanes";
import type { RunCommand } from "./run-commands";
import styles from "./plot.module.css";

type Props = {
  onCommand: (command: RunCommand) => void;
  hasPin: boolean;
  lanes: readonly Lane[];
  shown: readonly LaneId[];
  onShown: (ids: LaneId[]) => void;
  tableId: string;
  isTableOpen: boolean;
  onTable: (isOpen: boolean) => void;
  isCompact: boolean;
};

type Button = { label: string; name: string; title: string; command: RunCommand };

const ZOOM: Button[] = [
  { label: "+", name: "Zoom in", title: "Zoom in (+)", command: { do: "zoom", factor: 0.5 } },
  { label: "−", name: "Zoom out", title: "Zoom out (−)", command: { do: "zoom", factor: 2 } },
  { label: "Whole run", name: "Whole run", title: "Whole run (0)", command: { do: "whole" } },
];
const MORE: Button[] = [
  { label: "Period", name: "Zoom to the PWM period", title: "Zoom to the PWM period (Z)", command: { do: "period" } },
  { label: "◂", name: "Show earlier", title: "Show earlier (Ctrl+Left)", command: { do: "pan", direction: -1 } },
  { label: "▸", name: "Show later", title: "Show later (Ctrl+Right)", command: { do: "pan", direction: 1 } },
];
const PIN: Button = { label: "Pin here", name: "Pin here", title: "Pin the cursor (P); Shift and drag does both ends", command: { do: "pin" } };
const PINNED: Button[] = [
  { label: "Zoom to span", name: "Zoom to the span between pin and cursor", title: "Show the time between pin and cursor", command: { do: "span" } },
  { label: "Remove pin", name: "Remove pin", title: "Remove the pin (Shift+P)", command: { do: "unpin" } },
];

/** Every drag on the plot has its button here: zoom, pan, pin and span; and the table and the choice of lanes. On a phone all but zoom wait behind "More". */
export function PlotControls({ onCommand, hasPin, lanes, shown, onShown, tableId, isTableOpen, onTable, isCompact }: Props) {
  const [isMore, setMore] = useState(false);
  const draw = (button: Button) => (
    <button key={button.name} type="button" className={styles.button} aria-label={button.name} title={button.title} onClick={() => onCommand(button.command)}>
      {button.label}
    </button>
  );
  return (
    <div className={styles.controls} role="toolbar" aria-label="Time axis">
      {ZOOM.map(draw)}
      {isCompact && (
        <>
          <span className={styles.push} />
          <button type="button" className={styles.button} aria-expanded={isMore} onClick={() => setMore(!isMore)}>
            More
          </button>
        </>
      )}
      {(!isCompact || isMore) && (
        <>
          {MORE.map(draw)}
          <span className={styles.gap} />
          {[PIN, ...(hasPin ? PINNED : [])].map(draw)}
          <span className={styles.push} />
          <button type="button" className={styles.button} aria-expanded={isTableOpen} aria-controls={isTableOpen ? tableId : undefined} onClick={() => onTable(!isTableOpen)}>
            Table
          </button>
          <LaneChoice lanes={lanes} shown={shown} onShown={onShown} />
        </>
      )}
    </div>
  );
}

function LaneChoice({ lanes, shown, onShown }: Pick<Props, "lanes" | "shown" | "onShown">) {
  const toggle = (id: LaneId) => {
    const next = shown.includes(id) ? shown.filter((other) => other !== id) : [...shown, id];
    if (next.length > 0) onShown(next);
  };
  return (
    <details className={styles.choice}>
      <summary className={styles.button}>Lanes</summary>
      <fieldset>
        <legend className={styles.srOnly}>Lanes shown</legend>
        {lanes.map((lane) => (
          <label key={lane.id}>
            <input type="checkbox" checked={shown.includes(lane.id)} onChange={() => toggle(lane.id)} />
            {lane.label}
          </label>
        ))}
      </fieldset>
    </details>
  );
}
