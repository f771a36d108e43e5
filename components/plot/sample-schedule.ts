import type { Conversion } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";

/**
 * When conversions are reported. A run keeps the conversions of its window only, but they come at even spacing, so any of them can be
 * stepped to and numbered: conversion n (from 1) of a run is at `firstS + (n - 1) * spacingS`.
 */
export type SampleSchedule = { firstS: number; spacingS: number };

/** `perPeriod` conversions evenly through the period from phase p on, wrapped into it; blocks of `average` are reported at their last. */
export function sampleSchedule(document: ScenarioDocument): SampleSchedule {
  const { phase, perPeriod, average } = document.sensing.converter;
  const conversionS = 1 / (document.pwm.frequencyHz * perPeriod);
  const offset = phase * perPeriod;
  return { firstS: (offset - Math.floor(offset) + average - 1) * conversionS, spacingS: conversionS * average };
}

/** Number of the last conversion not after `timeS`; 0 before the first. `slackS` is what counts as the same instant. */
export const sampleNumberAt = ({ firstS, spacingS }: SampleSchedule, timeS: number, slackS: number): number => Math.max(0, Math.floor((timeS + slackS - firstS) / spacingS) + 1);

/** The next conversion in a direction, or `null` beyond the run. */
export function nextSample(schedule: SampleSchedule, timeS: number, direction: 1 | -1, slackS: number, durationS: number): number | null {
  const { firstS, spacingS } = schedule;
  const number = direction === 1 ? sampleNumberAt(schedule, timeS, slackS) + 1 : sampleNumberAt(schedule, timeS - 2 * slackS, slackS);
  const nextS = firstS + (number - 1) * spacingS;
  return number < 1 || nextS > durationS ? null : nextS;
}

/** The conversions that are known, of the run's window and of the view, in time order and each once. */
export function knownSamples(ofRun: readonly Conversion[], ofView: readonly Conversion[], slackS: number): Conversion[] {
  const sorted = [...ofRun, ...ofView].sort((a, b) => a.timeS - b.timeS);
  return sorted.filter((sample, index) => index === 0 || sample.timeS - sorted[index - 1]!.timeS > slackS);
}
