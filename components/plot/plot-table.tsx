"use client";

import { useMemo, useState } from "react";
import type { View } from "@/lib/engine/results";
import type { EventRow } from "./event-rows";
import type { Lane } from "./lanes";
import type { PlotWindow } from "./scale";
import { valueAt } from "./values";
import { MINUS } from "./ticks";
import styles from "./plot.module.css";

type Props = { view: View; window: PlotWindow; lanes: readonly Lane[]; rows: readonly EventRow[] };

const MOST_ROWS = 120;
const EVEN_ROWS = 25;

export type ValueTable = { head: string[]; body: string[][]; isCut: boolean };

const written = (value: number | null): string => (value === null ? "" : Number(value.toPrecision(6)).toString().replace("-", MINUS));

/** The plot as numbers: one row an event or sample of the window, or evenly spaced instants where there are none. */
export function valueTable(view: View, range: PlotWindow, lanes: readonly Lane[], rows: readonly EventRow[]): ValueTable {
  const traces = lanes.flatMap((lane) => lane.traces.map((trace) => ({ name: trace.name, head: `${lane.label}${trace.label === "" ? "" : ` ${trace.label}`}, ${lane.unit}` })));
  const inside = rows.filter((row) => row.timeS >= range.fromS && row.timeS <= range.toS);
  const step = (range.toS - range.fromS) / (EVEN_ROWS - 1);
  const stops = inside.length > 0 ? inside : Array.from({ length: EVEN_ROWS }, (_, index) => ({ timeS: range.fromS + index * step, label: "" }));
  return {
    head: ["Time, s", "Event", ...traces.map((trace) => trace.head)],
    body: stops.slice(0, MOST_ROWS).map((row) => [Number(row.timeS.toPrecision(9)).toString(), row.label, ...traces.map((trace) => written(valueAt(view, trace.name, row.timeS)))]),
    isCut: stops.length > MOST_ROWS,
  };
}

/** The same facts as the drawing, for reading aloud and for copying. */
export function PlotTable({ id, view, window: range, lanes, rows }: Props & { id: string }) {
  const table = useMemo(() => valueTable(view, range, lanes, rows), [view, range, lanes, rows]);
  const [message, setMessage] = useState("");
  const copy = async () => {
    const text = [table.head, ...table.body].map((cells) => cells.join("\t")).join("\n");
    try {
      await navigator.clipboard.writeText(text);
      setMessage("Copied");
    } catch {
      setMessage("The browser did not allow copying; select the table instead");
    }
  };
  return (
    <div id={id} className={`${styles.table} ${styles.scroll}`} tabIndex={0} role="region" aria-label="Values at events and samples">
      <p>
        <button type="button" className={styles.button} onClick={copy}>
          Copy table
        </button>{" "}
        <span role="status">{message}</span>
        {table.isCut && <span className={styles.sub}> first {MOST_ROWS} rows of the window; zoom in for the rest</span>}
      </p>
      <table>
        <thead>
          <tr>
            {table.head.map((cell) => (
              <th key={cell} scope="col">
                {cell}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.body.map((cells) => (
            <tr key={cells[0]}>
              {cells.map((cell, index) => (
                <td key={table.head[index]}>{cell}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
