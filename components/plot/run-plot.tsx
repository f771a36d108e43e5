"use client";

import { useId, useRef, useState } from "react";
import type { InstantReading, Simulation, View } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { announcement } from "./announcement";
import { Announcer } from "./announcer";
import type { LaneId } from "./lanes";
import { PlotControls } from "./plot-controls";
import { PlotStage } from "./plot-stage";
import { PlotTable } from "./plot-table";
import { applyCommand, type RunCommand } from "./run-commands";
import type { PlotWindow } from "./scale";
import { SpanBar } from "./span-bar";
import type { ThemeName } from "./theme";
import { cursorFormat } from "./ticks";
import { useRunData } from "./use-run-data";
import { useRunKeys } from "./use-run-keys";
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
  const { view, overview, document, cursorS, viewWindow, pinS, heightPx } = props;
  const id = useId();
  const rootRef = useRef<HTMLElement>(null);
  const fieldRef = useRef<HTMLDivElement>(null);
  const framesRef = useRef<HTMLDivElement>(null);
  const size = useSize(fieldRef, { width: 900, height: 460 });
  const [ownLanes, setOwnLanes] = useState<readonly LaneId[] | null>(null);
  const [isTableOpen, setTableOpen] = useState(false);
  const [said, setSaid] = useState("");
  const isCompact = size.width < COMPACT_BELOW_PX;
  const laneIds = props.lanes ?? ownLanes;
  const { scene, available, shown } = useScene({ view, overview, document, viewWindow, laneIds, width: size.width, height: heightPx ?? size.height, isCompact, isHeld: props.isHeld ?? false });
  const { layout, facts: sensing } = scene;
  const { stops, rows, facts } = useRunData(props, sensing);
  const format = cursorFormat(viewWindow, sensing.periodS);
  const command = (next: RunCommand) => {
    if (next.do === "play") return props.onTogglePlay?.();
    const place = applyCommand({ cursorS, window: viewWindow, pinS }, next, stops);
    if (place.cursorS !== cursorS) props.onCursor(place.cursorS);
    if (place.window !== viewWindow) props.onViewWindow(place.window);
    if (place.pinS !== pinS) props.onPin(place.pinS);
  };
  const { isInside, onKeyDown } = useRunKeys(rootRef, framesRef, props.areLettersOn ?? true, command);
  const isScrolling = layout.height > (heightPx ?? size.height) + 1;
  return (
    <section ref={rootRef} className={styles.plot} role="group" aria-roledescription="run" aria-label="Waveforms of the run" aria-describedby={id} tabIndex={0} onKeyDown={onKeyDown} data-stale={props.isStale || undefined}>
      <p id={id} className={styles.srOnly}>
        {HELP}
      </p>
      <PlotControls onCommand={command} hasPin={pinS !== null} lanes={available} shown={shown} onShown={props.onLanes ?? setOwnLanes} tableId={`${id}-table`} isTableOpen={isTableOpen} onTable={setTableOpen} isCompact={isCompact} />
      <div ref={fieldRef} className={styles.field} {...(isScrolling ? SCROLLING : {})} style={{ overflowY: isScrolling ? "auto" : "hidden", ...(heightPx === undefined ? {} : { height: heightPx, flex: "none" }) }}>
        <PlotStage run={props} scene={scene} facts={facts} format={format} areStops={isInside} framesRef={framesRef} onReadLane={setSaid} />
      </div>
      {pinS !== null && <SpanBar view={view} lanes={layout.lanes} pinS={pinS} cursorS={cursorS} format={format} />}
      {isTableOpen && <PlotTable id={`${id}-table`} view={view} window={viewWindow} lanes={layout.lanes} rows={rows} />}
      <Announcer text={announcement(cursorS, facts, sensing, format)} said={said} className={styles.srOnly} />
    </section>
  );
}
