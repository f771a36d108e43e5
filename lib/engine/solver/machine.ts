import type { ScenarioDocument } from "../../scenario/schema";
import type { EventKind, LegName } from "../results";
import { GATE_HIGH, isDiodeState, LEG_OPEN } from "../model/legs";
import { parameterChangeTimes, SAME_INSTANT_S, stageParametersAt, type ShuntResistances, type StageParameters } from "../model/parameters";
import { CommandPattern, DutyCommand, type CommandMemory } from "./command";
import type { EventLog } from "./event-log";
import { GateDriver, type GateEdge } from "./gates";
import { rowRoot } from "./locate";
import { PIECE_LENGTH, PIECE_RIDER_EVENT, PIECE_STAGE_EVENT, PIECE_START } from "./piece";
import { PowerStage } from "./power-stage";
import { STAGE_BREAK_FORWARD, STAGE_BREAK_REVERSE, STAGE_DIODE_ENDS, STAGE_SHAFT_ZERO, STAGE_SOURCE } from "./stage-guards";
import type { Observer, Rider } from "./rider";
import { WindingNode } from "./winding";

/** Everything needed to go on from the start of a period. */
export type Checkpoint = { period: number; numbers: number[]; gates: number[]; rider: number[] };

/** State at the start of a plain period: what a period can change when nothing but the PWM pattern acts. */
export type PeriodState = { period: number; x: Float64Array; rider: number[]; gates: number[]; legA: number; legB: number; shaftSign: number; sourceConducts: boolean; gateA: number; gateB: number; isWaiting: boolean };

/** Pieces without progress at one instant after which shaft events are let pass: guards that chatter by rounding. */
const IDLE_PIECES_MAX = 12;
const IDLE_RIDER_MAX = 2;
/** Pieces of one period after which the run ends with the status `step-limit`: a real one has about ten. */
const PIECES_MAX = 20_000;

const CURRENT_ROW = new Float64Array([1, 0, 0, 0]);

/**
 * Runs the power stage and its rider period by period. Period k starts at k/f, one rounding (D-02); all edges of a
 * period are offsets from it. Deterministic; state, checkpoints and observers hold no clock and no randomness.
 */
export class Machine {
  period = 0;
  /** Offset inside the running period, s. */
  offsetS = 0;
  periodStartS = 0;
  duty = 0;
  intervals = 0;
  /** Zero-current intervals with both legs undriven were cut by an interruption: the energy balance has a hole. */
  lostEnergy = false;
  /** A period needed more pieces than PIECES_MAX: something chatters. */
  isStuck = false;
  private piecesInPeriod = 0;
  gateA = 0;
  gateB = 0;
  isWaiting = false;
  isReversal = false;
  observers: Observer[] = [];
  /** One more observer for the time of a survey (see PeriodLeaper). */
  observersBeside: Observer | null = null;
  /** Observers that belong to the model itself (the winding's thermal node) come first and stay. */
  readonly ownObserverCount: number;
  readonly periodS: number;
  readonly frequencyHz: number;
  readonly periodCount: number;
  /** Called at the start of a period with its number; returns extra instants (offsets) at which pieces must end. */
  pointsOfPeriod: ((period: number) => readonly number[]) | null = null;
  /** Called when an instant asked for by `pointsOfPeriod` is reached. */
  onPoint: ((offsetS: number) => void) | null = null;

  private readonly command: DutyCommand;
  private readonly pattern: CommandPattern;
  private readonly driver: GateDriver;
  private readonly changes: number[];
  private nextChange = 0;
  private changedAtS = 0;
  private memory: CommandMemory = { direction: 1, dwellFromS: 0, dwellToS: 0 };
  private readonly winding: WindingNode | null;
  private cachedBefore: number[] = [];
  private cachedDuty = NaN;
  private cachedDirection = 0;
  private cachedEdges: GateEdge[] = [];
  private cachedAfter: number[] = [];

  constructor(
    readonly document: ScenarioDocument,
    private readonly shunt: ShuntResistances,
    readonly stage: PowerStage,
    readonly rider: Rider,
    public log: EventLog | null,
  ) {
    this.frequencyHz = document.pwm.frequencyHz;
    this.periodS = 1 / this.frequencyHz;
    const { durationS } = document.run;
    let count = Math.ceil(durationS * this.frequencyHz - 1e-9);
    if (count < 1) count = 1;
    this.periodCount = count;
    this.command = new DutyCommand(document.command.points);
    this.pattern = new CommandPattern(document);
    this.driver = new GateDriver(document.bridge.deadTimeS);
    this.changes = parameterChangeTimes(document).filter((t) => t <= durationS);
    this.winding = document.load.kind === "motor" && document.load.motor.thermal ? new WindingNode(document.load.motor.thermal, document.load.motor.temperatureC, stage) : null;
    if (this.winding) this.observers.push(this.winding);
    this.ownObserverCount = this.observers.length;
  }

  get timeS(): number {
    return this.periodStartS + this.offsetS;
  }

  private windingC(): number {
    if (this.winding) return this.winding.temperatureC;
    return this.document.load.kind === "motor" ? this.document.load.motor.temperatureC : 20;
  }

  /** Puts the machine at t = 0, before the first edge. */
  begin(): void {
    const { initial, supply } = this.document;
    const { stage } = this;
    stage.setParameters(this.parametersAt(0));
    stage.begin(initial.currentA, initial.speedRadPerS, initial.busV ?? supply.voltageV);
    this.period = 0;
    this.isStuck = false;
  }

  private parametersAt(timeS: number): StageParameters {
    this.changedAtS = timeS;
    return stageParametersAt(this.document, timeS, this.windingC(), this.shunt);
  }

  /** Runs one period (the last one may be cut by the end of the run). */
  runPeriod(): void {
    const k = this.period;
    const { stage, rider } = this;
    this.periodStartS = k / this.frequencyHz;
    this.offsetS = 0;
    this.piecesInPeriod = 0;
    const isLast = k === this.periodCount - 1;
    const endS = isLast ? this.document.run.durationS - this.periodStartS : this.periodS;
    let isChanged = this.applyChanges(SAME_INSTANT_S);
    if (this.winding && k > 0 && this.winding.endPeriod(this.periodS)) {
      if (!isChanged) stage.setParameters(this.parametersAt(this.periodStartS));
      isChanged = true;
    }
    this.beginCommand();
    const edges = this.edgesOfPeriod();
    const points = this.pointsOfPeriod?.(k) ?? NO_POINTS;
    let edge = 0;
    let point = 0;
    let mustResolve = isChanged || k === 0;
    for (;;) {
      while (point < points.length && points[point]! <= this.offsetS + SAME_INSTANT_S && points[point]! < endS - SAME_INSTANT_S) {
        // conversions see the state after the events of their instant (D-27): edges first
        if (edge < edges.length && edges[edge]!.offsetS <= this.offsetS + SAME_INSTANT_S) break;
        if (mustResolve) break;
        this.onPoint!(points[point++]!);
      }
      if (edge < edges.length && edges[edge]!.offsetS <= this.offsetS + SAME_INSTANT_S) {
        this.takeEdge(edges[edge++]!);
        mustResolve = true;
        continue;
      }
      if (mustResolve) {
        this.resolve(stage.x[0]!);
        if (k === 0 && this.offsetS === 0) rider.begin(stage);
        mustResolve = false;
        continue;
      }
      let untilS = endS;
      if (edge < edges.length && edges[edge]!.offsetS < untilS) untilS = edges[edge]!.offsetS;
      if (point < points.length && points[point]! < untilS) untilS = points[point]!;
      const changeS = this.nextChange < this.changes.length ? this.changes[this.nextChange]! - this.periodStartS : Infinity;
      if (changeS < untilS) untilS = changeS;
      if (this.offsetS >= endS - SAME_INSTANT_S) break;
      this.advance(untilS);
      if (this.isStuck) break;
      if (changeS <= this.offsetS + SAME_INSTANT_S && this.applyChanges(SAME_INSTANT_S)) mustResolve = true;
    }
    this.period = k + 1;
    if (isLast) this.offsetS = endS;
  }

  private beginCommand(): void {
    const { memory, document } = this;
    this.duty = this.command.at(this.periodStartS);
    this.isReversal = this.pattern.beginPeriod(memory, this.duty, this.periodStartS);
    if (this.isReversal && this.log && (this.period > 0 || this.duty < 0)) {
      const kind = document.command.reversal.kind;
      this.log.add(this.periodStartS, "command", `${this.duty > 0 ? "forward" : "reverse"}${kind === "direct" ? "" : `, ${kind} first`}`);
    }
  }

  /** Gate edges of this period, from the last one where nothing differs: bit-equal offsets make operators reusable. */
  private edgesOfPeriod(): GateEdge[] {
    const { memory, driver } = this;
    const isSpecial = this.pattern.hasOverride(memory, this.periodStartS, this.periodStartS + this.periodS);
    if (!isSpecial && this.duty === this.cachedDuty && memory.direction === this.cachedDirection && driver.matches(this.cachedBefore)) {
      driver.restore(this.cachedAfter);
      return this.cachedEdges;
    }
    this.cachedBefore = isSpecial ? [] : driver.save();
    this.cachedDuty = this.duty;
    this.cachedDirection = memory.direction;
    const edges = driver.drive(this.pattern.commands(this.duty, memory, this.periodStartS, isSpecial), this.periodS);
    this.cachedEdges = edges;
    this.cachedAfter = driver.save();
    return edges;
  }

  private takeEdge(edge: GateEdge): void {
    if (this.log) {
      this.logGate("A", this.gateA, edge.gateA, edge.isWaitingA);
      this.logGate("B", this.gateB, edge.gateB, edge.isWaitingB);
    }
    this.gateA = this.stage.gateA = edge.gateA;
    this.gateB = this.stage.gateB = edge.gateB;
    this.isWaiting = edge.isWaitingA || edge.isWaitingB;
  }

  private logGate(leg: LegName, before: number, after: number, isWaiting: boolean): void {
    if (before === after) return;
    const log = this.log!;
    if (before !== 0) log.add(this.timeS, "gate", before === GATE_HIGH ? "high off" : "low off", leg);
    if (after !== 0) log.add(this.timeS, "gate", after === GATE_HIGH ? "high on" : "low on", leg);
    if (isWaiting && after === 0) log.add(this.timeS, "deadTime", "both switches of the leg off", leg);
  }

  /** Parameter changes (faults, shaft entries) reached now; true if there were any. */
  private applyChanges(toleranceS: number): boolean {
    const nowS = this.timeS;
    const fromIndex = this.nextChange;
    while (this.nextChange < this.changes.length && this.changes[this.nextChange]! <= nowS + toleranceS) this.nextChange++;
    if (this.nextChange === fromIndex) return false;
    const atS = this.changes[this.nextChange - 1]!;
    if (this.log) this.logChanges(this.changes[fromIndex]!, atS);
    const wasTurning = this.stage.x[1] !== 0;
    this.stage.setParameters(this.parametersAt(atS));
    if (wasTurning && this.stage.parameters.isLocked) this.lostEnergy = true;
    this.rider.changeAt(atS, this.stage);
    return true;
  }

  private logChanges(fromS: number, toS: number): void {
    const { document, log } = this;
    for (const fault of document.faults) if (fault.atS >= fromS && fault.atS <= toS) log!.add(fault.atS, "fault", fault.kind, "leg" in fault ? fault.leg : undefined);
    if (document.load.kind !== "motor") return;
    for (const entry of document.load.shaft) if (entry.timeS >= fromS && entry.timeS <= toS) log!.add(entry.timeS, "shaftStep", `${entry.kind} ${entry.value}`);
  }

  /** One resolution of the conduction states from the state reached (D-27). */
  private resolve(currentBeforeA: number): void {
    const { stage } = this;
    if (stage.x[1] === 0 && !stage.parameters.isLocked) stage.settleShaft();
    const legA = stage.slot.mode.legA;
    const legB = stage.slot.mode.legB;
    if (stage.resolve()) this.lostEnergy = true;
    this.entered(legA, legB, currentBeforeA);
  }

  private entered(legA: number, legB: number, currentBeforeA: number): void {
    const { stage, log } = this;
    const { mode } = stage.slot;
    this.rider.onMode(stage, currentBeforeA);
    if (!log) return;
    if (isDiodeState(mode.legA) && !isDiodeState(legA)) log.add(this.timeS, "diodeStarts", mode.legA === 2 ? "high diode" : "low diode", "A");
    if (isDiodeState(mode.legB) && !isDiodeState(legB)) log.add(this.timeS, "diodeStarts", mode.legB === 2 ? "high diode" : "low diode", "B");
  }

  /** Advances to the offset `untilS` of this period in pieces that end at events; gates stay as they are. */
  private advance(untilS: number): void {
    const { stage, rider } = this;
    let idle = 0;
    const { piece } = stage;
    while (this.offsetS < untilS) {
      const restS = untilS - this.offsetS;
      piece[PIECE_START] = this.periodStartS + this.offsetS;
      piece[PIECE_LENGTH] = restS;
      rider.limitPiece(stage);
      stage.prepare(this.changedAtS, this.periodS);
      stage.step();
      stage.skipsIdle = idle > IDLE_PIECES_MAX;
      let isStageEvent = stage.nextEvent();
      if (isStageEvent && piece[PIECE_STAGE_EVENT]! < piece[PIECE_LENGTH]!) {
        piece[PIECE_LENGTH] = piece[PIECE_STAGE_EVENT]!;
        stage.step();
      }
      if (rider.attempt(stage) && piece[PIECE_RIDER_EVENT]! < piece[PIECE_LENGTH]!) {
        // an event of the sensing chain that stands still is stepped over, so that its state is on the far side
        const least = idle > IDLE_RIDER_MAX ? SAME_INSTANT_S * 2 ** (idle - IDLE_RIDER_MAX) : 0;
        piece[PIECE_LENGTH] = Math.min(Math.max(piece[PIECE_RIDER_EVENT]!, least), piece[PIECE_LENGTH]!);
        isStageEvent = false;
        stage.step();
        rider.attempt(stage);
      }
      const h = piece[PIECE_LENGTH]!;
      idle = h > SAME_INSTANT_S * 2 ** Math.min(idle, 20) ? 0 : idle + 1;
      this.intervals++;
      if (++this.piecesInPeriod > PIECES_MAX) {
        this.isStuck = true;
        return;
      }
      if (h > 0) this.commitPiece(isStageEvent);
      this.offsetS = h === restS ? untilS : this.offsetS + h;
      if (isStageEvent) this.takeStageEvent();
    }
  }

  private commitPiece(isStageEvent: boolean): void {
    const { stage, observers } = this;
    const i0 = stage.x[0]!;
    const i1 = stage.xEnd[0]!;
    if (this.log && ((i0 > 0 && i1 < 0) || (i0 < 0 && i1 > 0))) this.noteCurrentZero(isStageEvent);
    if (this.observersBeside) this.observersBeside.piece();
    else for (let n = 0; n < observers.length; n++) observers[n]!.piece();
    stage.commit();
    this.rider.commit(stage);
  }

  private takeStageEvent(): void {
    const { stage } = this;
    const { mode } = stage.slot;
    const { legA, legB } = mode;
    const kind = stage.eventKind;
    // a current that ends here was not zero just before, and is zero just after: shares jump (D-20)
    const currentBeforeA = kind === STAGE_DIODE_ENDS ? 0 : stage.x[0]!;
    stage.applyEvent();
    if (this.log) this.noteStageEvent(kind, legA, legB);
    this.entered(legA, legB, currentBeforeA);
  }

  /** A zero crossing while both legs conduct in channels changes no mode but is an event (D-46). */
  private noteCurrentZero(isStageEvent: boolean): void {
    const { stage } = this;
    if (isStageEvent && stage.eventKind === STAGE_DIODE_ENDS) return;
    const log = this.log!;
    const { piece, slot, x, xEnd } = stage;
    const atS = log.isKept("currentZero") ? rowRoot(CURRENT_ROW, slot.mode, slot.spectrum, x, 0, x[0]!, piece[PIECE_LENGTH]!, xEnd[0]!) : 0;
    log.add(piece[PIECE_START]! + atS, "currentZero", xEnd[0]! > 0 ? "to forward" : "to reverse");
  }

  private noteStageEvent(kind: number, legA: number, legB: number): void {
    const { stage } = this;
    const log = this.log!;
    const atS = this.timeS;
    const add = (event: EventKind, detail: string, leg?: LegName) => log.add(atS, event, detail, leg);
    if (kind === STAGE_DIODE_ENDS) {
      const leg: LegName | undefined = isDiodeState(legA) && isDiodeState(legB) ? undefined : isDiodeState(legA) ? "A" : "B";
      add("diodeEnds", stage.slot.mode.legA === LEG_OPEN || stage.slot.mode.legB === LEG_OPEN ? "the current has ended" : "the current turns", leg);
      add("currentZero", "");
    } else if (kind === STAGE_SHAFT_ZERO) {
      if (stage.shaftSign === 0) add("shaftSticks", "friction holds the shaft");
    } else if (kind === STAGE_BREAK_FORWARD) add("breakAway", "+");
    else if (kind === STAGE_BREAK_REVERSE) add("breakAway", "-");
    else if (kind === STAGE_SOURCE) add(stage.sourceConducts ? "sourceConducts" : "sourceBlocks", "");
  }

  /* ------------------------------------------------------ plain periods ------------------------------------------------ */

  /** Nothing but the PWM pattern acts in the period that starts now: no change of parameters or direction, no override. */
  isPlainPeriod(): boolean {
    const k = this.period;
    if (k === 0 || k >= this.periodCount - 1) return false;
    const startS = k / this.frequencyHz;
    const endS = startS + this.periodS;
    if (this.nextChange < this.changes.length && this.changes[this.nextChange]! <= endS) return false;
    const duty = this.command.at(startS);
    if (duty !== 0 && Math.sign(duty) !== this.memory.direction) return false;
    return !this.pattern.hasOverride(this.memory, startS, endS);
  }

  /** The period that starts now has this duty, gate memory and conduction state. */
  startsLike(state: PeriodState, duty: number): boolean {
    if (this.command.at(this.period / this.frequencyHz) !== duty || !this.driver.matches(state.gates)) return false;
    return this.returnsTo(state);
  }

  /** Legs, gates, shaft and source stand as in `state`. */
  returnsTo(state: PeriodState): boolean {
    const { stage } = this;
    const { mode } = stage.slot;
    return mode.legA === state.legA && mode.legB === state.legB && stage.shaftSign === state.shaftSign && stage.sourceConducts === state.sourceConducts && this.gateA === state.gateA && this.gateB === state.gateB && this.driver.matches(state.gates) && this.rider.matches(state.rider);
  }

  /** Whether the log still keeps events of a kind that has occurred since `counts`. */
  keepsEvents(counts: EventLog["counts"]): boolean {
    if (!this.log) return false;
    for (const kind of Object.keys(this.log.counts) as EventKind[]) if (this.log.counts[kind] !== counts[kind] && this.log.isKept(kind)) return true;
    return false;
  }

  /** States that move: all but the shaft at rest and an algebraic bus. */
  isMovingState(index: number): boolean {
    const { stage } = this;
    if (index === 1) return !stage.parameters.isLocked && stage.shaftSign !== 0;
    return index === 0 || stage.parameters.hasBusState;
  }

  periodState(): PeriodState {
    const { stage } = this;
    const { mode } = stage.slot;
    return { period: this.period, x: stage.x.slice(), rider: this.rider.save(), gates: this.driver.save(), legA: mode.legA, legB: mode.legB, shaftSign: stage.shaftSign, sourceConducts: stage.sourceConducts, gateA: this.gateA, gateB: this.gateB, isWaiting: this.isWaiting };
  }

  setPeriodState(state: PeriodState): void {
    const { stage } = this;
    this.period = state.period;
    stage.x.set(state.x);
    stage.shaftSign = state.shaftSign;
    stage.sourceConducts = state.sourceConducts;
    this.gateA = stage.gateA = state.gateA;
    this.gateB = stage.gateB = state.gateB;
    this.isWaiting = state.isWaiting;
    this.driver.restore(state.gates);
    this.rider.restore(state.rider);
    stage.reenter(state.legA, state.legB);
  }

  /** Counts a period whose end state has been set by other means. */
  skipPeriod(intervals: number, eventCounts: Readonly<Record<string, number>>): void {
    this.period++;
    this.intervals += intervals;
    if (this.log) for (const kind in eventCounts) this.log.counts[kind as EventKind]! += eventCounts[kind]!;
  }

  /* ------------------------------------------------------- checkpoints ------------------------------------------------ */

  save(): Checkpoint {
    const { stage, memory } = this;
    const numbers = [stage.x[0]!, stage.x[1]!, stage.x[2]!, stage.shaftSign, stage.sourceConducts ? 1 : 0, this.gateA, this.gateB, this.isWaiting ? 1 : 0, memory.direction, memory.dwellFromS, memory.dwellToS, this.nextChange, this.changedAtS, this.winding?.temperatureC ?? 0, this.winding?.lossIntegralJ ?? 0, stage.slot.mode.legA, stage.slot.mode.legB];
    return { period: this.period, numbers, gates: this.driver.save(), rider: this.rider.save() };
  }

  restore(saved: Checkpoint): void {
    const { stage } = this;
    const n = saved.numbers;
    this.period = saved.period;
    this.isStuck = false;
    this.offsetS = 0;
    this.periodStartS = saved.period / this.frequencyHz;
    this.memory = { direction: n[8]!, dwellFromS: n[9]!, dwellToS: n[10]! };
    this.nextChange = n[11]!;
    if (this.winding) this.winding.restore(n[13]!, n[14]!);
    stage.setParameters(this.parametersAt(n[12]!));
    stage.x.set([n[0]!, n[1]!, n[2]!]);
    stage.shaftSign = n[3]!;
    stage.sourceConducts = n[4] === 1;
    this.gateA = stage.gateA = n[5]!;
    this.gateB = stage.gateB = n[6]!;
    this.isWaiting = n[7] === 1;
    this.driver.restore(saved.gates);
    this.cachedBefore = [];
    stage.reenter(n[15]!, n[16]!);
    this.rider.changeAt(n[12]!, stage);
    this.rider.restore(saved.rider);
  }
}

const NO_POINTS: readonly number[] = [];
