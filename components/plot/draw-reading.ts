import type { Conversion } from "@/lib/engine/results";
import { decimate } from "./decimate";
import type { PlacedLane } from "./layout";
import { cross, diamond, type Painter } from "./painter";
import { clamp, xOf, yOf } from "./scale";
import type { Scene } from "./scene";
import { fixed } from "./ticks";
import { valueAt } from "./values";

/** A gap smaller than this between the reading and what it should be is the filter's lag, not something worth red ink. */
const LEAST_GAP_PX = 2;
/** Lozenges closer than this run into one another; then only the samples that miss are marked. */
const LEAST_MARK_GAP_PX = 9;
const LEAST_CODE_GAP_PX = 36;

export const isMiss = (sample: Conversion, limitA: number): boolean => Math.abs(sample.reconstructedA - sample.trueA) > limitA;

/** Red hatch between the reading and what it should be. */
export function drawMissed(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { view, facts } = scene;
  const ideal = view.traces.idealV?.max;
  const actual = view.traces[facts.readingTrace]?.max;
  if (ideal === undefined || actual === undefined || view.kind !== "exact") return;
  const kept = [...new Set([...decimate(view.timeS, ideal, scene.scale), ...decimate(view.timeS, actual, scene.scale)])].sort((a, b) => a - b);
  let upper: number[] = [];
  let lower: number[][] = [];
  const close = () => {
    if (upper.length >= 4) painter.polygon([...upper, ...lower.reverse().flat()], { pattern: "missed" });
    upper = [];
    lower = [];
  };
  painter.clip(scene.layout.x0, lane.y - 3, scene.layout.x1 - scene.layout.x0, lane.height + 6, () => {
    for (const index of kept) {
      const x = xOf(scene.scale, view.timeS[index]!);
      const idealY = yOf(lane.scale, ideal[index]!);
      const actualY = yOf(lane.scale, actual[index]!);
      const isGap = Math.abs(idealY - actualY) >= LEAST_GAP_PX;
      if (isGap || upper.length > 0) {
        upper.push(x, idealY);
        lower.push([x, actualY]);
      }
      if (!isGap) close();
    }
    close();
  });
}

/** Dotted line: what the reading would be if it followed the motor current. */
export function drawIdeal(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { view } = scene;
  const ideal = view.traces.idealV;
  if (ideal === undefined) return;
  const points = decimate(view.timeS, ideal.max, scene.scale).flatMap((index) => [
    xOf(scene.scale, view.timeS[index]!),
    yOf(lane.scale, (ideal.min[index]! + ideal.max[index]!) / 2),
  ]);
  painter.clip(scene.layout.x0, lane.y - 3, scene.layout.x1 - scene.layout.x0, lane.height + 6, () =>
    painter.polyline(points, { color: "ink", width: 1.2, dash: [1.4, 2.6] }),
  );
}

const samplesIn = (scene: Scene): Conversion[] => scene.view.samples.filter((sample) => sample.timeS >= scene.window.fromS && sample.timeS <= scene.window.toS);

const gapPx = (scene: Scene, count: number): number => (scene.layout.x1 - scene.layout.x0) / Math.max(1, count);

/** Marks in the motor lane at the reconstructed current; a dashed stem shows the missing ampere. */
export function drawReconstructed(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const samples = samplesIn(scene);
  const isSparse = gapPx(scene, samples.length) >= LEAST_MARK_GAP_PX;
  for (const sample of samples) {
    const x = xOf(scene.scale, sample.timeS);
    const y = clamp(yOf(lane.scale, sample.reconstructedA), lane.y, lane.y + lane.height);
    if (isMiss(sample, scene.facts.sampleLimitA)) {
      painter.polyline([x, y, x, yOf(lane.scale, sample.trueA)], { color: "fault", width: 1.4, dash: [3, 2] });
      cross(painter, x, y, isSparse ? 4 : 2.5);
    } else if (isSparse) diamond(painter, x, y, 4.2);
  }
}

/** Marks on the reading with a stem down to the row of codes; codes are thinned out where they would touch. */
export function drawSamples(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const samples = samplesIn(scene);
  const gap = gapPx(scene, samples.length);
  const stride = Math.max(1, Math.ceil(LEAST_CODE_GAP_PX / gap));
  const isSparse = gap >= LEAST_MARK_GAP_PX;
  const bottom = lane.y + lane.height;
  samples.forEach((sample, index) => {
    const value = valueAt(scene.view, scene.facts.readingTrace, sample.timeS);
    if (value === null) return;
    const x = xOf(scene.scale, sample.timeS);
    const y = yOf(lane.scale, value);
    const isBad = isMiss(sample, scene.facts.sampleLimitA);
    if (isSparse) painter.polyline([x, bottom, x, y], { color: isBad ? "fault" : "ink", width: 1, dash: [1.2, 2] });
    if (isBad) cross(painter, x, y, isSparse ? 4 : 2.5);
    else if (isSparse) diamond(painter, x, y, 4.2);
    if (scene.layout.isCompact || index % stride !== 0) return;
    painter.polyline([x, bottom, x, bottom + 4], { color: "ink", width: 1 });
    painter.text(x, bottom + 15, fixed(sample.code, 0), { size: 10.5, color: isBad ? "fault" : "ink3", weight: isBad ? 700 : 400, anchor: "middle" });
  });
}

/** Hatched margin where the amplifier's output stage cannot go. */
export function drawOutputLimits(painter: Painter, scene: Scene, lane: PlacedLane): void {
  const { x0, x1 } = scene.layout;
  for (const [limitV, isFloor] of [
    [scene.facts.outputMinV, true],
    [scene.facts.outputMaxV, false],
  ] as const) {
    if (limitV < lane.scale.min || limitV > lane.scale.max) continue;
    const y = yOf(lane.scale, limitV);
    const height = isFloor ? lane.y + lane.height - y : y - lane.y;
    if (height < 1) continue;
    painter.rect(x0, isFloor ? y : lane.y, x1 - x0, height, { pattern: "clip" });
  }
}
