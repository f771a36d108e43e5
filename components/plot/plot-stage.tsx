"use client";

import { useCallback, useRef, type RefObject } from "react";
import type { RunPlotProps } from "./run-plot";
import { CursorLayer } from "./cursor-layer";
import { borderLabel, drawScene } from "./draw-scene";
import { LaneFrames } from "./lane-frames";
import type { Painter } from "./painter";
import type { CursorFacts } from "./readout-rows";
import type { Scene } from "./scene";
import { StaticLayer } from "./static-layer";
import type { TimeFormat } from "./ticks";
import { usePlotPointer } from "./use-plot-pointer";
import styles from "./plot.module.css";

type Props = { run: RunPlotProps; scene: Scene; facts: CursorFacts; format: TimeFormat; areStops: boolean; framesRef: RefObject<HTMLDivElement | null>; onReadLane: (text: string) => void };

/** The layers, from the back: the static canvas, names and readings, the cursor, and the surface that takes the pointer. */
export function PlotStage({ run, scene, facts, format, areStops, framesRef, onReadLane }: Props) {
  const surfaceRef = useRef<HTMLDivElement>(null);
  const { layout, scale, facts: sensing } = scene;
  const draw = useCallback((painter: Painter) => drawScene(painter, scene), [scene]);
  const { ghostS, handlers } = usePlotPointer({
    surface: surfaceRef,
    scale,
    durationS: run.simulation.durationS,
    periodS: sensing.periodS,
    snapS: run.view.samples.map((sample) => sample.timeS),
    onCursor: run.onCursor,
    onWindow: run.onViewWindow,
    onPin: run.onPin,
  });
  return (
    <div className={styles.stage} style={{ width: layout.width, height: layout.height }}>
      <StaticLayer width={layout.width} height={layout.height} theme={run.theme} className={styles.canvas} draw={draw} />
      <LaneFrames layout={layout} facts={facts} sensing={sensing} borderLabel={borderLabel(scene)} areStops={areStops} containerRef={framesRef} onReadLane={onReadLane} />
      <CursorLayer layout={layout} scale={scale} format={format} cursorS={run.cursorS} pinS={run.pinS} ghostS={ghostS} band={facts.band} valueOf={facts.valueOf} />
      <div ref={surfaceRef} className={styles.surface} style={{ left: layout.x0, width: layout.x1 - layout.x0, height: layout.height }} {...handlers} />
    </div>
  );
}
