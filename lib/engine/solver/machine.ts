import type { ScenarioDocument } from "../../scenario/schema";
import type { EventKind } from "../results";
import { SAME_INSTANT_S, type ShuntResistances } from "../model/parameters";
import type { EventLog } from "./event-log";
import { GatePlan } from "./gate-plan";
import type { GateEdge } from "./gates";
import { noteChanges, noteCurrentZero, noteDiodes, noteGate, noteReversal, noteStageEvent } from "./machine-log";
import { ParameterTimeline } from "./parameter-timeline";
import { PIECE_LENGTH, PIECE_RIDER_EVENT, PIECE_STAGE_EVENT, PIECE_START } from "./piece";
import type { PowerStage } from "./power-stage";
import type { Observer, Rider } from "./rider";
import { STAGE_DIODE_ENDS } from "./stage-guards";
import { WindingNode } from "./winding";

/** Everything needed to go on from the start of a period. */
export type Checkpoint = { period: number; numbers: number[]; gates: number[]; rider: number[] };

/** Pieces without progress at one instant after which shaft events are let pass: guards that chatter by rounding. */
const IDLE_PIECES_MAX = 12;
const IDLE_RIDER_MAX = 2;
/** Pieces of one period after which the run ends with the status `step-limit`: a real one has about ten. */
const PIECES_MAX = 20_000;

/**
 * Runs the power stage and its rider period by period. Period k starts at k/f, one rounding (D-02); all edges of a
 * period are offsets from it. Deterministic; state, checkpoints and observers hold no clock and no randomness.
 */
export class Machine {
  period = 0;
  /** Offset inside the running period, s. */
  offsetS = 0;
  periodStartS = 0;
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

  readonly plan: GatePlan;
  private readonly timeline: ParameterTimeline;
  private readonly winding: WindingNode | null;

  constructor(
    readonly document: ScenarioDocument,
    shunt: ShuntResistances,
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
    this.plan = new GatePlan(document);
    this.winding = document.load.kind === "motor" && document.load.motor.thermal ? new WindingNode(document.load.motor.thermal, document.load.motor.temperatureC, stage) : null;
    this.timeline = new ParameterTimeline(document, shunt, this.winding);
    if (this.winding) this.observers.push(this.winding);
    this.ownObserverCount = this.observers.length;
  }

  get timeS(): number {
    return this.periodStartS + this.offsetS;
  }

  /** Duty of the running period. */
  get duty(): number {
    return this.plan.duty;
  }

  /** Puts the machine at t = 0, before the first edge. */
  begin(): void {
    const { initial, supply } = this.document;
    const { stage } = this;
    stage.setParameters(this.timeline.at(0));
    stage.begin(initial.currentA, initial.speedRadPerS, initial.busV ?? supply.voltageV);
    this.period = 0;
    this.isStuck = false;
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
      if (!isChanged) stage.setParameters(this.timeline.at(this.periodStartS));
      isChanged = true;
    }
    this.isReversal = this.plan.beginPeriod(this.periodStartS);
    if (this.isReversal && this.log && (k > 0 || this.duty < 0)) noteReversal(this.log, this);
    const edges = this.plan.edges(this.periodStartS);
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
      const changeS = this.timeline.nextS - this.periodStartS;
      if (changeS < untilS) untilS = changeS;
      if (this.offsetS >= endS - SAME_INSTANT_S) break;
      this.advance(untilS);
      if (this.isStuck) break;
      if (changeS <= this.offsetS + SAME_INSTANT_S && this.applyChanges(SAME_INSTANT_S)) mustResolve = true;
    }
    this.period = k + 1;
    if (isLast) this.offsetS = endS;
  }

  private takeEdge(edge: GateEdge): void {
    if (this.log) {
      noteGate(this.log, this, "A", this.gateA, edge.gateA, edge.isWaitingA);
      noteGate(this.log, this, "B", this.gateB, edge.gateB, edge.isWaitingB);
    }
    this.gateA = this.stage.gateA = edge.gateA;
    this.gateB = this.stage.gateB = edge.gateB;
    this.isWaiting = edge.isWaitingA || edge.isWaitingB;
  }

  /** Parameter changes (faults, shaft entries) reached now; true if there were any. */
  private applyChanges(toleranceS: number): boolean {
    const { timeline } = this;
    if (!timeline.take(this.timeS + toleranceS)) return false;
    const atS = timeline.takenToS;
    if (this.log) noteChanges(this.log, this.document, timeline.takenFromS, atS);
    const wasTurning = this.stage.x[1] !== 0;
    this.stage.setParameters(this.timeline.at(atS));
    if (wasTurning && this.stage.parameters.isLocked) this.lostEnergy = true;
    this.rider.changeAt(atS, this.stage);
    return true;
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
    this.rider.onMode(this.stage, currentBeforeA);
    if (this.log) noteDiodes(this.log, this, legA, legB);
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
      stage.prepare(this.timeline.madeAtS, this.periodS);
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
    if (this.log && ((i0 > 0 && i1 < 0) || (i0 < 0 && i1 > 0))) noteCurrentZero(this.log, stage, isStageEvent);
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
    if (this.log) noteStageEvent(this.log, this, kind, legA, legB);
    this.entered(legA, legB, currentBeforeA);
  }

  /** Nothing but the PWM pattern acts in the period that starts now: no change of parameters or direction, no override. */
  isPlainPeriod(): boolean {
    const k = this.period;
    if (k === 0 || k >= this.periodCount - 1) return false;
    const startS = k / this.frequencyHz;
    if (this.timeline.nextS <= startS + this.periodS) return false;
    return this.plan.isPlain(startS);
  }

  /** Counts a period whose end state has been set by other means. */
  skipPeriod(intervals: number, eventCounts: Readonly<Record<string, number>>): void {
    this.period++;
    this.intervals += intervals;
    if (this.log) for (const kind in eventCounts) this.log.counts[kind as EventKind]! += eventCounts[kind]!;
  }

  /* ------------------------------------------------------- checkpoints ------------------------------------------------ */

  save(): Checkpoint {
    const { stage } = this;
    const { memory } = this.plan;
    const numbers = [stage.x[0]!, stage.x[1]!, stage.x[2]!, stage.shaftSign, stage.sourceConducts ? 1 : 0, this.gateA, this.gateB, this.isWaiting ? 1 : 0, memory.direction, memory.dwellFromS, memory.dwellToS, this.timeline.passedCount, this.timeline.madeAtS, this.winding?.temperatureC ?? 0, this.winding?.lossIntegralJ ?? 0, stage.slot.mode.legA, stage.slot.mode.legB];
    return { period: this.period, numbers, gates: this.plan.driver.save(), rider: this.rider.save() };
  }

  restore(saved: Checkpoint): void {
    const { stage } = this;
    const n = saved.numbers;
    this.period = saved.period;
    this.isStuck = false;
    this.offsetS = 0;
    this.periodStartS = saved.period / this.frequencyHz;
    this.plan.restore({ direction: n[8]!, dwellFromS: n[9]!, dwellToS: n[10]! }, saved.gates);
    this.timeline.passedCount = n[11]!;
    if (this.winding) this.winding.restore(n[13]!, n[14]!);
    stage.setParameters(this.timeline.at(n[12]!));
    stage.x.set([n[0]!, n[1]!, n[2]!]);
    stage.shaftSign = n[3]!;
    stage.sourceConducts = n[4] === 1;
    this.gateA = stage.gateA = n[5]!;
    this.gateB = stage.gateB = n[6]!;
    this.isWaiting = n[7] === 1;
    stage.reenter(n[15]!, n[16]!);
    this.rider.changeAt(n[12]!, stage);
    this.rider.restore(saved.rider);
  }
}

const NO_POINTS: readonly number[] = [];
