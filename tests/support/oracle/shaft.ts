/** The shaft at one instant: model.md section 1 with D-10, D-11, D-16, D-17, D-40. Everything at the motor shaft. */

export type ShaftParameters = {
  inertia: number;
  viscous: number;
  fan: number;
  /** Coulomb friction of the motor: value at `sinceS`, target, and time to get there (rising friction). */
  coulomb: { fromNm: number; toNm: number; sinceS: number; overS: number };
  staticNm: number;
  /** A `constant` load, which holds at rest like friction. */
  constantNm: number;
  /** An `active` load when the shaft turns forwards and backwards. */
  activeNm: { forward: number; backward: number };
  isLocked: boolean;
};

/** +1 or -1 turning, `stuck`, `locked`, or `free` when there is nothing that could hold the shaft. */
export type Motion = 1 | -1 | "stuck" | "locked" | "free";

export const coulombAt = (p: ShaftParameters, timeS: number): number => {
  const { fromNm, toNm, sinceS, overS } = p.coulomb;
  if (overS <= 0 || timeS >= sinceS + overS) return toNm;
  return fromNm + (toNm - fromNm) * Math.max(0, (timeS - sinceS) / overS);
};

const holdingNm = (p: ShaftParameters, timeS: number): number => Math.max(p.staticNm, coulombAt(p, timeS)) + p.constantNm;

/** Torque beyond what holds the shaft, forwards and backwards; the shaft starts where it is > 0. */
export const excessTorque = (p: ShaftParameters, timeS: number, driveNm: number): { forward: number; backward: number } => ({
  forward: driveNm - p.activeNm.forward - holdingNm(p, timeS),
  backward: -(driveNm - p.activeNm.backward) - holdingNm(p, timeS),
});

export const resolveMotion = (p: ShaftParameters, timeS: number, speed: number, driveNm: number): Motion => {
  if (p.isLocked) return "locked";
  const canHold = holdingNm(p, timeS) > 0 || coulombAt(p, timeS) > 0 || p.activeNm.forward !== p.activeNm.backward;
  if (!canHold) return "free";
  if (speed !== 0) return speed > 0 ? 1 : -1;
  const excess = excessTorque(p, timeS, driveNm);
  return excess.forward > 0 ? 1 : excess.backward > 0 ? -1 : "stuck";
};

/** Friction and load torque against the drive, N m. */
export const resistingNm = (p: ShaftParameters, timeS: number, speed: number, motion: Motion): number => {
  if (motion === "stuck" || motion === "locked") return 0;
  const sign = motion === "free" ? Math.sign(speed) : motion;
  const active = sign < 0 ? p.activeNm.backward : p.activeNm.forward;
  return p.viscous * speed + p.fan * speed * Math.abs(speed) + (coulombAt(p, timeS) + p.constantNm) * sign + active;
};

export const speedSlope = (p: ShaftParameters, timeS: number, speed: number, motion: Motion, driveNm: number): number =>
  motion === "stuck" || motion === "locked" ? 0 : (driveNm - resistingNm(p, timeS, speed, motion)) / p.inertia;
