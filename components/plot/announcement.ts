import type { CursorFacts } from "./readout-rows";
import type { SensingFacts } from "./sensing-facts";
import { fixed, formatTime, type TimeFormat } from "./ticks";

/** "225.00 µs, sample 5, motor +3.84 A, combined 1.650 V, misses 3.84 A": what is said when the cursor comes to rest. */
export function announcement(cursorS: number, facts: CursorFacts, sensing: SensingFacts, format: TimeFormat): string {
  const parts = [formatTime(cursorS, format)];
  const motorA = facts.valueOf("motorCurrentA");
  const readingV = facts.valueOf(sensing.readingTrace);
  const sample = facts.sample;
  const isOnSample = sample !== null && Math.abs(sample.conversion.timeS - cursorS) <= sensing.periodS * 1e-6;
  if (isOnSample) parts.push(`sample ${sample.number}`);
  if (motorA !== null) parts.push(`${sensing.loadName.toLowerCase()} ${fixed(motorA, 2, true)} A`);
  if (readingV !== null) parts.push(`${READING_WORD[sensing.readingTrace] ?? "output"} ${fixed(readingV, 3)} V`);
  if (isOnSample) {
    const errorA = sample.conversion.reconstructedA - sample.conversion.trueA;
    if (Math.abs(errorA) > sensing.sampleLimitA) parts.push(`misses ${fixed(Math.abs(errorA), 2)} A`);
  }
  return parts.join(", ");
}

const READING_WORD: Record<string, string> = { combinedV: "combined", differenceV: "difference", outAV: "output A" };
