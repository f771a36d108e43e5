"use client";

import type { View } from "@/lib/engine/results";
import type { PlacedLane } from "./layout";
import { laneNumber } from "./readout-rows";
import { formatTime, type TimeFormat } from "./ticks";
import { spanFigures } from "./values";
import styles from "./plot.module.css";

type Props = { view: View; lanes: readonly PlacedLane[]; pinS: number; cursorS: number; format: TimeFormat };

/** Average, RMS and change of each lane between pin and cursor. Where only the envelope is known the figures are estimates and say so. */
export function SpanBar({ view, lanes, pinS, cursorS, format }: Props) {
  const fromS = Math.min(pinS, cursorS);
  const toS = Math.max(pinS, cursorS);
  const rows = lanes.flatMap((lane) =>
    lane.traces.flatMap((trace) => {
      const figures = spanFigures(view, trace.name, fromS, toS);
      return figures === null ? [] : [{ key: trace.name, name: `${lane.label} ${trace.label}`.trim(), write: laneNumber(lane, true), figures, sign: pinS <= cursorS ? 1 : -1 }];
    }),
  );
  if (toS <= fromS) return null;
  const isEstimate = rows.some((row) => row.figures.isEstimate);
  return (
    <section className={styles.span} aria-label="Between pin and cursor">
      <p>
        <b>P to cursor</b> {formatTime(toS - fromS, format)}
        {isEstimate && <span className={styles.sub}> estimates from the envelope; zoom in for exact values</span>}
        {rows.length === 0 && <span className={styles.sub}> the span is not wholly inside the window</span>}
      </p>
      {rows.length > 0 && (
        <table>
          <thead>
            <tr>
              <th scope="col">Quantity</th>
              <th scope="col">Average</th>
              <th scope="col">RMS</th>
              <th scope="col">Difference</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.key}>
                <th scope="row">{row.name}</th>
                <td>{row.write(row.figures.meanValue)}</td>
                <td>{row.write(row.figures.rmsValue).replace("+", "")}</td>
                <td>{row.write(row.figures.change * row.sign)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </section>
  );
}
