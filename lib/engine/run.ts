import type { ScenarioDocument } from "../scenario/schema";
import { SAME_INSTANT_S, shuntAtTemperatureOhm, type ShuntResistances } from "./model/parameters";
import type { Conversion, InstantReading, RunStatus, Simulation, SimulationEvent, View, ViewRequest } from "./results";
import { SensorBank } from "./sensing/bank";
import { SensingChain } from "./sensing/chain";
import { Sampler } from "./sensing/converter";
import { FigureMeter } from "./sensing/figures";
import { PeriodLeaper } from "./sensing/leap";
import { RunMonitor } from "./sensing/monitor";
import { noticesOf } from "./sensing/notices";
import { InstantReader } from "./sensing/readings";
import { EnvelopeRecorder, ExactRecorder } from "./sensing/recorder";
import { EventLog } from "./solver/event-log";
import { Machine, type Checkpoint } from "./solver/machine";
import { PowerStage } from "./solver/power-stage";
import type { Observer } from "./solver/rider";

const SAMPLES_KEPT = 8192; // D-55
/** Cells of the run's grid: a checkpoint and a column of the overview each. */
const GRID_CELLS = 1024;
/** Runs with cells of up to this many periods are short: they run in detail throughout. */
const LEAST_CELL_PERIODS = 4;
/** Views of up to this many periods are drawn from exact break points, wider ones as envelopes. */
const EXACT_PERIODS_MAX = 400;
/** Views of up to this many periods are computed anew for their columns, wider ones come from the run's own columns. */
const REPLAY_PERIODS_MAX = 20_000;
const DEFAULT_WINDOW_PERIODS = 20; // D-24

export type RunOptions = { at?: readonly number[]; traces?: boolean };

type Assembly = { machine: Machine; bank: SensorBank };

function assemble(document: ScenarioDocument, shunt: ShuntResistances, log: EventLog | null): Assembly {
  const chain = new SensingChain(document, shunt);
  const bank = new SensorBank(chain, document, log);
  const stage = new PowerStage(chain.poles);
  return { machine: new Machine(document, shunt, stage, bank, log), bank };
}

const ambientC = (document: ScenarioDocument) => document.sensing.ambientC ?? 25; // D-33

/** Figures window: the document's, or the last 20 whole periods, or the run (D-24). */
export function figuresWindow(document: ScenarioDocument): { fromS: number; toS: number } {
  const { run, pwm } = document;
  if (run.window) return { fromS: run.window.fromS, toS: run.window.toS };
  const count = Math.floor(run.durationS * pwm.frequencyHz + 1e-9);
  if (count < DEFAULT_WINDOW_PERIODS) return { fromS: 0, toS: run.durationS };
  return { fromS: (count - DEFAULT_WINDOW_PERIODS) / pwm.frequencyHz, toS: Math.min(count / pwm.frequencyHz, run.durationS) };
}

/**
 * One simulation, resumable: `advance` runs some periods at a time, so that a caller can show progress and stop; `finish`
 * gives the results; afterwards `view` and `readAt` evaluate any interval or instant exactly, from checkpoints.
 */
export class Run {
  private machine!: Machine;
  private bank!: SensorBank;
  private log!: EventLog;
  private meter!: FigureMeter;
  private sampler!: Sampler;
  private monitor!: RunMonitor;
  private leaper!: PeriodLeaper;
  private firstMeasured = 0;
  private lastMeasured = 0;
  private overview: EnvelopeRecorder | null = null;
  private shunt: ShuntResistances;
  private readonly checkpoints: Checkpoint[] = [];
  private readonly gridStep: number;
  private readonly window: { fromS: number; toS: number };
  private isPreparing: boolean;
  private status: RunStatus = "reached-end";
  private statusText = "";
  private replay: Assembly | null = null;

  constructor(readonly document: ScenarioDocument, private readonly options: RunOptions = {}) {
    this.window = figuresWindow(document);
    const ambientOhm = shuntAtTemperatureOhm(document, ambientC(document));
    this.shunt = { aOhm: ambientOhm, bOhm: ambientOhm };
    this.gridStep = Math.max(Math.ceil(Math.ceil(document.run.durationS * document.pwm.frequencyHz - 1e-9) / GRID_CELLS), 1);
    // self-heating needs the RMS currents first: one pass at ambient, then the run proper (D-33)
    this.isPreparing = document.sensing.shunt.thermalResistanceKPerW > 0 && document.sensing.shunt.tcrPpmPerK !== 0;
    this.set();
  }

  private set(): void {
    const { document } = this;
    this.log = new EventLog();
    ({ machine: this.machine, bank: this.bank } = assemble(document, this.shunt, this.log));
    const { machine, bank, window } = this;
    this.meter = new FigureMeter(machine, bank, window.fromS, window.toS);
    this.firstMeasured = Math.max(Math.floor(window.fromS * machine.frequencyHz + 1e-9) - Sampler.leadPeriods(document), 0);
    this.sampler = new Sampler(machine, bank, this.firstMeasured);
    this.sampler.onConversion = (conversion) => this.meter.addConversion(conversion);
    this.monitor = new RunMonitor(machine, bank, this.log);
    const always: Observer[] = [...machine.observers, this.monitor];
    if (!this.isPreparing) {
      if (this.options.traces && machine.periodCount > REPLAY_PERIODS_MAX) always.push((this.overview = this.makeOverview()));
    }
    // conversions and figures cost nothing outside their stretch of the run
    const measuring = [...always, this.sampler, this.meter];
    this.lastMeasured = Math.ceil(window.toS * machine.frequencyHz + 1e-9);
    const edges = this.meter.edges();
    machine.pointsOfPeriod = (period) => {
      machine.observers = period >= this.firstMeasured && period <= this.lastMeasured ? measuring : always;
      return pointsOf(machine, period, this.sampler, edges);
    };
    machine.onPoint = (offsetS) => this.sampler.reach(offsetS);
    machine.begin();
    this.leaper = new PeriodLeaper(machine, bank, this.monitor);
  }

  /** A column per cell of the grid: what views too wide to be replayed are drawn from. */
  private makeOverview(): EnvelopeRecorder {
    const { machine, bank } = this;
    const columnCount = Math.ceil(machine.periodCount / this.gridStep);
    return new EnvelopeRecorder(machine, bank, 0, (columnCount * this.gridStep) / machine.frequencyHz, columnCount);
  }

  /** Share of the whole work done, 0 to 1. */
  get doneShare(): number {
    const share = this.machine.period / this.machine.periodCount;
    if (this.document.sensing.shunt.thermalResistanceKPerW === 0 || this.document.sensing.shunt.tcrPpmPerK === 0) return share;
    return this.isPreparing ? share / 2 : 0.5 + share / 2;
  }

  /** Runs up to about `periodCount` periods more; true when there is nothing left to run. */
  advance(periodCount: number): boolean {
    const { machine } = this;
    const untilPeriod = machine.period + periodCount;
    while (machine.period < untilPeriod && machine.period < machine.periodCount) {
      if (this.status !== "reached-end") return true;
      const isCellStart = machine.period % this.gridStep === 0;
      if (isCellStart && machine.period > 0 && !this.isPreparing) this.checkpoints.push(machine.save());
      if (isCellStart || this.gridStep <= LEAST_CELL_PERIODS || this.leaper.leap(this.leapLimit()) === 0) machine.runPeriod();
      if (!this.isFinite()) return true;
    }
    if (machine.period < machine.periodCount) return false;
    if (!this.isPreparing) return true;
    const [rmsAA, rmsBA] = this.meter.shuntRmsA();
    const { resistanceOhm, thermalResistanceKPerW } = this.document.sensing.shunt;
    const heated = (rmsA: number) => shuntAtTemperatureOhm(this.document, ambientC(this.document) + thermalResistanceKPerW * resistanceOhm * rmsA * rmsA);
    this.shunt = { aOhm: heated(rmsAA), bOhm: heated(rmsBA) };
    this.isPreparing = false;
    this.set();
    return false;
  }

  /**
   * First period from here that must run in detail: the first of each grid cell (checkpoint, envelope) and those that are
   * measured. It depends on the document alone, so that every caller gets the same numbers to the bit.
   */
  private leapLimit(): number {
    const { period } = this.machine;
    if (period % this.gridStep === 0 || (period >= this.firstMeasured && period <= this.lastMeasured)) return period;
    const cellEnd = (Math.floor(period / this.gridStep) + 1) * this.gridStep;
    return period < this.firstMeasured ? Math.min(cellEnd, this.firstMeasured) : cellEnd;
  }

  private isFinite(): boolean {
    const { x } = this.machine.stage;
    if (this.machine.isStuck) {
      this.status = "step-limit";
      this.statusText = `The period that starts at ${this.machine.periodStartS} s needs more than 20 000 pieces. Two limits are likely to be met by turns at one instant; the last input changed is the first to look at.`;
      return false;
    }
    if (Number.isFinite(x[0]!) && Number.isFinite(x[1]!) && Number.isFinite(x[2]!)) return true;
    this.status = "not-finite";
    const timeS = this.machine.periodStartS;
    this.statusText = `The state left the range of numbers in the period that starts at ${timeS} s. The likely cause is a combination of constants far from any real motor; the last input changed is the first to look at.`;
    return false;
  }

  finish(): Simulation {
    const { machine, log } = this;
    this.sampler.finish();
    const figures = this.meter.figures();
    const { fromS, toS } = this.window;
    const samples = this.sampler.conversions.filter((c) => c.timeS >= fromS - 1e-13 && c.timeS < toS - 1e-13);
    const simulation: Simulation = {
      status: this.status,
      statusText: this.statusText,
      durationS: this.document.run.durationS,
      window: this.window,
      at: this.status === "reached-end" && this.options.at ? this.readAt(this.options.at) : [],
      events: withSampleEvents(log.events, samples),
      eventCounts: { ...log.counts, ...(samples.length > 0 ? { sample: samples.length } : {}) },
      samples: samples.slice(0, SAMPLES_KEPT),
      figures,
      notices: [],
      counters: { periods: machine.period, intervals: machine.intervals, crossings: machine.stage.crossings, operatorBuilds: machine.stage.operatorBuilds },
    };
    simulation.notices = noticesOf(this.document, simulation, this.monitor);
    return simulation;
  }

  /* ------------------------------------------------------ afterwards ------------------------------------------------- */

  /** A second machine at the start of the period that holds `timeS`, or of an earlier one. */
  private rewind(timeS: number, leadPeriods: number): Assembly {
    const { document } = this;
    const period = Math.min(Math.max(Math.floor(timeS * this.machine.frequencyHz) - leadPeriods, 0), this.machine.periodCount - 1);
    let saved: Checkpoint | null = null;
    const index = Math.min(Math.floor(period / this.gridStep), this.checkpoints.length);
    if (index > 0) saved = this.checkpoints[index - 1]!;
    let assembly = this.replay;
    if (!assembly || !saved) assembly = assemble(document, this.shunt, null);
    this.replay = assembly;
    const { machine } = assembly;
    machine.observers = machine.observers.slice(0, machine.ownObserverCount);
    machine.pointsOfPeriod = null;
    if (saved) machine.restore(saved);
    else machine.begin();
    while (machine.period < period && !machine.isStuck) machine.runPeriod();
    return assembly;
  }

  /** Waveforms of an interval: exact break points for narrow views, minimum and maximum per column for wide ones. */
  view(request: ViewRequest): View {
    const { durationS } = this.document.run;
    const fromS = Math.min(Math.max(request.fromS, 0), durationS);
    const toS = Math.min(Math.max(request.toS, fromS), durationS);
    const columnCount = Math.min(Math.max(Math.round(request.columnCount), 1), 8192);
    const periods = (toS - fromS) * this.machine.frequencyHz;
    if (periods > REPLAY_PERIODS_MAX && this.overview) return this.overview.view(fromS, toS, columnCount);
    if (periods > EXACT_PERIODS_MAX) {
      const { machine, bank } = this.rewind(fromS, 0);
      const recorder = new EnvelopeRecorder(machine, bank, fromS, toS, columnCount);
      machine.observers.push(recorder);
      this.runTo(machine, toS);
      return recorder.view(fromS, toS, columnCount);
    }
    return this.exactView(fromS, toS, columnCount);
  }

  private exactView(fromS: number, toS: number, columnCount: number): View {
    const { machine, bank } = this.rewind(fromS, Sampler.leadPeriods(this.document));
    const recorder = new ExactRecorder(machine, bank, fromS, toS, columnCount);
    const sampler = new Sampler(machine, bank, machine.period);
    const samples: Conversion[] = [];
    sampler.onConversion = (conversion) => {
      if (conversion.timeS >= fromS && conversion.timeS <= toS) samples.push(conversion);
    };
    machine.observers.push(recorder, sampler);
    machine.pointsOfPeriod = (period) => pointsOf(machine, period, sampler, []);
    machine.onPoint = (offsetS) => sampler.reach(offsetS);
    const log = new EventLog(100_000);
    machine.log = bank.log = log;
    this.runTo(machine, toS);
    sampler.finish();
    machine.log = bank.log = null;
    const events = withSampleEvents(log.events, samples).filter((event) => event.timeS >= fromS && event.timeS <= toS);
    return recorder.view(samples, events);
  }

  private runTo(machine: Machine, toS: number): void {
    while (machine.period < machine.periodCount && machine.period / machine.frequencyHz < toS && !machine.isStuck) machine.runPeriod();
  }

  /** Readings at instants, in the order asked for; the same numbers as `at` of the run. */
  readAt(times: readonly number[]): InstantReading[] {
    const order = times.map((_, i) => i).sort((a, b) => times[a]! - times[b]!);
    const results: InstantReading[] = new Array(times.length);
    let from = 0;
    while (from < order.length) {
      // instants closer than two checkpoints share one stretch
      let to = from + 1;
      const stretchS = (2 * this.gridStep + 8) / this.machine.frequencyHz;
      while (to < order.length && times[order[to]!]! - times[order[to - 1]!]! < stretchS) to++;
      const part = order.slice(from, to);
      const { machine, bank } = this.rewind(times[part[0]!]!, 1);
      const reader = new InstantReader(machine, bank, part.map((i) => times[i]!));
      machine.observers.push(reader);
      this.runTo(machine, times[part[part.length - 1]!]! + 1 / machine.frequencyHz);
      reader.finish().forEach((reading, i) => (results[part[i]!] = reading));
      from = to;
    }
    return results;
  }
}

/** Points of a period at which pieces must end: conversions and the window's edges. */
function pointsOf(machine: Machine, period: number, sampler: Sampler, edges: readonly number[]): readonly number[] {
  let offsets = sampler.offsetsOfPeriod(period);
  const startS = period / machine.frequencyHz;
  for (let n = 0; n < edges.length; n++) {
    const offsetS = edges[n]! - startS;
    if (offsetS > SAME_INSTANT_S && offsetS < machine.periodS - SAME_INSTANT_S) offsets = [...offsets, offsetS].sort((a, b) => a - b);
  }
  return offsets;
}

function withSampleEvents(events: SimulationEvent[], samples: readonly Conversion[]): SimulationEvent[] {
  const kept: SimulationEvent[] = samples.slice(0, 200).map((s) => ({ timeS: s.timeS, kind: "sample", detail: `code ${s.code}` }));
  return [...events, ...kept].sort((a, b) => a.timeS - b.timeS);
}
