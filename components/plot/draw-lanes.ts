import { decimate, envelopeColumns } from "./decimate";
import type { LaneTrace } from "./lanes";
import type { PlacedLane } from "./layout";
import { crisp, type Painter, type Paint } from "./painter";
import { xOf, yOf } from "./scale";
import type { Scene } from "./scene";
import { splitByRuns, type Direction } from "./sign-runs";
import type { ColorName } from "./theme";
import { laneTicks, tickTexts, unitScale } from "./ticks";

const LINE_OF: Record<Direction, ColorName> = { 1: "fwd", [-1]: "rev", 0: "ink3" };
const AREA_OF: Record<Direction, Paint> = { 1: { pattern: "forwardArea" }, [-1]: { pattern: "reverseArea" }, 0: { color: "ink3", opacity: 0.12 } };

/** Area and line of a signed quantity: solid while the motor runs forward, ruled while it runs in reverse, whatever the sign of the quantity. */
export function drawSigned(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const trace = lane.traces[0];
  if (trace === undefined) return;
  painter.clip(scene.layout.x0, lane.y - 3, scene.layout.x1 - scene.layout.x0, lane.height + 6, () => {
    if (scene.view.kind === "exact") drawSignedExact(painter, scene, lane, trace);
    else drawSignedEnvelope(painter, scene, lane, trace);
  });
}

function drawSignedExact(painter: Painter, scene: Scene, lane: PlacedLane, trace: LaneTrace): void {
  const values = scene.view.traces[trace.name]?.max;
  if (values === undefined) return;
  const baseY = yOf(lane.scale, lane.base ?? lane.scale.min);
  const kept = decimate(scene.view.timeS, values, scene.scale);
  for (const piece of splitByRuns(scene.view.timeS, values, kept, scene.runs)) {
    const points: number[] = [];
    piece.timeS.forEach((timeS, index) => points.push(xOf(scene.scale, timeS), yOf(lane.scale, piece.values[index]!)));
    const firstX = points[0]!;
    const lastX = points[points.length - 2]!;
    painter.polygon([firstX, baseY, ...points, lastX, baseY], AREA_OF[piece.direction]);
    painter.polyline(points, { color: LINE_OF[piece.direction], width: 1.5 });
  }
}

function drawSignedEnvelope(painter: Painter, scene: Scene, lane: PlacedLane, trace: LaneTrace): void {
  const data = scene.view.traces[trace.name];
  if (data === undefined) return;
  const baseY = yOf(lane.scale, lane.base ?? lane.scale.min);
  const columns = envelopeColumns(scene.view.timeS, data.min, data.max, scene.view.toS, scene.scale);
  let next = 0;
  for (const run of scene.runs) {
    const upper: number[] = [];
    const lower: number[] = [];
    for (; next < columns.length && (columns[next]!.fromS + columns[next]!.toS) / 2 <= run.toS; next += 1) {
      const column = columns[next]!;
      const [x0, x1] = [xOf(scene.scale, column.fromS), xOf(scene.scale, column.toS)];
      const [top, bottom] = [yOf(lane.scale, column.max), yOf(lane.scale, column.min)];
      upper.push(x0, top, x1, top);
      lower.push(x0, bottom, x1, bottom);
    }
    if (upper.length > 0) drawEnvelopeRun(painter, upper, lower, baseY, run.direction);
  }
}

/** The area reaches from the base to the far bound; the band between both bounds is drawn over it, stronger. */
function drawEnvelopeRun(painter: Painter, upper: number[], lower: number[], baseY: number, direction: Direction): void {
  const outer: number[] = [];
  const inner: number[] = [];
  for (let index = 0; index < upper.length; index += 2) {
    outer.push(upper[index]!, Math.min(upper[index + 1]!, baseY));
    inner.push(lower[index]!, Math.max(lower[index + 1]!, baseY));
  }
  painter.polygon([...outer, ...reversed(inner)], AREA_OF[direction]);
  painter.polygon([...upper, ...reversed(lower)], { color: LINE_OF[direction], opacity: 0.5 });
  painter.polyline([...upper, NaN, NaN, ...lower], { color: LINE_OF[direction], width: 1 });
}

function reversed(points: readonly number[]): number[] {
  const result: number[] = [];
  for (let index = points.length - 2; index >= 0; index -= 2) result.push(points[index]!, points[index + 1]!);
  return result;
}

/** Ink lines, A solid and B dashed. */
export function drawLines(painter: Painter, scene: Scene, lane: PlacedLane): void {
  painter.clip(scene.layout.x0, lane.y - 3, scene.layout.x1 - scene.layout.x0, lane.height + 6, () => {
    for (const trace of [...lane.traces].reverse()) {
      const data = scene.view.traces[trace.name];
      if (data === undefined) continue;
      if (scene.view.kind === "envelope") {
        const columns = envelopeColumns(scene.view.timeS, data.min, data.max, scene.view.toS, scene.scale);
        const upper = columns.flatMap((column) => [xOf(scene.scale, column.fromS), yOf(lane.scale, column.max), xOf(scene.scale, column.toS), yOf(lane.scale, column.max)]);
        const lower = columns.flatMap((column) => [xOf(scene.scale, column.fromS), yOf(lane.scale, column.min), xOf(scene.scale, column.toS), yOf(lane.scale, column.min)]);
        painter.polygon([...upper, ...reversed(lower)], { color: trace.isDashed ? "ink3" : "ink", opacity: trace.isDashed ? 0.3 : 0.45 });
        painter.polyline([...upper, NaN, NaN, ...lower], { color: "ink", width: 1, ...(trace.isDashed ? { dash: [5, 3] } : {}) });
      } else {
        const points = decimate(scene.view.timeS, data.max, scene.scale).flatMap((index) => [xOf(scene.scale, scene.view.timeS[index]!), yOf(lane.scale, data.max[index]!)]);
        painter.polyline(points, { color: "ink", width: trace.isDashed ? 1.4 : 1.7, ...(trace.isDashed ? { dash: [6, 3] } : {}) });
      }
    }
  });
}

/** Zero or midscale line. The reference is dash-dot so that it needs no colour to be told from zero. */
export function drawBaseLine(painter: Painter, scene: Scene, lane: PlacedLane): void {
  if (lane.base === null || lane.base < lane.scale.min || lane.base > lane.scale.max) return;
  const { x0, x1 } = scene.layout;
  const y = crisp(yOf(lane.scale, lane.base));
  if (lane.id === "combined") painter.polyline([x0, y, x1, y], { color: "ref", width: 1.4, dash: [9, 3, 2, 3] });
  else painter.polyline([x0, y, x1, y], { color: "ink", width: 1 });
}

/** Three or four round values on the left; on the combined lane the difference on the right. */
export function drawTicks(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { layout } = scene;
  const { min, max } = lane.scale;
  const { factor, unit } = unitScale(Math.max(Math.abs(min), Math.abs(max)), lane.unit);
  const all = laneTicks(min, max, lane.height);
  const texts = tickTexts(all, factor, lane.kind === "signed" && lane.base === 0);
  const top = all.length - 1;
  const isFree = (tick: number) => lane.id !== "combined" || lane.base === null || Math.abs(yOf(lane.scale, tick) - yOf(lane.scale, lane.base)) > 11;
  all.forEach((tick, index) => {
    if (!isFree(tick)) return;
    const y = yOf(lane.scale, tick);
    painter.text(layout.x0 - 7, y + 3.7, texts[index]! + (index === top ? ` ${unit}` : ""), { size: 10.5, color: "ink3", anchor: "end" });
    painter.polyline([layout.x0 - 4, crisp(y), layout.x0, crisp(y)], { color: "edge", width: 1 });
  });
  if (lane.id !== "combined" || lane.base === null) return;
  const baseY = yOf(lane.scale, lane.base);
  painter.text(layout.x0 - 7, baseY + 3.7, (lane.base / factor).toFixed(2), { size: 10.5, color: "ref", weight: 600, anchor: "end" });
  if (scene.facts.isLegSite && !layout.isCompact) drawDifferenceTicks(painter, scene, lane, lane.base);
}

function drawDifferenceTicks(painter: Painter, scene: Scene, lane: PlacedLane, baseV: number): void {
  const { x1 } = scene.layout;
  const ticks = laneTicks(lane.scale.min - baseV, lane.scale.max - baseV, lane.height);
  const texts = tickTexts(ticks, 1, true);
  ticks.forEach((tick, index) => {
    const y = yOf(lane.scale, baseV + tick);
    painter.polyline([x1, crisp(y), x1 + 4, crisp(y)], { color: "edge", width: 1 });
    painter.text(x1 + 6, y + 3.7, texts[index]!, { size: 10.5, color: "ink3" });
  });
}
