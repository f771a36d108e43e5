import type { Paint, Painter, PatternName, Stroke, TextStyle } from "./painter";
import { PATTERNS, tileLines } from "./patterns";
import type { ThemeColors } from "./theme";

/** The page's faces, as the style sheet names them; a canvas cannot read a CSS variable in `font`. */
export const SANS = '"Archivo Variable", "Commissioner Variable", system-ui, sans-serif';
export const SERIF = '"Newsreader Variable", "Source Serif 4 Variable", Georgia, serif';

/**
 * Paints on a 2D canvas whose context is already scaled to CSS pixels. Patterns are built in device pixels, whole ones, so that rulings
 * stay sharp at any device pixel ratio.
 */
export function canvasPainter(context: CanvasRenderingContext2D, colors: ThemeColors, pixelRatio: number): Painter {
  const tiles = new Map<PatternName, CanvasPattern | string>();
  const styleOf = (paint: Paint): CanvasPattern | string => {
    if ("color" in paint) return colors[paint.color];
    let style = tiles.get(paint.pattern);
    if (style === undefined) {
      style = buildTile(context, paint.pattern, colors, pixelRatio);
      tiles.set(paint.pattern, style);
    }
    return style;
  };
  const fill = (paint: Paint, draw: () => void) => {
    context.globalAlpha = "color" in paint ? (paint.opacity ?? 1) : 1;
    context.fillStyle = styleOf(paint);
    draw();
    context.globalAlpha = 1;
  };
  return {
    rect: (x, y, width, height, paint) => fill(paint, () => context.fillRect(x, y, width, height)),
    polygon: (points, paint) =>
      fill(paint, () => {
        tracePath(context, points);
        context.closePath();
        context.fill();
      }),
    polyline: (points, stroke) => strokeLine(context, points, stroke, colors),
    text: (x, y, content, style) => writeText(context, x, y, content, style, colors),
    clip: (x, y, width, height, draw) => {
      context.save();
      context.beginPath();
      context.rect(x, y, width, height);
      context.clip();
      draw();
      context.restore();
    },
  };
}

function tracePath(context: CanvasRenderingContext2D, points: readonly number[]): void {
  context.beginPath();
  let isDown = false;
  for (let index = 0; index + 1 < points.length; index += 2) {
    const x = points[index]!;
    if (Number.isNaN(x)) isDown = false;
    else if (isDown) context.lineTo(x, points[index + 1]!);
    else {
      context.moveTo(x, points[index + 1]!);
      isDown = true;
    }
  }
}

function strokeLine(context: CanvasRenderingContext2D, points: readonly number[], stroke: Stroke, colors: ThemeColors): void {
  context.globalAlpha = stroke.opacity ?? 1;
  context.strokeStyle = colors[stroke.color];
  context.lineWidth = stroke.width;
  context.lineJoin = "round";
  context.setLineDash([...(stroke.dash ?? [])]);
  tracePath(context, points);
  context.stroke();
  context.setLineDash([]);
  context.globalAlpha = 1;
}

function writeText(context: CanvasRenderingContext2D, x: number, y: number, content: string, style: TextStyle, colors: ThemeColors): void {
  context.font = `${style.weight ?? 400} ${style.size}px ${style.isSerif ? SERIF : SANS}`;
  context.textAlign = style.anchor === "middle" ? "center" : style.anchor === "end" ? "right" : "left";
  if ("letterSpacing" in context) context.letterSpacing = style.isCaps ? "0.8px" : "0px";
  const written = style.isCaps ? content.toUpperCase() : content;
  if (style.halo !== undefined) {
    context.strokeStyle = colors[style.halo];
    context.lineWidth = 4;
    context.lineJoin = "round";
    context.strokeText(written, x, y);
  }
  context.fillStyle = colors[style.color];
  context.fillText(written, x, y);
}

function buildTile(context: CanvasRenderingContext2D, name: PatternName, colors: ThemeColors, pixelRatio: number): CanvasPattern | string {
  const spec = PATTERNS[name];
  const sidePx = Math.max(1, Math.round(spec.tilePx * pixelRatio));
  const tile = context.canvas.ownerDocument.createElement("canvas");
  tile.width = sidePx;
  tile.height = sidePx;
  const pen = tile.getContext("2d");
  if (pen === null) return colors[spec.base?.color ?? spec.line.color];
  if (spec.base !== null) {
    pen.globalAlpha = spec.base.opacity;
    pen.fillStyle = colors[spec.base.color];
    pen.fillRect(0, 0, sidePx, sidePx);
  }
  pen.globalAlpha = spec.line.opacity;
  pen.fillStyle = colors[spec.line.color];
  pen.strokeStyle = colors[spec.line.color];
  const linePx = Math.max(1, Math.round(spec.line.width * pixelRatio));
  if (spec.kind === "level") pen.fillRect(0, 0, sidePx, linePx);
  else if (spec.kind === "upright") pen.fillRect(0, 0, linePx, sidePx);
  else drawOblique(pen, spec.line.width * pixelRatio, sidePx / spec.tilePx, tileLines(spec));
  const pattern = context.createPattern(tile, "repeat");
  if (pattern === null) return colors[spec.base?.color ?? spec.line.color];
  pattern.setTransform(new DOMMatrix([1 / pixelRatio, 0, 0, 1 / pixelRatio, 0, 0]));
  return pattern;
}

function drawOblique(pen: CanvasRenderingContext2D, widthPx: number, scale: number, lines: number[][]): void {
  pen.lineWidth = widthPx;
  pen.beginPath();
  for (const [x1 = 0, y1 = 0, x2 = 0, y2 = 0] of lines) {
    pen.moveTo(x1 * scale, y1 * scale);
    pen.lineTo(x2 * scale, y2 * scale);
  }
  pen.stroke();
}
