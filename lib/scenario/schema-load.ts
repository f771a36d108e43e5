import { z } from "zod";
import { LENGTHS } from "./ranges";
import { quantity } from "./schema-parts";

/** What hangs between the terminals: a motor with its shaft, or a plain load (scenario.md, D-11, D-40). */
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
export const load = z.discriminatedUnion("kind", [
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
