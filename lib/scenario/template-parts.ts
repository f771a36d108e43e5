import type { Motor, ScenarioDocument } from "./schema";

/**
 * The parts from which the templates are put together: a 24 V drive for sluice gates at a waterworks that we made up.
 * Every number here is our own; none is taken from a maker's data sheet.
 */

/** Gate motor: 24 V, about 90 W, starts moving a gate through its gear. */
const gateMotor = (): Motor => ({
  resistanceOhm: 0.94,
  inductanceH: 0.00062,
  torqueConstantNmPerA: 0.061,
  backEmfVPerRadPerS: 0.061,
  inertiaKgM2: 4.4e-5,
  viscousNmPerRadPerS: 2.6e-5,
  coulombNm: 0.011,
  staticNm: 0.014,
  temperatureC: 20,
  locked: false,
});

/** Latch motor: small, for the pawl that holds a gate. */
export const latchMotor = (): Motor => ({
  resistanceOhm: 3.6,
  inductanceH: 0.0017,
  torqueConstantNmPerA: 0.024,
  backEmfVPerRadPerS: 0.024,
  inertiaKgM2: 2.9e-6,
  viscousNmPerRadPerS: 1.4e-6,
  coulombNm: 0.0018,
  staticNm: 0.0024,
  temperatureC: 20,
  locked: false,
});

/** A published small 12 V motor under a neutral name; tests/unit/engine/measured-motor.test.ts names the source and holds its figures. */
export const benchMotor = (): Motor => ({
  resistanceOhm: 0.66667,
  inductanceH: 0.00035,
  torqueConstantNmPerA: 0.01556,
  backEmfVPerRadPerS: 0.018,
  inertiaKgM2: 4.5e-5,
  viscousNmPerRadPerS: 4.098953237809476e-5,
  coulombNm: 0,
  staticNm: 0,
  temperatureC: 20,
  locked: false,
});

/** Amplifier of ordinary accuracy with a fixed gain of 30. */
const generalAmplifier = (): ScenarioDocument["sensing"]["amplifier"] => ({
  arrangement: "combinedMidscale",
  response: "unipolar",
  gain: { fixed: 30 },
  gainTolerancePct: 0.4,
  resistorTcrPpmPerK: 20,
  offsetV: 9e-5,
  offsetBV: -6e-5,
  offsetDriftVPerK: 8e-7,
  biasA: 2e-7,
  bandwidthHz: 480000,
  slewVPerS: 6e6,
  outputMinV: 0,
  outputMaxV: 3.3,
  cmrrDb: 126,
  psrrDb: 108,
  commonModeMinV: -3,
  commonModeMaxV: 58,
  commonModeAbsMaxV: 66,
  noiseVPerRtHz: 3.6e-8,
  quiescentA: 0.00072,
  shutdownA: 8e-7,
  wakeS: 1.6e-5,
});

/** The gate drive running forward: shunts at the top of each leg, 4 mΩ, gain 30, 1.65 V reference. */
export const gateDrive = (): ScenarioDocument => ({
  format: "slackwater.scenario/1",
  title: "Gate drive",
  notes: "",
  supply: { voltageV: 24, resistanceOhm: 0.03, busCapacitanceF: 0.00047, acceptsReturn: true },
  bridge: {
    highSide: { onResistanceOhm: 0.0095, diodeForwardV: 0.76, diodeResistanceOhm: 0.006 },
    lowSide: { onResistanceOhm: 0.0085, diodeForwardV: 0.73, diodeResistanceOhm: 0.005 },
    deadTimeS: 8e-7,
    commutationS: 6e-8,
  },
  pwm: { frequencyHz: 20000, alignment: "edge", scheme: "lowSideRecirculation", synchronous: true },
  command: {
    points: [{ timeS: 0, duty: 0.45, ramp: "step" }],
    special: [],
    reversal: { kind: "direct", dwellS: 0 },
  },
  load: { kind: "motor", motor: gateMotor(), shaft: [{ timeS: 0, kind: "constant", value: 0.21 }] },
  sensing: {
    site: "legTop",
    shunt: {
      resistanceOhm: 0.004,
      tolerancePct: 0.5,
      tcrPpmPerK: 50,
      inductanceH: 0,
      thermalResistanceKPerW: 18,
      ratingW: 2,
      layoutOhm: 5e-5,
    },
    amplifier: generalAmplifier(),
    reference: { voltageV: 1.65, tolerancePct: 0.15, tempcoPpmPerK: 20, sampledByConverter: true },
    filter: { resistanceOhm: 330, capacitanceF: 1e-9 },
    converter: {
      bits: 12,
      fullScaleV: 3.3,
      input: "unipolar",
      phase: 0.25,
      perPeriod: 1,
      average: 1,
      apertureS: 0,
      inlLsb: 1,
      offsetLsb: 1,
      gainErrorPct: 0.1,
      referenceTolerancePct: 0.2,
    },
  },
  faults: [],
  initial: { currentA: 3.6, speedRadPerS: 120 },
  run: { durationS: 0.004 },
});
