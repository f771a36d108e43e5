"use client";

import { useRef, useState, type KeyboardEvent, type PointerEvent } from "react";
import styles from "./slider.module.css";

/**
 * The hairline under an input row, with a lozenge as thumb. The strip that takes the pointer is taller than the line, so it can be
 * grasped anywhere along it. Preferred values attract within 6 px (Alt: free). Escape during a drag puts the old value back.
 */
export type SliderProps = {
  label: string;
  value: number;
  valueText: string;
  min: number;
  max: number;
  /** Where the thumb stands, 0 to 1. */
  position: number;
  /** Where the last drag started: a dashed lozenge. */
  startPosition?: number | null;
  /** Preferred values, shown while dragging. */
  ticks: readonly number[];
  /** The value under the pointer; it may snap to a preferred one that is nearer than `snapShare` of the length. */
  valueAt: (position: number, snapShare: number) => number;
  /** Value before the draft changed it; Backspace goes back to it. */
  resetValue?: number | null;
  onStart: () => void;
  onMove: (value: number) => void;
  onEnd: () => void;
  onCancel: () => void;
  /** Keys. */
  onStep: (value: number) => void;
  stepBy: (value: number, direction: 1 | -1, size: number) => number;
  pageBy: (value: number, direction: 1 | -1) => number;
};

/** look.md section 7: preferred values attract within 6 px. */
const SNAP_PX = 6;
const MOVE_PX = 2;

export function Slider(props: SliderProps) {
  const { value, position, startPosition } = props;
  const track = useRef<HTMLDivElement>(null);
  const grab = useRef<{ x: number; offsetPx: number; isMoved: boolean } | null>(null);
  const [isDragging, setDragging] = useState(false);

  const geometry = () => {
    const box = track.current?.getBoundingClientRect();
    return { left: box?.left ?? 0, width: box && box.width > 0 ? box.width : 1 };
  };
  const moveTo = (x: number, isFree: boolean) => {
    const { left, width } = geometry();
    props.onMove(props.valueAt(Math.min(1, Math.max(0, (x - left) / width)), isFree ? 0 : SNAP_PX / width));
  };
  const finish = (isKept: boolean) => {
    if (!grab.current) return;
    grab.current = null;
    setDragging(false);
    isKept ? props.onEnd() : props.onCancel();
  };
  const onPointerDown = (event: PointerEvent<HTMLDivElement>) => {
    if (event.button !== 0) return;
    const { left, width } = geometry();
    const thumbX = left + position * width;
    const isOnThumb = Math.abs(event.clientX - thumbX) <= THUMB_REACH_PX;
    event.currentTarget.setPointerCapture?.(event.pointerId);
    grab.current = { x: event.clientX, offsetPx: isOnThumb ? thumbX - event.clientX : 0, isMoved: false };
    setDragging(true);
    props.onStart();
    if (!isOnThumb) moveTo(event.clientX, event.altKey);
  };
  const onPointerMove = (event: PointerEvent<HTMLDivElement>) => {
    const held = grab.current;
    if (!held) return;
    if (!held.isMoved && Math.abs(event.clientX - held.x) < MOVE_PX) return;
    held.isMoved = true;
    moveTo(event.clientX + held.offsetPx, event.altKey);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLDivElement>) => {
    if (event.key === "Escape" && grab.current) {
      finish(false);
      event.preventDefault();
      event.stopPropagation();
      return;
    }
    const next = valueOfKey(event, props);
    if (next === null) return;
    event.preventDefault();
    event.stopPropagation();
    if (next !== value) props.onStep(next);
  };

  return (
    <div
      className={styles.slider}
      data-dragging={isDragging || undefined}
      onPointerDown={onPointerDown}
      onPointerMove={onPointerMove}
      onPointerUp={() => finish(true)}
      onPointerCancel={() => finish(false)}
    >
      <div ref={track} className={styles.track}>
        {isDragging && props.ticks.map((at) => <span key={at} className={styles.tick} style={{ left: percent(at) }} />)}
        <span className={styles.filled} style={{ width: percent(position) }} />
        {startPosition !== null && startPosition !== undefined && (
          <span className={styles.start} style={{ left: percent(startPosition) }} />
        )}
        <div
          role="slider"
          tabIndex={0}
          aria-label={props.label}
          aria-valuemin={props.min}
          aria-valuemax={props.max}
          aria-valuenow={value}
          aria-valuetext={props.valueText}
          className={styles.thumb}
          style={{ left: percent(position) }}
          onKeyDown={onKeyDown}
        />
      </div>
    </div>
  );
}

/** Half the width of the area in which a press takes the thumb without moving it. */
const THUMB_REACH_PX = 9;
const percent = (position: number): string => `${(position * 100).toFixed(3)}%`;

function valueOfKey(event: KeyboardEvent, props: SliderProps): number | null {
  const { value, stepBy, pageBy, resetValue } = props;
  const size = event.shiftKey ? 10 : event.altKey ? 0.1 : 1;
  switch (event.key) {
    case "ArrowRight":
    case "ArrowUp":
      return stepBy(value, 1, size);
    case "ArrowLeft":
    case "ArrowDown":
      return stepBy(value, -1, size);
    case "PageUp":
      return pageBy(value, 1);
    case "PageDown":
      return pageBy(value, -1);
    case "Home":
      return props.min;
    case "End":
      return props.max;
    case "Backspace":
      return resetValue ?? null;
    default:
      return null;
  }
}
