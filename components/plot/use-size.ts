"use client";

import { useEffect, useState, type RefObject } from "react";

export type Size = { width: number; height: number };

/** Size of an element's content box in CSS pixels, followed as it changes; `start` serves until the first measurement. */
export function useSize(ref: RefObject<HTMLElement | null>, start: Size): Size {
  const [size, setSize] = useState(start);
  useEffect(() => {
    const element = ref.current;
    if (element === null || typeof ResizeObserver === "undefined") return;
    const observer = new ResizeObserver((entries) => {
      const box = entries[entries.length - 1]?.contentRect;
      if (box !== undefined && box.width > 0) setSize({ width: Math.round(box.width), height: Math.round(box.height) });
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, [ref]);
  return size;
}
