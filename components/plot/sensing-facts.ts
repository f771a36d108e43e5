import type { TraceName } from "@/lib/engine/results";
import { sampleLimitA } from "@/lib/engine/sensing/notices";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { sampleSchedule, type SampleSchedule } from "./sample-schedule";

/** What the drawings need to know of a document's drive and sensing, worked out once. */
export type SensingFacts = {
  site: ScenarioDocument["sensing"]["site"];
  isLegSite: boolean;
  /** legBottom: the pair is crossed, so that forward is always up. */
  differenceLabel: string;
  arrangement: ScenarioDocument["sensing"]["amplifier"]["arrangement"];
  shuntOhm: number;
  /** "Motor", or "Load" where there is none. */
  loadName: string;
  gainRatio: number;
  referenceV: number | null;
  outputMinV: number;
  outputMaxV: number;
  /** Motor current at which the reading leaves its span, in the direction with less room. */
  fullScaleA: number;
  /** A sample farther than this from the true current counts as one that misses; the engine's notices use the same limit. */
  sampleLimitA: number;
  /** Trace that the converter reads, and the lane that shows it. */
  readingTrace: TraceName;
  samples: SampleSchedule;
  /** Two instants closer than this are one. */
  instantS: number;
  periodS: number;
  durationS: number;
};

/** A billionth of a PWM period: far below any dead time, above the rounding of times. */
const SAME_INSTANT_SHARE = 1e-9;

type Sensing = ScenarioDocument["sensing"];

/** Two single-ended outputs of a pair of legs are read together: their codes are subtracted, so the reading is their difference. */
function readingTraceOf({ site, amplifier }: Sensing): TraceName {
  if (amplifier.arrangement === "combinedMidscale" || amplifier.arrangement === "bipolarMidscale") return "combinedV";
  return site === "legTop" || site === "legBottom" ? "differenceV" : "outAV";
}

export const gainOf = (gain: Sensing["amplifier"]["gain"]): number => ("fixed" in gain ? gain.fixed : gain.outOhm / gain.inOhm);

export function readSensing(document: ScenarioDocument): SensingFacts {
  const { sensing } = document;
  const { amplifier, converter } = sensing;
  const isMidscale = sensing.amplifier.arrangement === "combinedMidscale" || sensing.amplifier.arrangement === "bipolarMidscale";
  const referenceV = sensing.reference?.voltageV ?? null;
  const voltPerAmpere = gainOf(amplifier.gain) * sensing.shunt.resistanceOhm;
  const topV = Math.min(amplifier.outputMaxV, converter.fullScaleV);
  const spanV = isMidscale && referenceV !== null ? Math.min(topV - referenceV, referenceV - amplifier.outputMinV) : topV - amplifier.outputMinV;
  const fullScaleA = spanV / voltPerAmpere;
  return {
    site: sensing.site,
    isLegSite: sensing.site === "legTop" || sensing.site === "legBottom",
    differenceLabel: sensing.site === "legBottom" ? "B − A" : "A − B",
    arrangement: sensing.amplifier.arrangement,
    loadName: document.load.kind === "motor" ? "Motor" : "Load",
    shuntOhm: sensing.shunt.resistanceOhm,
    gainRatio: gainOf(amplifier.gain),
    referenceV,
    outputMinV: amplifier.outputMinV,
    outputMaxV: amplifier.outputMaxV,
    fullScaleA,
    sampleLimitA: sampleLimitA(document),
    samples: sampleSchedule(document),
    instantS: SAME_INSTANT_SHARE / document.pwm.frequencyHz,
    readingTrace: readingTraceOf(sensing),
    periodS: 1 / document.pwm.frequencyHz,
    durationS: document.run.durationS,
  };
}
