"use client";

import { useCallback, useMemo, useRef, type KeyboardEvent, type PointerEvent } from "react";
import type { Simulation, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { drawOverview, overviewScene } from "./draw-overview";
import { milestonesOf, type Milestone } from "./milestones";
import type { Painter } from "./painter";
import { clamp, panWindow, timeOf, xOf, type PlotWindow, type TimeScale } from "./scale";
import { readSensing } from "./sensing-facts";
import { StaticLayer } from "./static-layer";
import type { ThemeName } from "./theme";
import { formatTime, timeFormat } from "./ticks";
import { useSize } from "./use-size";
import styles from "./overview.module.css";

/**
 * The whole run in one strip: motor current, milestones, the cursor, and the visible window as a bracket that can be dragged; beside it
 * a slider role with arrow keys does the same. A click outside the bracket brings the window there.
 */
export type OverviewProps = {
  overview: View;
  simulation: Simulation;
  document: ScenarioDocument;
  cursorS: number;
  onCursor: (timeS: number) => void;
  viewWindow: PlotWindow;
  onViewWindow: (next: PlotWindow) => void;
  theme: ThemeName;
};

const HEIGHT_PX = 44;
const TOP_PX = 15;
const LABEL_CHAR_PX = 6.2;

export function RunOverview(props: OverviewProps) {
  const { overview, simulation, document, cursorS, theme } = props;
  const ref = useRef<HTMLDivElement>(null);
  const { width } = useSize(ref, { width: 480, height: HEIGHT_PX });
  const facts = useMemo(() => readSensing(document), [document]);
  const scene = useMemo(() => overviewScene(overview, facts, width, HEIGHT_PX, TOP_PX), [overview, facts, width]);
  const draw = useCallback((painter: Painter) => drawOverview(painter, scene), [scene]);
  const marks = useMemo(() => placeLabels(milestonesOf(simulation), scene.scale), [simulation, scene.scale]);
  const x = xOf(scene.scale, clamp(cursorS, 0, simulation.durationS));
  return (
    <div ref={ref} className={styles.overview} style={{ height: HEIGHT_PX }}>
      <StaticLayer width={width} height={HEIGHT_PX} theme={theme} draw={draw} />
      <svg className={styles.overlay} width={width} height={HEIGHT_PX} aria-hidden="true">
        {marks.map((mark) => (
          <line key={mark.timeS} x1={mark.x} x2={mark.x} y1={TOP_PX - 1} y2={HEIGHT_PX - 2} stroke="var(--ink)" strokeWidth="1" opacity={mark.isSlack ? 0 : 0.75} />
        ))}
        {marks.filter((mark) => mark.isSlack).map((mark) => (
          <Lens key={mark.timeS} x={mark.x} y={slackY(scene)} />
        ))}
        <line x1={x} x2={x} y1={TOP_PX - 1} y2={HEIGHT_PX - 6} stroke="var(--ink)" strokeWidth="1.6" />
        <path d={`M${x - 4.5} ${HEIGHT_PX}h9l-4.5 -6z`} fill="var(--ink)" />
      </svg>
      {marks.map((mark) =>
        mark.isLabelled ? (
          <button key={mark.timeS} type="button" className={styles.mark} style={{ left: mark.labelX }} onClick={() => props.onCursor(mark.timeS)}>
            {mark.label}
          </button>
        ) : null,
      )}
      <Bracket {...props} scale={scene.scale} />
    </div>
  );
}

const slackY = (scene: ReturnType<typeof overviewScene>): number => {
  const { scale } = scene.layout.lanes[0]!;
  return scale.y0 + (scale.max / (scale.max - scale.min)) * (scale.y1 - scale.y0);
};

function Lens({ x, y }: { x: number; y: number }) {
  return <path d={`M${x - 5} ${y}C${x - 3} ${y - 4} ${x + 3} ${y - 4} ${x + 5} ${y}C${x + 3} ${y + 4} ${x - 3} ${y + 4} ${x - 5} ${y}Z`} fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.4" />;
}

type PlacedMark = Milestone & { x: number; labelX: number; isLabelled: boolean };

/** Labels left to right, one left out where it would run into the one before. */
export function placeLabels(milestones: readonly Milestone[], scale: TimeScale): PlacedMark[] {
  let freeFrom = 0;
  return milestones.map((mark) => {
    const x = xOf(scale, mark.timeS);
    const width = Math.max(26, mark.label.length * LABEL_CHAR_PX + 4);
    const labelX = clamp(x - 2, 0, Math.max(0, scale.x1 + 6 - width));
    const isLabelled = labelX >= freeFrom;
    if (isLabelled) freeFrom = labelX + width + 6;
    return { ...mark, x, labelX, isLabelled };
  });
}

const LEAST_BRACKET_PX = 12;

function Bracket({ simulation, viewWindow, onViewWindow, scale }: OverviewProps & { scale: TimeScale }) {
  const grab = useRef<{ x: number; window: PlotWindow } | null>(null);
  const { durationS } = simulation;
  const format = timeFormat({ fromS: 0, toS: durationS }, 400);
  const x = xOf(scale, viewWindow.fromS);
  const width = Math.max(LEAST_BRACKET_PX, xOf(scale, viewWindow.toS) - x);
  const left = clamp(x, scale.x0, scale.x1 - width);
  const lengthS = viewWindow.toS - viewWindow.fromS;
  const onPointerDown = (event: PointerEvent<HTMLDivElement>) => {
    event.currentTarget.setPointerCapture?.(event.pointerId);
    const at = event.clientX - event.currentTarget.getBoundingClientRect().left + scale.x0;
    const isOnBracket = at >= left && at <= left + width;
    const held = isOnBracket ? viewWindow : panWindow(viewWindow, timeOf(scale, at) - lengthS / 2 - viewWindow.fromS, durationS);
    if (!isOnBracket) onViewWindow(held);
    grab.current = { x: event.clientX, window: held };
  };
  const onPointerMove = (event: PointerEvent<HTMLDivElement>) => {
    if (grab.current === null) return;
    const byS = ((event.clientX - grab.current.x) / (scale.x1 - scale.x0)) * (scale.toS - scale.fromS);
    onViewWindow(panWindow(grab.current.window, byS, durationS));
  };
  const release = () => {
    grab.current = null;
  };
  const onKeyDown = (event: KeyboardEvent<HTMLDivElement>) => {
    const shares: Record<string, number> = { ArrowLeft: -0.1, ArrowRight: 0.1, ArrowDown: -0.1, ArrowUp: 0.1, PageDown: -1, PageUp: 1, Home: -Infinity, End: Infinity };
    const share = shares[event.key];
    if (share === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    onViewWindow(panWindow(viewWindow, clamp(share * lengthS, -durationS, durationS), durationS));
  };
  const isWhole = lengthS >= durationS * 0.999;
  return (
    <div className={styles.track} style={{ left: scale.x0, width: scale.x1 - scale.x0, top: TOP_PX }} onPointerDown={onPointerDown} onPointerMove={onPointerMove} onPointerUp={release} onPointerCancel={release}>
      <div
        role="slider"
        tabIndex={0}
        aria-label="Visible window"
        aria-valuemin={0}
        aria-valuemax={Number((durationS - lengthS).toPrecision(9))}
        aria-valuenow={Number(viewWindow.fromS.toPrecision(9))}
        aria-valuetext={isWhole ? "whole run" : `${formatTime(viewWindow.fromS, format)} to ${formatTime(viewWindow.toS, format)}`}
        className={styles.bracket}
        data-whole={isWhole || undefined}
        style={{ left: left - scale.x0, width }}
        onKeyDown={onKeyDown}
      />
    </div>
  );
}
