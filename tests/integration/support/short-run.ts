import { parseScenario, type ScenarioDocument, type ScenarioInput } from "@/lib/scenario/schema";

/** An invented motor and bridge, 20 PWM periods. */
const input: ScenarioInput = {
  format: "slackwater.scenario/1",
  title: "Sluice gate drive",
  notes: "",
  supply: { voltageV: 24 },
  bridge: { highSide: { onResistanceOhm: 0.012 }, lowSide: { onResistanceOhm: 0.011 } },
  pwm: { frequencyHz: 20_000, alignment: "edge", scheme: "lowSideRecirculation" },
  command: { points: [{ timeS: 0, duty: 0.6, ramp: "step" }], reversal: { kind: "direct" } },
  load: {
    kind: "motor",
    motor: { resistanceOhm: 0.9, inductanceH: 6e-4, torqueConstantNmPerA: 0.05, inertiaKgM2: 3e-5 },
    shaft: [{ timeS: 0, kind: "constant", value: 0.08 }],
  },
  sensing: {
    site: "legTop",
    shunt: { resistanceOhm: 0.01, tolerancePct: 1, tcrPpmPerK: 50, ratingW: 2 },
    amplifier: {
      arrangement: "differencePair",
      response: "unipolar",
      gain: { fixed: 20 },
      gainTolerancePct: 0.5,
      resistorTcrPpmPerK: 20,
      offsetV: 0,
      offsetDriftVPerK: 1e-6,
      biasA: 1e-6,
      bandwidthHz: 5e5,
      outputMinV: 0,
      outputMaxV: 5,
      cmrrDb: 100,
      psrrDb: 90,
      commonModeMinV: -0.3,
      commonModeMaxV: 60,
      commonModeAbsMaxV: 65,
      noiseVPerRtHz: 4e-8,
      quiescentA: 1e-3,
      shutdownA: 1e-6,
      wakeS: 1e-4,
    },
    converter: {
      bits: 12,
      fullScaleV: 5,
      input: "unipolar",
      phase: 0.3,
      inlLsb: 1,
      offsetLsb: 1,
      gainErrorPct: 0.1,
      referenceTolerancePct: 0.2,
    },
  },
  initial: {},
  run: { durationS: 1e-3 },
};

const parsed = parseScenario(input);
if (!parsed.ok) throw new Error(parsed.findings.map((finding) => `${finding.path}: ${finding.text}`).join("\n"));
export const SHORT_RUN: ScenarioDocument = parsed.document;
