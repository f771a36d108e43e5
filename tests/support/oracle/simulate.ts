import type { Conversion, Figures, InstantReading, LegState } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { isLegSite, readChains } from "./channels";
import { createConverter } from "./converter";
import { createWindow, windowOf } from "./figures";
import { runDocument, type Observer, type OracleEvent, type Run } from "./run";
import type { Condition } from "./stage";
import { isClipped, snapshot } from "./system";

/** The reference: slow, plain, made from model.md and decisions.md alone. Does not share a line with the engine. */
export type OracleResult = {
  at: InstantReading[];
  window: { fromS: number; toS: number };
  figures: Omit<Figures, "commutationRippleHz">;
  samples: Conversion[];
  events: OracleEvent[];
  clipIntervals: [number, number][];
  /** Largest magnitudes of the whole run. */
  fullScale: { currentA: number; speedRadPerS: number; bridgeA: number };
};

const WORDS: Record<Condition, LegState> = {
  highChannel: "high channel",
  lowChannel: "low channel",
  highDiode: "high diode",
  lowDiode: "low diode",
  open: "open",
  through: "high channel",
};

export const readInstant = (run: Run, timeS: number): InstantReading => {
  const { sensing, legs } = run.mode;
  const { electric: e, front, out, difference } = snapshot(run.mode, run.timeS, run.y);
  const hasLegs = isLegSite(sensing.site);
  const isSingle = !hasLegs && !sensing.isMidscale;
  return {
    timeS,
    dutyCommand: run.duty,
    motorCurrentA: e.currentA,
    speedRadPerS: run.y[1] ?? 0,
    busV: e.busV,
    terminalAV: e.terminalV[0],
    terminalBV: e.terminalV[1],
    topAA: e.topA[0],
    topBA: e.topA[1],
    bottomAA: e.bottomA[0],
    bottomBA: e.bottomA[1],
    supplyA: e.supplyA,
    bridgeA: e.bridgeA,
    senseAV: front.senseV[0],
    senseBV: hasLegs ? front.senseV[1] : null,
    outAV: hasLegs || isSingle ? out[0] : null,
    outBV: hasLegs ? out[1] : null,
    differenceV: hasLegs ? difference : null,
    combinedV: hasLegs ? (sensing.hasReference ? out[2] : null) : sensing.isMidscale ? out[2] : null,
    state: { A: WORDS[legs[0]], B: WORDS[legs[1]] },
  };
};

/** Follows the clipped state of the outputs that the arrangement reads. */
const createClipRecord = () => {
  const intervals: [number, number][] = [];
  let sinceS: number | null = null;
  return {
    intervals,
    see: (isNow: boolean, timeS: number): void => {
      if (isNow && sinceS === null) sinceS = timeS;
      if (!isNow && sinceS !== null) {
        if (timeS > sinceS) intervals.push([sinceS, timeS]);
        sinceS = null;
      }
    },
  };
};

const runOnce = (document: ScenarioDocument, times: number[], shuntC: [number, number]): OracleResult & { railRms: [number, number] } => {
  const at = new Map<number, InstantReading>();
  const clips = createClipRecord();
  const range = windowOf(document);
  const fullScale = { currentA: 0, speedRadPerS: 0, bridgeA: 0 };
  let parts: { window: ReturnType<typeof createWindow>; converter: ReturnType<typeof createConverter> } | null = null;
  const make = (run: Run): Observer => {
    const window = createWindow(run, range);
    const converter = createConverter(run, range);
    parts = { window, converter };
    let currentSign = 0;
    const look = (now: Run): void => {
      const { electric } = snapshot(now.mode, now.timeS, now.y);
      fullScale.currentA = Math.max(fullScale.currentA, Math.abs(electric.currentA));
      fullScale.bridgeA = Math.max(fullScale.bridgeA, Math.abs(electric.bridgeA));
      fullScale.speedRadPerS = Math.max(fullScale.speedRadPerS, Math.abs(now.y[1] ?? 0));
    };
    return {
      stopsS: [...times, range.fromS, range.toS, ...converter.stopsS],
      onStop: (now, timeS) => {
        window.onStop(now, timeS);
        converter.onStop(now, timeS);
        if (times.includes(timeS)) at.set(timeS, readInstant(now, timeS));
      },
      onStep: (now, step) => {
        window.onStep(now, step);
        const middle = snapshot(now.mode, step.middleS, step.middle);
        clips.see(readChains(now.mode.sensing).some((chain) => isClipped(now.mode.sensing, middle.pin[chain])), now.timeS);
        const sign = Math.sign(middle.electric.currentA);
        if (currentSign !== 0 && sign !== currentSign) now.events.push({ timeS: now.timeS, kind: "currentZero" });
        currentSign = sign;
      },
      onChange: (now) => {
        window.onChange(now);
        look(now);
      },
    };
  };
  const run = runDocument(document, shuntC, make);
  clips.see(false, run.timeS);
  const { window, converter } = parts as unknown as { window: ReturnType<typeof createWindow>; converter: ReturnType<typeof createConverter> };
  const { all, samples } = converter.finish(run);
  return {
    at: times.map((timeS) => at.get(timeS)).filter((one): one is InstantReading => one !== undefined),
    window: range,
    figures: window.finish(run, all),
    samples,
    events: [...run.events].sort((x, y) => x.timeS - y.timeS),
    clipIntervals: clips.intervals,
    fullScale,
    railRms: window.railRms(),
  };
};

/** One pass, or two when the shunts heat themselves: the first at ambient gives the RMS currents (D-33). */
export const simulateReference = (document: ScenarioDocument, options: { at?: number[] } = {}): OracleResult => {
  const times = options.at ?? [];
  const { shunt, ambientC = 25 } = document.sensing;
  const needsFirst = shunt.thermalResistanceKPerW > 0 && shunt.tcrPpmPerK !== 0;
  const warmth = (rms: number): number => ambientC + shunt.thermalResistanceKPerW * shunt.resistanceOhm * rms * rms;
  const rms = needsFirst ? runOnce(document, [], [ambientC, ambientC]).railRms : [0, 0];
  const { railRms: _unused, ...result } = runOnce(document, times, needsFirst ? [warmth(rms[0] ?? 0), warmth(rms[1] ?? 0)] : [ambientC, ambientC]);
  return result;
};
