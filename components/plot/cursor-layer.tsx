"use client";

import type { TraceName } from "@/lib/engine/results";
import type { PlotLayout } from "./layout";
import { clamp, xOf, yOf, type TimeScale } from "./scale";
import { formatTime, type TimeFormat } from "./ticks";
import styles from "./plot.module.css";

type Props = {
  layout: PlotLayout;
  scale: TimeScale;
  format: TimeFormat;
  cursorS: number;
  pinS: number | null;
  ghostS: number | null;
  band: { fromS: number; toS: number } | null;
  valueOf: (name: TraceName) => number | null;
};

const isInside = (scale: TimeScale, timeS: number): boolean => timeS >= scale.fromS && timeS <= scale.toS;

/** Cursor, pin, span between them, pointer ghost and the dots on the traces: the only part of the plot that moves with the cursor. */
export function CursorLayer(props: Props) {
  const { layout, scale, pinS, cursorS, ghostS } = props;
  return (
    <svg className={styles.overlay} width={layout.width} height={layout.height} aria-hidden="true">
      {pinS !== null && <Span layout={layout} scale={scale} fromS={Math.min(pinS, cursorS)} toS={Math.max(pinS, cursorS)} />}
      {ghostS !== null && isInside(scale, ghostS) && <Ghost layout={layout} x={xOf(scale, ghostS)} />}
      {pinS !== null && isInside(scale, pinS) && <Pin layout={layout} x={xOf(scale, pinS)} />}
      {isInside(scale, cursorS) ? <Cursor {...props} x={xOf(scale, cursorS)} /> : <Outside layout={layout} isBefore={cursorS < scale.fromS} />}
    </svg>
  );
}

function Span({ layout, scale, fromS, toS }: { layout: PlotLayout; scale: TimeScale; fromS: number; toS: number }) {
  const x = clamp(xOf(scale, fromS), layout.x0, layout.x1);
  const end = clamp(xOf(scale, toS), layout.x0, layout.x1);
  const width = Math.max(0, end - x);
  return (
    <g fill="var(--ref)">
      <rect x={x} y={layout.lanesTop - 6} width={width} height="3" />
      <rect x={x} y={layout.lanesTop - 3} width={width} height={layout.lanesBottom - layout.lanesTop + 3} opacity="0.06" />
    </g>
  );
}

function Ghost({ layout, x }: { layout: PlotLayout; x: number }) {
  return <line x1={x} x2={x} y1={layout.lanesTop - 5} y2={layout.axisY} stroke="var(--ink3)" strokeWidth="1" opacity="0.6" />;
}

function Pin({ layout, x }: { layout: PlotLayout; x: number }) {
  return (
    <g>
      <line x1={x} x2={x} y1={layout.lanesTop - 5} y2={layout.axisY} stroke="var(--ink)" strokeWidth="1" strokeDasharray="4 3" />
      <rect x={x - 7.5} y={layout.lanesTop - 20} width="15" height="15" rx="2" fill="var(--paper)" stroke="var(--ink)" />
      <text x={x} y={layout.lanesTop - 8.5} textAnchor="middle" className={styles.pinText}>
        P
      </text>
    </g>
  );
}

/** The cursor is outside the window: a triangle at the edge says on which side. */
function Outside({ layout, isBefore }: { layout: PlotLayout; isBefore: boolean }) {
  const y = layout.lanesTop - 11;
  const d = isBefore ? `M${layout.x0 + 7} ${y - 5}v10l-7 -5z` : `M${layout.x1 - 7} ${y - 5}v10l7 -5z`;
  return <path d={d} fill="var(--ink)" />;
}

function Cursor({ layout, cursorS, format, band, scale, valueOf, x }: Props & { x: number }) {
  const text = formatTime(cursorS, format);
  const tagPx = text.length * 6.4 + 14;
  const tagX = clamp(x - tagPx / 2, layout.x0 - 20, Math.max(layout.x0, layout.width - tagPx));
  const strip = layout.lanes.find((lane) => lane.kind === "strip");
  const bandX = band === null ? 0 : clamp(xOf(scale, band.fromS), layout.x0, layout.x1);
  const bandEnd = band === null ? 0 : clamp(xOf(scale, band.toS), layout.x0, layout.x1);
  return (
    <g>
      {strip !== undefined && bandEnd - bandX > 3 && <rect x={bandX} y={strip.y - 2.5} width={bandEnd - bandX} height={strip.height + 5} fill="none" stroke="var(--ink)" strokeWidth="2" />}
      <line x1={x} x2={x} y1={layout.lanesTop - 5} y2={layout.axisY + 4} stroke="var(--paper)" strokeWidth="3" opacity="0.55" />
      <line x1={x} x2={x} y1={layout.lanesTop - 5} y2={layout.axisY + 4} stroke="var(--ink)" strokeWidth="1.1" />
      <path d={`M${x - 5.5} ${layout.lanesTop - 12}h11l-5.5 7z`} fill="var(--ink)" />
      {layout.lanes.flatMap((lane) =>
        lane.traces.map((trace) => {
          const value = valueOf(trace.name);
          if (value === null) return null;
          const y = clamp(yOf(lane.scale, value), lane.y - 2, lane.y + lane.height + 2);
          return <circle key={`${lane.id}-${trace.name}`} cx={x} cy={y} r={trace.isDashed ? 2.9 : 3.4} fill={trace.isDashed ? "var(--sheet)" : "var(--ink)"} stroke={trace.isDashed ? "var(--ink)" : "var(--sheet)"} strokeWidth="1.2" />;
        }),
      )}
      <rect x={tagX} y={layout.axisY + 5} width={tagPx} height="18" rx="2" fill="var(--ink)" stroke="var(--paper)" strokeWidth="4" paintOrder="stroke" />
      <text x={tagX + tagPx / 2} y={layout.axisY + 18} textAnchor="middle" className={styles.tagText}>
        {text}
      </text>
    </g>
  );
}
