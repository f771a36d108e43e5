"use client";

import type { RefObject } from "react";
import type { PlacedLane, PlotLayout } from "./layout";
import type { CursorFacts } from "./readout-rows";
import { readoutRows } from "./readout-rows";
import type { SensingFacts } from "./sensing-facts";
import styles from "./plot.module.css";

type Props = {
  layout: PlotLayout;
  facts: CursorFacts;
  sensing: SensingFacts;
  borderLabel: string;
  /** Lanes are Tab stops only after Enter on the run. */
  areStops: boolean;
  containerRef: RefObject<HTMLDivElement | null>;
  onReadLane: (text: string) => void;
};

/** A lane in a sentence: what Enter reads aloud and what a screen reader hears on the lane. */
export function laneSentence(lane: PlacedLane, facts: CursorFacts, sensing: SensingFacts): string {
  const name = lane.sublabel === "" || lane.sublabel.startsWith("+") ? lane.label : `${lane.label} ${lane.sublabel}`;
  return `${name}: ${readoutRows(lane, facts, sensing)
    .map((row) => `${row.label} ${row.text}`.trim())
    .join(", ")}`;
}

/** Lane names at the left and values at the cursor at the far right, as page text over the canvas. */
export function LaneFrames({ layout, facts, sensing, borderLabel, areStops, containerRef, onReadLane }: Props) {
  return (
    <div ref={containerRef} className={styles.frames} data-compact={layout.isCompact || undefined}>
      {layout.lanes.map((lane) => {
        const sentence = laneSentence(lane, facts, sensing);
        return (
          <div
            key={lane.id}
            role="group"
            aria-roledescription="lane"
            aria-label={sentence}
            data-lane={lane.id}
            tabIndex={areStops ? 0 : -1}
            className={styles.lane}
            style={{ top: lane.y - 4, height: lane.height + 8, width: layout.width }}
            onKeyDown={(event) => {
              if (event.key !== "Enter" || !areStops) return;
              event.preventDefault();
              event.stopPropagation();
              onReadLane(sentence);
            }}
          >
            <LaneName lane={lane} layout={layout} />
            {!layout.isCompact && <Readout lane={lane} layout={layout} facts={facts} sensing={sensing} />}
          </div>
        );
      })}
      {!layout.isCompact && (
        <>
          <span className={styles.axisName} style={{ top: layout.borderY + 1 }}>
            {borderLabel}
          </span>
          <span className={styles.axisName} style={{ top: layout.axisY + 7 }}>
            Time
          </span>
        </>
      )}
    </div>
  );
}

function LaneName({ lane, layout }: { lane: PlacedLane; layout: PlotLayout }) {
  if (layout.isCompact) return lane.traces.length === 0 ? null : <span className={styles.compactName}>{lane.label}</span>;
  return (
    <div className={styles.laneName} aria-hidden="true">
      <span className={styles.caps}>{lane.label}</span>
      {lane.sublabel !== "" && lane.height > 28 && <span className={styles.sub}>{lane.sublabel}</span>}
      {lane.traces.length > 1 && (
        <span className={styles.legend}>
          {lane.traces.map((trace) => (
            <span key={trace.name}>
              <svg width="18" height="8" aria-hidden="true">
                <line x1="0" x2="18" y1="4" y2="4" stroke="var(--ink)" strokeWidth="1.6" strokeDasharray={trace.isDashed ? "6 3" : undefined} />
              </svg>
              {trace.label}
            </span>
          ))}
        </span>
      )}
      {lane.isReading && (
        <span className={styles.codes} style={{ top: lane.height + 8 }}>
          ADC code
        </span>
      )}
    </div>
  );
}

const ROW_PX = 16;

function Readout({ lane, layout, facts, sensing }: { lane: PlacedLane; layout: PlotLayout; facts: CursorFacts; sensing: SensingFacts }) {
  const room = Math.max(1, Math.floor((lane.height + 5) / ROW_PX));
  const rows = readoutRows(lane, facts, sensing).slice(0, room);
  return (
    <dl className={styles.readout} style={{ left: layout.x1 + 32 }} aria-hidden="true">
      {rows.map((row) => (
        <div key={row.label}>
          <dt>{row.label}</dt>
          <dd className={row.isFault ? styles.fault : undefined}>{row.text}</dd>
        </div>
      ))}
    </dl>
  );
}
