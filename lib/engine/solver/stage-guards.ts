import { isDiodeState, LEG_HIGH_DIODE, LEG_LOW_DIODE } from "../model/legs";
import type { StageParameters } from "../model/parameters";
import { firstDownCrossing, rowValue } from "./locate";
import { PIECE_LENGTH, PIECE_STAGE_EVENT } from "./piece";
import type { PowerStage } from "./power-stage";

export const STAGE_NO_EVENT = 0;
export const STAGE_DIODE_ENDS = 1;
export const STAGE_SHAFT_ZERO = 2;
export const STAGE_BREAK_FORWARD = 3;
export const STAGE_BREAK_REVERSE = 4;
export const STAGE_SOURCE = 5;
export const STAGE_DIODE_STARTS = 6;

const SOURCE_HYSTERESIS = 1e-12;
const IDLE_S = 1e-15;

/** Upper limit of K_t i within which a shaft at rest stays at rest, N m (D-16, D-11). */
export function holdMaxNm(p: StageParameters): number {
  return p.staticNm + p.constantNm + (p.activeOpposingNm > 0 ? p.activeOpposingNm : p.activeDrivingNm);
}

/** The lower limit of the same. */
export function holdMinNm(p: StageParameters): number {
  return -p.staticNm - p.constantNm + (p.activeOpposingNm > 0 ? p.activeDrivingNm : p.activeOpposingNm);
}

/** What the power stage watches in each of its modes: where the current, the shaft or the source changes it. */
export class StageGuards {
  private readonly guard = new Float64Array(4);

  constructor(private readonly stage: PowerStage) {}

  /** Finds the earliest event of the stage inside the piece, given xEnd; its kind is left in `eventKind`. */
  nextEvent(): boolean {
    const { stage } = this;
    const { mode } = stage.slot;
    const p = stage.parameters;
    const h = stage.piece[PIECE_LENGTH]!;
    stage.eventKind = STAGE_NO_EVENT;
    let firstS = -1;
    if (isDiodeState(mode.legA) || isDiodeState(mode.legB)) {
      const isForward = mode.legA === LEG_LOW_DIODE || mode.legB === LEG_HIGH_DIODE;
      firstS = this.watch(STAGE_DIODE_ENDS, isForward ? 1 : -1, 0, 0, 0, h, firstS);
    } else if (mode.isCurrentOpen && !p.isResistive) firstS = this.watchStart(h, firstS);
    if (!p.isLocked) firstS = this.watchShaft(h, firstS);
    if (!p.acceptsReturn && p.hasBusState) {
      // a hair of hysteresis: a bus that rests at the source voltage is no event
      const sign = stage.sourceConducts ? -1 : 1;
      firstS = this.watch(STAGE_SOURCE, 0, 0, sign, (SOURCE_HYSTERESIS - sign) * p.sourceV, h, firstS);
    }
    if (firstS < 0) return false;
    stage.crossings++;
    stage.piece[PIECE_STAGE_EVENT] = firstS;
    return true;
  }

  /** Pushes what must keep its sign for the piece tried last to stay free of stage events (both ends of it). */
  pushGuards(out: number[]): void {
    const { stage, guard } = this;
    const { x, xEnd, parameters: p } = stage;
    const { mode } = stage.slot;
    if (mode.isCurrentOpen && !p.isResistive) {
      for (let sign = 1; sign >= -1; sign -= 2) if (stage.resolver.startRow(p, sign, guard)) out.push(rowValue(guard, x), rowValue(guard, xEnd));
    }
    if (!p.isLocked && stage.shaftSign !== 0) out.push(x[1]!, xEnd[1]!);
    if (!p.isLocked && stage.shaftSign === 0) {
      for (const state of [x, xEnd]) out.push(holdMaxNm(p) - p.torqueNmPerA * state[0]!, p.torqueNmPerA * state[0]! - holdMinNm(p));
    }
    if (!p.acceptsReturn && p.hasBusState) out.push(p.sourceV - x[2]!, p.sourceV - xEnd[2]!);
  }

  private watchStart(h: number, firstS: number): number {
    const { stage, guard } = this;
    const p = stage.parameters;
    for (let sign = 1; sign >= -1; sign -= 2) {
      if (!stage.resolver.startRow(p, sign, guard)) continue;
      firstS = this.watch(STAGE_DIODE_STARTS, 0, -guard[1]!, -guard[2]!, -guard[3]!, h, firstS);
    }
    return firstS;
  }

  private watchShaft(h: number, firstS: number): number {
    const { stage } = this;
    const p = stage.parameters;
    if (stage.shaftSign !== 0) {
      const hasFriction = p.coulombNm + p.constantNm > 0 || p.staticNm > 0 || p.activeOpposingNm !== p.activeDrivingNm || p.fanNmPerRadPerS2 > 0;
      if (!hasFriction) return firstS;
      // far from zero, by the larger of the two end slopes: spares nearly every interval the search
      const { a, b } = stage.slot.mode;
      const { x, xEnd } = stage;
      const slope0 = Math.abs(a[3]! * x[0]! + a[4]! * x[1]! + b[1]!);
      const slope1 = Math.abs(a[3]! * xEnd[0]! + a[4]! * xEnd[1]! + b[1]!);
      const reach = 2 * h * (slope0 > slope1 ? slope0 : slope1);
      if (stage.shaftSign * x[1]! > reach && stage.shaftSign * xEnd[1]! > 0) return firstS;
      return this.watch(STAGE_SHAFT_ZERO, 0, stage.shaftSign, 0, 0, h, firstS);
    }
    const k = p.torqueNmPerA;
    const afterForward = this.watch(STAGE_BREAK_FORWARD, -k, 0, 0, holdMaxNm(p), h, firstS);
    return this.watch(STAGE_BREAK_REVERSE, k, 0, 0, -holdMinNm(p), h, afterForward);
  }

  private watch(kind: number, c0: number, c1: number, c2: number, c3: number, h: number, firstS: number): number {
    const { stage, guard } = this;
    guard[0] = c0;
    guard[1] = c1;
    guard[2] = c2;
    guard[3] = c3;
    const atS = firstDownCrossing(guard, stage.slot.mode, stage.slot.spectrum, stage.x, stage.xEnd, h);
    if (atS < 0 || (firstS >= 0 && atS >= firstS) || (stage.skipsIdle && atS <= IDLE_S)) return firstS;
    stage.eventKind = kind;
    return atS;
  }
}
