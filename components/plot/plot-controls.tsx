"use client";

import type { Lane, LaneId } from "./lanes";
import type { RunCommand } from "./run-commands";
import styles from "./plot.module.css";

type Props = {
  onCommand: (command: RunCommand) => void;
  hasPin: boolean;
  lanes: readonly Lane[];
  shown: readonly LaneId[];
  onShown: (ids: LaneId[]) => void;
};

const BUTTONS: { label: string; name: string; title: string; command: RunCommand }[] = [
  { label: "◂", name: "Show earlier", title: "Show earlier (Ctrl+Left)", command: { do: "pan", direction: -1 } },
  { label: "▸", name: "Show later", title: "Show later (Ctrl+Right)", command: { do: "pan", direction: 1 } },
  { label: "+", name: "Zoom in", title: "Zoom in (+)", command: { do: "zoom", factor: 0.5 } },
  { label: "−", name: "Zoom out", title: "Zoom out (−)", command: { do: "zoom", factor: 2 } },
  { label: "Period", name: "Zoom to the PWM period", title: "Zoom to the PWM period (Z)", command: { do: "period" } },
  { label: "Whole run", name: "Whole run", title: "Whole run (0)", command: { do: "whole" } },
];

/** Every drag on the plot has its button here: zoom, pan, pin and span; and the choice of lanes. */
export function PlotControls({ onCommand, hasPin, lanes, shown, onShown }: Props) {
  return (
    <div className={styles.controls} role="toolbar" aria-label="Time axis">
      {BUTTONS.map((button) => (
        <button key={button.name} type="button" className={styles.button} aria-label={button.name} title={button.title} onClick={() => onCommand(button.command)}>
          {button.label}
        </button>
      ))}
      <span className={styles.gap} />
      <button type="button" className={styles.button} title="Pin the cursor (P); Shift+drag does both ends" onClick={() => onCommand({ do: "pin" })}>
        Pin here
      </button>
      {hasPin && (
        <>
          <button type="button" className={styles.button} onClick={() => onCommand({ do: "span" })}>
            Zoom to span
          </button>
          <button type="button" className={styles.button} title="Remove the pin (Shift+P)" onClick={() => onCommand({ do: "unpin" })}>
            Remove pin
          </button>
        </>
      )}
      <LaneChoice lanes={lanes} shown={shown} onShown={onShown} />
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
