import { isHighState, isLowState, LEG_THROUGH } from "../model/legs";
import { PIECE_LENGTH } from "../solver/piece";
import type { PowerStage } from "../solver/power-stage";
import { CURRENT_SLOPE, rowOf, SENSE_A, SENSE_B, type SensingChain } from "./chain";

/** Largest |lambda| h of a piece of a commutation ramp: interpolation error below 1e-8 of the current's change. */
const RAMP_RATE = 0.25;
const RAMP_PIECES_MAX = 16;

/** How much of the motor current the upper path of each leg carries: 0 or 1, and between them on commutation ramps (D-20). */
export class Commutation {
  readonly share = new Float64Array(2);
  readonly target = new Float64Array(2);
  /** A share moves in the present piece. */
  isRamp = false;
  /** See setFactors. */
  readonly factors = new Float64Array(6);

  constructor(private readonly chain: SensingChain) {}

  /** Shares of the stage's mode, without a ramp. */
  begin(stage: PowerStage): void {
    const { mode } = stage.slot;
    this.share[0] = this.target[0] = isHighState(mode.legA) ? 1 : 0;
    this.share[1] = this.target[1] = isHighState(mode.legB) ? 1 : 0;
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

  /** Shortens the piece to the end of the nearest ramp, or to what a ramp's polynomial describes. */
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

  /** Moves the shares over the piece. */
  commit(stage: PowerStage): void {
    const { share, target, chain } = this;
    for (let leg = 0; leg < 2; leg++) {
      const gap = target[leg]! - share[leg]!;
      if (gap === 0) continue;
      const step = stage.piece[PIECE_LENGTH]! / chain.commutationS;
      share[leg] = step >= Math.abs(gap) * (1 - 1e-12) ? target[leg]! : share[leg]! + Math.sign(gap) * step;
    }
  }

  /**
   * What each shunt shows of the motor current during a ramp (D-20): factor at the piece's start and its rate, for A in
   * factors[0..1] and B in factors[2..3]; factors[4], factors[5] are 1 where shoot-through makes the stage's own row count.
   */
  setFactors(stage: PowerStage): void {
    const { chain, share, target, factors } = this;
    const sA = share[0]!;
    const sB = share[1]!;
    const dA = sA === target[0] ? 0 : Math.sign(target[0]! - sA) / chain.commutationS;
    const dB = sB === target[1] ? 0 : Math.sign(target[1]! - sB) / chain.commutationS;
    const { legA, legB } = stage.slot.mode;
    factors[4] = legA === LEG_THROUGH || (!chain.isLegSite && legB === LEG_THROUGH) ? 1 : 0;
    factors[5] = legB === LEG_THROUGH ? 1 : 0;
    switch (chain.site) {
      case "legTop":
        factors[0] = sA;
        factors[1] = dA;
        factors[2] = -sB;
        factors[3] = -dB;
        break;
      case "legBottom":
        factors[0] = sA - 1;
        factors[1] = dA;
        factors[2] = 1 - sB;
        factors[3] = -dB;
        break;
      case "line":
        factors[0] = 1;
        factors[1] = 0;
        break;
      default:
        factors[0] = sA - sB;
        factors[1] = dA - dB;
    }
  }

  /** Shunt voltage of a leg at tau seconds into the present piece, x being the state there: R i + L di/dt with the ramp (D-31). */
  senseV(leg: number, stage: PowerStage, sense: Float64Array, x: Float64Array, tauS: number): number {
    const { share, target, chain } = this;
    if (share[0] === target[0] && share[1] === target[1]) return rowOf(sense, leg === 0 ? SENSE_A : SENSE_B, x);
    this.setFactors(stage);
    const { factors } = this;
    if (factors[4 + leg] !== 0) return rowOf(sense, leg === 0 ? SENSE_A : SENSE_B, x);
    const factor = factors[2 * leg]! + factors[2 * leg + 1]! * tauS;
    const ohm = leg === 0 ? chain.shuntAOhm : chain.shuntBOhm;
    return ohm * factor * x[0]! + chain.shuntInductanceH * (factors[2 * leg + 1]! * x[0]! + factor * rowOf(sense, CURRENT_SLOPE, x));
  }
}

/** L d(i_leg)/dt contained in a settled shunt row. */
export function inductivePart(chain: SensingChain, sense: Float64Array, at: number, leg: number, stage: PowerStage): number {
  if (chain.shuntInductanceH === 0) return 0;
  const ohm = leg === 0 ? chain.shuntAOhm : chain.shuntBOhm;
  const full = rowOf(sense, at, stage.x);
  const { legA, legB } = stage.slot.mode;
  const highA = isHighState(legA) ? 1 : 0;
  const highB = isHighState(legB) ? 1 : 0;
  const factor = chain.site === "legTop" ? (leg === 0 ? highA : -highB) : chain.site === "legBottom" ? (leg === 0 ? highA - 1 : 1 - highB) : chain.site === "line" ? 1 : highA - highB;
  return full - ohm * factor * stage.x[0]!;
}
