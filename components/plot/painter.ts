import type { ColorName } from "./theme";

/** What a drawing is painted on: a canvas for the screen, SVG for export. One walk over the data serves both. */
export type PatternName =
  | "forwardArea"
  | "reverseArea"
  | "driveForward"
  | "driveReverse"
  | "returnToSupply"
  | "recirculateHigh"
  | "coasting"
  | "missed"
  | "clip";

export type Paint = { color: ColorName; opacity?: number } | { pattern: PatternName };
export type Stroke = { color: ColorName; width: number; dash?: readonly number[]; opacity?: number };
export type TextStyle = {
  size: number;
  color: ColorName;
  weight?: number;
  anchor?: "start" | "middle" | "end";
  isCaps?: boolean;
  isSerif?: boolean;
  /** Colour of a rim that keeps text readable over lines. */
  halo?: ColorName;
};

export interface Painter {
  rect(x: number, y: number, width: number, height: number, paint: Paint): void;
  /** Closed area; `points` are x, y in turn. */
  polygon(points: readonly number[], paint: Paint): void;
  /** Open line; a NaN pair lifts the pen. */
  polyline(points: readonly number[], stroke: Stroke): void;
  text(x: number, y: number, content: string, style: TextStyle): void;
  clip(x: number, y: number, width: number, height: number, draw: () => void): void;
}

/** Half-pixel position, so that a one-pixel line covers one row of pixels. */
export const crisp = (position: number): number => Math.round(position - 0.5) + 0.5;

export function diamond(painter: Painter, x: number, y: number, radius: number): void {
  const outline = [x, y - radius, x + radius, y, x, y + radius, x - radius, y];
  painter.polygon(outline, { color: "sheet" });
  painter.polyline([...outline, x, y - radius, x + radius, y], { color: "ink", width: 1.3 });
}

export function cross(painter: Painter, x: number, y: number, radius: number): void {
  painter.polyline([x - radius, y - radius, x + radius, y + radius, NaN, NaN, x + radius, y - radius, x - radius, y + radius], { color: "fault", width: 2 });
}
