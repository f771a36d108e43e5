import type { TraceName, View } from "@/lib/engine/results";
import { lowerBound, upperBound } from "./decimate";
import type { PlotWindow } from "./scale";

/** Value of a waveform at an instant, after any event there; `null` outside the view or without that waveform. Envelopes give the middle of the column. */
export function valueAt(view: View, name: TraceName, timeS: number): number | null {
  const trace = view.traces[name];
  const count = view.timeS.length;
  if (trace === undefined || count === 0 || timeS < view.fromS || timeS > view.toS) return null;
  const index = Math.max(0, upperBound(view.timeS, timeS) - 1);
  if (view.kind === "envelope") return (trace.min[index]! + trace.max[index]!) / 2;
  const here = view.timeS[index]!;
  if (index + 1 >= count || here >= timeS) return trace.max[index]!;
  const share = (timeS - here) / (view.timeS[index + 1]! - here);
  return trace.max[index]! + share * (trace.max[index + 1]! - trace.max[index]!);
}

export type Extent = { min: number; max: number };

/** Smallest and largest value of a waveform inside a window (interpolated at its edges), or of the whole view. */
export function extentOf(view: View, name: TraceName, range?: PlotWindow): Extent | null {
  const trace = view.traces[name];
  if (trace === undefined || view.timeS.length === 0) return null;
  const start = range === undefined ? 0 : lowerBound(view.timeS, range.fromS);
  const end = range === undefined ? view.timeS.length : upperBound(view.timeS, range.toS);
  let min = Infinity;
  let max = -Infinity;
  for (let index = start; index < end; index += 1) {
    min = Math.min(min, trace.min[index]!);
    max = Math.max(max, trace.max[index]!);
  }
  for (const edgeS of range === undefined ? [] : [range.fromS, range.toS]) {
    const value = valueAt(view, name, edgeS);
    if (value !== null) [min, max] = [Math.min(min, value), Math.max(max, value)];
  }
  return max >= min ? { min, max } : null;
}

export type SpanFigures = { meanValue: number; rmsValue: number; min: number; max: number; change: number; isEstimate: boolean };

/**
 * Mean and root mean square between two instants. Exact for the straight lines between break points (Simpson's rule on each, which is
 * exact for the square of a line); from an envelope the middle of each column is taken and `isEstimate` says so.
 */
export function spanFigures(view: View, name: TraceName, fromS: number, toS: number): SpanFigures | null {
  const first = valueAt(view, name, fromS);
  const last = valueAt(view, name, toS);
  const extent = extentOf(view, name, { fromS, toS });
  const trace = view.traces[name];
  if (first === null || last === null || extent === null || trace === undefined || !(toS > fromS)) return null;
  let sum = 0;
  let squares = 0;
  let timeS = fromS;
  let value = first;
  const add = (nextS: number, before: number, after: number) => {
    const middle = (value + before) / 2;
    sum += middle * (nextS - timeS);
    squares += ((value * value + 4 * middle * middle + before * before) / 6) * (nextS - timeS);
    timeS = nextS;
    value = after;
  };
  for (let index = upperBound(view.timeS, fromS); index < view.timeS.length && view.timeS[index]! < toS; index += 1) {
    const middle = (trace.min[index]! + trace.max[index]!) / 2;
    add(view.timeS[index]!, view.kind === "envelope" ? value : middle, middle);
  }
  add(toS, view.kind === "envelope" ? value : endValue(view, trace.max, toS, last), last);
  const lengthS = toS - fromS;
  return { meanValue: sum / lengthS, rmsValue: Math.sqrt(Math.max(0, squares / lengthS)), ...extent, change: last - first, isEstimate: view.kind === "envelope" };
}

/** The value just before `timeS`: what the last piece of an integral runs to when a jump sits exactly on its end. */
function endValue(view: View, values: Float64Array, timeS: number, after: number): number {
  const index = lowerBound(view.timeS, timeS);
  return view.timeS[index] === timeS ? values[index]! : after;
}
