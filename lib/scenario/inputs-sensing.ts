import { choiceInput, detail, flagInput, linear, log, partInput, quantityInput } from "./input-parts";
import type { Input } from "./input-types";
import type { ScenarioDocument } from "./schema";

const hasLegs = (document: ScenarioDocument) =>
  document.sensing.site === "legTop" || document.sensing.site === "legBottom";
const isFixed = (document: ScenarioDocument) => "fixed" in document.sensing.amplifier.gain;
const hasResistors = (document: ScenarioDocument) => !isFixed(document);
const hasReference = (document: ScenarioDocument) => document.sensing.reference !== undefined;
const hasFilter = (document: ScenarioDocument) => document.sensing.filter !== undefined;

const shunt: Input[] = [
  choiceInput("sensing", "sensing.site", { label: "Shunts" }),
  quantityInput("sensing", "sensing.shunt.resistanceOhm", {
    label: "Shunt value",
    symbol: "R_s",
    series: "E24",
    slider: log(2e-4, 0.5),
  }),
  choiceInput("sensing", "sensing.amplifier.arrangement", { label: "Read as" }),
  ...detail([
    quantityInput("sensing", "sensing.shunt.tolerancePct", { label: "Shunt tolerance" }),
    quantityInput("sensing", "sensing.shunt.tcrPpmPerK", { label: "Shunt TCR", symbol: "α_s" }),
    quantityInput("sensing", "sensing.shunt.inductanceH", {
      label: "Shunt inductance",
      symbol: "L_s",
      slider: linear(0, 5e-9, 1e-10),
      applies: (document) => document.load.kind !== "resistive",
    }),
    quantityInput("sensing", "sensing.shunt.thermalResistanceKPerW", { label: "Thermal resistance", symbol: "R_th" }),
    quantityInput("sensing", "sensing.shunt.ratingW", { label: "Power rating", symbol: "P_r" }),
    quantityInput("sensing", "sensing.shunt.layoutOhm", { label: "Layout resistance" }),
    quantityInput("sensing", "sensing.ambientC", {
      label: "Ambient",
      symbol: "ϑ_a",
      isOptional: true,
      help: "25 °C when left empty.",
    }),
  ]),
];

const amplifierPath = (field: string) => `sensing.amplifier.${field}`;
const amplifier: Input[] = [
  choiceInput("amplifier", amplifierPath("gain.kind"), { label: "Gain set by" }),
  quantityInput("amplifier", amplifierPath("gain.fixed"), {
    label: "Gain",
    symbol: "G",
    slider: log(5, 500),
    applies: isFixed,
  }),
  quantityInput("amplifier", amplifierPath("gain.inOhm"), {
    label: "Input resistor",
    symbol: "R_in",
    series: "E24",
    slider: log(50, 1e4),
    applies: hasResistors,
  }),
  quantityInput("amplifier", amplifierPath("gain.outOhm"), {
    label: "Output resistor",
    symbol: "R_out",
    series: "E24",
    slider: log(1e3, 1e6),
    applies: hasResistors,
  }),
  choiceInput("amplifier", amplifierPath("response"), { label: "Response" }),
  quantityInput("amplifier", amplifierPath("bandwidthHz"), {
    label: "Bandwidth",
    symbol: "f_BW",
    slider: log(1e4, 1e7),
  }),
  quantityInput("amplifier", amplifierPath("offsetV"), {
    label: "Input offset",
    symbol: "V_os",
    slider: linear(-5e-4, 5e-4, 5e-6),
  }),
  quantityInput("amplifier", amplifierPath("outputMinV"), {
    label: "Lowest output",
    symbol: "V_min",
    slider: linear(-5, 5, 0.05),
  }),
  quantityInput("amplifier", amplifierPath("outputMaxV"), {
    label: "Highest output",
    symbol: "V_max",
    slider: linear(0, 10, 0.05),
  }),
  ...detail([
    quantityInput("amplifier", amplifierPath("offsetBV"), {
      label: "Input offset, leg B",
      isOptional: true,
      applies: hasLegs,
      help: "As leg A when left empty.",
    }),
    quantityInput("amplifier", amplifierPath("gainBandwidthHz"), {
      label: "Gain-bandwidth",
      symbol: "GBW",
      isOptional: true,
    }),
    quantityInput("amplifier", amplifierPath("slewVPerS"), { label: "Slew rate", isOptional: true }),
    quantityInput("amplifier", amplifierPath("cmrrDb"), {
      label: "Common-mode rejection",
      symbol: "CMRR",
      slider: linear(40, 160, 1),
    }),
    quantityInput("amplifier", amplifierPath("commonModeMinV"), { label: "Lowest common mode" }),
    quantityInput("amplifier", amplifierPath("commonModeMaxV"), { label: "Highest common mode" }),
    quantityInput("amplifier", amplifierPath("commonModeAbsMaxV"), { label: "Absolute maximum" }),
    quantityInput("amplifier", amplifierPath("gainTolerancePct"), { label: "Gain tolerance" }),
    quantityInput("amplifier", amplifierPath("resistorTcrPpmPerK"), { label: "Gain drift" }),
    quantityInput("amplifier", amplifierPath("offsetDriftVPerK"), { label: "Offset drift" }),
    quantityInput("amplifier", amplifierPath("biasA"), { label: "Input bias" }),
    quantityInput("amplifier", amplifierPath("psrrDb"), { label: "Supply rejection", symbol: "PSRR" }),
    quantityInput("amplifier", amplifierPath("noiseVPerRtHz"), { label: "Noise density", symbol: "e_n" }),
    quantityInput("amplifier", amplifierPath("quiescentA"), { label: "Quiescent current", symbol: "I_q" }),
    quantityInput("amplifier", amplifierPath("shutdownA"), { label: "Shutdown current" }),
    quantityInput("amplifier", amplifierPath("wakeS"), { label: "Wake-up time" }),
  ]),
];

const referencePath = (field: string) => `sensing.reference.${field}`;
const reference: Input[] = [
  partInput("reference", "sensing.reference", {
    label: "Reference",
    applies: hasLegs,
    help: "Gives a combined output beside the others.",
  }),
  quantityInput("reference", referencePath("voltageV"), {
    label: "Midscale reference",
    symbol: "V_ref",
    slider: linear(0, 5, 0.05),
    applies: hasReference,
  }),
  ...detail([
    quantityInput("reference", referencePath("tolerancePct"), { label: "Tolerance", applies: hasReference }),
    quantityInput("reference", referencePath("tempcoPpmPerK"), {
      label: "Temperature coefficient",
      applies: hasReference,
    }),
    flagInput("reference", referencePath("sampledByConverter"), {
      label: "Converter samples it too",
      applies: hasReference,
      help: "Its tolerance then cancels.",
    }),
  ]),
];

const filter: Input[] = [
  partInput("filter", "sensing.filter", { label: "Filter" }),
  quantityInput("filter", "sensing.filter.resistanceOhm", {
    label: "Resistance",
    symbol: "R_f",
    series: "E24",
    slider: log(10, 1e5),
    applies: (document) => hasFilter(document) && isFixed(document),
  }),
  quantityInput("filter", "sensing.filter.capacitanceF", {
    label: "Capacitance",
    symbol: "C_f",
    series: "E12",
    slider: log(1e-11, 1e-7),
    applies: hasFilter,
  }),
];

const converterPath = (field: string) => `sensing.converter.${field}`;
const converter: Input[] = [
  quantityInput("converter", converterPath("bits"), { label: "Resolution", symbol: "N", slider: linear(8, 16, 1) }),
  quantityInput("converter", converterPath("fullScaleV"), {
    label: "Full scale",
    symbol: "V_fs",
    slider: linear(0.5, 6, 0.05),
  }),
  quantityInput("converter", converterPath("phase"), {
    label: "Sample instant",
    symbol: "p",
    unit: "share",
    slider: linear(0, 0.99, 0.01),
    help: "Within the PWM period.",
  }),
  choiceInput("converter", converterPath("input"), { label: "Input" }),
  ...detail([
    quantityInput("converter", converterPath("perPeriod"), { label: "Conversions per period" }),
    quantityInput("converter", converterPath("average"), { label: "Averaged over" }),
    quantityInput("converter", converterPath("apertureS"), { label: "Aperture" }),
    quantityInput("converter", converterPath("inlLsb"), { label: "Non-linearity" }),
    quantityInput("converter", converterPath("offsetLsb"), { label: "Offset" }),
    quantityInput("converter", converterPath("gainErrorPct"), { label: "Gain error" }),
    quantityInput("converter", converterPath("referenceTolerancePct"), { label: "Reference tolerance" }),
  ]),
];

export const SENSING_INPUTS: readonly Input[] = [...shunt, ...amplifier, ...reference, ...filter, ...converter];
