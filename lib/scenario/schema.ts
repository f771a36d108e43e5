import { z } from "zod";
import type { Finding } from "@/lib/result";
import { findingsFrom, tooLarge } from "./findings";
import { LENGTHS } from "./ranges";
import { FAULT_SCHEMAS } from "./schema-faults";
import { quantity, text } from "./schema-parts";
import { brokenRules } from "./rules";

/** The scenario document, format slackwater.scenario/1 (scenario.md, decisions.md). Cross-field rules are in rules.ts. */
export const SCENARIO_FORMAT = "slackwater.scenario/1";

const supply = z.strictObject({
  voltageV: quantity("supply.voltageV"),
  resistanceOhm: quantity("supply.resistanceOhm").default(0),
  busCapacitanceF: quantity("supply.busCapacitanceF").default(0),
  acceptsReturn: z.boolean().default(true),
});

const device = (side: "highSide" | "lowSide") =>
  z.strictObject({
    onResistanceOhm: quantity(`bridge.${side}.onResistanceOhm`),
    diodeForwardV: quantity(`bridge.${side}.diodeForwardV`).default(0.8),
    diodeResistanceOhm: quantity(`bridge.${side}.diodeResistanceOhm`).default(0),
  });

const bridge = z.strictObject({
  highSide: device("highSide"),
  lowSide: device("lowSide"),
  deadTimeS: quantity("bridge.deadTimeS").default(5e-7),
  commutationS: quantity("bridge.commutationS").default(5e-8),
});

export const SCHEMES = [
  "lowSideRecirculation",
  "highSideRecirculation",
  "fastDecay",
  "mixedDecay",
  "lockedAntiphase",
] as const;

const pwm = z.strictObject({
  frequencyHz: quantity("pwm.frequencyHz"),
  alignment: z.enum(["edge", "centre"]),
  scheme: z.enum(SCHEMES),
  synchronous: z.boolean().default(true),
  mixedFastShare: quantity("pwm.mixedFastShare").optional(),
});

const commandPoint = z.strictObject({
  timeS: quantity("command.points.*.timeS"),
  duty: quantity("command.points.*.duty"),
  ramp: z.enum(["step", "linear"]),
});
const specialInterval = z.strictObject({
  fromS: quantity("command.special.*.fromS"),
  toS: quantity("command.special.*.toS"),
  action: z.enum(["coast", "brakeLow", "brakeHigh"]),
});
const command = z.strictObject({
  points: z.array(commandPoint).min(LENGTHS.points[0]).max(LENGTHS.points[1]),
  special: z.array(specialInterval).max(LENGTHS.special[1]).default([]),
  reversal: z.strictObject({
    kind: z.enum(["direct", "coast", "brakeLow"]),
    dwellS: quantity("command.reversal.dwellS").default(0),
  }),
});

const motor = z
  .strictObject({
    resistanceOhm: quantity("load.motor.resistanceOhm"),
    inductanceH: quantity("load.motor.inductanceH"),
    torqueConstantNmPerA: quantity("load.motor.torqueConstantNmPerA"),
    backEmfVPerRadPerS: quantity("load.motor.backEmfVPerRadPerS").optional(),
    inertiaKgM2: quantity("load.motor.inertiaKgM2"),
    viscousNmPerRadPerS: quantity("load.motor.viscousNmPerRadPerS").default(0),
    coulombNm: quantity("load.motor.coulombNm").default(0),
    staticNm: quantity("load.motor.staticNm").optional(),
    temperatureC: quantity("load.motor.temperatureC").default(20),
    locked: z.boolean().default(false),
    thermal: z
      .strictObject({
        resistanceKPerW: quantity("load.motor.thermal.resistanceKPerW"),
        capacityJPerK: quantity("load.motor.thermal.capacityJPerK"),
        ambientC: quantity("load.motor.thermal.ambientC"),
      })
      .optional(),
    commutation: z
      .strictObject({
        barsCount: quantity("load.motor.commutation.barsCount"),
        rippleShare: quantity("load.motor.commutation.rippleShare"),
      })
      .optional(),
  })
  // In SI units K_e = K_t, and static friction is the Coulomb one, unless both are given (model.md section 1).
  .transform((given) => ({
    ...given,
    backEmfVPerRadPerS: given.backEmfVPerRadPerS ?? given.torqueConstantNmPerA,
    staticNm: given.staticNm ?? given.coulombNm,
  }));

const gear = z.strictObject({
  ratio: quantity("load.gear.ratio"),
  efficiency: quantity("load.gear.efficiency"),
  loadInertiaKgM2: quantity("load.gear.loadInertiaKgM2").optional(),
});
const shaftEntry = z.strictObject({
  timeS: quantity("load.shaft.*.timeS"),
  kind: z.enum(["none", "constant", "active", "viscous", "fan"]),
  value: quantity("load.shaft.*.value"),
});
const load = z.discriminatedUnion("kind", [
  z.strictObject({
    kind: z.literal("motor"),
    motor,
    gear: gear.optional(),
    shaft: z.array(shaftEntry).max(LENGTHS.shaft[1]),
  }),
  z.strictObject({
    kind: z.literal("inductive"),
    resistanceOhm: quantity("load.resistanceOhm"),
    inductanceH: quantity("load.inductanceH"),
  }),
  z.strictObject({ kind: z.literal("resistive"), resistanceOhm: quantity("load.resistanceOhm") }),
]);

const shunt = z.strictObject({
  resistanceOhm: quantity("sensing.shunt.resistanceOhm"),
  tolerancePct: quantity("sensing.shunt.tolerancePct"),
  tcrPpmPerK: quantity("sensing.shunt.tcrPpmPerK"),
  inductanceH: quantity("sensing.shunt.inductanceH").default(0),
  thermalResistanceKPerW: quantity("sensing.shunt.thermalResistanceKPerW").default(0),
  ratingW: quantity("sensing.shunt.ratingW"),
  layoutOhm: quantity("sensing.shunt.layoutOhm").default(0),
});

const amplifierQuantity = (field: string) => quantity(`sensing.amplifier.${field}`);
const gain = z.union([
  z.strictObject({ fixed: amplifierQuantity("gain.fixed") }),
  z.strictObject({ inOhm: amplifierQuantity("gain.inOhm"), outOhm: amplifierQuantity("gain.outOhm") }),
]);
export const ARRANGEMENTS = ["singleEnded", "differencePair", "combinedMidscale", "bipolarMidscale"] as const;

const amplifier = z.strictObject({
  arrangement: z.enum(ARRANGEMENTS),
  response: z.enum(["unipolar", "bipolar"]),
  gain,
  gainTolerancePct: amplifierQuantity("gainTolerancePct"),
  resistorTcrPpmPerK: amplifierQuantity("resistorTcrPpmPerK"),
  offsetV: amplifierQuantity("offsetV"),
  offsetBV: amplifierQuantity("offsetBV").optional(),
  offsetDriftVPerK: amplifierQuantity("offsetDriftVPerK"),
  biasA: amplifierQuantity("biasA"),
  bandwidthHz: amplifierQuantity("bandwidthHz"),
  gainBandwidthHz: amplifierQuantity("gainBandwidthHz").optional(),
  slewVPerS: amplifierQuantity("slewVPerS").optional(),
  outputMinV: amplifierQuantity("outputMinV"),
  outputMaxV: amplifierQuantity("outputMaxV"),
  cmrrDb: amplifierQuantity("cmrrDb"),
  psrrDb: amplifierQuantity("psrrDb"),
  commonModeMinV: amplifierQuantity("commonModeMinV"),
  commonModeMaxV: amplifierQuantity("commonModeMaxV"),
  commonModeAbsMaxV: amplifierQuantity("commonModeAbsMaxV"),
  noiseVPerRtHz: amplifierQuantity("noiseVPerRtHz"),
  quiescentA: amplifierQuantity("quiescentA"),
  shutdownA: amplifierQuantity("shutdownA"),
  wakeS: amplifierQuantity("wakeS"),
});

const reference = z.strictObject({
  voltageV: quantity("sensing.reference.voltageV"),
  tolerancePct: quantity("sensing.reference.tolerancePct"),
  tempcoPpmPerK: quantity("sensing.reference.tempcoPpmPerK"),
  sampledByConverter: z.boolean(),
});
const filter = z.strictObject({
  resistanceOhm: quantity("sensing.filter.resistanceOhm").optional(),
  capacitanceF: quantity("sensing.filter.capacitanceF"),
});
const converter = z.strictObject({
  bits: quantity("sensing.converter.bits"),
  fullScaleV: quantity("sensing.converter.fullScaleV"),
  input: z.enum(["unipolar", "differential"]),
  phase: quantity("sensing.converter.phase"),
  perPeriod: quantity("sensing.converter.perPeriod").default(1),
  average: quantity("sensing.converter.average").default(1),
  apertureS: quantity("sensing.converter.apertureS").default(0),
  inlLsb: quantity("sensing.converter.inlLsb"),
  offsetLsb: quantity("sensing.converter.offsetLsb"),
  gainErrorPct: quantity("sensing.converter.gainErrorPct"),
  referenceTolerancePct: quantity("sensing.converter.referenceTolerancePct"),
});
export const SITES = ["legTop", "legBottom", "line", "supply", "return"] as const;

const sensing = z.strictObject({
  site: z.enum(SITES),
  ambientC: quantity("sensing.ambientC").optional(),
  shunt,
  amplifier,
  reference: reference.optional(),
  filter: filter.optional(),
  converter,
});

export const scenarioSchema = z.strictObject({
  format: z.literal(SCENARIO_FORMAT),
  title: text("title"),
  notes: text("notes"),
  supply,
  bridge,
  pwm,
  command,
  load,
  sensing,
  faults: z.array(z.discriminatedUnion("kind", FAULT_SCHEMAS)).max(LENGTHS.faults[1]).default([]),
  initial: z.strictObject({
    currentA: quantity("initial.currentA").default(0),
    speedRadPerS: quantity("initial.speedRadPerS").default(0),
    busV: quantity("initial.busV").optional(),
  }),
  run: z.strictObject({
    durationS: quantity("run.durationS"),
    window: z.strictObject({ fromS: quantity("run.window.fromS"), toS: quantity("run.window.toS") }).optional(),
  }),
});

/** What may be sent: fields with a default may be left out. */
export type ScenarioInput = z.input<typeof scenarioSchema>;
/** Every default filled in. */
export type ScenarioDocument = z.output<typeof scenarioSchema>;

export type Supply = ScenarioDocument["supply"];
export type Bridge = ScenarioDocument["bridge"];
export type Pwm = ScenarioDocument["pwm"];
export type Scheme = Pwm["scheme"];
export type Command = ScenarioDocument["command"];
export type CommandPoint = Command["points"][number];
export type SpecialInterval = Command["special"][number];
export type Load = ScenarioDocument["load"];
export type MotorLoad = Extract<Load, { kind: "motor" }>;
export type Motor = MotorLoad["motor"];
export type ShaftEntry = MotorLoad["shaft"][number];
export type Sensing = ScenarioDocument["sensing"];
export type Site = Sensing["site"];
export type Shunt = Sensing["shunt"];
export type Amplifier = Sensing["amplifier"];
export type Arrangement = Amplifier["arrangement"];
export type Reference = NonNullable<Sensing["reference"]>;
export type Converter = Sensing["converter"];
export type Fault = ScenarioDocument["faults"][number];
export type FaultKind = Fault["kind"];

export type ParsedScenario = { ok: true; document: ScenarioDocument } | { ok: false; findings: Finding[] };

/**
 * Reads anything as a scenario. A refusal names every problem at once: shape, ranges, and the rules between fields as far
 * as the fields they need can be read. Never throws; oversized values are refused before they are walked in full.
 */
export function parseScenario(value: unknown): ParsedScenario {
  const oversized = tooLarge(value);
  if (oversized) return { ok: false, findings: [oversized] };
  const parsed = scenarioSchema.safeParse(value);
  const findings = parsed.success ? [] : findingsFrom(parsed.error.issues, value);
  for (const broken of brokenRules(value)) {
    if (!findings.some((finding) => finding.path === broken.path)) findings.push(broken);
  }
  if (!parsed.success || findings.length > 0) return { ok: false, findings };
  return { ok: true, document: parsed.data };
}

/** True for the sites that have a shunt in each leg. */
export const isLegSite = (site: Site): boolean => site === "legTop" || site === "legBottom";

/** The gain G of the amplifier in V/V. */
export const gainOf = (amplifierOfDocument: Amplifier): number =>
  "fixed" in amplifierOfDocument.gain
    ? amplifierOfDocument.gain.fixed
    : amplifierOfDocument.gain.outOhm / amplifierOfDocument.gain.inOhm;
