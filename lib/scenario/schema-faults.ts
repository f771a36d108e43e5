import { z } from "zod";
import { quantity } from "./schema-parts";

/** The faults of D-35. `leg` of a shunt's or amplifier's fault is left out at single-shunt sites (rules.ts holds it). */
const leg = z.enum(["A", "B"]);
const side = z.enum(["high", "low"]);
const atS = quantity("faults.*.atS");

export const FAULT_SCHEMAS = [
  z.strictObject({ kind: z.literal("stalledRotor"), atS }),
  z.strictObject({ kind: z.literal("lostLoad"), atS }),
  z.strictObject({
    kind: z.literal("risingFriction"),
    atS,
    coulombNm: quantity("faults.*.coulombNm"),
    overS: quantity("faults.*.overS"),
  }),
  z.strictObject({ kind: z.literal("wornBrushes"), atS, factor: quantity("faults.*.factor") }),
  z.strictObject({
    kind: z.literal("shortedTurns"),
    atS,
    resistanceFactor: quantity("faults.*.resistanceFactor"),
    inductanceFactor: quantity("faults.*.inductanceFactor"),
    torqueFactor: quantity("faults.*.torqueFactor"),
  }),
  z.strictObject({ kind: z.literal("openWinding"), atS }),
  z.strictObject({ kind: z.literal("switchStuckOpen"), atS, leg, side }),
  z.strictObject({ kind: z.literal("switchShorted"), atS, leg, side }),
  z.strictObject({ kind: z.literal("shuntOpen"), atS, leg: leg.optional() }),
  z.strictObject({ kind: z.literal("shuntDrifted"), atS, leg: leg.optional(), factor: quantity("faults.*.factor") }),
  z.strictObject({ kind: z.literal("shuntShorted"), atS, leg: leg.optional() }),
  z.strictObject({
    kind: z.literal("amplifierOffsetShift"),
    atS,
    leg: leg.optional(),
    deltaV: quantity("faults.*.deltaV"),
  }),
  z.strictObject({
    kind: z.literal("amplifierStuckOutput"),
    atS,
    leg: leg.optional(),
    voltageV: quantity("faults.*.voltageV", "amplifierStuckOutput"),
  }),
  z.strictObject({ kind: z.literal("referenceDrift"), atS, deltaV: quantity("faults.*.deltaV") }),
  z.strictObject({ kind: z.literal("supplySag"), atS, voltageV: quantity("faults.*.voltageV", "supplySag") }),
] as const;
