import type { ScenarioDocument } from "../../scenario/schema";
import { ROW_BOTTOM_A, ROW_BOTTOM_B, ROW_BRIDGE, ROW_BUS, ROW_CURRENT, ROW_RAIL, ROW_TERMINAL_A, ROW_TOP_A, ROW_TOP_B } from "../model/affine";
import { isHighState, LEG_OPEN, LEG_THROUGH } from "../model/legs";
import type { ModeSlot } from "../solver/mode-slot";
import { SAME_INSTANT_S, type ShuntResistances } from "../model/parameters";
import type { Poles } from "../solver/operator";

/** Rows in ModeSlot.sense, over [i, w, v, 1]: shunt voltages, the same with offset and common-mode error, error alone, di/dt. */
export const SENSE_A = 0;
export const SENSE_B = 4;
export const RAW_A = 8;
export const RAW_B = 12;
export const ERROR_A = 16;
export const ERROR_B = 20;
export const CURRENT_SLOPE = 24;

/** The outputs that are worked out together. */
export const OUT_A = 0;
export const OUT_B = 1;
export const OUT_COMBINED = 2;

/** A shunt voltage this close to cut-off is at cut-off: 1e-12 V is a thousandth of the smallest offset of any channel. */
export const CUT_OFF_V = 1e-12;

export type Site = ScenarioDocument["sensing"]["site"];

/** Design values of the sensing chain, and what the faults of the chain make of them at an instant. */
export class SensingChain {
  readonly site: Site;
  readonly isLegSite: boolean;
  readonly isUnipolar: boolean;
  readonly isCurrentOutput: boolean;
  readonly hasFilter: boolean;
  readonly gain: number;
  readonly poles: Poles;
  readonly slewVPerS: number;
  readonly outputMinV: number;
  readonly outputMaxV: number;
  /** +1: A - B; -1: B - A (bottom shunts are read crossed, D-18). */
  readonly pairSign: number;
  readonly hasCombined: boolean;
  readonly shuntInductanceH: number;
  readonly commutationS: number;
  /** Values that act, faults included. */
  shuntAOhm: number;
  shuntBOhm: number;
  offsetAV = 0;
  offsetBV = 0;
  referenceV = 0;
  stuckAV: number | null = null;
  stuckBV: number | null = null;
  /** Rises whenever one of them changes. */
  stamp = 0;
  private readonly commonModeRatio: number;
  private readonly commonModeZeroV: number;

  constructor(private readonly document: ScenarioDocument, private readonly shunt: ShuntResistances) {
    const { sensing } = document;
    const { amplifier, filter } = sensing;
    this.site = sensing.site;
    this.isLegSite = this.site === "legTop" || this.site === "legBottom";
    this.isUnipolar = amplifier.response === "unipolar";
    this.isCurrentOutput = "inOhm" in amplifier.gain;
    this.gain = "inOhm" in amplifier.gain ? amplifier.gain.outOhm / amplifier.gain.inOhm : amplifier.gain.fixed;
    const bandwidthHz = Math.min(amplifier.bandwidthHz, (amplifier.gainBandwidthHz ?? Infinity) / this.gain);
    const filterOhm = "inOhm" in amplifier.gain ? amplifier.gain.outOhm : (filter?.resistanceOhm ?? 0);
    const filterS = filterOhm * (filter?.capacitanceF ?? 0);
    this.hasFilter = filterS > 0;
    this.poles = { amplifierRadPerS: 2 * Math.PI * bandwidthHz, filterRadPerS: this.hasFilter ? 1 / filterS : 0 };
    this.slewVPerS = amplifier.slewVPerS ?? Infinity;
    this.outputMinV = amplifier.outputMinV;
    this.outputMaxV = amplifier.outputMaxV;
    this.pairSign = this.site === "legBottom" ? -1 : 1;
    this.hasCombined = this.isLegSite && sensing.reference !== undefined;
    this.shuntInductanceH = sensing.shunt.inductanceH;
    this.commutationS = document.bridge.commutationS;
    this.commonModeRatio = 10 ** (-amplifier.cmrrDb / 20);
    this.commonModeZeroV = this.site === "legTop" || this.site === "supply" ? document.supply.voltageV : 0;
    this.shuntAOhm = shunt.aOhm;
    this.shuntBOhm = shunt.bOhm;
    this.changeAt(0);
  }

  /** Reference that the single output of a midscale arrangement is read around; 0 where there is none. */
  get singleBaseV(): number {
    return this.document.sensing.amplifier.arrangement === "bipolarMidscale" ? this.referenceV : 0;
  }

  /** Applies the faults of the chain that are reached at `timeS`. */
  changeAt(timeS: number): void {
    const { amplifier, reference } = this.document.sensing;
    this.stamp++;
    this.shuntAOhm = this.shunt.aOhm;
    this.shuntBOhm = this.shunt.bOhm;
    this.offsetAV = amplifier.offsetV;
    this.offsetBV = amplifier.offsetBV ?? amplifier.offsetV;
    this.referenceV = reference?.voltageV ?? 0;
    this.stuckAV = null;
    this.stuckBV = null;
    for (const fault of this.document.faults) {
      if (fault.atS > timeS + SAME_INSTANT_S) continue;
      const isB = "leg" in fault && fault.leg === "B";
      if (fault.kind === "shuntDrifted") isB ? (this.shuntBOhm *= fault.factor) : (this.shuntAOhm *= fault.factor);
      if (fault.kind === "shuntShorted" || fault.kind === "shuntOpen") isB ? (this.shuntBOhm = 0) : (this.shuntAOhm = 0);
      if (fault.kind === "amplifierOffsetShift") isB ? (this.offsetBV += fault.deltaV) : (this.offsetAV += fault.deltaV);
      if (fault.kind === "amplifierStuckOutput") isB ? (this.stuckBV = fault.voltageV) : (this.stuckAV = fault.voltageV);
      if (fault.kind === "referenceDrift") this.referenceV += fault.deltaV;
    }
  }

  /** Fills the sense rows of a mode (shares settled). `fills` stamps them. */
  fillRows(slot: ModeSlot): void {
    const { mode, sense } = slot;
    const { rows, a, b } = mode;
    sense.fill(0);
    for (let j = 0; j < 3; j++) sense[CURRENT_SLOPE + j] = a[j]!;
    sense[CURRENT_SLOPE + 3] = b[0]!;
    const isThroughA = mode.legA === LEG_THROUGH;
    const isThroughB = mode.legB === LEG_THROUGH;
    const highA = isHighState(mode.legA) ? 1 : 0;
    const highB = isHighState(mode.legB) ? 1 : 0;
    const isOpenA = mode.legA === LEG_OPEN;
    const isOpenB = mode.legB === LEG_OPEN;
    switch (this.site) {
      case "legTop":
        this.fillShunt(slot, SENSE_A, this.shuntAOhm, isThroughA ? ROW_TOP_A : ROW_CURRENT, isOpenA ? 0 : isThroughA ? 1 : highA);
        this.fillShunt(slot, SENSE_B, this.shuntBOhm, isThroughB ? ROW_TOP_B : ROW_CURRENT, isOpenB ? 0 : isThroughB ? 1 : -highB);
        break;
      case "legBottom":
        this.fillShunt(slot, SENSE_A, this.shuntAOhm, isThroughA ? ROW_BOTTOM_A : ROW_CURRENT, isOpenA ? 0 : isThroughA ? 1 : highA - 1);
        this.fillShunt(slot, SENSE_B, this.shuntBOhm, isThroughB ? ROW_BOTTOM_B : ROW_CURRENT, isOpenB ? 0 : isThroughB ? 1 : 1 - highB);
        break;
      case "line":
        this.fillShunt(slot, SENSE_A, this.shuntAOhm, ROW_CURRENT, 1);
        break;
      default: // supply and return: the bridge current
        this.fillShunt(slot, SENSE_A, this.shuntAOhm, ROW_BRIDGE, 1);
    }
    const common = this.site === "legTop" ? ROW_RAIL : this.site === "supply" ? ROW_BUS : this.site === "line" ? ROW_TERMINAL_A : -1;
    for (let j = 0; j < 4; j++) {
      const error = common < 0 ? 0 : (rows[common + j]! - (j === 3 ? this.commonModeZeroV : 0)) * this.commonModeRatio;
      sense[ERROR_A + j] = error + (j === 3 ? this.offsetAV : 0);
      sense[ERROR_B + j] = error + (j === 3 ? this.offsetBV : 0);
      sense[RAW_A + j] = sense[SENSE_A + j]! + sense[ERROR_A + j]!;
      sense[RAW_B + j] = sense[SENSE_B + j]! + sense[ERROR_B + j]!;
    }
  }

  /** v_s = R i_leg + L d(i_leg)/dt for i_leg = factor times the row. */
  private fillShunt({ mode, sense }: ModeSlot, at: number, ohm: number, row: number, factor: number): void {
    const { rows, a, b } = mode;
    const l = this.shuntInductanceH * factor;
    const r = ohm * factor;
    // the current row is the state itself, also for a resistive load (there the row says what it is set to)
    const c = row === ROW_CURRENT ? CURRENT : rows.subarray(row, row + 4);
    for (let j = 0; j < 4; j++) sense[at + j] = r * c[j]!;
    if (l === 0) return;
    for (let k = 0; k < 3; k++) {
      for (let j = 0; j < 3; j++) sense[at + j]! += l * c[k]! * a[3 * k + j]!;
      sense[at + 3]! += l * c[k]! * b[k]!;
    }
  }
}

/** Value of the sense row at an offset for the state x. */
export function rowOf(rows: Float64Array, at: number, x: Float64Array): number {
  return rows[at]! * x[0]! + rows[at + 1]! * x[1]! + rows[at + 2]! * x[2]! + rows[at + 3]!;
}

const CURRENT = new Float64Array([1, 0, 0, 0]);
