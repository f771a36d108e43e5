"use client";

import { useEffect, useMemo, useRef, useState, type CSSProperties, type KeyboardEvent, type RefObject } from "react";
import type { Simulation, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { eventRows, mergeEvents, rowAt, type EventRow } from "./event-rows";
import { knownSamples } from "./sample-schedule";
import { readSensing } from "./sensing-facts";
import { fixed, cursorFormat } from "./ticks";
import { useSize } from "./use-size";
import { valueAt } from "./values";
import styles from "./steps.module.css";

/**
 * The events of the run as a table: instant, what happens, motor current and the output the converter reads, each after the event. The row
 * in force at the cursor is ink. One tab stop; up and down move the cursor by a row. Only rows in sight are in the document.
 */
export type EventsTableProps = {
  view: View;
  overview?: View | undefined;
  simulation: Simulation;
  document: ScenarioDocument;
  cursorS: number;
  onCursor: (timeS: number) => void;
};

const ROW_PX = 26;
const SPARE_ROWS = 8;
const OUTPUT_HEADS: Record<string, string> = { combinedV: "Comb.", differenceV: "Diff.", outAV: "Out A" };

export function EventsTable({ view, overview, simulation, document, cursorS, onCursor }: EventsTableProps) {
  const sensing = useMemo(() => readSensing(document), [document]);
  const rows = useMemo(
    () => eventRows(mergeEvents(simulation.events, view.events), knownSamples(simulation.samples, view.samples, sensing.instantS), view.bands, sensing),
    [simulation, view, sensing],
  );
  const scrollerRef = useRef<HTMLDivElement>(null);
  const [scrollPx, setScrollPx] = useState(0);
  const current = rowAt(rows, cursorS, sensing.instantS);
  const format = cursorFormat({ fromS: 0, toS: simulation.durationS }, sensing.periodS);
  const timeColumnPx = fixed(simulation.durationS / format.factor, format.decimals).length * 7.2 + 8;
  const { height: heightPx } = useSize(scrollerRef, { width: 300, height: 8 * ROW_PX });

  useFollow(scrollerRef, current);

  const onKeyDown = (event: KeyboardEvent) => {
    const moves: Record<string, number> = { ArrowDown: 1, ArrowUp: -1, PageDown: 8, PageUp: -8, Home: -rows.length, End: rows.length };
    const move = moves[event.key];
    if (move === undefined || event.ctrlKey || event.altKey) return;
    event.preventDefault();
    event.stopPropagation();
    const next = rows[Math.min(rows.length - 1, Math.max(0, current + move))];
    if (next !== undefined) onCursor(next.timeS);
  };
  const first = Math.max(0, Math.floor(scrollPx / ROW_PX) - SPARE_ROWS);
  const last = Math.min(rows.length, Math.ceil((scrollPx + heightPx) / ROW_PX) + SPARE_ROWS);
  const valueOf = (name: Parameters<typeof valueAt>[1], timeS: number) => exactly(view, name, timeS) ?? (overview === undefined ? null : exactly(overview, name, timeS));
  return (
    <section className={styles.events} aria-label="Events">
      <div className={styles.head}>
        <span className={styles.caps}>Events</span>
        <span>
          {current + 1} of {rows.length}
        </span>
      </div>
      <div className={styles.grid} style={{ "--time-col": `${timeColumnPx}px` } as CSSProperties} role="table" aria-label="Events of the run" aria-rowcount={rows.length + 1}>
        <div role="rowgroup" className={styles.titles}>
          <Titles unit={format.unit} load={sensing.loadName} output={OUTPUT_HEADS[sensing.readingTrace] ?? "Output"} />
        </div>
        <div
          ref={scrollerRef}
          role="rowgroup"
          tabIndex={0}
          aria-label="Rows; up and down move the cursor"
          className={styles.scroller}
          onScroll={(event) => setScrollPx(event.currentTarget.scrollTop)}
          onKeyDown={onKeyDown}
        >
          {rows.length === 0 && <p className={styles.empty}>Nothing switches in this run.</p>}
          <div style={{ height: rows.length * ROW_PX }} role="presentation" />
          {indicesShown(first, last, current).map((index) => {
            const row = rows[index]!;
            const time = fixed(row.timeS / format.factor, format.decimals);
            return <Row key={row.timeS} row={row} index={index} time={time} isCurrent={index === current} motorA={valueOf("motorCurrentA", row.timeS)} outputV={valueOf(sensing.readingTrace, row.timeS)} onChoose={onCursor} />;
          })}
        </div>
      </div>
    </section>
  );
}

/** Keeps the current row in sight, in the middle when it had left. */
function useFollow(scrollerRef: RefObject<HTMLDivElement | null>, current: number): void {
  useEffect(() => {
    const scroller = scrollerRef.current;
    if (scroller === null || current < 0) return;
    const top = current * ROW_PX;
    if (top < scroller.scrollTop || top + ROW_PX > scroller.scrollTop + scroller.clientHeight) scroller.scrollTop = Math.max(0, top - scroller.clientHeight / 2 + ROW_PX / 2);
  }, [scrollerRef, current]);
}

type RowProps = { row: EventRow; index: number; time: string; isCurrent: boolean; motorA: number | null; outputV: number | null; onChoose: (timeS: number) => void };

function Row({ row, index, time, isCurrent, motorA, outputV, onChoose }: RowProps) {
  return (
    <div role="row" aria-rowindex={index + 2} aria-current={isCurrent ? "true" : undefined} data-current={isCurrent || undefined} className={styles.row} style={{ top: index * ROW_PX }} onClick={() => onChoose(row.timeS)}>
      <span role="cell" className={styles.number}>
        {time}
      </span>
      <span role="cell" className={styles.name} title={row.label}>
        <SampleMark sample={row.sample} />
        {row.label}
      </span>
      <Value value={motorA} decimals={2} isSigned />
      <Value value={outputV} decimals={3} />
    </div>
  );
}

/** Rows in sight, and the current one wherever it is, so that it can always be found. */
function indicesShown(first: number, last: number, current: number): number[] {
  const indices = Array.from({ length: Math.max(0, last - first) }, (_, offset) => first + offset);
  if (current < 0 || (current >= first && current < last)) return indices;
  return current < first ? [current, ...indices] : [...indices, current];
}

const exactly = (view: View, name: Parameters<typeof valueAt>[1], timeS: number): number | null => (view.kind === "exact" ? valueAt(view, name, timeS) : null);

function Titles({ unit, load, output }: { unit: string; load: string; output: string }) {
  return (
    <div role="row" aria-rowindex={1} className={styles.row}>
      <span role="columnheader" className={styles.number}>
        <span className={styles.u}>{unit}</span>
      </span>
      <span role="columnheader" className={styles.name}>
        Event
      </span>
      <span role="columnheader" className={styles.number}>
        {load} <span className={styles.u}>A</span>
      </span>
      <span role="columnheader" className={styles.number}>
        {output} <span className={styles.u}>V</span>
      </span>
    </div>
  );
}

function Value({ value, decimals, isSigned = false }: { value: number | null; decimals: number; isSigned?: boolean }) {
  return (
    <span role="cell" className={styles.number}>
      {value === null ? "" : fixed(value, decimals, isSigned)}
    </span>
  );
}

function SampleMark({ sample }: { sample: EventRow["sample"] }) {
  if (sample === null || sample.isMiss === null) return null;
  return (
    <svg className="inline" width="10" height="10" viewBox="0 0 10 10" role="img" aria-label={sample.isMiss ? "misses the current" : "within its limit"}>
      {sample.isMiss ? <path d="M1.5 1.5l7 7m0 -7l-7 7" stroke="currentColor" strokeWidth="2" /> : <path d="M5 1l4 4-4 4-4-4z" fill="none" stroke="currentColor" strokeWidth="1.3" />}
    </svg>
  );
}
