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
              <td />
              {rows.map((row) => (
                <th key={row.key} scope="col">
                  {row.name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            <FigureRow name="Average" cells={rows.map((row) => ({ key: row.key, text: row.write(row.figures.meanValue) }))} />
            <FigureRow name="RMS" cells={rows.map((row) => ({ key: row.key, text: row.write(row.figures.rmsValue).replace("+", "") }))} />
            <FigureRow name="Difference" cells={rows.map((row) => ({ key: row.key, text: row.write(row.figures.change * row.sign) }))} />
          </tbody>
        </table>
      )}
    </section>
  );
}

function FigureRow({ name, cells }: { name: string; cells: { key: string; text: string }[] }) {
  return (
    <tr>
      <th scope="row">{name}</th>
      {cells.map((cell) => (
        <td key={cell.key}>{cell.text}</td>
      ))}
    </tr>
  );
}
