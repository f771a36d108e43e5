import type { ScenarioDocument } from "../../scenario/schema";
import { isHighState, isLowState, LEG_THROUGH } from "../model/legs";
import { SAME_INSTANT_S } from "../model/parameters";
import type { EventLog } from "../solver/event-log";
import { bracketedRoot, EXTREMUM_SHARE } from "../solver/locate";
import { AT_POLE1, AT_POLE2, buildOperator, OPERATOR_LENGTH } from "../solver/operator";
import type { ModeSlot } from "../solver/mode-slot";
import { PIECE_LENGTH, PIECE_RIDER_EVENT, PIECE_START } from "../solver/piece";
import type { PowerStage } from "../solver/power-stage";
import type { Rider } from "../solver/rider";
import { stateAfter } from "../solver/spectrum";
import { NODE_COUNT, nodeWeights, polynomialAt, segmentResponse, toMonomials } from "./cascade";
import { CURRENT_SLOPE, ERROR_A, ERROR_B, RAW_A, RAW_B, SENSE_A, SENSE_B, type SensingChain } from "./chain";

export const OUT_A = 0;
export const OUT_B = 1;
export const OUT_COMBINED = 2;

/** A shunt voltage this close to cut-off is at cut-off: 1e-12 V is a thousandth of the smallest offset of any channel. */
const CUT_OFF_V = 1e-12;
/** D-25: an output counts as clipped beyond a limit by more than this. */
const CLIP_V = 1e-9;
const CLIP_BAND_V = 1e-11;
/** Largest |lambda| h of a piece of a commutation ramp: interpolation error below 1e-8 of the current's change. */
const RAMP_RATE = 0.25;
const RAMP_PIECES_MAX = 16;
/** Twice the share of its value by which the current may change before a period with a kink is surveyed anew. */
const KINK_REACH = 0.2;
const WEIGHT_RING = 6;
/** Parts of a piece in which the slope of an output is looked at for extrema. */
const EXTREMUM_SCAN = 8;
/** Rates this close to the slew limit, as a share, are at it. */
const SLEW_BAND = 1e-6;

/**
 * The sensing channels beside the power stage: shunt voltages (with commutation ramps, D-20), offset, common-mode error,
 * rectifier, amplifier pole, slew limit, clip, filter pole, clip; for leg A, leg B and the combined output at once (D-21).
 * State per output: z behind the amplifier's pole and y behind the filter's, both without the reference, except y of a
 * fixed gain, which follows the pin and so holds it (D-25).
 */
export class SensorBank implements Rider {
  readonly z = new Float64Array(3);
  readonly y = new Float64Array(3);
  readonly zEnd = new Float64Array(3);
  readonly yEnd = new Float64Array(3);
  /** Clip state of each output in the piece tried last: -1 floor, 0, +1 ceiling. */
  readonly clip = new Int8Array(3);
  readonly isUsed = [true, false, false];
  /** Outputs that the converter reads. */
  readonly isRead = [false, false, false];
  /** Rectifier of each leg's channel conducts in this piece. */
  readonly passes = [true, true];
  /** Input of the two channels (V, after the rectifier) integrated over a ramp piece; null outside ramps. */
  readonly rampIntegral = new Float64Array(2);
  isRamp = false;
  readonly share = new Float64Array(2);
  private readonly target = new Float64Array(2);
  private readonly slewing = new Int8Array(3);
  private readonly base = new Float64Array(3);
  private readonly rawEnds = new Float64Array(4);
  private readonly inputMin = new Float64Array(3);
  private readonly inputMax = new Float64Array(3);
  private readonly nodes = new Float64Array(2 * NODE_COUNT);
  /** Response of each output to its input, one pole and both. */
  private readonly response = new Float64Array(6);
  /** Length of the stretch being computed, s. */
  private readonly lengthS = new Float64Array(1);
  private readonly monomials = new Float64Array(NODE_COUNT);
  private readonly weightDurations = new Float64Array(WEIGHT_RING).fill(-1);
  private readonly weights = Array.from({ length: WEIGHT_RING }, () => new Float64Array(2 * NODE_COUNT));
  private nextWeight = 0;
  private readonly scratch = new Float64Array(OPERATOR_LENGTH);
  private readonly node = new Float64Array(3);
  private readonly ramp = new Float64Array(6);
  private wasClipped = false;

  constructor(readonly chain: SensingChain, document: ScenarioDocument, public log: EventLog | null) {
    this.isUsed[1] = chain.isLegSite;
    this.isUsed[2] = chain.hasCombined;
    const { arrangement } = document.sensing.amplifier;
    if (arrangement === "combinedMidscale") this.isRead[2] = true;
    else {
      this.isRead[0] = true;
      this.isRead[1] = chain.isLegSite;
    }
    this.setBases();
  }

  private setBases(): void {
    this.base[0] = this.chain.singleBaseV;
    this.base[2] = this.chain.referenceV;
  }

  /** The filter's state holds the pin voltage, reference included (fixed gain with a filter). */
  get holdsPin(): boolean {
    return this.chain.hasFilter && !this.chain.isCurrentOutput;
  }

  private rows(slot: ModeSlot): Float64Array {
    if (slot.senseStamp !== this.chain.stamp) {
      this.chain.fillRows(slot);
      slot.senseStamp = this.chain.stamp;
    }
    return slot.sense;
  }

  begin(stage: PowerStage): void {
    const { chain } = this;
    const { mode } = stage.slot;
    this.share[0] = this.target[0] = isHighState(mode.legA) ? 1 : 0;
    this.share[1] = this.target[1] = isHighState(mode.legB) ? 1 : 0;
    const sense = this.rows(stage.slot);
    // D-19: settled at the initial current, the inductive part left out
    const settled = (raw: number, at: number, slopeAt: number) => rowOf(sense, raw, stage.x) - inductivePart(chain, sense, at, slopeAt, stage);
    let a = settled(RAW_A, SENSE_A, 0);
    let b = settled(RAW_B, SENSE_B, 1);
    if (chain.isUnipolar) {
      a = Math.max(0, a);
      b = Math.max(0, b);
    }
    this.z[0] = chain.gain * a;
    this.z[1] = chain.gain * b;
    this.z[2] = chain.gain * chain.pairSign * (a - b);
    for (let k = 0; k < 3; k++) {
      const pin = this.base[k]! + this.z[k]!;
      this.y[k] = this.holdsPin ? Math.min(Math.max(pin, chain.outputMinV), chain.outputMaxV) : this.z[k]!;
    }
  }

  changeAt(timeS: number, _stage: PowerStage): void {
    this.chain.changeAt(timeS);
    this.setBases();
  }

  onMode(stage: PowerStage, currentBeforeA: number): void {
    this.turnShare(0, stage.slot.mode.legA, stage, currentBeforeA);
    this.turnShare(1, stage.slot.mode.legB, stage, currentBeforeA);
  }

  private turnShare(leg: number, state: number, stage: PowerStage, currentBeforeA: number): void {
    const target = isHighState(state) ? 1 : isLowState(state) ? 0 : this.target[leg]!;
    if (target === this.target[leg] && state !== LEG_THROUGH) {
      if (this.share[leg] !== target && stage.x[0] === 0) this.share[leg] = target;
      return;
    }
    this.target[leg] = target;
    if (this.chain.commutationS === 0 || currentBeforeA === 0 || stage.x[0] === 0 || state === LEG_THROUGH) this.share[leg] = target;
  }

  limitPiece(stage: PowerStage): void {
    const { share, target, chain } = this;
    this.isRamp = share[0] !== target[0] || share[1] !== target[1];
    if (!this.isRamp) return;
    let rest = Infinity;
    for (let leg = 0; leg < 2; leg++) {
      if (share[leg] !== target[leg]) rest = Math.min(rest, Math.abs(target[leg]! - share[leg]!) * chain.commutationS);
    }
    const piecesCount = Math.min(Math.ceil((stage.slot.spectrum.rateMaxPerS * rest) / RAMP_RATE), RAMP_PIECES_MAX);
    if (piecesCount > 1) rest /= piecesCount;
    if (rest < stage.piece[PIECE_LENGTH]!) stage.piece[PIECE_LENGTH] = rest;
  }

  /* ---------------------------------------------------- one piece -------------------------------------------------- */

  attempt(stage: PowerStage): boolean {
    const operator = stage.stepOperator;
    const h = stage.piece[PIECE_LENGTH]!;
    this.lengthS[0] = h;
    const sense = this.rows(stage.slot);
    this.hasKink = false;
    if (this.isRamp) this.fillNodes(stage, sense, h);
    const isSteady = this.boundInputs(stage, sense);
    const hasSlew = this.chain.slewVPerS !== Infinity && this.maySlew();
    if (hasSlew) this.classifySlew(stage, sense);
    this.isRegular = isSteady && !hasSlew && this.staysInside();
    if (this.isRegular) {
      this.clip[0] = this.clip[1] = this.clip[2] = 0;
      this.compute(stage, sense, operator, true);
      return false;
    }
    this.compute(stage, sense, operator, true);
    // the clip class needs z at the end, which no clip changes; y does when the filter follows a clipped pin
    if (this.classifyClips() && this.holdsPin) this.compute(stage, sense, operator, true);
    const eventS = this.firstEvent(stage, sense, h, hasSlew);
    stage.piece[PIECE_RIDER_EVENT] = eventS;
    return eventS >= 0;
  }

  /** Some output is at its slew limit, or could come to it: its pole's drive is at most the spread of its input and state. */
  private maySlew(): boolean {
    for (let k = 0; k < 3; k++) if (this.isUsed[k] && (this.slewing[k] !== 0 || this.slewMarginV(k) < 0)) return true;
    return false;
  }

  /** What is left between the largest drive of output k in this piece and the one at which it slews, V. */
  private slewMarginV(k: number): number {
    const { chain } = this;
    const z = this.z[k]!;
    const high = z > this.inputMax[k]! ? z : this.inputMax[k]!;
    const low = z < this.inputMin[k]! ? z : this.inputMin[k]!;
    return ((1 - SLEW_BAND) * chain.slewVPerS) / chain.poles.amplifierRadPerS - (high - low);
  }

  /** No output can reach a limit in this piece. */
  private staysInside(): boolean {
    for (let k = 0; k < 3; k++) if (this.isUsed[k] && this.mayLeave(k)) return false;
    return true;
  }

  /** Input of output k behind the rectifier, V, for the state x, times the gain. */
  private inputAt(k: number, sense: Float64Array, x: Float64Array): number {
    const a = this.passes[0] ? rowOf(sense, RAW_A, x) : 0;
    if (k === OUT_A) return this.chain.gain * a;
    const b = this.passes[1] ? rowOf(sense, RAW_B, x) : 0;
    return this.chain.gain * (k === OUT_B ? b : this.chain.pairSign * (a - b));
  }

  /** The same inside a ramp, at the end of the piece computed last (share 1) or its start (share 0). */
  private rampInputAt(k: number, s: number): number {
    const value = (leg: number) => {
      toMonomials(this.nodes, leg * NODE_COUNT, this.monomials);
      const v = polynomialAt(this.monomials, s);
      return this.chain.isUnipolar ? Math.max(0, v) : v;
    };
    if (k === OUT_A) return this.chain.gain * value(0);
    if (k === OUT_B) return this.chain.gain * value(1);
    return this.chain.gain * this.chain.pairSign * (value(0) - value(1));
  }

  private classifySlew(stage: PowerStage, sense: Float64Array): void {
    const { chain, slewing } = this;
    for (let k = 0; k < 3; k++) {
      if (!this.isUsed[k]) continue;
      const input = this.isRamp ? this.rampInputAt(k, 0) : this.inputAt(k, sense, stage.x);
      const rate = chain.poles.amplifierRadPerS * (input - this.z[k]!);
      // at the limit itself the class that the last event left stays
      if (Math.abs(rate) > chain.slewVPerS * (1 + SLEW_BAND)) slewing[k] = rate > 0 ? 1 : -1;
      else if (Math.abs(rate) < chain.slewVPerS * (1 - SLEW_BAND)) slewing[k] = 0;
    }
  }

  /** zEnd, yEnd after `lengthS` from the present state, with the classes as they stand. */
  private compute(stage: PowerStage, sense: Float64Array, o: Float64Array, hasNodes: boolean): void {
    const { chain, response } = this;
    if (this.isRamp) {
      if (!hasNodes) this.fillNodes(stage, sense, this.lengthS[0]!);
      this.rampLeg(0);
      if (chain.isLegSite) this.rampLeg(1);
    } else {
      this.steadyResponse(stage.x, sense, o, RAW_A, 0, this.passes[0]!);
      if (chain.isLegSite) this.steadyResponse(stage.x, sense, o, RAW_B, 2, this.passes[1]!);
    }
    const { gain } = chain;
    for (let n = 0; n < 4; n++) response[n]! *= gain;
    response[4] = chain.pairSign * (response[0]! - response[2]!);
    response[5] = chain.pairSign * (response[1]! - response[3]!);
    for (let k = 0; k < 3; k++) if (this.isUsed[k]) this.finishOutput(k, o);
  }

  private steadyResponse(x: Float64Array, sense: Float64Array, o: Float64Array, row: number, at: number, passes: boolean): void {
    if (!passes) {
      this.response[at] = 0;
      this.response[at + 1] = 0;
      return;
    }
    const r0 = sense[row]!;
    const r1 = sense[row + 1]!;
    const r2 = sense[row + 2]!;
    const rc = sense[row + 3]!;
    let one = rc * (1 - o[36]!);
    let two = rc * o[39]!;
    if (r0 !== 0) {
      one += r0 * affineAt(o, AT_POLE1, x);
      two += r0 * affineAt(o, AT_POLE2, x);
    }
    if (r1 !== 0) {
      one += r1 * affineAt(o, AT_POLE1 + 4, x);
      two += r1 * affineAt(o, AT_POLE2 + 4, x);
    }
    if (r2 !== 0) {
      one += r2 * affineAt(o, AT_POLE1 + 8, x);
      two += r2 * affineAt(o, AT_POLE2 + 8, x);
    }
    this.response[at] = one;
    this.response[at + 1] = two;
  }

  private finishOutput(k: number, o: Float64Array): void {
    const { chain, z, y, zEnd, yEnd } = this;
    const one = this.response[2 * k]!;
    const two = this.response[2 * k + 1]!;
    const h = this.lengthS[0]!;
    const slewing = this.slewing[k]!;
    const rate = slewing === 0 ? 0 : slewing * chain.slewVPerS;
    zEnd[k] = slewing === 0 ? o[36]! * z[k]! + one : z[k]! + rate * h;
    if (!chain.hasFilter) {
      yEnd[k] = zEnd[k]!;
      return;
    }
    const eq = o[37]!;
    const base = this.holdsPin ? this.base[k]! : 0;
    const stuckV = this.stuckAt(k);
    if (this.holdsPin && (stuckV !== null || this.clip[k] !== 0)) {
      const pinV = stuckV ?? (this.clip[k]! > 0 ? chain.outputMaxV : chain.outputMinV);
      yEnd[k] = eq * y[k]! + (1 - eq) * pinV;
    } else if (slewing === 0) yEnd[k] = base + eq * (y[k]! - base) + o[38]! * z[k]! + two;
    else yEnd[k] = base + eq * (y[k]! - base) + z[k]! * (1 - eq) + rate * (h - (1 - eq) / chain.poles.filterRadPerS);
  }

  stuckAt(k: number): number | null {
    if (k === OUT_A) return this.chain.stuckAV;
    return k === OUT_B ? this.chain.stuckBV : this.isRead[OUT_COMBINED] ? (this.chain.stuckAV ?? this.chain.stuckBV) : null;
  }

  /* ------------------------------------------------------- ramps ---------------------------------------------------- */

  /** Shunt voltages with errors at the five nodes of a ramp piece of length h. */
  private fillNodes(stage: PowerStage, sense: Float64Array, h: number): void {
    const { chain, node, nodes, ramp } = this;
    this.setRamp(stage);
    const step = stage.operator(h / (NODE_COUNT - 1));
    const l = chain.shuntInductanceH;
    const isStillError = sense[ERROR_A] === 0 && sense[ERROR_A + 1] === 0 && sense[ERROR_A + 2] === 0;
    node[0] = stage.x[0]!;
    node[1] = stage.x[1]!;
    node[2] = stage.x[2]!;
    for (let j = 0; j < NODE_COUNT; j++) {
      if (j > 0) advance(step, node);
      const t = (h * j) / (NODE_COUNT - 1);
      const i = node[0]!;
      const slope = l === 0 ? 0 : rowOf(sense, CURRENT_SLOPE, node);
      const factorA = ramp[0]! + ramp[1]! * t;
      const own = chain.shuntAOhm * factorA * i + l * (ramp[1]! * i + factorA * slope);
      const errorA = isStillError ? sense[ERROR_A + 3]! : rowOf(sense, ERROR_A, node);
      nodes[j] = (ramp[4] === 0 ? own : rowOf(sense, SENSE_A, node)) + errorA;
      if (!chain.isLegSite) continue;
      const factorB = ramp[2]! + ramp[3]! * t;
      const ownB = chain.shuntBOhm * factorB * i + l * (ramp[3]! * i + factorB * slope);
      const errorB = isStillError ? sense[ERROR_B + 3]! : rowOf(sense, ERROR_B, node);
      nodes[NODE_COUNT + j] = (ramp[5] === 0 ? ownB : rowOf(sense, SENSE_B, node)) + errorB;
    }
  }

  /**
   * What each shunt shows of the motor current during a ramp (D-20): factor at the piece's start and its rate, for A in
   * ramp[0..1] and B in ramp[2..3]; ramp[4], ramp[5] are 1 where shoot-through makes the stage's own row count.
   */
  private setRamp(stage: PowerStage): void {
    const { chain, share, target, ramp } = this;
    const sA = share[0]!;
    const sB = share[1]!;
    const dA = sA === target[0] ? 0 : Math.sign(target[0]! - sA) / chain.commutationS;
    const dB = sB === target[1] ? 0 : Math.sign(target[1]! - sB) / chain.commutationS;
    const { legA, legB } = stage.slot.mode;
    ramp[4] = legA === LEG_THROUGH || (!chain.isLegSite && legB === LEG_THROUGH) ? 1 : 0;
    ramp[5] = legB === LEG_THROUGH ? 1 : 0;
    switch (chain.site) {
      case "legTop":
        ramp[0] = sA;
        ramp[1] = dA;
        ramp[2] = -sB;
        ramp[3] = -dB;
        break;
      case "legBottom":
        ramp[0] = sA - 1;
        ramp[1] = dA;
        ramp[2] = 1 - sB;
        ramp[3] = -dB;
        break;
      case "line":
        ramp[0] = 1;
        ramp[1] = 0;
        break;
      default:
        ramp[0] = sA - sB;
        ramp[1] = dA - dB;
    }
  }

  private rampLeg(leg: number): void {
    const { nodes, response } = this;
    const h = this.lengthS[0]!;
    const at = leg * NODE_COUNT;
    response[2 * leg] = 0;
    response[2 * leg + 1] = 0;
    let isAbove = true;
    let isBelow = true;
    for (let j = 0; j < NODE_COUNT; j++) {
      if (nodes[at + j]! < -CUT_OFF_V) isAbove = false;
      else if (nodes[at + j]! > CUT_OFF_V) isBelow = false;
    }
    if (this.chain.isUnipolar && isBelow) return;
    if (!this.chain.isUnipolar || isAbove) {
      const w = this.weightsFor(h);
      let one = 0;
      let two = 0;
      for (let j = 0; j < NODE_COUNT; j++) {
        one += w[j]! * nodes[at + j]!;
        two += w[NODE_COUNT + j]! * nodes[at + j]!;
      }
      response[2 * leg] = one;
      response[2 * leg + 1] = two;
      return;
    }
    this.hasKink = true;
    this.eachPositive(leg, (from, to) => segmentResponse(this.chain.poles, this.monomials, from, to, h, response, 2 * leg));
  }

  /** Calls with each part of the piece, as shares of it, where the shunt voltage is above cut-off. */
  private eachPositive(leg: number, visit: (from: number, to: number) => void): void {
    const at = leg * NODE_COUNT;
    toMonomials(this.nodes, at, this.monomials);
    let from = this.nodes[at]! > 0 ? 0 : -1;
    for (let j = 1; j < NODE_COUNT; j++) {
      const v0 = this.nodes[at + j - 1]!;
      const v1 = this.nodes[at + j]!;
      if (v0 > 0 === v1 > 0) continue;
      const root = bracketedRoot((s, out) => {
        out[0] = polynomialAt(this.monomials, s);
        out[1] = 0;
        const c = this.monomials;
        out[1] = ((4 * c[4]! * s + 3 * c[3]!) * s + 2 * c[2]!) * s + c[1]!;
      }, (j - 1) / 4, v0, j / 4, v1);
      if (v1 > 0) from = root;
      else {
        visit(from, root);
        from = -1;
      }
    }
    if (from >= 0) visit(from, 1);
  }

  private weightsFor(h: number): Float64Array {
    for (let k = 0; k < WEIGHT_RING; k++) if (this.weightDurations[k] === h) return this.weights[k]!;
    const k = this.nextWeight;
    this.nextWeight = (k + 1) % WEIGHT_RING;
    this.weightDurations[k] = h;
    nodeWeights(this.chain.poles, h, this.weights[k]!);
    return this.weights[k]!;
  }

  /** Integral over the piece tried last of each channel's input (V s, behind the rectifier, before the gain): ramps only. */
  integrateRamp(stage: PowerStage, h: number): void {
    this.fillNodes(stage, this.rows(stage.slot), h);
    for (let leg = 0; leg < (this.chain.isLegSite ? 2 : 1); leg++) {
      let sum = 0;
      const add = (from: number, to: number) => {
        const c = this.monomials;
        for (let k = 0; k < NODE_COUNT; k++) sum += (c[k]! * (to ** (k + 1) - from ** (k + 1))) / (k + 1);
      };
      if (this.chain.isUnipolar) this.eachPositive(leg, add);
      else {
        toMonomials(this.nodes, leg * NODE_COUNT, this.monomials);
        add(0, 1);
      }
      this.rampIntegral[leg] = sum * h;
    }
  }

  /* ------------------------------------------------------- events --------------------------------------------------- */

  private limitV(isCeiling: boolean): number {
    return isCeiling ? this.chain.outputMaxV + CLIP_V : this.chain.outputMinV - CLIP_V;
  }

  /** Voltage that is clipped: at the pin (fixed gain) or at the output node, before the clip. */
  private unclippedV(k: number, z: Float64Array, y: Float64Array): number {
    return this.base[k]! + (this.holdsPin || !this.chain.hasFilter ? z[k]! : y[k]!);
  }

  /** Sets the clip class of each output; true if any changed. */
  private classifyClips(): boolean {
    let isChanged = false;
    for (let k = 0; k < 3; k++) {
      if (!this.isUsed[k]) continue;
      const clip = this.clipClass(this.unclippedV(k, this.z, this.y), this.unclippedV(k, this.zEnd, this.yEnd));
      if (clip !== this.clip[k]) isChanged = true;
      this.clip[k] = clip;
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

  private firstEvent(stage: PowerStage, sense: Float64Array, h: number, hasSlew: boolean): number {
    let firstS = -1;
    const { chain } = this;
    if (chain.isUnipolar && !this.isRamp) {
      firstS = earlier(firstS, this.rectifierEvent(0, RAW_A, stage, sense, h));
      if (chain.isLegSite) firstS = earlier(firstS, this.rectifierEvent(1, RAW_B, stage, sense, h));
    }
    for (let k = 0; k < 3; k++) {
      if (!this.isUsed[k]) continue;
      firstS = earlier(firstS, this.clipEvent(k, stage, sense, h));
      if (hasSlew) firstS = earlier(firstS, this.slewEvent(k, stage, sense, h));
    }
    if (firstS >= 0) stage.crossings++;
    return firstS;
  }

  /**
   * Bounds of each output's input over the piece, V behind the gain (its ends, or the nodes of a ramp), and the class of
   * each rectifier. True if no rectifier changes its class inside the piece.
   */
  private boundInputs(stage: PowerStage, sense: Float64Array): boolean {
    const { chain, inputMin, inputMax, nodes } = this;
    let isSteady = true;
    const legCount = chain.isLegSite ? 2 : 1;
    for (let leg = 0; leg < legCount; leg++) {
      let low: number;
      let high: number;
      if (this.isRamp) {
        const at = leg * NODE_COUNT;
        low = high = nodes[at]!;
        for (let j = at + 1; j < at + NODE_COUNT; j++) {
          const v = nodes[j]!;
          if (v < low) low = v;
          else if (v > high) high = v;
        }
      } else {
        const at = leg === 0 ? RAW_A : RAW_B;
        const start = rowOf(sense, at, stage.x);
        const end = rowOf(sense, at, stage.xEnd);
        low = start < end ? start : end;
        high = start < end ? end : start;
        this.rawEnds[2 * leg] = start;
        this.rawEnds[2 * leg + 1] = end;
        if (chain.isUnipolar) {
          const passes = (start > CUT_OFF_V || start < -CUT_OFF_V ? start : end) > 0;
          this.passes[leg] = passes;
          if (passes ? end < -CUT_OFF_V : end > CUT_OFF_V) isSteady = false;
        }
      }
      if (chain.isUnipolar) {
        low = low > 0 ? low : 0;
        high = high > 0 ? high : 0;
      }
      inputMin[leg] = chain.gain * low;
      inputMax[leg] = chain.gain * high;
    }
    const first = chain.pairSign > 0 ? 0 : 1;
    inputMin[2] = inputMin[first]! - inputMax[1 - first]!;
    inputMax[2] = inputMax[first]! - inputMin[1 - first]!;
    return isSteady;
  }

  private rectifierEvent(leg: number, row: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const end = rowOf(sense, row, stage.xEnd);
    if (this.passes[leg] ? end >= -CUT_OFF_V : end <= CUT_OFF_V) return -1;
    const start = rowOf(sense, row, stage.x);
    if (start > 0 === end > 0) return -1;
    return bracketedRoot((tau, out) => {
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
      out[0] = rowOf(sense, row, this.node);
      out[1] = 0;
    }, 0, start, h, end);
  }

  private clipEvent(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const end = this.unclippedV(k, this.zEnd, this.yEnd);
    const clip = this.clip[k]!;
    if (clip !== 0) {
      const limitV = this.limitV(clip > 0);
      return clip * (end - limitV) < -CLIP_BAND_V ? this.outputRoot(k, limitV, stage, sense, h, end) : -1;
    }
    if (end > this.limitV(true) + CLIP_BAND_V) return this.outputRoot(k, this.limitV(true), stage, sense, h, end);
    if (end < this.limitV(false) - CLIP_BAND_V) return this.outputRoot(k, this.limitV(false), stage, sense, h, end);
    return this.mayLeave(k) ? this.excursion(k, stage, sense, h) : -1;
  }

  /** Real poles only average: an output stays between its states and its input, so most pieces need no closer look. */
  private mayLeave(k: number): boolean {
    const { chain } = this;
    const z = this.z[k]!;
    const ownV = this.holdsPin || !chain.hasFilter ? z : this.y[k]!;
    let high = this.inputMax[k]!;
    let low = this.inputMin[k]!;
    if (z > high) high = z;
    if (z < low) low = z;
    if (ownV > high) high = ownV;
    if (ownV < low) low = ownV;
    const base = this.base[k]!;
    return high + base > chain.outputMaxV + CLIP_V || low + base < chain.outputMinV - CLIP_V;
  }

  /** Slope of the voltage that is clipped at the start (false) or the end (true) of the piece. */
  private outputSlope(k: number, isEnd: boolean, stage: PowerStage, sense: Float64Array): number {
    const z = isEnd ? this.zEnd : this.z;
    const y = isEnd ? this.yEnd : this.y;
    if (this.chain.hasFilter && !this.holdsPin) return this.chain.poles.filterRadPerS * (z[k]! - y[k]!);
    if (this.slewing[k] !== 0) return this.slewing[k]! * this.chain.slewVPerS;
    const input = this.isRamp ? this.rampInputAt(k, isEnd ? 1 : 0) : this.inputAt(k, sense, isEnd ? stage.xEnd : stage.x);
    return this.chain.poles.amplifierRadPerS * (input - z[k]!);
  }

  /** A peak beyond a limit between two ends inside: the zero of the output's slope, then the crossing before it. */
  private excursion(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const slope0 = this.outputSlope(k, false, stage, sense);
    const limitV = this.limitV(slope0 > 0);
    const sign = slope0 > 0 ? 1 : -1;
    const slope1 = this.outputSlope(k, true, stage, sense);
    if (!(slope1 * slope0 < 0)) return -1;
    const peakS = bracketedRoot((tau, out) => {
      this.probe(stage, sense, tau);
      out[0] = this.probedSlope(k, stage, sense, tau);
      out[1] = 0;
    }, 0, slope0, h, slope1, EXTREMUM_SHARE * h);
    this.probe(stage, sense, peakS);
    const peak = this.unclippedV(k, this.zEnd, this.yEnd);
    const atS = sign * (peak - limitV) > CLIP_BAND_V ? this.outputRoot(k, limitV, stage, sense, peakS, peak) : -1;
    this.probe(stage, sense, h);
    return atS;
  }

  private probedSlope(k: number, stage: PowerStage, sense: Float64Array, tau: number): number {
    if ((this.chain.hasFilter && !this.holdsPin) || this.isRamp || this.slewing[k] !== 0) return this.outputSlope(k, true, stage, sense);
    stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
    return this.chain.poles.amplifierRadPerS * (this.inputAt(k, sense, this.node) - this.zEnd[k]!);
  }

  /** zEnd, yEnd at tau inside the piece. */
  private probe(stage: PowerStage, sense: Float64Array, tau: number): void {
    buildOperator(stage.slot.mode, stage.slot.spectrum, this.chain.poles, tau, this.scratch);
    this.lengthS[0] = tau;
    this.compute(stage, sense, this.scratch, false);
  }

  private outputRoot(k: number, limitV: number, stage: PowerStage, sense: Float64Array, h: number, end: number): number {
    const start = this.unclippedV(k, this.z, this.y);
    if ((start - limitV) * (end - limitV) > 0) return -1;
    const root = bracketedRoot((tau, out) => {
      this.probe(stage, sense, tau);
      out[0] = this.unclippedV(k, this.zEnd, this.yEnd) - limitV;
      out[1] = this.probedSlope(k, stage, sense, tau);
    }, 0, start - limitV, h, end - limitV);
    this.probe(stage, sense, h);
    return root;
  }

  private slewEvent(k: number, stage: PowerStage, sense: Float64Array, h: number): number {
    const { chain } = this;
    const sign = this.slewing[k]!;
    const excess = (x: Float64Array, s: number) => {
      const input = this.isRamp ? this.rampInputAt(k, s) : this.inputAt(k, sense, x);
      const rate = chain.poles.amplifierRadPerS * (input - this.zEnd[k]!);
      return (sign === 0 ? Math.abs(rate) : sign * rate) - chain.slewVPerS;
    };
    const endExcess = excess(stage.xEnd, 1);
    const bandVPerS = SLEW_BAND * chain.slewVPerS;
    if (sign === 0 ? endExcess <= bandVPerS : endExcess >= -bandVPerS) return -1;
    const startInput = this.isRamp ? this.rampInputAt(k, 0) : this.inputAt(k, sense, stage.x);
    const startRate = chain.poles.amplifierRadPerS * (startInput - this.z[k]!);
    const startExcess = (sign === 0 ? Math.abs(startRate) : sign * startRate) - chain.slewVPerS;
    if (startExcess > 0 === endExcess > 0) return -1;
    const root = bracketedRoot((tau, out) => {
      this.probe(stage, sense, tau);
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, tau, this.node);
      out[0] = excess(this.node, 1);
      out[1] = 0;
    }, 0, startExcess, h, endExcess);
    this.probe(stage, sense, root);
    if (sign === 0) {
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, root, this.node);
      const input = this.isRamp ? this.rampInputAt(k, 1) : this.inputAt(k, sense, this.node);
      this.pendingSlew[k] = input > this.zEnd[k]! ? 1 : -1;
    } else this.pendingSlew[k] = 2;
    this.pendingSlewS[k] = root;
    this.probe(stage, sense, h);
    return root;
  }

  private readonly pendingSlew = new Int8Array(3);
  private readonly pendingSlewS = new Float64Array(3);

  commit(stage: PowerStage): void {
    const { share, target, chain } = this;
    const h = stage.piece[PIECE_LENGTH]!;
    this.noteClip(stage);
    for (let k = 0; k < 3; k++) {
      this.z[k] = this.zEnd[k]!;
      this.y[k] = this.yEnd[k]!;
      if (this.pendingSlew[k] === 0) continue;
      // several outputs may reach their limit at one instant (the pair and its difference do)
      if (Math.abs(h - this.pendingSlewS[k]!) <= SAME_INSTANT_S) this.slewing[k] = this.pendingSlew[k] === 2 ? 0 : this.pendingSlew[k]!;
      this.pendingSlew[k] = 0;
    }
    if (!this.isRamp) return;
    for (let leg = 0; leg < 2; leg++) {
      const gap = target[leg]! - share[leg]!;
      if (gap === 0) continue;
      const step = h / chain.commutationS;
      share[leg] = step >= Math.abs(gap) * (1 - 1e-12) ? target[leg]! : share[leg]! + Math.sign(gap) * step;
    }
  }

  /** Clip events of the outputs that are read: one interval while any of them is clipped (D-26). */
  private noteClip(stage: PowerStage): void {
    if (!this.log) return;
    const startS = stage.piece[PIECE_START]!;
    const isClipped = this.isAnyClipped();
    if (isClipped === this.wasClipped) return;
    this.wasClipped = isClipped;
    if (!isClipped) {
      this.log.add(startS, "clipEnds", "");
      return;
    }
    const k = this.isRead[OUT_COMBINED] ? OUT_COMBINED : this.clip[0] !== 0 ? OUT_A : OUT_B;
    const word = this.clip[k]! > 0 ? "ceiling" : "floor";
    this.log.add(startS, "clipStarts", word, this.chain.isLegSite && k < OUT_COMBINED ? (k === OUT_A ? "A" : "B") : undefined);
  }

  isAnyClipped(): boolean {
    for (let k = 0; k < 3; k++) if (this.isRead[k] && this.clip[k] !== 0) return true;
    return false;
  }

  /* ------------------------------------------------------ readings -------------------------------------------------- */

  /** Output voltage k from the states z and y (at the pin of the converter, clipped). */
  outputV(k: number, z: Float64Array, y: Float64Array): number {
    const { chain } = this;
    const stuckV = this.stuckAt(k);
    if (this.holdsPin) return y[k]!;
    if (stuckV !== null) return stuckV;
    const v = this.base[k]! + (chain.hasFilter ? y[k]! : z[k]!);
    return Math.min(Math.max(v, chain.outputMinV), chain.outputMaxV);
  }

  /** Shunt voltage of a leg at tau seconds into the present piece, x being the state there: R i + L di/dt with the ramp (D-31). */
  senseV(leg: number, stage: PowerStage, x: Float64Array, tauS: number): number {
    const sense = this.rows(stage.slot);
    const { share, target, chain } = this;
    if (share[0] === target[0] && share[1] === target[1]) return rowOf(sense, leg === 0 ? SENSE_A : SENSE_B, x);
    this.setRamp(stage);
    const { ramp } = this;
    if (ramp[4 + leg] !== 0) return rowOf(sense, leg === 0 ? SENSE_A : SENSE_B, x);
    const factor = ramp[2 * leg]! + ramp[2 * leg + 1]! * tauS;
    const ohm = leg === 0 ? chain.shuntAOhm : chain.shuntBOhm;
    return ohm * factor * x[0]! + chain.shuntInductanceH * (ramp[2 * leg + 1]! * x[0]! + factor * rowOf(sense, CURRENT_SLOPE, x));
  }

  /** Fills zAt and yAt for tau into the piece that was tried last, leaving its end as it is. */
  readAt(stage: PowerStage, tauS: number): void {
    if (tauS === 0) {
      this.zAt.set(this.z);
      this.yAt.set(this.y);
      return;
    }
    this.keep.set(this.zEnd);
    this.keep.set(this.yEnd, 3);
    this.probe(stage, this.rows(stage.slot), tauS);
    this.zAt.set(this.zEnd);
    this.yAt.set(this.yEnd);
    this.zEnd.set(this.keep.subarray(0, 3));
    this.yEnd.set(this.keep.subarray(3));
  }

  /** Visits the extrema of output k inside the piece tried last, zAt and yAt filled at each. */
  visitExtrema(k: number, stage: PowerStage, visit: () => void): void {
    const sense = this.rows(stage.slot);
    const h = stage.piece[PIECE_LENGTH]!;
    if (this.isRamp) this.fillNodes(stage, sense, h);
    this.keep.set(this.zEnd);
    this.keep.set(this.yEnd, 3);
    const slopeAt = (tau: number) => {
      this.probe(stage, sense, tau);
      return this.holdsPin ? this.pinFilterSlope(k, true) : this.probedSlope(k, stage, sense, tau);
    };
    let fromS = 0;
    let from = this.holdsPin ? this.pinFilterSlope(k, false) : this.outputSlope(k, false, stage, sense);
    for (let n = 1; n <= EXTREMUM_SCAN; n++) {
      const toS = (h * n) / EXTREMUM_SCAN;
      const to = slopeAt(toS);
      if (from * to < 0) {
        const atS = bracketedRoot((tau, out) => {
          out[0] = slopeAt(tau);
          out[1] = 0;
        }, fromS, from, toS, to, 1e-4 * h);
        this.probe(stage, sense, atS);
        this.zAt.set(this.zEnd);
        this.yAt.set(this.yEnd);
        visit();
      }
      fromS = toS;
      from = to;
    }
    this.probe(stage, sense, h);
    this.zEnd.set(this.keep.subarray(0, 3));
    this.yEnd.set(this.keep.subarray(3));
  }

  /** Largest (sign +1) or smallest (sign -1) voltage that output k can reach in the piece tried last: real poles only average. */
  boundV(k: number, sign: 1 | -1): number {
    const inputs = sign > 0 ? this.inputMax[k]! : this.inputMin[k]!;
    const ownV = this.holdsPin ? this.y[k]! - this.base[k]! : this.y[k]!;
    return this.base[k]! + sign * Math.max(sign * inputs, sign * this.z[k]!, sign * ownV);
  }

  private pinFilterSlope(k: number, isEnd: boolean): number {
    const { chain } = this;
    const stuckV = this.stuckAt(k);
    const clip = this.clip[k]!;
    const z = isEnd ? this.zEnd[k]! : this.z[k]!;
    const pinV = stuckV ?? (clip > 0 ? chain.outputMaxV : clip < 0 ? chain.outputMinV : this.base[k]! + z);
    return chain.poles.filterRadPerS * (pinV - (isEnd ? this.yEnd[k]! : this.y[k]!));
  }

  readonly zAt = new Float64Array(3);
  readonly yAt = new Float64Array(3);
  private readonly keep = new Float64Array(6);

  /** Row integral helper: input rows of the present mode, for figures. */
  senseRows(stage: PowerStage): Float64Array {
    return this.rows(stage.slot);
  }

  baseV(k: number): number {
    return this.base[k]!;
  }

  /** Rate of a slewing output, V/s; 0 while it follows its pole. */
  slewRate(k: number): number {
    return this.slewing[k] === 0 ? 0 : this.slewing[k]! * this.chain.slewVPerS;
  }

  /** No rectifier, clip or part of a ramp behaves other than linearly in the piece tried last. */
  isRegular = true;

  /** A rectifier cuts off inside the ramp: its response bends with the current, by the square of the change. */
  private hasKink = false;

  /** Pushes what must keep its sign for the piece tried last to stay regular. */
  pushGuards(stage: PowerStage, out: number[]): void {
    const { chain } = this;
    // a tenth of the current at most: the bend is then below a hundred-thousandth of full scale, and dies with the filters
    if (this.hasKink) out.push(KINK_REACH * stage.x[0]!);
    if (this.isRamp && chain.isUnipolar) for (let n = 0; n < (chain.isLegSite ? 2 : 1) * NODE_COUNT; n++) out.push(this.nodes[n]!);
    if (!this.isRamp && chain.isUnipolar) for (let n = 0; n < 4; n++) out.push(this.rawEnds[n]!);
    for (let k = 0; k < 3; k++) {
      if (this.isUsed[k] && chain.slewVPerS !== Infinity) out.push(this.slewMarginV(k));
      if (this.isUsed[k]) out.push(chain.outputMaxV + CLIP_V - this.base[k]! - this.inputMax[k]!, this.inputMin[k]! + this.base[k]! - chain.outputMinV + CLIP_V);
    }
  }

  /** The outputs' own states lie inside the limits. */
  statesInside(): boolean {
    const { chain } = this;
    for (let k = 0; k < 3; k++) {
      if (!this.isUsed[k]) continue;
      const zV = this.z[k]! + this.base[k]!;
      const yV = this.holdsPin || !chain.hasFilter ? zV : this.y[k]! + this.base[k]!;
      if (zV > chain.outputMaxV + CLIP_V || zV < chain.outputMinV - CLIP_V || yV > chain.outputMaxV + CLIP_V || yV < chain.outputMinV - CLIP_V) return false;
    }
    return true;
  }

  matches(saved: readonly number[]): boolean {
    return this.share[0] === saved[6] && this.share[1] === saved[7] && this.target[0] === saved[8] && this.target[1] === saved[9] && this.wasClipped === (saved[13] === 1);
  }

  save(): number[] {
    return [...this.z, ...this.y, ...this.share, ...this.target, ...this.slewing, this.wasClipped ? 1 : 0];
  }

  restore(n: readonly number[]): void {
    this.z.set(n.slice(0, 3));
    this.y.set(n.slice(3, 6));
    this.share.set(n.slice(6, 8));
    this.target.set(n.slice(8, 10));
    this.slewing.set(n.slice(10, 13));
    this.wasClipped = n[13] === 1;
  }
}

/** Value of the sense row at an offset for the state x. */
export function rowOf(rows: Float64Array, at: number, x: Float64Array): number {
  return rows[at]! * x[0]! + rows[at + 1]! * x[1]! + rows[at + 2]! * x[2]! + rows[at + 3]!;
}

const affineAt = (o: Float64Array, at: number, x: Float64Array) => o[at]! * x[0]! + o[at + 1]! * x[1]! + o[at + 2]! * x[2]! + o[at + 3]!;

function advance(o: Float64Array, x: Float64Array): void {
  const a = affineAt(o, 0, x);
  const b = affineAt(o, 4, x);
  const c = affineAt(o, 8, x);
  x[0] = a;
  x[1] = b;
  x[2] = c;
}

/** L d(i_leg)/dt contained in a settled shunt row. */
function inductivePart(chain: SensingChain, sense: Float64Array, at: number, leg: number, stage: PowerStage): number {
  if (chain.shuntInductanceH === 0) return 0;
  const ohm = leg === 0 ? chain.shuntAOhm : chain.shuntBOhm;
  const full = rowOf(sense, at, stage.x);
  const { legA, legB } = stage.slot.mode;
  const highA = isHighState(legA) ? 1 : 0;
  const highB = isHighState(legB) ? 1 : 0;
  const factor = chain.site === "legTop" ? (leg === 0 ? highA : -highB) : chain.site === "legBottom" ? (leg === 0 ? highA - 1 : 1 - highB) : chain.site === "line" ? 1 : highA - highB;
  return full - ohm * factor * stage.x[0]!;
}

/** The earlier of two times, -1 meaning none. */
const earlier = (a: number, b: number) => (b < 0 || (a >= 0 && a <= b) ? a : b);
