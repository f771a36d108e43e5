import { z } from "zod";
import { quantity } from "./schema-parts";

/** Shunt, amplifier, reference, filter and converter (scenario.md, D-32, D-33, D-39). */
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

export const sensing = z.strictObject({
  site: z.enum(SITES),
  ambientC: quantity("sensing.ambientC").optional(),
  shunt,
  amplifier,
  reference: reference.optional(),
  filter: filter.optional(),
  converter,
});
