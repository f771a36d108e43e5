import { generalPath } from "./paths";

/**
 * The one table of every number of a scenario document: name in trade terms, unit, hard limits, default.
 * The schema, the texts of refusals, the inputs panel and the notices read it; nothing else states a limit.
 * Limits: scenario.md and D-39; what those leave open has a generous finite range of our own.
 */
export type Range = {
  /** In plain trade terms, sentence case. */
  name: string;
  /** SI unit of the value as stored; see lib/units/units.ts. */
  unit: string;
  min: number;
  max: number;
  /** Present means the field may be left out. */
  fallback?: number;
  isWhole?: boolean;
  /** `max` itself is refused (D-56). */
  isMaxOpen?: boolean;
  /** Zero is allowed, but nothing between it and this: such values lose all digits in the solver. */
  floor?: number;
};

const time = (name: string, max = 60): Range => ({ name, unit: "s", min: 0, max });
const percent = (name: string, min = 0): Range => ({ name, unit: "%", min, max: 50 });
const device = (side: string): Record<string, Range> => ({
  [`bridge.${side}Side.onResistanceOhm`]: {
    name: `On-resistance, ${side} side`,
    unit: "Ω",
    min: 0,
    max: 10,
    floor: 1e-9,
  },
  [`bridge.${side}Side.diodeForwardV`]: {
    name: `Diode forward voltage, ${side} side`,
    unit: "V",
    min: 0,
    max: 5,
    fallback: 0.8,
  },
  [`bridge.${side}Side.diodeResistanceOhm`]: {
    name: `Diode resistance, ${side} side`,
    unit: "Ω",
    min: 0,
    max: 10,
    fallback: 0,
    floor: 1e-9,
  },
});

const SUPPLY_AND_BRIDGE: Record<string, Range> = {
  "supply.voltageV": { name: "Supply voltage", unit: "V", min: 0.1, max: 2000 },
  "supply.resistanceOhm": { name: "Supply resistance", unit: "Ω", min: 0, max: 10, fallback: 0, floor: 1e-6 },
  "supply.busCapacitanceF": { name: "Bus capacitance", unit: "F", min: 0, max: 1, fallback: 0, floor: 1e-12 },
  ...device("high"),
  ...device("low"),
  "bridge.deadTimeS": { name: "Dead time", unit: "s", min: 0, max: 1e-4, fallback: 5e-7 },
  "bridge.commutationS": { name: "Commutation time", unit: "s", min: 0, max: 1e-5, fallback: 5e-8, floor: 1e-12 },
  "pwm.frequencyHz": { name: "PWM frequency", unit: "Hz", min: 10, max: 1e6 },
  "pwm.mixedFastShare": { name: "Fast share of the off-time", unit: "", min: 0, max: 1 },
};

const COMMAND: Record<string, Range> = {
  "command.points.*.timeS": time("Time of the command point"),
  "command.points.*.duty": { name: "Duty command", unit: "", min: -1, max: 1 },
  "command.special.*.fromS": time("Start of the special interval"),
  "command.special.*.toS": time("End of the special interval"),
  "command.reversal.dwellS": { ...time("Dwell at a reversal", 10), fallback: 0 },
};

const LOAD: Record<string, Range> = {
  "load.resistanceOhm": { name: "Load resistance", unit: "Ω", min: 1e-4, max: 1e4 },
  "load.inductanceH": { name: "Load inductance", unit: "H", min: 1e-7, max: 10 },
  "load.motor.resistanceOhm": { name: "Winding resistance at 20 °C", unit: "Ω", min: 1e-4, max: 1e4 },
  "load.motor.inductanceH": { name: "Winding inductance", unit: "H", min: 1e-7, max: 10 },
  "load.motor.torqueConstantNmPerA": { name: "Torque constant", unit: "N·m/A", min: 0, max: 100 },
  "load.motor.backEmfVPerRadPerS": { name: "Back-EMF constant", unit: "V·s/rad", min: 0, max: 100 },
  "load.motor.inertiaKgM2": { name: "Rotor inertia", unit: "kg·m²", min: 1e-9, max: 1e4 },
  "load.motor.viscousNmPerRadPerS": { name: "Viscous friction", unit: "N·m·s/rad", min: 0, max: 1e6, fallback: 0 },
  "load.motor.coulombNm": { name: "Coulomb friction", unit: "N·m", min: 0, max: 1e6, fallback: 0 },
  "load.motor.staticNm": { name: "Static friction", unit: "N·m", min: 0, max: 1e6 },
  "load.motor.temperatureC": { name: "Winding temperature", unit: "°C", min: -60, max: 250, fallback: 20 },
  "load.motor.thermal.resistanceKPerW": { name: "Winding thermal resistance", unit: "K/W", min: 1e-3, max: 1e5 },
  "load.motor.thermal.capacityJPerK": { name: "Winding heat capacity", unit: "J/K", min: 1e-6, max: 1e7 },
  "load.motor.thermal.ambientC": { name: "Ambient temperature of the motor", unit: "°C", min: -60, max: 250 },
  "load.motor.commutation.barsCount": { name: "Commutator bars", unit: "", min: 2, max: 1000, isWhole: true },
  "load.motor.commutation.rippleShare": { name: "Commutation ripple", unit: "", min: 0, max: 1 },
  "load.gear.ratio": { name: "Gear ratio", unit: "", min: 1e-3, max: 1e5 },
  "load.gear.efficiency": { name: "Gear efficiency", unit: "", min: 0.01, max: 1 },
  "load.gear.loadInertiaKgM2": { name: "Load inertia at the gear's output", unit: "kg·m²", min: 0, max: 1e8 },
  "load.shaft.*.timeS": time("Time of the shaft load"),
  "load.shaft.*.value": { name: "Shaft load", unit: "", min: -1e6, max: 1e6 },
};

const SENSING: Record<string, Range> = {
  "sensing.ambientC": { name: "Ambient temperature of the shunt", unit: "°C", min: -60, max: 250 },
  "sensing.shunt.resistanceOhm": { name: "Shunt resistance", unit: "Ω", min: 1e-6, max: 10 },
  "sensing.shunt.tolerancePct": percent("Shunt tolerance"),
  "sensing.shunt.tcrPpmPerK": { name: "Shunt temperature coefficient", unit: "ppm/K", min: -5000, max: 5000 },
  "sensing.shunt.inductanceH": { name: "Shunt inductance", unit: "H", min: 0, max: 1e-5, fallback: 0 },
  "sensing.shunt.thermalResistanceKPerW": {
    name: "Shunt thermal resistance",
    unit: "K/W",
    min: 0,
    max: 1e4,
    fallback: 0,
  },
  "sensing.shunt.ratingW": { name: "Shunt power rating", unit: "W", min: 1e-6, max: 1e5 },
  "sensing.shunt.layoutOhm": { name: "Layout resistance in the sense path", unit: "Ω", min: 0, max: 10, fallback: 0 },
  "sensing.reference.voltageV": { name: "Reference voltage", unit: "V", min: -50, max: 50 },
  "sensing.reference.tolerancePct": percent("Reference tolerance"),
  "sensing.reference.tempcoPpmPerK": {
    name: "Reference temperature coefficient",
    unit: "ppm/K",
    min: -1000,
    max: 1000,
  },
  "sensing.filter.resistanceOhm": { name: "Filter resistance", unit: "Ω", min: 1e-3, max: 1e7 },
  "sensing.filter.capacitanceF": { name: "Filter capacitance", unit: "F", min: 0, max: 1e-3, floor: 1e-18 },
};

const AMPLIFIER: Record<string, Range> = {
  "sensing.amplifier.gain.fixed": { name: "Gain", unit: "V/V", min: 1e-3, max: 1e5 },
  "sensing.amplifier.gain.inOhm": { name: "Gain resistor, input", unit: "Ω", min: 1, max: 1e7 },
  "sensing.amplifier.gain.outOhm": { name: "Gain resistor, output", unit: "Ω", min: 1, max: 1e7 },
  "sensing.amplifier.gainTolerancePct": percent("Gain tolerance"),
  "sensing.amplifier.resistorTcrPpmPerK": {
    name: "Gain temperature coefficient",
    unit: "ppm/K",
    min: -1000,
    max: 1000,
  },
  "sensing.amplifier.offsetV": { name: "Input offset", unit: "V", min: -0.1, max: 0.1 },
  "sensing.amplifier.offsetBV": { name: "Input offset, leg B", unit: "V", min: -0.1, max: 0.1 },
  "sensing.amplifier.offsetDriftVPerK": { name: "Offset drift", unit: "V/K", min: -0.01, max: 0.01 },
  "sensing.amplifier.biasA": { name: "Input bias current", unit: "A", min: -0.01, max: 0.01 },
  "sensing.amplifier.bandwidthHz": { name: "Bandwidth", unit: "Hz", min: 1, max: 1e9 },
  "sensing.amplifier.gainBandwidthHz": { name: "Gain-bandwidth product", unit: "Hz", min: 1, max: 1e12 },
  "sensing.amplifier.slewVPerS": { name: "Slew rate", unit: "V/s", min: 1, max: 1e12 },
  "sensing.amplifier.outputMinV": { name: "Lowest output", unit: "V", min: -50, max: 50 },
  "sensing.amplifier.outputMaxV": { name: "Highest output", unit: "V", min: -50, max: 50 },
  "sensing.amplifier.cmrrDb": { name: "Common-mode rejection", unit: "dB", min: 20, max: 160 },
  "sensing.amplifier.psrrDb": { name: "Supply rejection", unit: "dB", min: 20, max: 160 },
  "sensing.amplifier.commonModeMinV": { name: "Lowest common mode", unit: "V", min: -1e4, max: 1e4 },
  "sensing.amplifier.commonModeMaxV": { name: "Highest common mode", unit: "V", min: -1e4, max: 1e4 },
  "sensing.amplifier.commonModeAbsMaxV": { name: "Absolute maximum common mode", unit: "V", min: -1e4, max: 1e4 },
  "sensing.amplifier.noiseVPerRtHz": { name: "Noise density", unit: "V/√Hz", min: 0, max: 1e-3 },
  "sensing.amplifier.quiescentA": { name: "Quiescent current", unit: "A", min: 0, max: 10 },
  "sensing.amplifier.shutdownA": { name: "Shutdown current", unit: "A", min: 0, max: 10 },
  "sensing.amplifier.wakeS": time("Wake-up time"),
};

const CONVERTER: Record<string, Range> = {
  "sensing.converter.bits": { name: "Converter resolution", unit: "bit", min: 6, max: 24, isWhole: true },
  "sensing.converter.fullScaleV": { name: "Converter full scale", unit: "V", min: 0.05, max: 50 },
  "sensing.converter.phase": { name: "Sample instant in the period", unit: "", min: 0, max: 1, isMaxOpen: true },
  "sensing.converter.perPeriod": {
    name: "Conversions per period",
    unit: "",
    min: 1,
    max: 64,
    fallback: 1,
    isWhole: true,
  },
  "sensing.converter.average": {
    name: "Conversions averaged",
    unit: "",
    min: 1,
    max: 1024,
    fallback: 1,
    isWhole: true,
  },
  "sensing.converter.apertureS": { name: "Sampling aperture", unit: "s", min: 0, max: 0.1, fallback: 0 },
  "sensing.converter.inlLsb": { name: "Integral non-linearity", unit: "LSB", min: 0, max: 1e6 },
  "sensing.converter.offsetLsb": { name: "Converter offset", unit: "LSB", min: -1e6, max: 1e6 },
  "sensing.converter.gainErrorPct": percent("Converter gain error", -50),
  "sensing.converter.referenceTolerancePct": percent("Converter reference tolerance"),
};

const FAULTS_AND_RUN: Record<string, Range> = {
  "faults.*.atS": time("Onset of the fault"),
  "faults.*.coulombNm": { name: "Friction reached", unit: "N·m", min: 0, max: 1e6 },
  "faults.*.overS": time("Time of the rise"),
  "faults.*.factor": { name: "Factor", unit: "", min: 1e-3, max: 1e4 },
  "faults.*.resistanceFactor": { name: "Resistance factor", unit: "", min: 1e-3, max: 1e3 },
  "faults.*.inductanceFactor": { name: "Inductance factor", unit: "", min: 1e-3, max: 1e3 },
  "faults.*.torqueFactor": { name: "Torque constant factor", unit: "", min: 0, max: 1e3 },
  "faults.*.deltaV": { name: "Shift", unit: "V", min: -50, max: 50 },
  "faults.*.stuckV": { name: "Stuck output", unit: "V", min: -50, max: 50 },
  "faults.*.sagV": { name: "Supply voltage after the sag", unit: "V", min: 0, max: 2000 },
  "initial.currentA": { name: "Initial motor current", unit: "A", min: -1e5, max: 1e5, fallback: 0 },
  "initial.speedRadPerS": { name: "Initial speed", unit: "rad/s", min: -1e6, max: 1e6, fallback: 0 },
  "initial.busV": { name: "Initial bus voltage", unit: "V", min: 0, max: 1e4 },
  "run.durationS": { name: "Length of the run", unit: "s", min: 1e-6, max: 60 },
  "run.window.fromS": time("Start of the figures' window"),
  "run.window.toS": time("End of the figures' window"),
};

export const RANGES = {
  ...SUPPLY_AND_BRIDGE,
  ...COMMAND,
  ...LOAD,
  ...SENSING,
  ...AMPLIFIER,
  ...CONVERTER,
  ...FAULTS_AND_RUN,
};

/** Lengths of texts and lists. */
export const LENGTHS = {
  title: [1, 120],
  notes: [0, 4000],
  points: [1, 200],
  special: [0, 200],
  shaft: [0, 200],
  faults: [0, 50],
} as const;

/** D-55: nothing longer than this many PWM periods is simulated. */
export const PERIODS_MAX = 2e6;

/** Unit of `load.shaft.*.value`, by the kind of the entry. */
export const SHAFT_UNITS = {
  none: "",
  constant: "N·m",
  active: "N·m",
  viscous: "N·m·s/rad",
  fan: "N·m·s²/rad²",
} as const;

/** `command.points.3.duty` -> the entry of `command.points.*.duty`; two faults share the field `voltageV`. */
export function rangeOf(path: string, faultKind?: string): Range | undefined {
  const general = generalPath(path);
  if (general === "faults.*.voltageV") return RANGES[faultKind === "supplySag" ? "faults.*.sagV" : "faults.*.stuckV"];
  return Object.hasOwn(RANGES, general) ? RANGES[general] : undefined;
}
