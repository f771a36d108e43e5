import { nextSample, type SampleSchedule } from "./sample-schedule";
import { clamp } from "./scale";

export type StepKind = "event" | "period" | "milestone" | "sample";
export const STEP_WORDS: Record<StepKind, string> = { event: "Event", period: "Period", milestone: "Milestone", sample: "Sample" };

/** Instants that each kind of step stops at, ascending; samples by their schedule. A period step keeps its place within the period. */
export type StepStops = { events: readonly number[]; milestones: readonly number[]; samples: SampleSchedule; periodS: number; instantS: number; durationS: number };

/** Nearest stop beyond `timeS` in the given direction; a stop within a billionth of a period of it counts as the present one. */
export function nextStop(stops: readonly number[], timeS: number, direction: 1 | -1, slackS: number): number | null {
  let low = 0;
  let high = stops.length;
  const limit = timeS + direction * slackS;
  while (low < high) {
    const middle = (low + high) >>> 1;
    const isBefore = direction === 1 ? stops[middle]! <= limit : stops[middle]! < limit;
    if (isBefore) low = middle + 1;
    else high = middle;
  }
  return (direction === 1 ? stops[low] : stops[low - 1]) ?? null;
}

/** Where a step leads; the present instant if there is nothing further that way. */
export function stepFrom(timeS: number, kind: StepKind, direction: 1 | -1, stops: StepStops): number {
  if (kind === "period") return clamp(timeS + direction * stops.periodS, 0, stops.durationS);
  if (kind === "sample") return nextSample(stops.samples, timeS, direction, stops.instantS, stops.durationS) ?? timeS;
  return nextStop(kind === "event" ? stops.events : stops.milestones, timeS, direction, stops.instantS) ?? timeS;
}
