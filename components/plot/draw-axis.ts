import { crisp, type Painter } from "./painter";
import { xOf } from "./scale";
import type { Scene } from "./scene";
import { decimalsOf, fixed, niceTicks, roundStep, timeFormat } from "./ticks";

const LEAST_SEGMENT_PX = 9;

/** How many PWM periods one segment of the border stands for: 1, 2, 5, 10, ... so that a segment is at least 9 px wide. */
export function periodsPerSegment(periodPx: number): number {
  if (periodPx >= LEAST_SEGMENT_PX) return 1;
  return Math.max(1, Math.round(roundStep(LEAST_SEGMENT_PX / periodPx, 1)));
}

export type Segment = { fromS: number; toS: number; isInked: boolean; label: string };

/** Segments of the graduated border inside the window; a label is the number of the (first) period, counted from 1. */
export function borderSegments(scene: Scene): Segment[] {
  const { scale, facts } = scene;
  const periodPx = ((scale.x1 - scale.x0) * facts.periodS) / (scale.toS - scale.fromS);
  const count = periodsPerSegment(periodPx);
  const lengthS = count * facts.periodS;
  const segments: Segment[] = [];
  for (let index = Math.max(0, Math.floor(scale.fromS / lengthS + 1e-9)); index * lengthS < scale.toS - lengthS * 1e-9; index += 1) {
    segments.push({
      fromS: Math.max(scale.fromS, index * lengthS),
      toS: Math.min(scale.toS, (index + 1) * lengthS, facts.durationS),
      isInked: index % 2 === 0,
      label: String(index * count + 1),
    });
  }
  return segments;
}

export function drawBorder(painter: Painter, scene: Scene): void {
  const { layout, scale } = scene;
  const y = layout.borderY;
  const height = layout.axisY - y;
  const segments = borderSegments(scene);
  const room = Math.max(0, ...segments.map((segment) => segment.label.length)) * 6.5 + 8;
  for (const segment of segments) {
    const x = xOf(scale, segment.fromS);
    const width = xOf(scale, segment.toS) - x;
    painter.rect(x, y + 2, width, height - 4, { color: segment.isInked ? "ink" : "sheet" });
    if (!layout.isCompact && width >= room) {
      painter.text(x + width / 2, y + height - 4.2, segment.label, { size: 10.5, weight: 600, color: segment.isInked ? "onInk" : "ink", anchor: "middle" });
    }
  }
  const [top, bottom] = [crisp(y + 0.5), crisp(y + height - 0.5)];
  painter.polyline([layout.x0, top, layout.x1, top, NaN, NaN, layout.x0, bottom, layout.x1, bottom], { color: "ink", width: 1 });
  painter.polyline([layout.x0, top, layout.x0, bottom, NaN, NaN, layout.x1, top, layout.x1, bottom], { color: "ink", width: 1 });
}

export function drawTimeAxis(painter: Painter, scene: Scene): void {
  const { layout, scale } = scene;
  const plotPx = layout.x1 - layout.x0;
  const format = timeFormat(scene.window, plotPx);
  const from = scale.fromS / format.factor;
  const to = scale.toS / format.factor;
  const tickCount = Math.max(2, Math.floor(plotPx / (layout.isCompact ? 90 : 105)));
  const ticks = niceTicks(from, to, tickCount);
  // of the span, not of two neighbours: a narrow plot may hold a single tick
  const step = roundStep(to - from, tickCount);
  const y = layout.axisY;
  const minorStep = step / 5;
  const marks: number[] = [];
  for (let index = Math.ceil(from / minorStep - 1e-9); index * minorStep <= to + minorStep * 1e-9; index += 1) {
    const x = crisp(xOf(scale, index * minorStep * format.factor));
    marks.push(x, y, x, y + 3, NaN, NaN);
  }
  painter.polyline(marks, { color: "ink", width: 1, opacity: 0.6 });
  ticks.forEach((tick, index) => {
    const x = xOf(scale, tick * format.factor);
    painter.polyline([crisp(x), y, crisp(x), y + 6], { color: "ink", width: 1 });
    const text = fixed(tick, decimalsOf(step)) + (index === ticks.length - 1 ? ` ${format.unit}` : "");
    painter.text(x, y + 19, text, { size: 11, color: "ink2", anchor: layout.isCompact && index === ticks.length - 1 && layout.x1 - x < 24 ? "end" : "middle" });
  });
}
