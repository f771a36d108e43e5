import type { ScenarioDocument } from "@/lib/scenario/schema";

/**
 * The benchmark's drive written out by hand for general-purpose steppers: forward low-side recirculation, synchronous,
 * positive current, top shunts, unipolar channels with amplifier pole and filter pole, combined output.
 * State: current, speed, then amplifier and filter pole of leg A, leg B and the combined output.
 */
export const STATE_SIZE = 8;

export type Piece = {
  lengthS: number;
  /** Driving voltage and loop resistance of the conduction state. */
  driveV: number;
  loopOhm: number;
  /** Share of leg A's current in its upper shunt at the piece's start, and its slope (1/s). */
  share: number;
  shareSlope: number;
};

export type Drive = {
  pieces: Piece[];
  henry: number;
  emf: number;
  inertia: number;
  viscous: number;
  frictionNm: number;
  shuntOhm: number;
  gain: number;
  offsetV: number;
  amplifierRate: number;
  filterRate: number;
  referenceV: number;
  minV: number;
  maxV: number;
};

export const benchDocument = (base: ScenarioDocument, durationS: number): ScenarioDocument => ({ ...base, run: { durationS } });

/** One PWM period cut at every edge, dead-time end and commutation end. */
export const buildDrive = (document: ScenarioDocument): Drive => {
  const { bridge, supply, sensing, pwm, load, command } = document;
  if (load.kind !== "motor" || !("fixed" in sensing.amplifier.gain) || !sensing.filter?.resistanceOhm) throw new Error("not the benchmark's drive");
  const { motor } = load;
  const windingOhm = motor.resistanceOhm * (1 + 0.00393 * (motor.temperatureC - 20));
  const [rH, rL, shunt] = [bridge.highSide.onResistanceOhm, bridge.lowSide.onResistanceOhm, sensing.shunt.resistanceOhm];
  const periodS = 1 / pwm.frequencyHz;
  const onS = (command.points[0]?.duty ?? 0) * periodS;
  const { deadTimeS: td, commutationS: tc } = bridge;
  const diode = { driveV: -bridge.lowSide.diodeForwardV, loopOhm: windingOhm + bridge.lowSide.diodeResistanceOhm + rL };
  const high = { driveV: supply.voltageV, loopOhm: windingOhm + rH + shunt + rL };
  const low = { driveV: 0, loopOhm: windingOhm + 2 * rL };
  const pieces: Piece[] = [
    { ...diode, lengthS: td, share: 0, shareSlope: 0 },
    { ...high, lengthS: tc, share: 0, shareSlope: 1 / tc },
    { ...high, lengthS: onS - td - tc, share: 1, shareSlope: 0 },
    { ...diode, lengthS: tc, share: 1, shareSlope: -1 / tc },
    { ...diode, lengthS: td - tc, share: 0, shareSlope: 0 },
    { ...low, lengthS: periodS - onS - td, share: 0, shareSlope: 0 },
  ];
  return {
    pieces,
    henry: motor.inductanceH,
    emf: motor.backEmfVPerRadPerS,
    inertia: motor.inertiaKgM2,
    viscous: motor.viscousNmPerRadPerS,
    frictionNm: motor.coulombNm + (load.shaft[0]?.value ?? 0),
    shuntOhm: shunt,
    gain: sensing.amplifier.gain.fixed,
    offsetV: sensing.amplifier.offsetV,
    amplifierRate: 2 * Math.PI * sensing.amplifier.bandwidthHz,
    filterRate: 1 / (sensing.filter.resistanceOhm * sensing.filter.capacitanceF),
    referenceV: sensing.reference?.voltageV ?? 0,
    minV: sensing.amplifier.outputMinV,
    maxV: sensing.amplifier.outputMaxV,
  };
};

export const writeSlope = (drive: Drive, piece: Piece, t: number, y: ArrayLike<number>, slope: Float64Array | number[]): void => {
  const i = y[0] ?? 0;
  const w = y[1] ?? 0;
  slope[0] = (piece.driveV - piece.loopOhm * i - drive.emf * w) / drive.henry;
  slope[1] = (drive.emf * i - drive.viscous * w - drive.frictionNm) / drive.inertia;
  const shown = (piece.share + piece.shareSlope * t) * i;
  const inputA = Math.max(0, drive.shuntOhm * shown + drive.offsetV);
  const inputB = Math.max(0, drive.offsetV);
  writeChain(drive, drive.gain * inputA, 0, 2, y, slope);
  writeChain(drive, drive.gain * inputB, 0, 4, y, slope);
  writeChain(drive, drive.gain * (inputA - inputB), drive.referenceV, 6, y, slope);
};

const writeChain = (drive: Drive, target: number, addedV: number, n: number, y: ArrayLike<number>, slope: Float64Array | number[]): void => {
  const amplifier = y[n] ?? 0;
  slope[n] = (target - amplifier) * drive.amplifierRate;
  const pin = amplifier + addedV;
  slope[n + 1] = ((pin > drive.maxV ? drive.maxV : pin < drive.minV ? drive.minV : pin) - (y[n + 1] ?? 0)) * drive.filterRate;
};
