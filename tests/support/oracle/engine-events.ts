import type { Simulation } from "@/lib/engine/results";

/** Times of one kind of event of a result, each instant once (a diode end and its zero may be told for both legs). */
export const timesOf = (result: Simulation, kind: string): number[] => {
  const times: number[] = [];
  for (const event of result.events) if (event.kind === kind && event.timeS - (times.at(-1) ?? -Infinity) > 1e-13) times.push(event.timeS);
  return times;
};

/**
 * Intervals in which at least one output is clipped, from the starts and ends of all outputs.
 * An interval that is still open at the end of the run ends with it.
 */
export const clipIntervalsOf = (result: Simulation): [number, number][] => {
  const intervals: [number, number][] = [];
  let depth = 0;
  let sinceS = 0;
  for (const event of result.events) {
    if (event.kind === "clipStarts") {
      if (depth === 0) sinceS = event.timeS;
      depth += 1;
    }
    if (event.kind === "clipEnds") {
      depth -= 1;
      if (depth === 0) intervals.push([sinceS, event.timeS]);
    }
  }
  if (depth > 0) intervals.push([sinceS, result.durationS]);
  return intervals;
};
