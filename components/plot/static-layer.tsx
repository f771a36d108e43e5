"use client";

import { memo, useEffect, useRef, useState } from "react";
import { canvasPainter } from "./canvas-painter";
import type { Painter } from "./painter";
import { readTheme, type ThemeName } from "./theme";

type Props = {
  width: number;
  height: number;
  theme: ThemeName;
  className?: string | undefined;
  /** Must keep its identity while nothing it draws has changed: a new one redraws. */
  draw: (painter: Painter) => void;
};

/** Text on a canvas keeps the face it was drawn with, so the layer is drawn again once the page's fonts are there. */
function useFontsReady(): boolean {
  const [isReady, setReady] = useState(false);
  useEffect(() => {
    let isAlive = true;
    document.fonts?.ready.then(() => isAlive && setReady(true));
    return () => {
      isAlive = false;
    };
  }, []);
  return isReady;
}

/** Device pixels per CSS pixel, followed across zoom and a move to another display. */
function usePixelRatio(): number {
  const [ratio, setRatio] = useState(1);
  useEffect(() => {
    const follow = () => setRatio(window.devicePixelRatio || 1);
    follow();
    window.addEventListener("resize", follow);
    return () => window.removeEventListener("resize", follow);
  }, []);
  return ratio;
}

/** A canvas at device resolution that is drawn once for each new `draw`, theme or size. Decoration to assistive technology: the table says the same. */
export const StaticLayer = memo(function StaticLayer({ width, height, theme, className, draw }: Props) {
  const ref = useRef<HTMLCanvasElement>(null);
  const ratio = usePixelRatio();
  const areFontsReady = useFontsReady();
  useEffect(() => {
    const canvas = ref.current;
    const context = canvas?.getContext("2d") ?? null;
    if (canvas === null || context === null) return;
    canvas.width = Math.round(width * ratio);
    canvas.height = Math.round(height * ratio);
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    draw(canvasPainter(context, readTheme(canvas, theme), ratio));
  }, [width, height, theme, ratio, areFontsReady, draw]);
  return <canvas ref={ref} className={className} style={{ width, height, display: "block" }} aria-hidden="true" />;
});
