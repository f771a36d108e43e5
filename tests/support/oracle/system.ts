import { chainSlopes, chainsOf, differenceOf, driveOf, outputVoltage, pinVoltage, senseFront, shuntPower, type Chain, type Front, type SensingParameters, type Share } from "./channels";
import { excessTorque, resistingNm, speedSlope, type Motion, type ShaftParameters } from "./shaft";
import { evaluateStage, isCapacitive, startVoltage, type Condition, type Electric, type Gates, type StageParameters } from "./stage";

/**
 * The right-hand side: state = motor current, speed, bus voltage, both poles of three output chains, then quadratures.
 * Rectifier, slew and clip are taken literally (max, min); their kinks are reported so that a step never spans one.
 */
export const SUMS = ["i", "ii", "topA2", "topB2", "bottomA2", "bottomB2", "bridge2", "bridge", "supply", "shuntA", "shuntB", "copper", "switches", "mechanical", "input", "speed", "outA", "outB", "difference", "combined", "resisting", "sourceLoss", "emfMismatch"] as const;
export type SumName = (typeof SUMS)[number];
export const STATE_COUNT = 9;
export const SIZE = STATE_COUNT + SUMS.length;

export type Mode = {
  stage: StageParameters;
  shaft: ShaftParameters;
  sensing: SensingParameters;
  gates: Gates[];
  legs: [Condition, Condition];
  motion: Motion;
  shares: [Share, Share];
};

export type Snapshot = { electric: Electric; front: Front; out: [number, number, number]; pin: [number, number, number]; difference: number };

const at = (y: Float64Array, n: number): number => y[n] ?? 0;
export const amplifierIndex = (chain: Chain): number => 3 + 2 * chain;

export const snapshot = (mode: Mode, timeS: number, y: Float64Array): Snapshot => {
  const { stage, sensing, legs } = mode;
  const electric = evaluateStage(stage, legs, at(y, 0), at(y, 1), at(y, 2));
  const through = legs.map((leg) => leg === "through");
  const needsSlopes = through.includes(true) && sensing.shuntH > 0;
  // The rail currents are affine in (i, v), so one whole slope further their difference is their derivative.
  const slopes = needsSlopes ? evaluateStage(stage, legs, electric.currentA + electric.currentSlope, at(y, 1), at(y, 2) + electric.busSlope) : electric;
  const front = senseFront(sensing, electric, slopes, through, mode.shares, timeS);
  const out: [number, number, number] = [0, 0, 0];
  const pin: [number, number, number] = [0, 0, 0];
  for (const chain of chainsOf(sensing)) {
    const n = amplifierIndex(chain);
    out[chain] = outputVoltage(sensing, chain, at(y, n), at(y, n + 1));
    pin[chain] = pinVoltage(sensing, chain, at(y, n), at(y, n + 1));
  }
  return { electric, front, out, pin, difference: differenceOf(sensing, out[0], out[1]) };
};

const sumSlopes = (mode: Mode, timeS: number, y: Float64Array, now: Snapshot): Record<SumName, number> => {
  const { electric: e, out } = now;
  const { stage } = mode;
  const i = e.currentA;
  const speed = at(y, 1);
  const [shuntA, shuntB] = shuntPower(mode.sensing, stage, e);
  return {
    i,
    ii: i * i,
    topA2: e.topA[0] ** 2,
    topB2: e.topA[1] ** 2,
    bottomA2: e.bottomA[0] ** 2,
    bottomB2: e.bottomA[1] ** 2,
    bridge2: e.bridgeA ** 2,
    bridge: e.bridgeA,
    supply: e.supplyA,
    shuntA,
    shuntB,
    copper: stage.windingOhm * i * i,
    switches: e.switchesW,
    mechanical: stage.torqueNmPerA * i * speed,
    input: stage.sourceV * e.supplyA,
    speed,
    outA: out[0],
    outB: out[1],
    difference: now.difference,
    combined: out[2],
    resisting: resistingNm(mode.shaft, timeS, speed, mode.motion) * speed,
    sourceLoss: stage.sourceOhm * e.supplyA ** 2,
    emfMismatch: (stage.emfVs - stage.torqueNmPerA) * i * speed,
  };
};

export const slopeOf = (mode: Mode) => (timeS: number, y: Float64Array, slope: Float64Array): void => {
  const now = snapshot(mode, timeS, y);
  slope[0] = now.electric.currentSlope;
  slope[1] = speedSlope(mode.shaft, timeS, at(y, 1), mode.motion, mode.stage.torqueNmPerA * now.electric.currentA);
  slope[2] = now.electric.busSlope;
  for (const chain of chainsOf(mode.sensing)) {
    const n = amplifierIndex(chain);
    const [first, second] = chainSlopes(mode.sensing, chain, driveOf(mode.sensing, now.front, chain), at(y, n), at(y, n + 1));
    slope[n] = first;
    slope[n + 1] = second;
  }
  const sums = sumSlopes(mode, timeS, y, now);
  for (let n = 0; n < SUMS.length; n += 1) slope[STATE_COUNT + n] = sums[SUMS[n] ?? "i"];
};

export const EVENT_NAMES = ["diodeEnds", "startForward", "startBackward", "shaftStops", "breakForward", "breakBackward"] as const;
/** Values that are > 0 once an event that changes the equations has happened. */
export const eventValues = (mode: Mode, timeS: number, y: Float64Array): number[] => {
  const { stage, legs, motion } = mode;
  const values = [-1, -1, -1, -1, -1, -1];
  const isMotional = stage.loadKind !== "resistive" && !stage.isWindingOpen;
  if (isMotional && !legs.includes("open")) {
    const a = legs[0] === "lowDiode" ? 1 : legs[0] === "highDiode" ? -1 : 0;
    const b = legs[1] === "highDiode" ? 1 : legs[1] === "lowDiode" ? -1 : 0;
    const s = a || b;
    if (s !== 0) values[0] = -s * at(y, 0);
  }
  if (isMotional && legs.includes("open")) {
    values[1] = startVoltage(stage, mode.gates, 1, at(y, 1), at(y, 2));
    values[2] = startVoltage(stage, mode.gates, -1, at(y, 1), at(y, 2));
  }
  if (motion === 1 || motion === -1) values[3] = -motion * at(y, 1);
  if (motion === "stuck") {
    const current = evaluateStage(stage, legs, at(y, 0), at(y, 1), at(y, 2)).currentA;
    const excess = excessTorque(mode.shaft, timeS, stage.torqueNmPerA * current);
    values[4] = excess.forward;
    values[5] = excess.backward;
  }
  return values;
};

/** An output counts as clipped when its pin is beyond a limit by more than 1e-9 V (D-25). */
export const CLIP_MARGIN_V = 1e-9;
export const isClipped = (p: SensingParameters, pinV: number): boolean => pinV > p.maxV + CLIP_MARGIN_V || pinV < p.minV - CLIP_MARGIN_V;

/** Values whose change of sign is a kink of the right-hand side or an extreme to be hit by a step's end. */
export const kinkValues = (mode: Mode, timeS: number, y: Float64Array): number[] => {
  const { sensing, stage } = mode;
  const now = snapshot(mode, timeS, y);
  const quiet = (value: number, floor: number): number => (Math.abs(value) < floor ? 0 : value);
  const slopeFloor = stage.inductanceH > 0 ? (1e-9 * stage.sourceV) / stage.inductanceH : 0;
  const values = [at(y, 0), quiet(now.electric.currentSlope, slopeFloor)];
  if (isCapacitive(stage)) values.push(stage.sourceV - at(y, 2), quiet(now.electric.busSlope, (1e-9 * stage.sourceV) / (stage.sourceOhm * stage.busF)));
  if (sensing.isUnipolar) values.push(quiet(now.front.rawV[0], 1e-16), quiet(now.front.rawV[1], 1e-16));
  for (const chain of chainsOf(sensing)) {
    values.push(now.pin[chain] - sensing.maxV - CLIP_MARGIN_V, sensing.minV - CLIP_MARGIN_V - now.pin[chain]);
    if (sensing.slewVPerS < Infinity) {
      const free = (driveOf(sensing, now.front, chain) - at(y, amplifierIndex(chain))) / sensing.amplifierTau;
      values.push(free - sensing.slewVPerS, -sensing.slewVPerS - free);
    }
  }
  return values;
};
