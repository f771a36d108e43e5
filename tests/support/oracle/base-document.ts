import type { ScenarioDocument } from "@/lib/scenario/schema";

/** A complete document with numbers that are all different, so that a swap of two of them shows. */
export const baseDocument = (): ScenarioDocument => ({
  format: "slackwater.scenario/1",
  title: "Reference case",
  notes: "",
  supply: { voltageV: 26.3, resistanceOhm: 0, busCapacitanceF: 0, acceptsReturn: true },
  bridge: {
    highSide: { onResistanceOhm: 0.037, diodeForwardV: 0.83, diodeResistanceOhm: 0.019 },
    lowSide: { onResistanceOhm: 0.029, diodeForwardV: 0.71, diodeResistanceOhm: 0.023 },
    deadTimeS: 7.3e-7,
    commutationS: 9.1e-8,
  },
  pwm: { frequencyHz: 23000, alignment: "edge", scheme: "lowSideRecirculation", synchronous: true },
  command: { points: [{ timeS: 0, duty: 0.53, ramp: "step" }], special: [], reversal: { kind: "direct", dwellS: 0 } },
  load: {
    kind: "motor",
    motor: {
      resistanceOhm: 0.91,
      inductanceH: 0.00043,
      torqueConstantNmPerA: 0.0387,
      backEmfVPerRadPerS: 0.0387,
      inertiaKgM2: 2.1e-5,
      viscousNmPerRadPerS: 1.7e-5,
      coulombNm: 0.0059,
      staticNm: 0.0067,
      temperatureC: 23,
      locked: false,
    },
    shaft: [{ timeS: 0, kind: "constant", value: 0.079 }],
  },
  sensing: {
    site: "legTop",
    shunt: { resistanceOhm: 0.0131, tolerancePct: 1, tcrPpmPerK: 0, inductanceH: 0, thermalResistanceKPerW: 0, ratingW: 3, layoutOhm: 0 },
    amplifier: {
      arrangement: "differencePair",
      response: "unipolar",
      gain: { fixed: 19 },
      gainTolerancePct: 0.5,
      resistorTcrPpmPerK: 25,
      offsetV: 0.00017,
      offsetDriftVPerK: 1e-6,
      biasA: 0,
      bandwidthHz: 510000,
      outputMinV: 0,
      outputMaxV: 3.2,
      cmrrDb: 118,
      psrrDb: 110,
      commonModeMinV: -2,
      commonModeMaxV: 60,
      commonModeAbsMaxV: 70,
      noiseVPerRtHz: 4e-8,
      quiescentA: 0.0006,
      shutdownA: 1e-6,
      wakeS: 2e-5,
    },
    filter: { resistanceOhm: 410, capacitanceF: 1.3e-9 },
    converter: {
      bits: 13,
      fullScaleV: 3.1,
      input: "unipolar",
      phase: 0.29,
      perPeriod: 1,
      average: 1,
      apertureS: 0,
      inlLsb: 0,
      offsetLsb: 0,
      gainErrorPct: 0,
      referenceTolerancePct: 0,
    },
  },
  faults: [],
  initial: { currentA: 2.3, speedRadPerS: 271 },
  run: { durationS: 0.00113 },
});

export type OracleCase = { name: string; covers: string; document: ScenarioDocument; moreTimesS: number[] };
type Motor = Extract<ScenarioDocument["load"], { kind: "motor" }>;

/** A case is the base document with changes; `motorOf` gives the load's motor for changing. */
export const makeCase = (name: string, covers: string, change: (document: ScenarioDocument) => void, moreTimesS: number[] = []): OracleCase => {
  const document = baseDocument();
  document.title = covers.slice(0, 120);
  change(document);
  return { name, covers, document, moreTimesS };
};

export const motorOf = (document: ScenarioDocument): Motor => {
  if (document.load.kind !== "motor") throw new Error("this case has no motor");
  return document.load;
};

export const withReference = (document: ScenarioDocument, voltageV: number): void => {
  document.sensing.reference = { voltageV, tolerancePct: 0, tempcoPpmPerK: 0, sampledByConverter: false };
};

/** Command points from [time, duty, ramp] rows. */
export const points = (...rows: [number, number, "step" | "linear"][]): ScenarioDocument["command"]["points"] =>
  rows.map(([timeS, duty, ramp]) => ({ timeS, duty, ramp }));
