import type { PowerStage } from "../solver/power-stage";
import type { SensorBank } from "./bank";
import { NODE_COUNT } from "./cascade";
import { CUT_OFF_V, RAW_A, RAW_B, rowOf } from "./chain";

/** D-25: an output counts as clipped beyond a limit by more than this. */
export const CLIP_V = 1e-9;
/** Rates this close to the slew limit, as a share, are at it. */
export const SLEW_BAND = 1e-6;
/** Twice the share of its value by which the current may change before a period with a kink is surveyed anew. */
const KINK_REACH = 0.2;

/** How far the outputs can move in the piece being tried: real poles only average, so inputs and states bound them. */
export class OutputBounds {
  private readonly inputMin = new Float64Array(3);
  private readonly inputMax = new Float64Array(3);
  private readonly rawEnds = new Float64Array(4);

  constructor(private readonly bank: SensorBank) {}

  /**
   * Bounds of each output's input over the piece, V behind the gain (its ends, or the nodes of a ramp), and the class of
   * each rectifier. True if no rectifier changes its class inside the piece.
   */
  update(stage: PowerStage, sense: Float64Array): boolean {
    const { bank, inputMin, inputMax } = this;
    const { chain } = bank;
    const { nodes } = bank.ramp;
    let isSteady = true;
    const legCount = chain.isLegSite ? 2 : 1;
    for (let leg = 0; leg < legCount; leg++) {
      let low: number;
      let high: number;
      if (bank.commutation.isRamp) {
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
          bank.passes[leg] = passes;
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

  /** Some output is at its slew limit, or could come to it: its pole's drive is at most the spread of its input and state. */
  maySlew(): boolean {
    const { bank } = this;
    for (let k = 0; k < 3; k++) if (bank.isUsed[k] && (bank.slewing[k] !== 0 || this.slewMarginV(k) < 0)) return true;
    return false;
  }

  /** What is left between the largest drive of output k in this piece and the one at which it slews, V. */
  private slewMarginV(k: number): number {
    const { bank } = this;
    const { chain } = bank;
    const z = bank.z[k]!;
    const high = z > this.inputMax[k]! ? z : this.inputMax[k]!;
    const low = z < this.inputMin[k]! ? z : this.inputMin[k]!;
    return ((1 - SLEW_BAND) * chain.slewVPerS) / chain.poles.amplifierRadPerS - (high - low);
  }

  /** No output can reach a limit in this piece. */
  staysInside(): boolean {
    const { bank } = this;
    for (let k = 0; k < 3; k++) if (bank.isUsed[k] && this.mayLeave(k)) return false;
    return true;
  }

  /** Real poles only average: an output stays between its states and its input, so most pieces need no closer look. */
  mayLeave(k: number): boolean {
    const { bank } = this;
    const { chain } = bank;
    const z = bank.z[k]!;
    const ownV = bank.holdsPin || !chain.hasFilter ? z : bank.y[k]!;
    let high = this.inputMax[k]!;
    let low = this.inputMin[k]!;
    if (z > high) high = z;
    if (z < low) low = z;
    if (ownV > high) high = ownV;
    if (ownV < low) low = ownV;
    const base = bank.base[k]!;
    return high + base > chain.outputMaxV + CLIP_V || low + base < chain.outputMinV - CLIP_V;
  }

  /** Largest (sign +1) or smallest (sign -1) voltage that output k can reach in the piece tried last: real poles only average. */
  boundV(k: number, sign: 1 | -1): number {
    const { bank } = this;
    const inputs = sign > 0 ? this.inputMax[k]! : this.inputMin[k]!;
    const ownV = bank.holdsPin ? bank.y[k]! - bank.base[k]! : bank.y[k]!;
    return bank.base[k]! + sign * Math.max(sign * inputs, sign * bank.z[k]!, sign * ownV);
  }

  /** Pushes what must keep its sign for the piece tried last to stay regular. */
  pushGuards(stage: PowerStage, out: number[]): void {
    const { bank } = this;
    const { chain } = bank;
    // a tenth of the current at most: the bend is then below a hundred-thousandth of full scale, and dies with the filters
    if (bank.ramp.hasKink) out.push(KINK_REACH * stage.x[0]!);
    if (bank.commutation.isRamp && chain.isUnipolar) for (let n = 0; n < (chain.isLegSite ? 2 : 1) * NODE_COUNT; n++) out.push(bank.ramp.nodes[n]!);
    if (!bank.commutation.isRamp && chain.isUnipolar) for (let n = 0; n < 4; n++) out.push(this.rawEnds[n]!);
    for (let k = 0; k < 3; k++) {
      if (bank.isUsed[k] && chain.slewVPerS !== Infinity) out.push(this.slewMarginV(k));
      if (bank.isUsed[k]) out.push(chain.outputMaxV + CLIP_V - bank.base[k]! - this.inputMax[k]!, this.inputMin[k]! + bank.base[k]! - chain.outputMinV + CLIP_V);
    }
  }

  /** The outputs' own states lie inside the limits. */
  statesInside(): boolean {
    const { bank } = this;
    const { chain } = bank;
    for (let k = 0; k < 3; k++) {
      if (!bank.isUsed[k]) continue;
      const zV = bank.z[k]! + bank.base[k]!;
      const yV = bank.holdsPin || !chain.hasFilter ? zV : bank.y[k]! + bank.base[k]!;
      if (zV > chain.outputMaxV + CLIP_V || zV < chain.outputMinV - CLIP_V || yV > chain.outputMaxV + CLIP_V || yV < chain.outputMinV - CLIP_V) return false;
    }
    return true;
  }
}
