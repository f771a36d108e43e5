"use client";

import { useEffect, useRef, useState, type PointerEvent, type RefObject } from "react";
import { clamp, fitWindow, panWindow, timeOf, zoomWindow, type PlotWindow, type TimeScale } from "./scale";

type PointerInput = {
  surface: RefObject<HTMLDivElement | null>;
  scale: TimeScale;
  durationS: number;
  periodS: number;
  /** Instants a click snaps to when it is within a few pixels (Alt: free). */
  snapS: readonly number[];
  onCursor: (timeS: number) => void;
  onWindow: (next: PlotWindow) => void;
  onPin: (timeS: number) => void;
};

const SNAP_PX = 5;
const MOVE_PX = 3;
/** One notch of a usual wheel (100 units) changes the window by about a fifth. */
const WHEEL_STEP = 0.002;

type Touch = { x: number };
type Pinch = { leftS: number; rightS: number };

/** Left and right of two fingers. */
function fingers(touches: ReadonlyMap<number, Touch>): [number, number] {
  const places = [...touches.values()].map((touch) => touch.x);
  return [Math.min(...places), Math.max(...places)];
}

/** Nearest of `stops` to `timeS` within `slackS`, else `timeS`. */
export function snapTo(stops: readonly number[], timeS: number, slackS: number): number {
  let best = timeS;
  let distance = slackS;
  for (const stop of stops) {
    const apart = Math.abs(stop - timeS);
    if (apart <= distance) [best, distance] = [stop, apart];
  }
  return best;
}

/** The window in which two instants lie under two fingers. */
export function pinchWindow(scale: TimeScale, leftS: number, rightS: number, leftX: number, rightX: number): PlotWindow {
  const perPixelS = (rightS - leftS) / Math.max(1, rightX - leftX);
  const fromS = leftS - (leftX - scale.x0) * perPixelS;
  return { fromS, toS: fromS + (scale.x1 - scale.x0) * perPixelS };
}

/**
 * Pointer and touch on the lanes. Drag: cursor. Shift and drag: pin at the start, cursor at the end, which selects the span between them.
 * Two fingers: zoom and pan. Ctrl and wheel: zoom about the pointer; a sideways wheel pans. A plain wheel and a vertical touch scroll the page.
 */
export function usePlotPointer(input: PointerInput) {
  const { surface, scale, durationS, periodS } = input;
  const [ghostS, setGhostS] = useState<number | null>(null);
  const touches = useRef(new Map<number, Touch>());
  const pinch = useRef<Pinch | null>(null);
  const start = useRef<{ x: number; isMoved: boolean } | null>(null);
  useWheel(surface, input);

  const xOfEvent = (event: PointerEvent) => event.clientX - (surface.current?.getBoundingClientRect().left ?? 0) + scale.x0;
  const timeAt = (x: number) => clamp(timeOf(scale, x), Math.max(0, scale.fromS), Math.min(durationS, scale.toS));

  const release = (event: PointerEvent) => {
    touches.current.delete(event.pointerId);
    if (touches.current.size < 2) pinch.current = null;
    if (touches.current.size === 0) start.current = null;
  };
  const beginPinch = () => {
    const [left, right] = fingers(touches.current);
    pinch.current = { leftS: timeOf(scale, left), rightS: timeOf(scale, right) };
  };
  const movePinch = ({ leftS, rightS }: Pinch) => {
    const [leftX, rightX] = fingers(touches.current);
    input.onWindow(fitWindow(pinchWindow(scale, leftS, rightS, leftX, rightX), durationS, periodS));
  };

  return {
    ghostS,
    handlers: {
      onPointerDown: (event: PointerEvent<HTMLDivElement>) => {
        if (event.button !== 0) return;
        const x = xOfEvent(event);
        event.currentTarget.setPointerCapture?.(event.pointerId);
        touches.current.set(event.pointerId, { x });
        if (touches.current.size === 2) return beginPinch();
        start.current = { x, isMoved: false };
        setGhostS(null);
        if (event.shiftKey) input.onPin(timeAt(x));
        input.onCursor(timeAt(x));
      },
      onPointerMove: (event: PointerEvent<HTMLDivElement>) => {
        const x = xOfEvent(event);
        const touch = touches.current.get(event.pointerId);
        if (touch === undefined) return event.pointerType === "touch" ? undefined : setGhostS(timeAt(x));
        touch.x = x;
        if (pinch.current !== null) return movePinch(pinch.current);
        const began = start.current;
        if (began !== null && (began.isMoved ||= Math.abs(x - began.x) > MOVE_PX)) input.onCursor(timeAt(x));
      },
      onPointerUp: (event: PointerEvent<HTMLDivElement>) => {
        const isClick = start.current !== null && !start.current.isMoved && pinch.current === null;
        const slackS = (SNAP_PX * (scale.toS - scale.fromS)) / (scale.x1 - scale.x0);
        if (isClick && !event.altKey && !event.shiftKey) input.onCursor(snapTo(input.snapS, timeAt(xOfEvent(event)), slackS));
        release(event);
      },
      onPointerCancel: release,
      onPointerLeave: () => setGhostS(null),
    },
  };
}

/** React listens to wheels passively; zooming must be able to keep the page from scrolling. */
function useWheel(surface: RefObject<HTMLDivElement | null>, input: PointerInput): void {
  const latest = useRef(input);
  useEffect(() => {
    latest.current = input;
  });
  useEffect(() => {
    const element = surface.current;
    if (element === null) return;
    const onWheel = (event: WheelEvent) => {
      const { scale, durationS, periodS, onWindow } = latest.current;
      const range = { fromS: scale.fromS, toS: scale.toS };
      const sideways = event.shiftKey ? event.deltaY : event.deltaX;
      if (event.ctrlKey || event.metaKey) {
        event.preventDefault();
        const x = event.clientX - element.getBoundingClientRect().left + scale.x0;
        onWindow(zoomWindow(range, Math.exp(event.deltaY * WHEEL_STEP), timeOf(scale, x), durationS, periodS));
      } else if (Math.abs(sideways) > Math.abs(event.shiftKey ? event.deltaX : event.deltaY)) {
        event.preventDefault();
        onWindow(panWindow(range, (sideways / (scale.x1 - scale.x0)) * (scale.toS - scale.fromS), durationS));
      }
    };
    element.addEventListener("wheel", onWheel, { passive: false });
    return () => element.removeEventListener("wheel", onWheel);
  }, [surface]);
}
