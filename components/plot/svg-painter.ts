import { SANS, SERIF } from "./canvas-painter";
import type { Paint, Painter, PatternName, Stroke, TextStyle } from "./painter";
import { PATTERNS, tileLines } from "./patterns";
import type { ThemeColors } from "./theme";

const cut = (value: number): string => String(Number(value.toFixed(2)));
const escapeText = (content: string): string => content.replace(/&/g, "&amp;").replace(/</g, "&lt;").replace(/>/g, "&gt;").replace(/"/g, "&quot;");

/** Collects SVG markup. `prefix` makes pattern and clip ids unique among drawings on one page. Only patterns in use are defined. */
export function svgPainter(colors: ThemeColors, prefix: string): Painter & { markup(): { defs: string; body: string } } {
  const body: string[] = [];
  const clips: string[] = [];
  const used = new Set<PatternName>();
  const fillOf = (paint: Paint): string => {
    if ("color" in paint) return `fill="${colors[paint.color]}"` + (paint.opacity === undefined ? "" : ` fill-opacity="${paint.opacity}"`);
    used.add(paint.pattern);
    return `fill="url(#${prefix}-${paint.pattern})"`;
  };
  return {
    rect: (x, y, width, height, paint) => {
      body.push(`<rect x="${cut(x)}" y="${cut(y)}" width="${cut(width)}" height="${cut(height)}" ${fillOf(paint)}/>`);
    },
    polygon: (points, paint) => {
      body.push(`<path d="${pathOf(points)}Z" ${fillOf(paint)}/>`);
    },
    polyline: (points, stroke) => {
      body.push(`<path d="${pathOf(points)}" fill="none" ${strokeOf(stroke, colors)}/>`);
    },
    text: (x, y, content, style) => {
      body.push(textMarkup(x, y, content, style, colors));
    },
    clip: (x, y, width, height, draw) => {
      const id = `${prefix}-clip${clips.length}`;
      clips.push(`<clipPath id="${id}"><rect x="${cut(x)}" y="${cut(y)}" width="${cut(width)}" height="${cut(height)}"/></clipPath>`);
      body.push(`<g clip-path="url(#${id})">`);
      draw();
      body.push("</g>");
    },
    markup: () => ({ defs: [...used].map((name) => patternMarkup(name, colors, prefix)).join("") + clips.join(""), body: body.join("\n") }),
  };
}

function pathOf(points: readonly number[]): string {
  const parts: string[] = [];
  let isDown = false;
  for (let index = 0; index + 1 < points.length; index += 2) {
    const x = points[index]!;
    if (Number.isNaN(x)) {
      isDown = false;
      continue;
    }
    parts.push(`${isDown ? "L" : "M"}${cut(x)} ${cut(points[index + 1]!)}`);
    isDown = true;
  }
  return parts.join("");
}

function strokeOf(stroke: Stroke, colors: ThemeColors): string {
  const dash = stroke.dash === undefined ? "" : ` stroke-dasharray="${stroke.dash.join(" ")}"`;
  const opacity = stroke.opacity === undefined ? "" : ` stroke-opacity="${stroke.opacity}"`;
  return `stroke="${colors[stroke.color]}" stroke-width="${stroke.width}" stroke-linejoin="round"${dash}${opacity}`;
}

function textMarkup(x: number, y: number, content: string, style: TextStyle, colors: ThemeColors): string {
  const written = escapeText(style.isCaps ? content.toUpperCase() : content);
  const family = escapeText(style.isSerif ? SERIF : SANS);
  const halo = style.halo === undefined ? "" : ` paint-order="stroke" stroke="${colors[style.halo]}" stroke-width="4" stroke-linejoin="round"`;
  const spacing = style.isCaps ? ' letter-spacing="0.8"' : "";
  return (
    `<text x="${cut(x)}" y="${cut(y)}" font-family="${family}" font-size="${style.size}" font-weight="${style.weight ?? 400}" ` +
    `fill="${colors[style.color]}" text-anchor="${style.anchor ?? "start"}"${spacing}${halo}>${written}</text>`
  );
}

function patternMarkup(name: PatternName, colors: ThemeColors, prefix: string): string {
  const spec = PATTERNS[name];
  const n = spec.tilePx;
  const base = spec.base === null ? "" : `<rect width="${n}" height="${n}" fill="${colors[spec.base.color]}" fill-opacity="${spec.base.opacity}"/>`;
  const d = tileLines(spec)
    .map(([x1, y1, x2, y2]) => `M${x1} ${y1}L${x2} ${y2}`)
    .join("");
  const lines = d === "" ? "" : `<path d="${d}" stroke="${colors[spec.line.color]}" stroke-width="${spec.line.width}" stroke-opacity="${spec.line.opacity}"/>`;
  return `<pattern id="${prefix}-${name}" width="${n}" height="${n}" patternUnits="userSpaceOnUse">${base}${lines}</pattern>`;
}
