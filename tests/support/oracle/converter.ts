import type { Conversion } from "@/lib/engine/results";
import { isLegSite } from "./channels";
import { SAME_INSTANT_S } from "./schedule";
import { sumOf, type Run } from "./run";
import { snapshot } from "./system";

/** Conversions, averaging, aperture and reconstruction: D-22, D-37. */
type Volts = { a: number; b: number; difference: number; combined: number; referenceV: number };
type Raw = { timeS: number; periodIndex: number; volts: Volts; trueA: number };

const readVolts = (run: Run): Volts => {
  const now = snapshot(run.mode, run.timeS, run.y);
  return { a: now.out[0], b: now.out[1], difference: now.difference, combined: now.out[2], referenceV: run.mode.sensing.referenceV };
};

const conversionTimes = (run: Run): { timeS: number; periodIndex: number }[] => {
  const { phase, perPeriod } = run.document.sensing.converter;
  const { frequencyHz } = run.document.pwm;
  const times: { timeS: number; periodIndex: number }[] = [];
  for (const period of run.schedule.periods)
    for (let j = 0; j < perPeriod; j += 1) {
      const share = phase + j / perPeriod;
      times.push({ timeS: period.startS + (share - Math.floor(share)) / frequencyHz, periodIndex: period.index });
    }
  return times.sort((x, y) => x.timeS - y.timeS).filter((one) => one.timeS <= run.document.run.durationS);
};

const nominalGain = (run: Run): number => {
  const { gain } = run.document.sensing.amplifier;
  return "outOhm" in gain ? gain.outOhm / gain.inOhm : gain.fixed;
};

/** Codes of one conversion before averaging. */
const convert = (run: Run, volts: Volts): { codeA: number | null; codeB: number | null; code: number } => {
  const { converter, amplifier, site } = run.document.sensing;
  const isDifferential = converter.input === "differential";
  const lsb = ((isDifferential ? 2 : 1) * converter.fullScaleV) / 2 ** converter.bits;
  const lowest = isDifferential ? -(2 ** (converter.bits - 1)) : 0;
  const highest = isDifferential ? 2 ** (converter.bits - 1) - 1 : 2 ** converter.bits - 1;
  const codeOf = (v: number): number => Math.min(highest, Math.max(lowest, Math.floor(v / lsb + 0.5)));
  if (run.mode.sensing.isMidscale) return { codeA: null, codeB: null, code: codeOf(isDifferential ? volts.combined - volts.referenceV : volts.combined) };
  if (amplifier.arrangement === "differencePair" && isDifferential) return { codeA: null, codeB: null, code: codeOf(volts.difference) };
  const codeA = codeOf(volts.a);
  if (!isLegSite(site)) return { codeA, codeB: null, code: codeA };
  const codeB = codeOf(volts.b);
  return { codeA, codeB, code: site === "legBottom" ? codeB - codeA : codeA - codeB };
};

const mean = (values: (number | null)[]): number | null =>
  values.includes(null) ? null : values.reduce<number>((sum, value) => sum + (value ?? 0), 0) / values.length;

export const createConverter = (run: Run, range: { fromS: number; toS: number }) => {
  const times = conversionTimes(run);
  const { apertureS, average } = run.document.sensing.converter;
  const { durationS } = run.document.run;
  const startOf = new Map(times.map((one) => [one.timeS, one]));
  const ends = new Map(apertureS > 0 ? times.map((one) => [Math.min(durationS, one.timeS + apertureS), one.timeS]) : []);
  const raws = new Map<number, Raw>();
  const opening = new Map<number, Volts>();
  const currentSum = new Map<number, number>();
  const sums = (now: Run): Volts => ({ a: sumOf(now, "outA"), b: sumOf(now, "outB"), difference: sumOf(now, "difference"), combined: sumOf(now, "combined"), referenceV: 0 });

  const onStop = (now: Run, timeS: number): void => {
    if (!currentSum.has(now.periodIndex)) currentSum.set(now.periodIndex, sumOf(now, "i"));
    const start = startOf.get(timeS);
    if (start && !raws.has(timeS)) {
      raws.set(timeS, { ...start, volts: readVolts(now), trueA: snapshot(now.mode, now.timeS, now.y).electric.currentA });
      if (apertureS > 0) opening.set(timeS, sums(now));
    }
    const begun = ends.get(timeS);
    const raw = begun === undefined ? undefined : raws.get(begun);
    const from = begun === undefined ? undefined : opening.get(begun);
    if (!raw || !from || begun === undefined || timeS <= begun) return;
    const to = sums(now);
    const over = (key: "a" | "b" | "difference" | "combined"): number => (to[key] - from[key]) / (timeS - begun);
    raw.volts = { a: over("a"), b: over("b"), difference: over("difference"), combined: over("combined"), referenceV: raw.volts.referenceV };
  };

  const meanCurrent = (periodIndex: number, end: Run): number => {
    const startS = periodIndex / run.document.pwm.frequencyHz;
    const nextS = Math.min(durationS, (periodIndex + 1) / run.document.pwm.frequencyHz);
    const from = currentSum.get(periodIndex) ?? 0;
    const to = currentSum.get(periodIndex + 1) ?? sumOf(end, "i");
    return (to - from) / (nextS - startS);
  };

  const finish = (end: Run): { all: Conversion[]; samples: Conversion[] } => {
    const { converter, shunt } = run.document.sensing;
    const lsb = ((converter.input === "differential" ? 2 : 1) * converter.fullScaleV) / 2 ** converter.bits;
    const zeroV = run.mode.sensing.isMidscale && converter.input === "unipolar" ? (run.document.sensing.reference?.voltageV ?? 0) : 0;
    const list = times.map((one) => raws.get(one.timeS)).filter((one): one is Raw => one !== undefined);
    const all: Conversion[] = [];
    for (let n = average - 1; n < list.length; n += average) {
      const block = list.slice(n - average + 1, n + 1);
      const codes = block.map((raw) => convert(run, raw.volts));
      const last = block.at(-1);
      const code = mean(codes.map((one) => one.code)) ?? 0;
      if (!last) continue;
      const reconstructedA = (code * lsb - zeroV) / (nominalGain(run) * shunt.resistanceOhm);
      all.push({ timeS: last.timeS, codeA: mean(codes.map((one) => one.codeA)), codeB: mean(codes.map((one) => one.codeB)), code, reconstructedA, trueA: last.trueA, meanA: meanCurrent(last.periodIndex, end) });
    }
    const samples = all.filter((one) => one.timeS >= range.fromS - SAME_INSTANT_S && one.timeS < range.toS - SAME_INSTANT_S);
    return { all: samples, samples };
  };

  const periodStarts = run.schedule.periods.map((period) => period.startS);
  return { stopsS: [...times.map((one) => one.timeS), ...ends.keys(), ...periodStarts], onStop, finish };
};
