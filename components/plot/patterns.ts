import type { PatternName } from "./painter";
import type { ColorName } from "./theme";

/**
 * Patterns as data, for the canvas and for SVG alike. A tile is a square of whole pixels and its lines join at the seams. Line pitches are
 * 4 px and more, with lines of one pixel: closer rulings flicker between even and odd pixel rows when the plot is moved.
 */
export type PatternSpec = {
  tilePx: number;
  base: { color: ColorName; opacity: number } | null;
  line: { color: ColorName; width: number; opacity: number };
  kind: "level" | "rising" | "falling" | "crossed" | "upright" | "none";
};

export const PATTERNS: Record<PatternName, PatternSpec> = {
  forwardArea: { tilePx: 4, base: { color: "fwdFill", opacity: 0.72 }, line: { color: "fwd", width: 0, opacity: 0 }, kind: "none" },
  reverseArea: { tilePx: 4, base: { color: "revFill", opacity: 0.42 }, line: { color: "rev", width: 1, opacity: 0.62 }, kind: "level" },
  driveForward: { tilePx: 6, base: { color: "fwdTint", opacity: 1 }, line: { color: "fwd", width: 1.3, opacity: 0.7 }, kind: "rising" },
  driveReverse: { tilePx: 6, base: { color: "revTint", opacity: 1 }, line: { color: "rev", width: 1.3, opacity: 0.7 }, kind: "falling" },
  returnToSupply: { tilePx: 6, base: null, line: { color: "ink", width: 0.9, opacity: 0.62 }, kind: "crossed" },
  recirculateHigh: { tilePx: 4, base: null, line: { color: "ink", width: 1, opacity: 0.3 }, kind: "upright" },
  coasting: { tilePx: 5, base: null, line: { color: "ink", width: 1, opacity: 0.3 }, kind: "level" },
  missed: { tilePx: 5, base: { color: "faultTint", opacity: 0.75 }, line: { color: "fault", width: 1, opacity: 0.75 }, kind: "rising" },
  clip: { tilePx: 5, base: null, line: { color: "ink", width: 0.9, opacity: 0.4 }, kind: "falling" },
};

/** Lines of a tile as x1, y1, x2, y2; oblique ones carry on over the corners so that no seam shows. */
export function tileLines(spec: PatternSpec): number[][] {
  const n = spec.tilePx;
  const rising = [
    [-1, n + 1, n + 1, -1],
    [-1, 1, 1, -1],
    [n - 1, n + 1, n + 1, n - 1],
  ];
  const falling = [
    [-1, -1, n + 1, n + 1],
    [-1, n - 1, 1, n + 1],
    [n - 1, -1, n + 1, 1],
  ];
  if (spec.kind === "level") return [[0, 0.5, n, 0.5]];
  if (spec.kind === "upright") return [[0.5, 0, 0.5, n]];
  if (spec.kind === "rising") return rising;
  if (spec.kind === "falling") return falling;
  return spec.kind === "crossed" ? [...rising, ...falling] : [];
}
