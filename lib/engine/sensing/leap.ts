import { isDiodeState } from "../model/legs";
import type { Machine } from "../solver/machine";
import { exponentialDifference } from "../solver/operator";
import { isMovingState, keepsEvents, periodState, returnsTo, setPeriodState, startsLike, type PeriodState } from "../solver/period-state";
import { PIECE_LENGTH } from "../solver/piece";
import type { Observer } from "../solver/rider";
import type { SensorBank } from "./bank";
import type { RunMonitor } from "./monitor";

/** A guard this small is at its limit: no period may be leapt unless the guard does not depend on the state at all. */
const LEAST_GUARD = 1e-12;
/** Share of the distance to the nearest guard that leaps may use up. */
const SAFETY = 0.5;
/** Periods to wait after a survey found an irregular period; doubled each time, up to the limit. */
const FIRST_WAIT = 16;
const LONGEST_WAIT = 1024;
/** Perturbation of the state in a survey, as a share of its size: the map is affine, so the quotient is exact to rounding. */
const PERTURBATION = 1e-3;

/** Collects the guards of a period: values that must keep their sign for the next period to be of the same shape. */
class GuardSurvey implements Observer {
  readonly values: number[] = [];
  isRegular = true;

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly monitor: RunMonitor) {}

  piece(): void {
    const { stage } = this.machine;
    const { mode } = stage.slot;
    if (!this.bank.isRegular || stage.piece[PIECE_LENGTH]! <= 0) this.isRegular = false;
    this.values.push(stage.x[0]!, stage.xEnd[0]!);
    if (isDiodeState(mode.legA) || isDiodeState(mode.legB)) this.values.push(0.5 * stage.x[0]! + 0.5 * stage.xEnd[0]!);
    stage.pushGuards(this.values);
    this.bank.bounds.pushGuards(stage, this.values);
    this.monitor.pushGuards(this.values);
  }
}

type Reference = {
  before: PeriodState;
  /** State [x, z, y] at the end of the reference period, and its dependence on x at the start, per state a column of 3. */
  after: Float64Array;
  jacobian: Float64Array;
  /** Per component of x: largest |dg/dx|/|g| over the guards; the sum of these times the change must stay below SAFETY. */
  reach: Float64Array;
  version: number;
  duty: number;
  eventCounts: Record<string, number>;
  intervals: number;
};

/**
 * Leaps over whole PWM periods. Where a period passes without an event its effect on power stage and filters is one affine
 * map of the state at its start, and so is every guard; a survey finds both by running the period from neighbouring states.
 * Later periods of the same pattern are then one small product each, exact to rounding, as long as no guard can change
 * sign. Not used with winding temperature, fan loads or rising friction, whose maps are not affine.
 */
export class PeriodLeaper {
  private reference: Reference | null = null;
  private waitUntil = 0;
  private wait = FIRST_WAIT;
  private readonly isPossible: boolean;
  private readonly next = new Float64Array(9);
  private readonly decay: { ep: number; eq: number; q: number };

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly monitor: RunMonitor) {
    const { document } = machine;
    const isPlain = document.load.kind !== "motor" || (!document.load.motor.thermal && document.load.shaft.every((entry) => entry.kind !== "fan"));
    this.isPossible = isPlain && document.faults.every((fault) => fault.kind !== "risingFriction");
    const { amplifierRadPerS: p, filterRadPerS: q } = bank.chain.poles;
    const ep = Math.exp(-p * machine.periodS);
    const eq = q > 0 ? Math.exp(-q * machine.periodS) : 0;
    this.decay = { ep, eq, q: q > 0 ? q * exponentialDifference(p, q, machine.periodS) : 0 };
  }

  /** Leaps from the machine's period up to, not into, `limitPeriod`; returns the number of periods done (0: run it in detail). */
  leap(limitPeriod: number): number {
    const { machine } = this;
    if (!this.isPossible || machine.period < this.waitUntil) return 0;
    let done = 0;
    while (machine.period < limitPeriod) {
      if (!machine.isPlainPeriod()) break;
      if (this.fits()) this.step();
      else if (limitPeriod - machine.period < 6 || !this.survey()) break;
      done++;
    }
    return done;
  }

  /** The reference holds for the period that starts now. */
  private fits(): boolean {
    const { reference: r, machine } = this;
    if (!r || r.version !== machine.stage.version || !startsLike(machine, r.before, r.duty)) return false;
    const { x } = machine.stage;
    let used = 0;
    for (let d = 0; d < 3; d++) used += r.reach[d]! * Math.abs(x[d]! - r.before.x[d]!);
    if (!(used < SAFETY)) return false;
    // outputs only average their inputs, whose bounds are guards: they stay inside if they start inside
    return this.bank.bounds.statesInside();
  }

  private step(): void {
    const { machine, bank, next, decay } = this;
    const r = this.reference!;
    const { x } = machine.stage;
    const d0 = x[0]! - r.before.x[0]!;
    const d1 = x[1]! - r.before.x[1]!;
    const d2 = x[2]! - r.before.x[2]!;
    const j = r.jacobian;
    for (let n = 0; n < 9; n++) next[n] = r.after[n]! + j[3 * n]! * d0 + j[3 * n + 1]! * d1 + j[3 * n + 2]! * d2;
    for (let k = 0; k < 3; k++) {
      const dz = bank.z[k]! - r.before.rider[k]!;
      const dy = bank.y[k]! - r.before.rider[3 + k]!;
      next[3 + k]! += decay.ep * dz;
      next[6 + k]! += bank.chain.hasFilter ? decay.eq * dy + decay.q * dz : decay.ep * dz;
    }
    for (let n = 0; n < 3; n++) {
      x[n] = next[n]!;
      bank.z[n] = next[3 + n]!;
      bank.y[n] = next[6 + n]!;
    }
    machine.skipPeriod(r.intervals, r.eventCounts);
    this.monitor.skip(machine.periodS);
  }

  /** Runs the present period in detail and from neighbouring states; false if it is not regular (it is done all the same). */
  private survey(): boolean {
    const { machine, bank } = this;
    this.reference = null;
    const before = periodState(machine);
    const counts = machine.log ? { ...machine.log.counts } : {};
    const intervals = machine.intervals;
    const base = this.runSurveyed();
    const after = stateVector(machine, bank);
    const end = periodState(machine);
    this.monitor.skip(machine.periodS);
    const isPeriodic = base !== null && returnsTo(machine, before) && !keepsEvents(machine, counts);
    if (!base || !isPeriodic) return this.giveUp();
    const jacobian = new Float64Array(27);
    const reach = new Float64Array(3);
    const eventCounts: Record<string, number> = {};
    for (const [kind, count] of Object.entries(machine.log?.counts ?? {})) if (count !== counts[kind as keyof typeof counts]) eventCounts[kind] = count - (counts[kind as keyof typeof counts] ?? 0);
    const intervalCount = machine.intervals - intervals;
    const log = machine.log;
    machine.log = bank.log = null;
    const isWhole = this.differentiate(before, base, after, jacobian, reach);
    machine.log = bank.log = log;
    setPeriodState(machine, end);
    machine.intervals = intervals + intervalCount;
    if (!isWhole) return this.giveUp();
    this.reference = { before, after, jacobian, reach, version: machine.stage.version, duty: machine.duty, eventCounts, intervals: intervalCount };
    this.wait = FIRST_WAIT;
    return true;
  }

  private giveUp(): false {
    this.waitUntil = this.machine.period + this.wait;
    this.wait = Math.min(2 * this.wait, LONGEST_WAIT);
    return false;
  }

  private differentiate(before: PeriodState, base: readonly number[], after: Float64Array, jacobian: Float64Array, reach: Float64Array): boolean {
    const { machine, bank, monitor } = this;
    for (let d = 0; d < 3; d++) {
      if (!isMovingState(machine, d)) continue;
      const scale = d === 0 ? Math.max(Math.abs(before.x[0]!), 0.01 * monitor.currentMaxA, 1e-6) : Math.max(Math.abs(before.x[d]!), 1e-3);
      const step = PERTURBATION * scale;
      setPeriodState(machine, before);
      machine.stage.x[d]! += step;
      const guards = this.runSurveyed();
      if (!guards || guards.length !== base.length) return false;
      const moved = stateVector(machine, bank);
      for (let n = 0; n < 9; n++) jacobian[3 * n + d] = (moved[n]! - after[n]!) / step;
      for (let n = 0; n < base.length; n++) {
        const slope = Math.abs(guards[n]! - base[n]!) / step;
        if (slope === 0) continue;
        if (Math.abs(base[n]!) <= LEAST_GUARD || guards[n]! > 0 !== base[n]! > 0) return false;
        reach[d] = Math.max(reach[d]!, slope / Math.abs(base[n]!));
      }
    }
    return true;
  }

  /** Runs the period with a survey; its guards, or null if it was not regular. */
  private runSurveyed(): number[] | null {
    const { machine } = this;
    const survey = new GuardSurvey(machine, this.bank, this.monitor);
    const crossings = machine.stage.crossings;
    machine.observersBeside = survey;
    machine.runPeriod();
    machine.observersBeside = null;
    return survey.isRegular && machine.stage.crossings === crossings ? survey.values : null;
  }
}

function stateVector(machine: Machine, bank: SensorBank): Float64Array {
  const v = new Float64Array(9);
  v.set(machine.stage.x);
  v.set(bank.z, 3);
  v.set(bank.y, 6);
  return v;
}
