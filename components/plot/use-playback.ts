"use client";

import { useEffect, useRef, useState } from "react";
import { nextStop, type StepStops } from "./steps";

const STEP_MS = 1000;

/** Play: one event a second from the cursor on, never by itself; it stops at the last event. */
export function usePlayback(stops: StepStops, cursorS: number, onCursor: (timeS: number) => void): { isPlaying: boolean; toggle: () => void } {
  const [isPlaying, setPlaying] = useState(false);
  const latest = useRef({ stops, cursorS, onCursor });
  useEffect(() => {
    latest.current = { stops, cursorS, onCursor };
  });
  useEffect(() => {
    if (!isPlaying) return;
    const timer = setInterval(() => {
      const { stops: now, cursorS: atS, onCursor: move } = latest.current;
      const nextS = nextStop(now.events, atS, 1, now.instantS);
      if (nextS === null) setPlaying(false);
      else move(nextS);
    }, STEP_MS);
    return () => clearInterval(timer);
  }, [isPlaying]);
  return { isPlaying, toggle: () => setPlaying((was) => !was) };
}
