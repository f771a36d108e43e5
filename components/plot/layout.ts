import type { View } from "@/lib/engine/results";
import type { Lane, LaneId } from "./lanes";
import { clamp, type PlotWindow, type TimeScale, type ValueScale } from "./scale";
import type { SensingFacts } from "./sensing-facts";
import { paddedDomain, stickyDomain, type Domain } from "./ticks";
import { extentOf, type Extent } from "./values";

/** Pixels of the frame. The gutter holds lane names and ticks, the reading column the values at the cursor. */
export const FRAME = {
  wide: { gutter: 120, readout: 150, top: 21, gap: 8, border: 16, axis: 26, codes: 18 },
  compact: { gutter: 40, readout: 10, top: 18, gap: 10, border: 14, axis: 28, codes: 0 },
};
const LEAST_STRETCH = 0.58;
const MOST_STRETCH = 2.2;

export type PlacedLane = Lane & { y: number; height: number; scale: ValueScale };
export type PlotLayout = {
  width: number;
  height: number;
  isCompact: boolean;
  x0: number;
  x1: number;
  lanesTop: number;
  lanesBottom: number;
  borderY: number;
  axisY: number;
  lanes: PlacedLane[];
};

const isStretched = (lane: Lane): boolean => lane.kind === "signed" || lane.kind === "lines";
const isWithCodes = (lane: Lane): boolean => lane.isReading;

/** Places lanes one under another; plot lanes stretch from 0.58 to 2.2 of their nominal height to fill `wantedHeight`, strips do not. */
export function layoutLanes(lanes: readonly Lane[], domains: Map<LaneId, Domain>, width: number, wantedHeight: number, isCompact: boolean): PlotLayout {
  const frame = isCompact ? FRAME.compact : FRAME.wide;
  const shown = isCompact ? lanes.map((lane) => ({ ...lane, nominalPx: isStretched(lane) ? 84 : lane.nominalPx })) : lanes;
  const codes = shown.some(isWithCodes) ? frame.codes : 0;
  const rigid = shown.reduce((sum, lane) => sum + frame.gap + (isStretched(lane) ? 0 : lane.nominalPx), frame.top + frame.border + frame.axis + codes);
  const elastic = shown.reduce((sum, lane) => sum + (isStretched(lane) ? lane.nominalPx : 0), 0);
  const stretch = elastic === 0 ? 1 : clamp((wantedHeight - rigid) / elastic, LEAST_STRETCH, MOST_STRETCH);
  const placed: PlacedLane[] = [];
  let y = frame.top;
  for (const lane of shown) {
    const height = isStretched(lane) ? Math.round(lane.nominalPx * stretch) : lane.nominalPx;
    const domain = domains.get(lane.id) ?? { min: 0, max: 1 };
    placed.push({ ...lane, y, height, scale: { ...domain, y0: y, y1: y + height } });
    y += height + frame.gap + (isWithCodes(lane) ? codes : 0);
  }
  return {
    width,
    height: y + frame.border + frame.axis,
    isCompact,
    x0: frame.gutter,
    x1: Math.max(frame.gutter + 40, width - frame.readout),
    lanesTop: frame.top,
    lanesBottom: y,
    borderY: y,
    axisY: y + frame.border,
    lanes: placed,
  };
}

export const timeScaleOf = (layout: PlotLayout, range: PlotWindow): TimeScale => ({ ...range, x0: layout.x0, x1: layout.x1 });

const join = (one: Extent | null, other: Extent | null): Extent | null =>
  one === null ? other : other === null ? one : { min: Math.min(one.min, other.min), max: Math.max(one.max, other.max) };

/** Smallest spans worth a scale of their own, in the lane's unit and as a share of the value: below them a lane would magnify ripple into a wall. */
const LEAST_SPAN = 1e-3;
const LEAST_SPAN_SHARE = 0.05;

/**
 * Value range of each lane. Taken over the whole run where the overview knows it, so that zooming in time never changes the value
 * scale; `previous` and `isHeld` keep it from jumping while an input is dragged.
 */
export function laneDomains(
  lanes: readonly Lane[],
  views: readonly (View | undefined)[],
  facts: SensingFacts,
  previous: Map<LaneId, Domain> | undefined,
  isHeld: boolean,
): Map<LaneId, Domain> {
  const domains = new Map<LaneId, Domain>();
  for (const lane of lanes) {
    if (!isStretched(lane)) continue;
    let extent: Extent | null = null;
    const names = lane.traces.map((trace) => trace.name);
    if (lane.isReading) names.push("idealV");
    for (const view of views) for (const name of names) if (view !== undefined) extent = join(extent, extentOf(view, name));
    const isOutput = lane.id === "outputs" && facts.readingTrace !== "outAV";
    if (isOutput) extent = join(extent, { min: 0, max: facts.outputMaxV });
    const largest = Math.max(Math.abs(extent?.min ?? 0), Math.abs(extent?.max ?? 0));
    const wanted = paddedDomain(extent?.min ?? 0, extent?.max ?? 0, lane.base, Math.max(LEAST_SPAN, largest * LEAST_SPAN_SHARE));
    domains.set(lane.id, stickyDomain(previous?.get(lane.id), wanted, isHeld));
  }
  return domains;
}
