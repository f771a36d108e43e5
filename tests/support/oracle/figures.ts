import type { Conversion } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { isLegSite, readChains } from "./channels";
import type { Advance } from "./integrate";
import { sumOf, type Run } from "./run";
import type { OracleResult } from "./simulate";
import { isCapacitive } from "./stage";
import { isClipped, snapshot, SUMS, type SumName } from "./system";

/** Figures over the window: D-24, D-26. */
export const windowOf = (document: ScenarioDocument): { fromS: number; toS: number } => {
  const { durationS, window } = document.run;
  if (window) return { fromS: window.fromS, toS: window.toS };
  const count = Math.floor(durationS * document.pwm.frequencyHz + 1e-9);
  if (count < 20) return { fromS: 0, toS: durationS };
  return { fromS: (count - 20) / document.pwm.frequencyHz, toS: count / document.pwm.frequencyHz };
};

type Sums = Record<SumName, number>;
const readSums = (run: Run): Sums => Object.fromEntries(SUMS.map((name) => [name, sumOf(run, name)])) as Sums;

const storedEnergy = (run: Run): number => {
  const { stage, shaft } = run.mode;
  const [i, w, v] = [run.y[0] ?? 0, run.y[1] ?? 0, run.y[2] ?? 0];
  const magnetic = stage.loadKind === "resistive" ? 0 : (stage.inductanceH * i * i) / 2;
  const kinetic = stage.loadKind === "motor" ? (shaft.inertia * w * w) / 2 : 0;
  return magnetic + kinetic + (isCapacitive(stage) ? (stage.busF * v * v) / 2 : 0);
};

export const createWindow = (run: Run, range: { fromS: number; toS: number }) => {
  let isInside = false;
  let from: { sums: Sums; storedJ: number } | null = null;
  let to: { sums: Sums; storedJ: number } | null = null;
  const seen = { highA: -Infinity, lowA: Infinity, busV: -Infinity, headroomV: Infinity, clippedS: 0 };

  const look = (now: Run, timeS: number, y: Float64Array): void => {
    const { electric, out } = snapshot(now.mode, timeS, y);
    seen.highA = Math.max(seen.highA, electric.currentA);
    seen.lowA = Math.min(seen.lowA, electric.currentA);
    seen.busV = Math.max(seen.busV, electric.busV);
    const { sensing } = now.mode;
    for (const chain of readChains(now.mode.sensing)) {
      const above = sensing.maxV - out[chain];
      seen.headroomV = Math.min(seen.headroomV, sensing.isMidscale ? Math.min(above, out[chain] - sensing.minV) : above);
    }
  };
  const onStop = (now: Run, timeS: number): void => {
    if (timeS === range.fromS && !from) {
      from = { sums: readSums(now), storedJ: storedEnergy(now) };
      isInside = true;
      look(now, now.timeS, now.y);
    }
    if (timeS === range.toS && !to) {
      to = { sums: readSums(now), storedJ: storedEnergy(now) };
      isInside = false;
    }
  };
  const onStep = (now: Run, step: Advance): void => {
    if (!isInside) return;
    const middle = snapshot(now.mode, step.middleS, step.middle);
    if (readChains(now.mode.sensing).some((chain) => isClipped(now.mode.sensing, middle.pin[chain]))) seen.clippedS += step.timeS - now.timeS;
    look(now, step.middleS, step.middle);
    look(now, step.timeS, step.y);
  };
  const mean = (name: SumName): number => (from && to ? (to.sums[name] - from.sums[name]) / (range.toS - range.fromS) : Number.NaN);
  const rms = (name: SumName): number => Math.sqrt(Math.max(0, mean(name)));

  /** Terms of the balance as mean powers; the residual is their signed sum over the sum of magnitudes. */
  const residual = (): number | null => {
    if (run.document.faults.some((fault) => fault.kind === "stalledRotor" || fault.kind === "openWinding" || fault.kind === "shortedTurns")) return null;
    const stored = from && to ? (to.storedJ - from.storedJ) / (range.toS - range.fromS) : Number.NaN;
    const lineW = isLegSite(run.mode.sensing.site) ? 0 : mean("shuntA");
    const legW = isLegSite(run.mode.sensing.site) ? mean("shuntA") + mean("shuntB") : 0;
    const terms = [mean("input"), -mean("sourceLoss"), -mean("switches"), -lineW, -legW, -mean("copper"), -mean("resisting"), -mean("emfMismatch"), -stored];
    const size = terms.reduce((sum, term) => sum + Math.abs(term), 0);
    return size === 0 ? 0 : Math.abs(terms.reduce((sum, term) => sum + term, 0)) / size;
  };

  const finish = (end: Run, conversions: Conversion[]): OracleResult["figures"] => {
    const { sensing, stage } = end.mode;
    const hasLegs = isLegSite(sensing.site);
    const errors = conversions.map((one) => one.reconstructedA - one.trueA);
    const count = errors.length;
    return {
      motorMeanA: mean("i"),
      motorRmsA: rms("ii"),
      motorPeakA: Math.max(Math.abs(seen.highA), Math.abs(seen.lowA)),
      motorRippleA: seen.highA - seen.lowA,
      topARmsA: rms("topA2"),
      topBRmsA: rms("topB2"),
      supplyMeanA: mean("supply"),
      shuntAW: mean("shuntA"),
      shuntBW: hasLegs ? mean("shuntB") : null,
      copperW: mean("copper"),
      switchesW: mean("switches"),
      mechanicalW: mean("mechanical"),
      inputW: mean("input"),
      speedMeanRadPerS: mean("speed"),
      torqueMeanNm: stage.torqueNmPerA * mean("i"),
      outAMeanV: hasLegs || !sensing.isMidscale ? mean("outA") : null,
      outBMeanV: hasLegs ? mean("outB") : null,
      differenceMeanV: hasLegs ? mean("difference") : null,
      combinedMeanV: (hasLegs ? sensing.hasReference : sensing.isMidscale) ? mean("combined") : null,
      headroomV: seen.headroomV,
      clippedShare: seen.clippedS / (range.toS - range.fromS),
      reconstructionErrorMeanA: count === 0 ? null : errors.reduce((sum, one) => sum + one, 0) / count,
      reconstructionErrorMaxA: count === 0 ? null : Math.max(...errors.map(Math.abs)),
      busMaxV: seen.busV,
      energyResidualShare: residual(),
    };
  };

  const railRms = (): [number, number] => {
    const { site } = run.document.sensing;
    if (site === "legTop") return [rms("topA2"), rms("topB2")];
    if (site === "legBottom") return [rms("bottomA2"), rms("bottomB2")];
    return [rms(site === "line" ? "ii" : "bridge2"), 0];
  };
  return { onStop, onStep, onChange: (now: Run) => (isInside ? look(now, now.timeS, now.y) : undefined), finish, railRms };
};
