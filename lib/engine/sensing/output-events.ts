import { bracketedRoot, EXTREMUM_SHARE } from "../solver/locate";
import type { PowerStage } from "../solver/power-stage";
import { stateAfter } from "../solver/spectrum";
import type { SensorBank } from "./bank";
import { CUT_OFF_V, RAW_A, RAW_B, rowOf } from "./chain";
import { CLIP_V, SLEW_BAND } from "./output-bounds";

const CLIP_BAND_V = 1e-11;

/**
 * What interrupts a piece in the sensing chain: a rectifier that changes, an output that comes to a limit or leaves it, a
 * slew limit. Located by probing the bank inside the piece; only pieces that OutputBounds cannot rule out come here.
 */
export class OutputEvents {
  /** Slew class that an output takes at its event (2: follows its pole again; 0: no event) and when, s into the piece. */
  readonly pendingSlew = new Int8Array(3);
  readonly pendingSlewS = new Float64Array(3);
  private readonly node = new Float64Array(3);

  constructor(private readonly bank: SensorBank) {}

  classifySlew(stage: PowerStage, sense: Float64Array): void {
    const { bank } = this;
    const { chain, slewing } = bank;
    for (let k = 0; k < 3; k++) {
      if (!bank.isUsed[k]) continue;
      const input = bank.commutation.isRamp ? bank.ramp.inputAt(k, 0) : bank.inputAt(k, sense, stage.x);
      const rate = chain.poles.amplifierRadPerS * (input - bank.z[k]!);
      // at the limit itself the class that the last event left stays
      if (Math.abs(rate) > chain.slewVPerS * (1 + SLEW_BAND)) slewing[k] = rate > 0 ? 1 : -1;
      else if (Math.abs(rate) < chain.slewVPerS * (1 - SLEW_BAND)) slewing[k] = 0;
    }
  }

  private limitV(isCeiling: boolean): number {
    const { bank } = this;
    return isCeiling ? bank.chain.outputMaxV + CLIP_V : bank.chain.outputMinV - CLIP_V;
  }

  /** Voltage that is clipped: at the pin (fixed gain) or at the output node, before the clip. */
  private unclippedV(k: number, z: Float64Array, y: Float64Array): number {
    const { bank } = this;
    return bank.base[k]! + (bank.holdsPin || !bank.chain.hasFilter ? z[k]! : y[k]!);
  }

  /** Sets the clip class of each output; true if any changed. */
  classifyClips(): boolean {
    const { bank } = this;
    let isChanged = false;
    for (let k = 0; k < 3; k++) {
      if (!bank.isUsed[k]) continue;
      const clip = this.clipClass(this.unclippedV(k, bank.z, bank.y), this.unclippedV(k, bank.zEnd, bank.yEnd));
      if (clip !== bank.clip[k]) isChanged = true;
      bank.clip[k] = clip;
    }
    return isChanged;
  }

  private clipClass(startV: number, endV: number): number {
    const ceilingV = this.limitV(true);
    const floorV = this.limitV(false);
    if (startV > ceilingV + CLIP_BAND_V) return 1;
    if (startV < floorV - CLIP_BAND_V) return -1;
    if (startV > ceilingV - CLIP_BAND_V && endV > ceilingV + CLIP_BAND_V) return 1;
    if (startV < floorV + CLIP_BAND_V && endV < floorV - CLIP_BAND_V) return -1;
    return 0;
  }

  firstEvent(stage: PowerStage, sense: Float64Array, h: number, hasSlew: boolean): number {
    let firstS = -1;
    const { bank } = this;
    const { chain } = bank;
    if (chain.isUnipolar && !bank.commutation.isRamp) {
      firstS = earlier(firstS, this.rectifierEvent(0, RAW_A, stage, sense, h));
      if (chain.isLegSite) firstS = earlier(firstS, this.rectifierEvent(1, RAW_B, stage, sense, h));
    }
    for (let k = 0; k < 3; k++) {
      if (!bank.isUsed[k]) continue;
      firstS = earlier(firstS, this.clipEvent(k, stage, sense, h));
      if (hasSlew) firstS = earlier(firstS, this.slewEvent(k, stage, sense, h));
    }
    if (firstS >= 0) stage.crossings++;
    return firstS;
  }

  private rectifierEvent(leg: number, row: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const { bank } = this;
    const end = rowOf(sense, row, stage.xEnd);
    if (bank.passes[leg] ? end >= -CUT_OFF_V : end <= CUT_OFF_V) return -1;
    const start = rowOf(sense, row, stage.x);
    if (start > 0 === end > 0) return -1;
    return bracketedRoot((tau, out) => {
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
      out[0] = rowOf(sense, row, this.node);
      out[1] = 0;
    }, 0, start, h, end);
  }

  private clipEvent(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const { bank } = this;
    const end = this.unclippedV(k, bank.zEnd, bank.yEnd);
    const clip = bank.clip[k]!;
    if (clip !== 0) {
      const limitV = this.limitV(clip > 0);
      return clip * (end - limitV) < -CLIP_BAND_V ? this.outputRoot(k, limitV, stage, sense, h, end) : -1;
    }
    if (end > this.limitV(true) + CLIP_BAND_V) return this.outputRoot(k, this.limitV(true), stage, sense, h, end);
    if (end < this.limitV(false) - CLIP_BAND_V) return this.outputRoot(k, this.limitV(false), stage, sense, h, end);
    return bank.bounds.mayLeave(k) ? this.excursion(k, stage, sense, h) : -1;
  }

  /** Slope of the voltage that is clipped at the start (false) or the end (true) of the piece. */
  outputSlope(k: number, isEnd: boolean, stage: PowerStage, sense: Float64Array): number {
    const { bank } = this;
    const z = isEnd ? bank.zEnd : bank.z;
    const y = isEnd ? bank.yEnd : bank.y;
    if (bank.chain.hasFilter && !bank.holdsPin) return bank.chain.poles.filterRadPerS * (z[k]! - y[k]!);
    if (bank.slewing[k] !== 0) return bank.slewing[k]! * bank.chain.slewVPerS;
    const input = bank.commutation.isRamp ? bank.ramp.inputAt(k, isEnd ? 1 : 0) : bank.inputAt(k, sense, isEnd ? stage.xEnd : stage.x);
    return bank.chain.poles.amplifierRadPerS * (input - z[k]!);
  }

  /** A peak beyond a limit between two ends inside: the zero of the output's slope, then the crossing before it. */
  private excursion(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const { bank } = this;
    const slope0 = this.outputSlope(k, false, stage, sense);
    const limitV = this.limitV(slope0 > 0);
    const sign = slope0 > 0 ? 1 : -1;
    const slope1 = this.outputSlope(k, true, stage, sense);
    if (!(slope1 * slope0 < 0)) return -1;
    const peakS = bracketedRoot((tau, out) => {
      bank.probe(stage, sense, tau);
      out[0] = this.probedSlope(k, stage, sense, tau);
      out[1] = 0;
    }, 0, slope0, h, slope1, EXTREMUM_SHARE * h);
    bank.probe(stage, sense, peakS);
    const peak = this.unclippedV(k, bank.zEnd, bank.yEnd);
    const atS = sign * (peak - limitV) > CLIP_BAND_V ? this.outputRoot(k, limitV, stage, sense, peakS, peak) : -1;
    bank.probe(stage, sense, h);
    return atS;
  }

  probedSlope(k: number, stage: PowerStage, sense: Float64Array, tau: number): number {
    const { bank } = this;
    if ((bank.chain.hasFilter && !bank.holdsPin) || bank.commutation.isRamp || bank.slewing[k] !== 0) return this.outputSlope(k, true, stage, sense);
    stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
    return bank.chain.poles.amplifierRadPerS * (bank.inputAt(k, sense, this.node) - bank.zEnd[k]!);
  }

  private outputRoot(k: number, limitV: number, stage: PowerStage, sense: Float64Array, h: number, end: number): number {
    const { bank } = this;
    const start = this.unclippedV(k, bank.z, bank.y);
    if ((start - limitV) * (end - limitV) > 0) return -1;
    const root = bracketedRoot((tau, out) => {
      bank.probe(stage, sense, tau);
      out[0] = this.unclippedV(k, bank.zEnd, bank.yEnd) - limitV;
      out[1] = this.probedSlope(k, stage, sense, tau);
    }, 0, start - limitV, h, end - limitV);
    bank.probe(stage, sense, h);
    return root;
  }

  private slewEvent(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const { bank } = this;
    const { chain } = bank;
    const sign = bank.slewing[k]!;
    const excess = (x: Float64Array, s: number) => {
      const input = bank.commutation.isRamp ? bank.ramp.inputAt(k, s) : bank.inputAt(k, sense, x);
      const rate = chain.poles.amplifierRadPerS * (input - bank.zEnd[k]!);
      return (sign === 0 ? Math.abs(rate) : sign * rate) - chain.slewVPerS;
    };
    const endExcess = excess(stage.xEnd, 1);
    const bandVPerS = SLEW_BAND * chain.slewVPerS;
    if (sign === 0 ? endExcess <= bandVPerS : endExcess >= -bandVPerS) return -1;
    const startInput = bank.commutation.isRamp ? bank.ramp.inputAt(k, 0) : bank.inputAt(k, sense, stage.x);
    const startRate = chain.poles.amplifierRadPerS * (startInput - bank.z[k]!);
    const startExcess = (sign === 0 ? Math.abs(startRate) : sign * startRate) - chain.slewVPerS;
    if (startExcess > 0 === endExcess > 0) return -1;
    const root = bracketedRoot((tau, out) => {
      bank.probe(stage, sense, tau);
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
      out[0] = excess(this.node, 1);
      out[1] = 0;
    }, 0, startExcess, h, endExcess);
    bank.probe(stage, sense, root);
    if (sign === 0) {
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, root, this.node);
      const input = bank.commutation.isRamp ? bank.ramp.inputAt(k, 1) : bank.inputAt(k, sense, this.node);
      this.pendingSlew[k] = input > bank.zEnd[k]! ? 1 : -1;
    } else this.pendingSlew[k] = 2;
    this.pendingSlewS[k] = root;
    bank.probe(stage, sense, h);
    return root;
  }
}

/** The earlier of two times, -1 meaning none. */
const earlier = (a: number, b: number) => (b < 0 || (a >= 0 && a <= b) ? a : b);
