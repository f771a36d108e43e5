import { drawBorder, drawTimeAxis, periodsPerSegment } from "./draw-axis";
import { drawGates, drawLaneBands, drawStrip } from "./draw-bands";
import { drawBaseLine, drawLines, drawSigned, drawTicks } from "./draw-lanes";
import { drawIdeal, drawMissed, drawOutputLimits, drawReconstructed, drawSamples } from "./draw-reading";
import type { PlacedLane } from "./layout";
import type { Painter } from "./painter";
import type { Scene } from "./scene";

function drawLane(painter: Painter, scene: Scene, lane: PlacedLane): void {
  if (lane.kind === "strip") return drawStrip(painter, scene, lane);
  if (lane.kind === "gates") return drawGates(painter, scene, lane);
  if (lane.id === "outputs") drawOutputLimits(painter, scene, lane);
  if (lane.isReading) drawMissed(painter, scene, lane);
  if (lane.kind === "signed") drawSigned(painter, scene, lane);
  if (lane.kind === "lines") drawLines(painter, scene, lane);
  if (lane.isReading) drawIdeal(painter, scene, lane);
  drawBaseLine(painter, scene, lane);
  drawTicks(painter, scene, lane);
  if (lane.id === "motor") drawReconstructed(painter, scene, lane);
  if (lane.isReading) drawSamples(painter, scene, lane);
}

/** The whole static picture, the same on canvas and in an exported file. */
export function drawScene(painter: Painter, scene: Scene): void {
  drawLaneBands(painter, scene);
  for (const lane of scene.layout.lanes) drawLane(painter, scene, lane);
  drawBorder(painter, scene);
  drawTimeAxis(painter, scene);
}

export const borderLabel = (scene: Scene): string => {
  const periodPx = ((scene.scale.x1 - scene.scale.x0) * scene.facts.periodS) / (scene.scale.toS - scene.scale.fromS);
  const count = periodsPerSegment(periodPx);
  return count === 1 ? "PWM period" : `${count} periods each`;
};

/** Lane names for an export; on the page they are elements of their own. */
export function drawLaneNames(painter: Painter, scene: Scene): void {
  const { layout } = scene;
  for (const lane of layout.lanes) {
    if (layout.isCompact) {
      if (lane.traces.length > 0) painter.text(layout.x1 - 4, lane.y + 11, lane.label, { size: 10.5, weight: 600, color: "ink2", isCaps: true, anchor: "end", halo: "paper" });
      continue;
    }
    painter.text(0, lane.y + 11, lane.label, { size: 10.5, weight: 600, color: "ink2", isCaps: true });
    if (lane.sublabel !== "") painter.text(0, lane.y + 26, lane.sublabel, { size: 11, color: "ink2" });
    if (lane.isReading) painter.text(0, lane.y + lane.height + 15, "ADC code", { size: 11, color: "ink2" });
    if (lane.traces.length > 1) drawLegend(painter, lane);
  }
  if (layout.isCompact) return;
  painter.text(0, layout.axisY - 4, borderLabel(scene), { size: 10.5, weight: 600, color: "ink2", isCaps: true });
  painter.text(0, layout.axisY + 19, "Time", { size: 10.5, weight: 600, color: "ink2", isCaps: true });
}

function drawLegend(painter: Painter, lane: PlacedLane): void {
  lane.traces.forEach((trace, index) => {
    const y = lane.y + 23 + index * 14;
    painter.polyline([0, y, 20, y], { color: "ink", width: trace.isDashed ? 1.4 : 1.7, ...(trace.isDashed ? { dash: [6, 3] } : {}) });
    painter.text(26, y + 4, trace.label, { size: 11, color: "ink2" });
  });
}
