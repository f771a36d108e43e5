import type { Electric, StageParameters } from "./stage";

/** Sensing at one instant: model.md section 3 with D-13, D-19, D-20, D-21, D-25, D-34. */
type Pair = [number, number];

export type Site = "legTop" | "legBottom" | "line" | "supply" | "return";
/** Share of a leg's current in its upper rail and its rate (1/s), held while no ramp runs. */
export type Share = { valueAt: number; atS: number; rate: number; endS: number; target: number };

export type SensingParameters = {
  site: Site;
  shuntOhm: Pair;
  shuntH: number;
  offsetV: Pair;
  rejection: number;
  commonModeZeroV: number;
  gain: number;
  amplifierTau: number;
  /** 0: no filter. */
  filterTau: number;
  isCurrentOutput: boolean;
  slewVPerS: number;
  minV: number;
  maxV: number;
  isUnipolar: boolean;
  referenceV: number;
  hasReference: boolean;
  isMidscale: boolean;
  stuckV: [number | null, number | null];
};

export const isLegSite = (site: Site): boolean => site === "legTop" || site === "legBottom";
export const shareAt = (share: Share, timeS: number): number => share.valueAt + share.rate * (timeS - share.atS);

type Shown = { current: number; slope: number };

/** What the shunts carry and its derivative, with the commutation ramp. Shoot-through shows the rail's own current. */
const shownCurrents = (p: SensingParameters, e: Electric, slopes: Electric, through: readonly boolean[], shares: readonly Share[], timeS: number): [Shown, Shown] => {
  const leg = (x: 0 | 1): { top: Shown; bottom: Shown } => {
    const sign = x === 0 ? 1 : -1;
    const share = shares[x];
    const s = share ? shareAt(share, timeS) : 0;
    const out = sign * e.currentA;
    const outSlope = sign * e.currentSlope;
    if (through[x])
      return {
        top: { current: e.topA[x], slope: slopes.topA[x] - e.topA[x] },
        bottom: { current: e.bottomA[x], slope: slopes.bottomA[x] - e.bottomA[x] },
      };
    const top = { current: s * out, slope: (share?.rate ?? 0) * out + s * outSlope };
    return { top, bottom: { current: top.current - out, slope: top.slope - outSlope } };
  };
  const a = leg(0);
  const b = leg(1);
  if (p.site === "legTop") return [a.top, b.top];
  if (p.site === "legBottom") return [a.bottom, b.bottom];
  const single =
    p.site === "line"
      ? { current: e.currentA, slope: e.currentSlope }
      : { current: a.top.current + b.top.current, slope: a.top.slope + b.top.slope };
  return [single, { current: 0, slope: 0 }];
};

const commonMode = (p: SensingParameters, e: Electric): number => {
  if (p.site === "legTop") return e.railV;
  if (p.site === "supply") return e.busV;
  return p.site === "line" ? e.terminalV[0] : 0;
};

export type Front = { senseV: Pair; rawV: Pair; inputV: Pair };

/** Shunt voltages, and what the channels see before and after the rectifier. */
export const senseFront = (p: SensingParameters, e: Electric, slopes: Electric, through: readonly boolean[], shares: readonly Share[], timeS: number, withInductance = true): Front => {
  const shown = shownCurrents(p, e, slopes, through, shares, timeS);
  const senseV: Pair = [0, 0];
  const rawV: Pair = [0, 0];
  const inputV: Pair = [0, 0];
  for (const x of [0, 1] as const) {
    senseV[x] = p.shuntOhm[x] * shown[x].current + (withInductance ? p.shuntH * shown[x].slope : 0);
    rawV[x] = senseV[x] + p.offsetV[x] + (commonMode(p, e) - p.commonModeZeroV) * p.rejection;
    inputV[x] = p.isUnipolar ? Math.max(0, rawV[x]) : rawV[x];
  }
  return { senseV, rawV, inputV };
};

/** The three output chains: leg A (or the only one), leg B, combined. */
export type Chain = 0 | 1 | 2;
export const chainsOf = (p: SensingParameters): Chain[] => {
  if (isLegSite(p.site)) return p.hasReference ? [0, 1, 2] : [0, 1];
  return p.isMidscale ? [2] : [0];
};

/** The chains that the converter reads (D-21). */
export const readChains = (p: SensingParameters): Chain[] => (p.isMidscale ? [2] : isLegSite(p.site) ? [0, 1] : [0]);

const crossed = (p: SensingParameters): number => (p.site === "legBottom" ? -1 : 1);
export const driveOf = (p: SensingParameters, front: Front, chain: Chain): number => {
  if (chain !== 2) return p.gain * front.inputV[chain];
  return p.gain * (isLegSite(p.site) ? crossed(p) * (front.inputV[0] - front.inputV[1]) : front.inputV[0]);
};

const clip = (p: SensingParameters, v: number): number => Math.min(p.maxV, Math.max(p.minV, v));
const addedV = (p: SensingParameters, chain: Chain): number => (chain === 2 ? p.referenceV : 0);
const stuckOf = (p: SensingParameters, chain: Chain): number | null => {
  if (chain === 2) return isLegSite(p.site) ? null : p.stuckV[0];
  return p.stuckV[chain];
};

/** Unclipped voltage of the amplifier's pin from both pole states. */
export const pinVoltage = (p: SensingParameters, chain: Chain, amplifier: number, filter: number): number => {
  const stuck = stuckOf(p, chain);
  if (stuck !== null) return clip(p, stuck);
  return (p.isCurrentOutput && p.filterTau > 0 ? filter : amplifier) + addedV(p, chain);
};
export const outputVoltage = (p: SensingParameters, chain: Chain, amplifier: number, filter: number): number =>
  !p.isCurrentOutput && p.filterTau > 0 ? filter : clip(p, pinVoltage(p, chain, amplifier, filter));

export const chainSlopes = (p: SensingParameters, chain: Chain, drive: number, amplifier: number, filter: number): Pair => {
  const free = (drive - amplifier) / p.amplifierTau;
  const slope = Math.min(p.slewVPerS, Math.max(-p.slewVPerS, free));
  if (p.filterTau === 0) return [slope, 0];
  const seen = p.isCurrentOutput ? amplifier : clip(p, pinVoltage(p, chain, amplifier, filter));
  return [slope, (seen - filter) / p.filterTau];
};

export const settledChain = (p: SensingParameters, chain: Chain, drive: number): Pair => [
  drive,
  p.isCurrentOutput ? drive : clip(p, pinVoltage(p, chain, drive, 0)),
];

export const differenceOf = (p: SensingParameters, a: number, b: number): number => crossed(p) * (a - b);

/** Power in the shunts, by leg; a single shunt's goes to the first. */
export const shuntPower = (p: SensingParameters, stage: StageParameters, e: Electric): Pair => {
  if (p.site === "legTop") return [stage.topOhm[0] * e.topA[0] ** 2, stage.topOhm[1] * e.topA[1] ** 2];
  if (p.site === "legBottom") return [stage.bottomOhm[0] * e.bottomA[0] ** 2, stage.bottomOhm[1] * e.bottomA[1] ** 2];
  const carried = p.site === "line" ? e.currentA : e.bridgeA;
  return [p.shuntOhm[0] * carried ** 2, 0];
};
