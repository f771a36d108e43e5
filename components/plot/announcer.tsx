"use client";

import { useEffect, useRef, useState } from "react";

const LEAST_GAP_MS = 500;

/** The text to announce, changed at most every 500 ms, always ending on the newest; nothing is said before the first change. */
export function usePacedText(text: string): string {
  const [spoken, setSpoken] = useState("");
  const heard = useRef(text);
  const saidAtMs = useRef(-Infinity);
  useEffect(() => {
    if (text === heard.current) return;
    const waitMs = Math.max(0, saidAtMs.current + LEAST_GAP_MS - performance.now());
    const timer = setTimeout(() => {
      saidAtMs.current = performance.now();
      heard.current = text;
      setSpoken(text);
    }, waitMs);
    return () => clearTimeout(timer);
  }, [text]);
  return spoken;
}

/** Polite live regions: the cursor, at most twice a second, and `said`, a lane read on demand, at once. */
export function Announcer({ text, said, className }: { text: string; said: string; className: string | undefined }) {
  const spoken = usePacedText(text);
  return (
    <div className={className}>
      <div role="status" aria-live="polite" aria-atomic="true">
        {spoken}
      </div>
      <div role="status" aria-live="polite" aria-atomic="true">
        {said}
      </div>
    </div>
  );
}
