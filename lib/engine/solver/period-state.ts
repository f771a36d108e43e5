import type { EventKind } from "../results";
import type { EventLog } from "./event-log";
import type { Machine } from "./machine";

/** State at the start of a plain period: what a period can change when nothing but the PWM pattern acts. */
export type PeriodState = { period: number; x: Float64Array; rider: number[]; gates: number[]; legA: number; legB: number; shaftSign: number; sourceConducts: boolean; gateA: number; gateB: number; isWaiting: boolean };

export function periodState(machine: Machine): PeriodState {
  const { stage } = machine;
  const { mode } = stage.slot;
  return { period: machine.period, x: stage.x.slice(), rider: machine.rider.save(), gates: machine.plan.driver.save(), legA: mode.legA, legB: mode.legB, shaftSign: stage.shaftSign, sourceConducts: stage.sourceConducts, gateA: machine.gateA, gateB: machine.gateB, isWaiting: machine.isWaiting };
}

export function setPeriodState(machine: Machine, state: PeriodState): void {
  const { stage } = machine;
  machine.period = state.period;
  stage.x.set(state.x);
  stage.shaftSign = state.shaftSign;
  stage.sourceConducts = state.sourceConducts;
  machine.gateA = stage.gateA = state.gateA;
  machine.gateB = stage.gateB = state.gateB;
  machine.isWaiting = state.isWaiting;
  machine.plan.driver.restore(state.gates);
  machine.rider.restore(state.rider);
  stage.reenter(state.legA, state.legB);
}

/** The period that starts now has this duty, gate memory and conduction state. */
export function startsLike(machine: Machine, state: PeriodState, duty: number): boolean {
  if (machine.plan.dutyAt(machine.period / machine.frequencyHz) !== duty || !machine.plan.driver.matches(state.gates)) return false;
  return returnsTo(machine, state);
}

/** Legs, gates, shaft and source stand as in `state`. */
export function returnsTo(machine: Machine, state: PeriodState): boolean {
  const { stage } = machine;
  const { mode } = stage.slot;
  return mode.legA === state.legA && mode.legB === state.legB && stage.shaftSign === state.shaftSign && stage.sourceConducts === state.sourceConducts && machine.gateA === state.gateA && machine.gateB === state.gateB && machine.plan.driver.matches(state.gates) && machine.rider.matches(state.rider);
}

/** Whether the machine's log still keeps events of a kind that has occurred since `counts`. */
export function keepsEvents({ log }: Machine, counts: EventLog["counts"]): boolean {
  if (!log) return false;
  for (const kind of Object.keys(log.counts) as EventKind[]) if (log.counts[kind] !== counts[kind] && log.isKept(kind)) return true;
  return false;
}

/** States that move: all but the shaft at rest and an algebraic bus. */
export function isMovingState({ stage }: Machine, index: number): boolean {
  if (index === 1) return !stage.parameters.isLocked && stage.shaftSign !== 0;
  return index === 0 || stage.parameters.hasBusState;
}
