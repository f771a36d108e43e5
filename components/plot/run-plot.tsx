"use client";

import { useCallback, useId, useMemo, useRef, useState, type KeyboardEvent } from "react";
import type { InstantReading, Simulation, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { announcement } from "./announcement";
import { Announcer } from "./announcer";
import { CursorLayer } from "./cursor-layer";
import { cursorFacts } from "./cursor-facts";
import { borderLabel, drawScene } from "./draw-scene";
import { eventRows, mergeEvents } from "./event-rows";
import { LaneFrames } from "./lane-frames";
import type { LaneId } from "./lanes";
import type { Painter } from "./painter";
import { PlotControls } from "./plot-controls";
import { PlotTable } from "./plot-table";
import { applyCommand, commandOfKey, type RunCommand } from "./run-commands";
import { runStops } from "./run-stops";
import { knownSamples } from "./sample-schedule";
import type { PlotWindow } from "./scale";
import { SpanBar } from "./span-bar";
import { StaticLayer } from "./static-layer";
import type { ThemeName } from "./theme";
import { cursorFormat } from "./ticks";
import { usePlotPointer } from "./use-plot-pointer";
import { useScene } from "./use-scene";
import { useSize } from "./use-size";
import styles from "./plot.module.css";

/**
 * The waveforms of a run: stacked lanes on one time axis with cursor, pin, span, zoom and pan.
 *
 * Controlled: it owns no time. `cursorS`, `viewWindow` and `pinS` come from the page's store and go back through their callbacks; ask the
 * engine for a new `view` when the window changes (the old one is drawn, cut to the new window, until it arrives) and for a new `reading`
 * when the cursor moves. `overview` (the whole run) fixes the value scales, so that zooming in time leaves them alone; `isHeld` while an
 * input is dragged keeps them from jumping; `isStale` fades a run that no longer belongs to the inputs.
 * Takes the height of its parent, or `heightPx`. Below 560 px it draws three lanes with names inside (phone).
 */
export type RunPlotProps = {
  view: View;
  overview?: View | undefined;
  simulation: Simulation;
  document: ScenarioDocument;
  reading: InstantReading | null;
  cursorS: number;
  onCursor: (timeS: number) => void;
  viewWindow: PlotWindow;
  onViewWindow: (next: PlotWindow) => void;
  pinS: number | null;
  onPin: (timeS: number | null) => void;
  theme: ThemeName;
  lanes?: readonly LaneId[] | undefined;
  onLanes?: ((ids: LaneId[]) => void) | undefined;
  areLettersOn?: boolean;
  isHeld?: boolean;
  isStale?: boolean;
  heightPx?: number | undefined;
  onTogglePlay?: (() => void) | undefined;
};

/** Lanes that do not fit scroll; a keyboard must then reach the scroller. */
const SCROLLING = { tabIndex: 0, role: "group", "aria-label": "Lanes; up and down scroll" };
const COMPACT_BELOW_PX = 560;
const HELP = "Arrow keys step by event, with Shift by PWM period, with Ctrl they move the window. Enter goes into the lanes, Escape leaves them.";

export function RunPlot(props: RunPlotProps) {
  const { view, overview, simulation, document, reading, cursorS, viewWindow, pinS, theme } = props;
  const helpId = useId();
  const rootRef = useRef<HTMLElement>(null);
  const fieldRef = useRef<HTMLDivElement>(null);
  const framesRef = useRef<HTMLDivElement>(null);
  const surfaceRef = useRef<HTMLDivElement>(null);
  const size = useSize(fieldRef, { width: 900, height: 460 });
  const [ownLanes, setOwnLanes] = useState<readonly LaneId[] | null>(null);
  const [isInside, setInside] = useState(false);
  const [isTableOpen, setTableOpen] = useState(false);
  const [said, setSaid] = useState("");

  const isCompact = size.width < COMPACT_BELOW_PX;
  const { scene, available, shown } = useScene({
    view,
    overview,
    document,
    viewWindow,
    laneIds: props.lanes ?? ownLanes,
    width: size.width,
    height: props.heightPx ?? size.height,
    isCompact,
    isHeld: props.isHeld ?? false,
  });
  const { layout, scale, facts: sensing } = scene;
  const stops = useMemo(() => runStops(simulation, view, sensing), [simulation, view, sensing]);
  const samples = useMemo(() => knownSamples(simulation.samples, view.samples, sensing.instantS), [simulation, view, sensing]);
  const rows = useMemo(() => eventRows(mergeEvents(simulation.events, view.events), samples, view.bands, sensing), [simulation, view, samples, sensing]);
  const facts = useMemo(
    () => cursorFacts({ view, overview, reading, samples, cursorS, pinS, sensing }),
    [view, overview, reading, samples, cursorS, pinS, sensing],
  );
  const format = cursorFormat(viewWindow, sensing.periodS);
  const draw = useCallback((painter: Painter) => drawScene(painter, scene), [scene]);

  const command = (next: RunCommand) => {
    if (next.do === "play") return props.onTogglePlay?.();
    const place = applyCommand({ cursorS, window: viewWindow, pinS }, next, stops);
    if (place.cursorS !== cursorS) props.onCursor(place.cursorS);
    if (place.window !== viewWindow) props.onViewWindow(place.window);
    if (place.pinS !== pinS) props.onPin(place.pinS);
  };
  const { ghostS, handlers } = usePlotPointer({
    surface: surfaceRef,
    scale,
    durationS: simulation.durationS,
    periodS: sensing.periodS,
    snapS: view.samples.map((sample) => sample.timeS),
    onCursor: props.onCursor,
    onWindow: props.onViewWindow,
    onPin: props.onPin,
  });
  const onKeyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (isTyping(event.target)) return;
    if (event.key === "Escape" && isInside) {
      setInside(false);
      rootRef.current?.focus();
    } else if (event.key === "Enter" && event.target === rootRef.current) {
      setInside(true);
      requestAnimationFrame(() => framesRef.current?.querySelector<HTMLElement>("[data-lane]")?.focus());
    } else {
      const next = commandOfKey(event, props.areLettersOn ?? true);
      const isButtonKey = event.key === " " && event.target instanceof HTMLElement && event.target.closest("button, summary") !== null;
      if (next === null || isButtonKey) return;
      command(next);
    }
    event.preventDefault();
  };

  return (
    <section ref={rootRef} className={styles.plot} role="group" aria-roledescription="run" aria-label="Waveforms of the run" aria-describedby={helpId} tabIndex={0} onKeyDown={onKeyDown} data-stale={props.isStale || undefined}>
      <p id={helpId} className={styles.srOnly}>
        {HELP}
      </p>
      <PlotControls onCommand={command} hasPin={pinS !== null} lanes={available} shown={shown} onShown={props.onLanes ?? setOwnLanes} tableId={`${helpId}-table`} isTableOpen={isTableOpen} onTable={setTableOpen} isCompact={isCompact} />
      <div ref={fieldRef} className={styles.field} {...(layout.height > size.height + 1 && props.heightPx === undefined ? SCROLLING : {})} style={props.heightPx === undefined ? undefined : { height: props.heightPx, flex: "none" }}>
        <div className={styles.stage} style={{ width: layout.width, height: layout.height }}>
          <StaticLayer width={layout.width} height={layout.height} theme={theme} className={styles.canvas} draw={draw} />
          <LaneFrames layout={layout} facts={facts} sensing={sensing} borderLabel={borderLabel(scene)} areStops={isInside} containerRef={framesRef} onReadLane={setSaid} />
          <CursorLayer layout={layout} scale={scale} format={format} cursorS={cursorS} pinS={pinS} ghostS={ghostS} band={facts.band} valueOf={facts.valueOf} />
          <div ref={surfaceRef} className={styles.surface} style={{ left: layout.x0, width: layout.x1 - layout.x0, height: layout.height }} {...handlers} />
        </div>
      </div>
      {pinS !== null && <SpanBar view={view} lanes={layout.lanes} pinS={pinS} cursorS={cursorS} format={format} />}
      {isTableOpen && <PlotTable id={`${helpId}-table`} view={view} window={viewWindow} lanes={layout.lanes} rows={rows} />}
      <Announcer text={announcement(cursorS, facts, sensing, format)} said={said} className={styles.srOnly} />
    </section>
  );
}

const isTyping = (target: EventTarget): boolean => target instanceof HTMLElement && target.closest("input, select, textarea, [contenteditable]") !== null;
