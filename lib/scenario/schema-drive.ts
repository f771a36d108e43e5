import { z } from "zod";
import { LENGTHS } from "./ranges";
import { quantity } from "./schema-parts";

/** Supply, bridge, PWM and command (scenario.md). */
export const supply = z.strictObject({
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

export const bridge = z.strictObject({
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

export const pwm = z.strictObject({
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
export const command = z.strictObject({
  points: z.array(commandPoint).min(LENGTHS.points[0]).max(LENGTHS.points[1]),
  special: z.array(specialInterval).max(LENGTHS.special[1]).default([]),
  reversal: z.strictObject({
    kind: z.enum(["direct", "coast", "brakeLow"]),
    dwellS: quantity("command.reversal.dwellS").default(0),
  }),
});
