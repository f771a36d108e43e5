import { GATE_HIGH, GATE_LOW, LEG_HIGH_CHANNEL, LEG_HIGH_DIODE, LEG_LOW_CHANNEL, LEG_LOW_DIODE, LEG_OPEN, LEG_THROUGH, isHighState, isLowState } from "./legs";
import type { StageParameters } from "./parameters";

/** What the resolution of one instant says: both legs, and whether a forced interruption takes the current to zero. */
export type Conduction = { legA: number; legB: number; isCut: boolean };

const NO_PATH = -1;

/** Which channels of a leg are on, after faults: bit 1 high, bit 2 low. */
function channelsOn(p: StageParameters, gate: number, first: 0 | 2): number {
  const high = (gate === GATE_HIGH && !p.stuckOpen[first]) || p.shorted[first];
  const low = (gate === GATE_LOW && !p.stuckOpen[first + 1]!) || p.shorted[first + 1]!;
  return (high ? 1 : 0) + (low ? 2 : 0);
}

/**
 * State of a leg whose current i_out has the sign `outSign` (model.md's table); NO_PATH when an open shunt leaves none.
 * `highBlocked`/`lowBlocked`: an open shunt interrupts that rail of the leg.
 */
function conductingLeg(on: number, outSign: number, highBlocked: boolean, lowBlocked: boolean): number {
  const high = (on & 1) !== 0 && !highBlocked;
  const low = (on & 2) !== 0 && !lowBlocked;
  if (high && low) return LEG_THROUGH;
  if (high) return LEG_HIGH_CHANNEL;
  if (low) return LEG_LOW_CHANNEL;
  if (outSign > 0) return lowBlocked ? NO_PATH : LEG_LOW_DIODE;
  return highBlocked ? NO_PATH : LEG_HIGH_DIODE;
}

const portGain = (leg: number) => (isHighState(leg) ? 1 : leg === LEG_THROUGH ? 0.5 : 0);
const portVoltage = (p: StageParameters, leg: number) => (leg === LEG_HIGH_DIODE ? p.highDiodeV : leg === LEG_LOW_DIODE ? -p.lowDiodeV : 0);

/**
 * Finds the conduction state from gates and current; one object per run, its `result` is overwritten at each call.
 * Rules: model.md's table for i != 0; D-43 for i = 0; D-29 for resistive loads; D-35 for the faults.
 */
export class ConductionResolver {
  readonly result: Conduction = { legA: LEG_OPEN, legB: LEG_OPEN, isCut: false };
  private onA = 0;
  private onB = 0;

  resolve(p: StageParameters, gateA: number, gateB: number, currentA: number, speedRadPerS: number, busV: number): Conduction {
    this.onA = channelsOn(p, gateA, 0);
    this.onB = channelsOn(p, gateB, 2);
    const out = this.result;
    out.isCut = false;
    if (p.isWindingOpen) return this.setOpen(currentA !== 0, LEG_OPEN, LEG_OPEN);
    if (p.isResistive) return this.resolveResistive(p);
    if (currentA !== 0) {
      const sign = currentA > 0 ? 1 : -1;
      if (this.tryDirection(p, sign)) return out;
      out.isCut = true;
    }
    return this.resolveAtZero(p, speedRadPerS, busV);
  }

  /**
   * Row over [i, w, v, 1] that becomes positive when a current of sign s can start in the open circuit (D-43).
   * Returns false when there is no path for that sign.
   */
  startRow(p: StageParameters, sign: number, row: Float64Array): boolean {
    if (p.isWindingOpen || p.isResistive || !this.tryDirection(p, sign)) return false;
    const { legA, legB } = this.result;
    const gain = portGain(legA) - portGain(legB);
    row[0] = 0;
    row[1] = -sign * p.backEmfVPerRadPerS;
    row[2] = p.hasBusState ? sign * gain : 0;
    row[3] = sign * ((p.hasBusState ? 0 : gain * p.sourceV) + portVoltage(p, legA) - portVoltage(p, legB));
    return true;
  }

  private setOpen(isCut: boolean, legA: number, legB: number): Conduction {
    this.result.legA = legA;
    this.result.legB = legB;
    this.result.isCut = isCut;
    return this.result;
  }

  private resolveResistive(p: StageParameters): Conduction {
    const legA = this.onA === 0 ? LEG_OPEN : conductingLeg(this.onA, 1, p.openShunt[0] || p.openShunt[2], false);
    const legB = this.onB === 0 ? LEG_OPEN : conductingLeg(this.onB, 1, p.openShunt[1] || p.openShunt[2], false);
    return this.setOpen(false, legA === NO_PATH ? LEG_OPEN : legA, legB === NO_PATH ? LEG_OPEN : legB);
  }

  /** Both legs for a motor current of the given sign; false if an open shunt leaves no path. */
  private tryDirection(p: StageParameters, sign: number): boolean {
    const out = this.result;
    const isTop = p.openShunt[0] || p.openShunt[1] ? p.topAOhm > 0 || p.topBOhm > 0 : false;
    const isBottom = (p.openShunt[0] || p.openShunt[1]) && !isTop;
    let legA = conductingLeg(this.onA, sign, isTop && p.openShunt[0], isBottom && p.openShunt[0]);
    let legB = conductingLeg(this.onB, -sign, isTop && p.openShunt[1], isBottom && p.openShunt[1]);
    if (legA === NO_PATH || legB === NO_PATH) return false;
    if (p.openShunt[2] && isHighState(legA) !== isHighState(legB)) {
      // the bus branch is interrupted: the current can only circulate through the rail that is still whole
      const keepsLow = p.supplyShuntOhm > 0;
      if (keepsLow) {
        if (isHighState(legA)) legA = sign > 0 ? LEG_LOW_DIODE : NO_PATH;
        else legB = sign < 0 ? LEG_LOW_DIODE : NO_PATH;
      } else if (isLowState(legA)) legA = sign < 0 ? LEG_HIGH_DIODE : NO_PATH;
      else legB = sign > 0 ? LEG_HIGH_DIODE : NO_PATH;
      if (legA === NO_PATH || legB === NO_PATH) return false;
    }
    out.legA = legA;
    out.legB = legB;
    return true;
  }

  private resolveAtZero(p: StageParameters, speedRadPerS: number, busV: number): Conduction {
    const out = this.result;
    const isCut = out.isCut;
    if (this.onA !== 0 && this.onB !== 0 && !p.openShunt[0] && !p.openShunt[1] && !p.openShunt[2]) {
      out.legA = conductingLeg(this.onA, 1, false, false);
      out.legB = conductingLeg(this.onB, -1, false, false);
      return out;
    }
    for (let sign = 1; sign >= -1; sign -= 2) {
      if (!this.startRow(p, sign, START_ROW)) continue;
      if (START_ROW[1]! * speedRadPerS + START_ROW[2]! * busV + START_ROW[3]! > 0) {
        out.isCut = isCut;
        return out;
      }
    }
    const restA = this.onA === 0 ? LEG_OPEN : conductingLeg(this.onA, 1, false, false);
    const restB = this.onB === 0 ? LEG_OPEN : conductingLeg(this.onB, -1, false, false);
    if (restA !== LEG_OPEN && restB !== LEG_OPEN) return this.setOpen(isCut, LEG_OPEN, LEG_OPEN); // only an open shunt keeps it from starting
    return this.setOpen(isCut, restA, restB);
  }
}

const START_ROW = new Float64Array(4);
