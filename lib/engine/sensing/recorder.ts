import { GATE_HIGH, GATE_LOW, isHighState, LEG_OPEN, LEG_THROUGH, LEG_WORDS } from "../model/legs";
import { TRACE_NAMES, type Band, type Conduction, type Conversion, type SimulationEvent, type TraceName, type View } from "../results";
import type { Machine } from "../solver/machine";
import { PIECE_LENGTH, PIECE_START } from "../solver/piece";
import type { Observer } from "../solver/rider";
import type { SensorBank } from "./bank";
import { readTraces, readTracesAtEnd, readTracesAtStart, TRACE_COUNT } from "./readings";

const VALUES = new Float64Array(TRACE_COUNT);
const INNER_POINTS_MAX = 6;

/** Waveforms of an interval as break points: both ends of every piece and points between where a piece is wide on screen. */
export class ExactRecorder implements Observer {
  private readonly columns: number[][] = Array.from({ length: TRACE_COUNT }, () => []);
  private readonly times: number[] = [];
  private readonly bands: Band[] = [];

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly fromS: number, private readonly toS: number, private readonly columnCount: number) {}

  piece(): void {
    const startS = this.machine.stage.piece[PIECE_START]!;
    const h = this.machine.stage.piece[PIECE_LENGTH]!;
    const from = Math.max(this.fromS - startS, 0);
    const to = Math.min(this.toS - startS, h);
    if (to < from || (to === from && h > 0 && from > 0)) return;
    const innerCount = Math.min(Math.floor(((to - from) * this.columnCount) / (this.toS - this.fromS) / 4), INNER_POINTS_MAX);
    for (let j = 0; j <= innerCount + 1; j++) {
      const tau = j === 0 ? from : j === innerCount + 1 ? to : from + ((to - from) * j) / (innerCount + 1);
      if (tau === h) readTracesAtEnd(this.machine, this.bank, h, VALUES);
      else readTraces(this.machine, this.bank, tau, VALUES);
      this.times.push(Math.min(Math.max(startS + tau, this.fromS), this.toS));
      for (let k = 0; k < TRACE_COUNT; k++) this.columns[k]!.push(VALUES[k]!);
    }
    this.addBand(startS + from, startS + to);
  }

  private addBand(fromS: number, toS: number): void {
    const { stage } = this.machine;
    const { mode } = stage.slot;
    const conduction = conductionOf(this.machine);
    const gates = {
      highA: stage.gateA === GATE_HIGH,
      lowA: stage.gateA === GATE_LOW,
      highB: stage.gateB === GATE_HIGH,
      lowB: stage.gateB === GATE_LOW,
    };
    const last = this.bands[this.bands.length - 1];
    const stateA = LEG_WORDS[mode.legA]!;
    const stateB = LEG_WORDS[mode.legB]!;
    const isSame =
      last && last.conduction === conduction && last.stateA === stateA && last.stateB === stateB && last.gates.highA === gates.highA && last.gates.lowA === gates.lowA && last.gates.highB === gates.highB && last.gates.lowB === gates.lowB;
    if (isSame) last.toS = toS;
    else this.bands.push({ fromS, toS, conduction, stateA, stateB, gates });
  }

  view(samples: Conversion[], events: SimulationEvent[]): View {
    const traces: View["traces"] = {};
    for (let k = 0; k < TRACE_COUNT; k++) {
      const values = Float64Array.from(this.columns[k]!);
      if (values.length > 0 && Number.isNaN(values[0]!)) continue;
      traces[TRACE_NAMES[k] as TraceName] = { min: values, max: values };
    }
    return { kind: "exact", fromS: this.fromS, toS: this.toS, timeS: Float64Array.from(this.times), traces, bands: this.bands, samples, events };
  }
}

/** What the bridge does with the motor current, in words (look.md's bands). */
export function conductionOf(machine: Machine): Conduction {
  const { stage } = machine;
  const { mode } = stage.slot;
  if (mode.legA === LEG_THROUGH || mode.legB === LEG_THROUGH) return "shootThrough";
  if (machine.isWaiting) return "deadTime";
  if (mode.legA === LEG_OPEN || mode.legB === LEG_OPEN) return "coasting";
  const kappa = (isHighState(mode.legA) ? 1 : 0) - (isHighState(mode.legB) ? 1 : 0);
  if (kappa === 0) return isHighState(mode.legA) ? "recirculateHigh" : "recirculateLow";
  const i = stage.x[0]! + stage.xEnd[0]!;
  if (i * kappa < 0) return "returnToSupply";
  return kappa > 0 ? "driveForward" : "driveReverse";
}

/** Waveforms of an interval as minimum and maximum per column of equal width; memory does not grow with the run. */
export class EnvelopeRecorder implements Observer {
  readonly min: Float64Array[] = [];
  readonly max: Float64Array[] = [];
  private readonly widthS: number;

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, readonly fromS: number, readonly toS: number, readonly columnCount: number) {
    this.widthS = (toS - fromS) / columnCount;
    for (let k = 0; k < TRACE_COUNT; k++) {
      this.min.push(new Float64Array(columnCount).fill(Infinity));
      this.max.push(new Float64Array(columnCount).fill(-Infinity));
    }
  }

  piece(): void {
    const startS = this.machine.stage.piece[PIECE_START]!;
    const h = this.machine.stage.piece[PIECE_LENGTH]!;
    const endS = startS + h;
    if (endS <= this.fromS || startS >= this.toS) return;
    const first = Math.floor((Math.max(startS, this.fromS) - this.fromS) / this.widthS);
    const last = Math.min(Math.floor((Math.min(endS, this.toS) - this.fromS) / this.widthS), this.columnCount - 1);
    if (startS >= this.fromS) {
      readTracesAtStart(this.machine, this.bank, VALUES);
      this.add(Math.min(first, this.columnCount - 1));
    }
    // a piece over several columns leaves its value at each border on both sides
    for (let column = first; column < last; column++) {
      readTraces(this.machine, this.bank, this.fromS + (column + 1) * this.widthS - startS, VALUES);
      this.add(column);
      this.add(column + 1);
    }
    if (endS > this.toS) readTraces(this.machine, this.bank, this.toS - startS, VALUES);
    else readTracesAtEnd(this.machine, this.bank, h, VALUES);
    this.add(last);
  }

  private add(column: number): void {
    for (let k = 0; k < TRACE_COUNT; k++) {
      const v = VALUES[k]!;
      if (v < this.min[k]![column]!) this.min[k]![column] = v;
      if (v > this.max[k]![column]!) this.max[k]![column] = v;
    }
  }

  /** The interval's columns merged to at most `columnCount`. */
  view(fromS: number, toS: number, columnCount: number): View {
    const first = Math.max(Math.floor((fromS - this.fromS) / this.widthS), 0);
    const last = Math.min(Math.ceil((toS - this.fromS) / this.widthS), this.columnCount);
    const step = Math.max((last - first) / columnCount, 1);
    const count = Math.max(Math.ceil((last - first) / step), 1);
    const timeS = new Float64Array(count);
    for (let c = 0; c < count; c++) timeS[c] = this.fromS + Math.floor(first + c * step) * this.widthS;
    const traces: View["traces"] = {};
    for (let k = 0; k < TRACE_COUNT; k++) {
      if (this.max[k]![first] === -Infinity) continue;
      const min = new Float64Array(count).fill(Infinity);
      const max = new Float64Array(count).fill(-Infinity);
      for (let c = 0; c < count; c++) {
        for (let j = Math.floor(first + c * step); j < Math.min(Math.floor(first + (c + 1) * step), last); j++) {
          min[c] = Math.min(min[c]!, this.min[k]![j]!);
          max[c] = Math.max(max[c]!, this.max[k]![j]!);
        }
      }
      traces[TRACE_NAMES[k] as TraceName] = { min, max };
    }
    return { kind: "envelope", fromS, toS, timeS, traces, bands: [], samples: [], events: [] };
  }
}
