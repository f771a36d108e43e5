import type { ScenarioDocument } from "../../scenario/schema";
import { ROW_BOTTOM_A, ROW_BOTTOM_B, ROW_BRIDGE, ROW_BUS, ROW_SUPPLY, ROW_TERMINAL_A, ROW_TERMINAL_B, ROW_TOP_A, ROW_TOP_B, rowAt } from "../model/affine";
import { LEG_WORDS } from "../model/legs";
import { SAME_INSTANT_S } from "../model/parameters";
import { TRACE_NAMES, type InstantReading } from "../results";
import type { Machine } from "../solver/machine";
import { PIECE_LENGTH, PIECE_START } from "../solver/piece";
import type { Observer } from "../solver/rider";
import { stateAfter } from "../solver/spectrum";
import type { SensorBank } from "./bank";
import { OUT_A, OUT_B, OUT_COMBINED } from "./chain";
import { readAt } from "./output-inside";

const STATE = new Float64Array(3);
export const TRACE_COUNT = TRACE_NAMES.length;

/** Traces at the start of the present piece (or at the machine's standing state). */
export function readTracesAtStart(machine: Machine, bank: SensorBank, out: Float64Array): void {
  fillTraces(machine, bank, machine.stage.x, bank.z, bank.y, 0, out);
}

/** Traces at the end of the piece that the machine tried last, of length h, before any event there. */
export function readTracesAtEnd(machine: Machine, bank: SensorBank, h: number, out: Float64Array): void {
  fillTraces(machine, bank, machine.stage.xEnd, bank.zEnd, bank.yEnd, h, out);
}

/** Traces at tau inside the piece that the machine tried last. */
export function readTraces(machine: Machine, bank: SensorBank, tauS: number, out: Float64Array): void {
  if (tauS === 0) return readTracesAtStart(machine, bank, out);
  stateAfter(machine.stage.slot.mode, machine.stage.slot.spectrum, machine.stage.x, tauS, STATE);
  readAt(bank, machine.stage, tauS);
  fillTraces(machine, bank, STATE, bank.zAt, bank.yAt, tauS, out);
}

/** Every trace in the order of TRACE_NAMES; NaN where the site or the reference has none. */
function fillTraces(machine: Machine, bank: SensorBank, x: Float64Array, z: Float64Array, y: Float64Array, tauS: number, out: Float64Array): void {
  const { stage } = machine;
  const { chain } = bank;
  const { mode } = stage.slot;
  const { rows } = mode;
  const isSingleCombined = machine.document.sensing.amplifier.arrangement === "bipolarMidscale";
  out[0] = x[0]!;
  out[1] = x[1]!;
  out[2] = rowAt(rows, ROW_BUS, x);
  out[3] = rowAt(rows, ROW_TERMINAL_A, x);
  out[4] = rowAt(rows, ROW_TERMINAL_B, x);
  out[5] = rowAt(rows, ROW_TOP_A, x);
  out[6] = rowAt(rows, ROW_TOP_B, x);
  out[7] = rowAt(rows, ROW_BOTTOM_A, x);
  out[8] = rowAt(rows, ROW_BOTTOM_B, x);
  out[9] = rowAt(rows, ROW_SUPPLY, x);
  out[10] = rowAt(rows, ROW_BRIDGE, x);
  out[11] = bank.senseV(0, stage, x, tauS);
  out[12] = chain.isLegSite ? bank.senseV(1, stage, x, tauS) : NaN;
  const single = bank.outputV(OUT_A, z, y);
  out[13] = isSingleCombined ? NaN : single;
  out[14] = chain.isLegSite ? bank.outputV(OUT_B, z, y) : NaN;
  out[15] = chain.isLegSite ? chain.pairSign * (out[13]! - out[14]!) : NaN;
  out[16] = isSingleCombined ? single : chain.hasCombined ? bank.outputV(OUT_COMBINED, z, y) : NaN;
  out[17] = idealV(machine.document, chain.gain, x[0]!);
}

/** What the output that the converter reads would show if it followed the motor current. */
function idealV(document: ScenarioDocument, gain: number, currentA: number): number {
  const { amplifier, reference, shunt } = document.sensing;
  const isMidscale = amplifier.arrangement === "combinedMidscale" || amplifier.arrangement === "bipolarMidscale";
  const v = (isMidscale ? (reference?.voltageV ?? 0) : 0) + gain * shunt.resistanceOhm * currentA;
  return isMidscale ? Math.min(Math.max(v, amplifier.outputMinV), amplifier.outputMaxV) : v;
}

const VALUES = new Float64Array(TRACE_COUNT);
const orNull = (v: number) => (Number.isNaN(v) ? null : v);

export function readInstant(machine: Machine, bank: SensorBank, tauS: number, timeS: number): InstantReading {
  readTraces(machine, bank, tauS, VALUES);
  const v = VALUES;
  const { mode } = machine.stage.slot;
  return {
    timeS,
    dutyCommand: machine.duty,
    motorCurrentA: v[0]!,
    speedRadPerS: v[1]!,
    busV: v[2]!,
    terminalAV: v[3]!,
    terminalBV: v[4]!,
    topAA: v[5]!,
    topBA: v[6]!,
    bottomAA: v[7]!,
    bottomBA: v[8]!,
    supplyA: v[9]!,
    bridgeA: v[10]!,
    senseAV: v[11]!,
    senseBV: orNull(v[12]!),
    outAV: orNull(v[13]!),
    outBV: orNull(v[14]!),
    differenceV: orNull(v[15]!),
    combinedV: orNull(v[16]!),
    state: { A: LEG_WORDS[mode.legA]!, B: LEG_WORDS[mode.legB]! },
  };
}

/** Serves requested instants beside the run; never moves an edge, so that asking for more changes nothing. */
export class InstantReader implements Observer {
  private readonly order: number[];
  private readonly results: InstantReading[];
  private next = 0;

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly times: readonly number[]) {
    this.order = times.map((_, i) => i).sort((a, b) => times[a]! - times[b]! || a - b);
    this.results = new Array(times.length);
  }

  piece(): void {
    const { piece } = this.machine.stage;
    const startS = piece[PIECE_START]!;
    const h = piece[PIECE_LENGTH]!;
    while (this.next < this.order.length) {
      const index = this.order[this.next]!;
      const timeS = this.times[index]!;
      // D-27: within 1e-13 s before the piece's end counts as after the event there
      if (timeS >= startS + h - SAME_INSTANT_S) return;
      this.results[index] = readInstant(this.machine, this.bank, Math.max(timeS - startS, 0), timeS);
      this.next++;
    }
  }

  /** The rest, at the end of the run. */
  finish(): InstantReading[] {
    while (this.next < this.order.length) {
      const index = this.order[this.next++]!;
      this.results[index] = readInstant(this.machine, this.bank, 0, this.times[index]!);
    }
    return this.results;
  }
}
