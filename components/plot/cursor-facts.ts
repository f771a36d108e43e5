import type { Conversion, InstantReading, TraceName, View } from "@/lib/engine/results";
import { bandAt } from "./bands";
import { rowAt } from "./event-rows";
import type { CursorFacts } from "./readout-rows";
import { sampleNumberAt } from "./sample-schedule";
import type { SensingFacts } from "./sensing-facts";
import { valueAt } from "./values";

type CursorInput = {
  view: View;
  overview: View | undefined;
  reading: InstantReading | null;
  samples: readonly Conversion[];
  cursorS: number;
  pinS: number | null;
  sensing: SensingFacts;
};

/** A reading belongs to the cursor when both are the same instant; an older one would show numbers of another place. */
const isOfCursor = (reading: InstantReading | null, cursorS: number, periodS: number): reading is InstantReading =>
  reading !== null && Math.abs(reading.timeS - cursorS) <= periodS * 1e-6;

function exactValue(views: readonly (View | undefined)[], name: TraceName, timeS: number): number | null {
  for (const view of views) {
    if (view === undefined || view.kind !== "exact") continue;
    const value = valueAt(view, name, timeS);
    if (value !== null) return value;
  }
  return null;
}

/** Gathers what is known of the cursor's instant: the engine's reading first, else the exact waveforms; an envelope gives no value of an instant. */
export function cursorFacts({ view, overview, reading, samples, cursorS, pinS, sensing }: CursorInput): CursorFacts {
  const own = isOfCursor(reading, cursorS, sensing.periodS) ? reading : null;
  const views = [view, overview];
  const conversion = samples[rowAt(samples, cursorS, sensing.instantS)];
  const number = sampleNumberAt(sensing.samples, cursorS, sensing.instantS);
  const isNewest = conversion !== undefined && sampleNumberAt(sensing.samples, conversion.timeS, sensing.instantS) === number;
  return {
    valueOf: (name) => {
      if (own !== null && name !== "idealV") return own[name];
      return exactValue(views, name, cursorS);
    },
    reading: own,
    band: bandAt(view.bands, cursorS + 2 * sensing.instantS) ?? bandAt(view.bands, cursorS),
    sample: isNewest ? { conversion, number } : null,
    pinMotorA: pinS === null ? null : exactValue(views, "motorCurrentA", pinS),
  };
}
