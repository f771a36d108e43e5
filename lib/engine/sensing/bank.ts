import type { ScenarioDocument } from "../../scenario/schema";
import { SAME_INSTANT_S } from "../model/parameters";
import type { EventLog } from "../solver/event-log";
import type { ModeSlot } from "../solver/mode-slot";
import { buildOperator, OPERATOR_LENGTH } from "../solver/operator";
import { PIECE_LENGTH, PIECE_RIDER_EVENT, PIECE_START } from "../solver/piece";
import type { PowerStage } from "../solver/power-stage";
import type { Rider } from "../solver/rider";
import { OUT_A, OUT_B, OUT_COMBINED, RAW_A, RAW_B, rowOf, SENSE_A, SENSE_B, type SensingChain } from "./chain";
import { Commutation, inductivePart } from "./commutation";
import { OutputBounds } from "./output-bounds";
import { OutputEvents } from "./output-events";
import { RampInput } from "./ramp-input";
import { steadyResponse } from "./steady-response";

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
  /** Slew limit that each output runs at: its sign, 0 while it follows its pole. */
  readonly slewing = new Int8Array(3);
  /** What each output is read around, V: a reference or 0. */
  readonly base = new Float64Array(3);
  /** States at an instant that was asked for (readAt, visitExtrema). */
  readonly zAt = new Float64Array(3);
  readonly yAt = new Float64Array(3);
  readonly commutation: Commutation;
  readonly ramp: RampInput;
  readonly bounds: OutputBounds;
  readonly events: OutputEvents;
  /** No rectifier, clip or part of a ramp behaves other than linearly in the piece tried last. */
  isRegular = true;
  /** Response of each output to its input, one pole and both. */
  private readonly response = new Float64Array(6);
  /** Length of the stretch being computed, s. */
  private readonly lengthS = new Float64Array(1);
  private readonly scratch = new Float64Array(OPERATOR_LENGTH);
  private wasClipped = false;

  constructor(readonly chain: SensingChain, document: ScenarioDocument, public log: EventLog | null) {
    this.commutation = new Commutation(chain);
    this.ramp = new RampInput(chain, this.commutation);
    this.bounds = new OutputBounds(this);
    this.events = new OutputEvents(this);
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

  /** Input rows of a mode, as the chain stands. */
  rows(slot: ModeSlot): Float64Array {
    if (slot.senseStamp !== this.chain.stamp) {
      this.chain.fillRows(slot);
      slot.senseStamp = this.chain.stamp;
    }
    return slot.sense;
  }

  begin(stage: PowerStage): void {
    const { chain } = this;
    this.commutation.begin(stage);
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
    this.commutation.onMode(stage, currentBeforeA);
  }

  limitPiece(stage: PowerStage): void {
    this.commutation.limitPiece(stage);
  }

  /* ---------------------------------------------------- one piece -------------------------------------------------- */

  attempt(stage: PowerStage): boolean {
    const operator = stage.stepOperator;
    const h = stage.piece[PIECE_LENGTH]!;
    this.lengthS[0] = h;
    const sense = this.rows(stage.slot);
    this.ramp.hasKink = false;
    if (this.commutation.isRamp) this.ramp.fillNodes(stage, sense, h);
    const isSteady = this.bounds.update(stage, sense);
    const hasSlew = this.chain.slewVPerS !== Infinity && this.bounds.maySlew();
    if (hasSlew) this.events.classifySlew(stage, sense);
    this.isRegular = isSteady && !hasSlew && this.bounds.staysInside();
    if (this.isRegular) {
      this.clip[0] = this.clip[1] = this.clip[2] = 0;
      this.compute(stage, sense, operator, true);
      return false;
    }
    this.compute(stage, sense, operator, true);
    // the clip class needs z at the end, which no clip changes; y does when the filter follows a clipped pin
    if (this.events.classifyClips() && this.holdsPin) this.compute(stage, sense, operator, true);
    const eventS = this.events.firstEvent(stage, sense, h, hasSlew);
    stage.piece[PIECE_RIDER_EVENT] = eventS;
    return eventS >= 0;
  }

  /** Input of output k behind the rectifier, V, for the state x, times the gain. */
  inputAt(k: number, sense: Float64Array, x: Float64Array): number {
    const a = this.passes[0] ? rowOf(sense, RAW_A, x) : 0;
    if (k === OUT_A) return this.chain.gain * a;
    const b = this.passes[1] ? rowOf(sense, RAW_B, x) : 0;
    return this.chain.gain * (k === OUT_B ? b : this.chain.pairSign * (a - b));
  }

  /** zEnd, yEnd after `lengthS` from the present state, with the classes as they stand. */
  private compute(stage: PowerStage, sense: Float64Array, o: Float64Array, hasNodes: boolean): void {
    const { chain, response } = this;
    if (this.commutation.isRamp) {
      if (!hasNodes) this.ramp.fillNodes(stage, sense, this.lengthS[0]!);
      this.ramp.respond(0, this.lengthS, response);
      if (chain.isLegSite) this.ramp.respond(1, this.lengthS, response);
    } else {
      steadyResponse(response, stage.x, sense, o, RAW_A, 0, this.passes[0]!);
      if (chain.isLegSite) steadyResponse(response, stage.x, sense, o, RAW_B, 2, this.passes[1]!);
    }
    const { gain } = chain;
    for (let n = 0; n < 4; n++) response[n]! *= gain;
    response[4] = chain.pairSign * (response[0]! - response[2]!);
    response[5] = chain.pairSign * (response[1]! - response[3]!);
    for (let k = 0; k < 3; k++) if (this.isUsed[k]) this.finishOutput(k, o);
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

  /** zEnd, yEnd at tau inside the piece. */
  probe(stage: PowerStage, sense: Float64Array, tau: number): void {
    buildOperator(stage.slot.mode, stage.slot.spectrum, this.chain.poles, tau, this.scratch);
    this.lengthS[0] = tau;
    this.compute(stage, sense, this.scratch, false);
  }

  commit(stage: PowerStage): void {
    const { slewing } = this;
    const { pendingSlew, pendingSlewS } = this.events;
    const h = stage.piece[PIECE_LENGTH]!;
    this.noteClip(stage);
    for (let k = 0; k < 3; k++) {
      this.z[k] = this.zEnd[k]!;
      this.y[k] = this.yEnd[k]!;
      if (pendingSlew[k] === 0) continue;
      // several outputs may reach their limit at one instant (the pair and its difference do)
      if (Math.abs(h - pendingSlewS[k]!) <= SAME_INSTANT_S) slewing[k] = pendingSlew[k] === 2 ? 0 : pendingSlew[k]!;
      pendingSlew[k] = 0;
    }
    if (this.commutation.isRamp) this.commutation.commit(stage);
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

  /** Shunt voltage of a leg at tau seconds into the present piece, x being the state there (D-31). */
  senseV(leg: number, stage: PowerStage, x: Float64Array, tauS: number): number {
    return this.commutation.senseV(leg, stage, this.rows(stage.slot), x, tauS);
  }

  /** Rate of a slewing output, V/s; 0 while it follows its pole. */
  slewRate(k: number): number {
    return this.slewing[k] === 0 ? 0 : this.slewing[k]! * this.chain.slewVPerS;
  }

  matches(saved: readonly number[]): boolean {
    const { share, target } = this.commutation;
    return share[0] === saved[6] && share[1] === saved[7] && target[0] === saved[8] && target[1] === saved[9] && this.wasClipped === (saved[13] === 1);
  }

  save(): number[] {
    return [...this.z, ...this.y, ...this.commutation.share, ...this.commutation.target, ...this.slewing, this.wasClipped ? 1 : 0];
  }

  restore(n: readonly number[]): void {
    this.z.set(n.slice(0, 3));
    this.y.set(n.slice(3, 6));
    this.commutation.share.set(n.slice(6, 8));
    this.commutation.target.set(n.slice(8, 10));
    this.slewing.set(n.slice(10, 13));
    this.wasClipped = n[13] === 1;
  }
}
