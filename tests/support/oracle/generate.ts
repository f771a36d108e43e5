import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { OracleCase } from "./base-document";
import { DRIVE_CASES } from "./cases-drive";
import { FAULT_CASES } from "./cases-faults";
import { SENSING_CASES } from "./cases-sensing";
import { STAGE_CASES } from "./cases-stage";
import type { Accept } from "./compare";
import { buildSchedule, SAME_INSTANT_S } from "./schedule";
import { simulateReference, type OracleResult } from "./simulate";

/**
 * Writes tests/reference/oracle-cases: `npx tsx tests/support/oracle/generate.ts [name ...]`.
 * Expected numbers come from the reference alone; the engine is not imported here.
 */
export const ORACLE_CASES: OracleCase[] = [...DRIVE_CASES, ...STAGE_CASES, ...SENSING_CASES, ...FAULT_CASES];

/** Request times inside dead times, commutation ramps and the quiet parts of an early, a middle and a late period. */
export const requestTimes = (one: OracleCase): number[] => {
  const { document } = one;
  const { gates, periods } = buildSchedule(document);
  const edges = [...new Set(gates.map((gate) => gate.timeS)), ...document.faults.map((fault) => fault.atS), document.run.durationS].sort((x, y) => x - y);
  const count = periods.length;
  const chosen = [0, 0.43, 0.62, 0.9].map((share) => periods[Math.floor(share * count)]?.startS ?? 0);
  const times = new Set<number>(one.moreTimesS);
  for (const startS of chosen) {
    const inside = edges.filter((timeS) => timeS >= startS && timeS < startS + 1 / document.pwm.frequencyHz);
    for (const edgeS of inside) {
      const gapS = (edges.find((timeS) => timeS > edgeS + SAME_INSTANT_S) ?? document.run.durationS) - edgeS;
      times.add(edgeS + 0.37 * gapS);
      if (document.bridge.commutationS > 0 && gapS > document.bridge.commutationS) times.add(edgeS + 0.43 * document.bridge.commutationS);
    }
    times.add(startS + 0.771 / document.pwm.frequencyHz);
  }
  for (const fault of document.faults) times.add(fault.atS + 1.7e-7);
  return [...times].filter((timeS) => timeS >= 0 && timeS <= document.run.durationS).sort((x, y) => x - y);
};

/** The tolerances of the public cases: state 1e-6 of full scale, outputs 1e-4, figures 2e-6, events 2e-11 s. */
export const acceptFor = (one: OracleCase, result: OracleResult): Accept => {
  const { supply, sensing, load } = one.document;
  const currentA = Math.max(result.fullScale.currentA, 1e-3);
  const speed = Math.max(result.fullScale.speedRadPerS, 1e-3);
  const outputV = sensing.amplifier.outputMaxV - sensing.amplifier.outputMinV;
  const { figures } = result;
  const powerW = Math.max(...[figures.inputW, figures.copperW, figures.mechanicalW, figures.switchesW].map(Math.abs));
  const gain = "outOhm" in sensing.amplifier.gain ? sensing.amplifier.gain.outOhm / sensing.amplifier.gain.inOhm : sensing.amplifier.gain.fixed;
  const lsbA = ((sensing.converter.input === "differential" ? 2 : 1) * sensing.converter.fullScaleV) / 2 ** sensing.converter.bits / (gain * sensing.shunt.resistanceOhm);
  const torque = load.kind === "motor" ? load.motor.torqueConstantNmPerA : 1;
  const fill = (keys: string[], value: number): Record<string, number> => Object.fromEntries(keys.map((key) => [key, value]));
  const senseV = 1e-4 * (sensing.shunt.resistanceOhm * currentA);
  const errorA = 1.01 * lsbA + (1e-4 * outputV) / (gain * sensing.shunt.resistanceOhm);
  const codeStep = Math.max(1, Math.ceil((1e-5 * outputV) / (lsbA * gain * sensing.shunt.resistanceOhm)));
  return {
    at: {
      ...fill(["motorCurrentA", "topAA", "topBA", "bottomAA", "bottomBA", "supplyA", "bridgeA"], 1e-6 * Math.max(currentA, result.fullScale.bridgeA)),
      speedRadPerS: 1e-6 * speed,
      dutyCommand: 1e-9,
      ...fill(["busV", "terminalAV", "terminalBV"], 1e-6 * supply.voltageV),
      ...fill(["senseAV", "senseBV"], senseV),
      ...fill(["outAV", "outBV", "differenceV", "combinedV"], 1e-4 * outputV),
    },
    figures: {
      ...fill(["motorMeanA", "motorRmsA", "motorPeakA", "motorRippleA", "topARmsA", "topBRmsA", "supplyMeanA"], 2e-6 * Math.max(currentA, result.fullScale.bridgeA)),
      ...fill(["shuntAW", "shuntBW", "copperW", "switchesW", "mechanicalW", "inputW"], 1e-5 * powerW),
      speedMeanRadPerS: 1e-6 * speed,
      torqueMeanNm: 2e-6 * currentA * torque,
      ...fill(["outAMeanV", "outBMeanV", "differenceMeanV", "combinedMeanV"], 1e-4 * outputV),
      headroomV: 1e-3 * outputV,
      busMaxV: 1e-6 * supply.voltageV,
      clippedShare: 2e-4,
      reconstructionErrorMeanA: errorA,
      reconstructionErrorMaxA: errorA,
    },
    eventTimeS: 2e-11,
    samples: { code: codeStep, reconstructedA: codeStep * lsbA * 1.01, trueA: 1e-6 * currentA, meanA: 2e-6 * currentA },
  };
};

const KEPT_COUNT = 40;

/** A leg in shoot-through has no word in the table of conduction states (D-46), so its state is not compared. */
const isThrough = (reading: { topAA: number; topBA: number; bottomAA: number; bottomBA: number }): boolean =>
  (reading.topAA !== 0 && reading.bottomAA !== 0) || (reading.topBA !== 0 && reading.bottomBA !== 0);

export const expectedOf = (one: OracleCase) => {
  const times = requestTimes(one);
  const result = simulateReference(one.document, { at: times });
  const kinds = ["diodeEnds", "currentZero", "shaftSticks", "breakAway"];
  const ofKind = (kind: string): number[] => result.events.filter((event) => event.kind === kind).map((event) => event.timeS);
  return {
    at: result.at.map(({ state, ...numbers }) => (isThrough(numbers) ? numbers : { ...numbers, state })),
    window: [result.window.fromS, result.window.toS],
    figures: result.figures,
    samples: result.samples,
    fullScale: result.fullScale,
    accept: acceptFor(one, result),
    events: kinds.flatMap((kind) => ofKind(kind).slice(0, KEPT_COUNT).map((timeS) => ({ timeS, kind }))),
    eventCounts: Object.fromEntries(kinds.map((kind) => [kind, ofKind(kind).length])),
    clipIntervals: result.clipIntervals.slice(0, KEPT_COUNT),
    clipCount: result.clipIntervals.length,
  };
};

const writeCases = (names: string[]): void => {
  const folder = join(import.meta.dirname, "../../reference/oracle-cases");
  mkdirSync(folder, { recursive: true });
  ORACLE_CASES.forEach((one, n) => {
    if (names.length > 0 && !names.includes(one.name)) return;
    const startMs = performance.now();
    const expected = expectedOf(one);
    const text = Object.entries({ name: one.name, covers: one.covers, source: "tests/support/oracle/generate.ts", document: one.document, expected })
      .map(([key, value]) => ` ${JSON.stringify(key)}: ${JSON.stringify(value)}`)
      .join(",\n");
    writeFileSync(join(folder, `${String(n + 1).padStart(2, "0")}-${one.name}.json`), `{\n${text}\n}\n`);
    const residual = expected.figures.energyResidualShare;
    console.log(`${one.name}: ${Math.round(performance.now() - startMs)} ms, ${expected.at.length} instants, residual ${residual?.toExponential(1) ?? "none"}, ${JSON.stringify(expected.eventCounts)}, clips ${expected.clipCount}`);
  });
};

if (process.argv[1]?.endsWith("generate.ts")) writeCases(process.argv.slice(2));
