import type { ScenarioDocument } from "@/lib/scenario/schema";
import { chainsOf, driveOf, senseFront, settledChain, shareAt, type Share } from "./channels";
import { advanceStep, type Advance } from "./integrate";
import { effectiveGates, sensingParameters, shaftParameters, stageParameters, type Circumstances } from "./parameters";
import { buildSchedule, SAME_INSTANT_S, type Schedule } from "./schedule";
import { resolveMotion } from "./shaft";
import { evaluateStage, isCapacitive, resolveLegs, type Condition, type Gates } from "./stage";
import { amplifierIndex, eventValues, SIZE, snapshot, STATE_COUNT, SUMS, type Mode, type SumName } from "./system";

/** The loop: from stop to stop, resolving what conducts after each (D-27). Observers see every step and every stop. */
export type OracleEvent = { timeS: number; kind: string };
export type Run = {
  document: ScenarioDocument;
  mode: Mode;
  timeS: number;
  y: Float64Array;
  duty: number;
  periodIndex: number;
  schedule: Schedule;
  events: OracleEvent[];
};
export type Observer = {
  /** Instants at which `onStop` is wanted, seconds. */
  stopsS: number[];
  onStop: (run: Run, timeS: number) => void;
  onStep: (run: Run, step: Advance) => void;
  /** The state just after anything changed. */
  onChange: (run: Run) => void;
};

export const sumOf = (run: Run, name: SumName): number => run.y[STATE_COUNT + SUMS.indexOf(name)] ?? 0;
const railOf = (condition: Condition): 0 | 1 | null =>
  condition === "highChannel" || condition === "highDiode" ? 1 : condition === "lowChannel" || condition === "lowDiode" ? 0 : null;
const still = (value: number): Share => ({ valueAt: value, atS: 0, rate: 0, endS: Infinity, target: value });

type Machine = { run: Run; state: Circumstances; requested: Gates[]; copperAtPeriod: number };

const refreshParameters = (machine: Machine): void => {
  const { run, state } = machine;
  run.mode.stage = stageParameters(run.document, state);
  run.mode.shaft = shaftParameters(run.document, state);
  run.mode.sensing = sensingParameters(run.document, state);
  if (run.mode.stage.isWindingOpen) run.y[0] = 0;
  if (run.mode.shaft.isLocked) run.y[1] = 0;
};

/** A leg's share moves to its new rail in t_c, or jumps when there is no current or no commutation time (D-20). */
const turnShare = (share: Share, condition: Condition, timeS: number, commutationS: number, isIdle: boolean): Share => {
  const target = railOf(condition);
  if (target === null || target === share.target) return share;
  if (commutationS === 0 || isIdle) return still(target);
  const from = shareAt(share, timeS);
  const rate = (target > from ? 1 : -1) / commutationS;
  return { valueAt: from, atS: timeS, rate, endS: timeS + Math.abs(target - from) * commutationS, target };
};

const resolve = (machine: Machine, isStart = false): void => {
  const { run } = machine;
  const { mode, y } = run;
  const before = evaluateStage(mode.stage, mode.legs, y[0] ?? 0, y[1] ?? 0, y[2] ?? 0).currentA;
  mode.gates = effectiveGates(machine.state, machine.requested);
  mode.legs = resolveLegs(mode.stage, mode.gates, y[0] ?? 0, y[1] ?? 0, y[2] ?? 0);
  const after = evaluateStage(mode.stage, mode.legs, y[0] ?? 0, y[1] ?? 0, y[2] ?? 0).currentA;
  const was = mode.motion;
  mode.motion = resolveMotion(mode.shaft, run.timeS, y[1] ?? 0, mode.stage.torqueNmPerA * after);
  if (was !== "stuck" && mode.motion === "stuck" && !isStart) run.events.push({ timeS: run.timeS, kind: "shaftSticks" });
  if (was === "stuck" && mode.motion !== "stuck" && !isStart) run.events.push({ timeS: run.timeS, kind: "breakAway" });
  const { commutationS } = run.document.bridge;
  mode.shares = [0, 1].map((x) => {
    const share = mode.shares[x] ?? still(0);
    const condition = mode.legs[x] ?? "open";
    return isStart ? still(railOf(condition) ?? 0) : turnShare(share, condition, run.timeS, commutationS, before === 0 || after === 0);
  }) as [Share, Share];
};

const createMachine = (document: ScenarioDocument, shuntC: [number, number]): Machine => {
  const windingC = document.load.kind === "motor" ? document.load.motor.temperatureC : 20;
  const state: Circumstances = { faults: [], shaftIndex: -1, windingC, shuntC };
  const stage = stageParameters(document, state);
  const y = new Float64Array(SIZE);
  y[0] = document.initial.currentA;
  y[1] = document.initial.speedRadPerS;
  y[2] = isCapacitive(stage) ? (document.initial.busV ?? document.supply.voltageV) : 0;
  const mode: Mode = {
    stage,
    shaft: shaftParameters(document, state),
    sensing: sensingParameters(document, state),
    gates: [],
    legs: ["open", "open"],
    motion: "free",
    shares: [still(0), still(0)],
  };
  const run: Run = { document, mode, timeS: 0, y, duty: 0, periodIndex: -1, schedule: buildSchedule(document), events: [] };
  return { run, state, requested: [{ high: false, low: false }, { high: false, low: false }], copperAtPeriod: 0 };
};

/** Filters start settled at the value for the initial current, without the inductive part (D-19). */
const settleFilters = (run: Run): void => {
  const { sensing, legs, stage, shares } = run.mode;
  const electric = snapshot(run.mode, 0, run.y).electric;
  const front = senseFront(sensing, electric, evaluateStage(stage, legs, electric.currentA, 0, run.y[2] ?? 0), legs.map((leg) => leg === "through"), shares, 0, false);
  for (const chain of chainsOf(sensing)) run.y.set(settledChain(sensing, chain, driveOf(sensing, front, chain)), amplifierIndex(chain));
};

/** Winding temperature from the mean copper loss of the period just ended (D-33). */
const warmWinding = (machine: Machine): void => {
  const { run, state } = machine;
  const copper = sumOf(run, "copper");
  const load = run.document.load;
  if (load.kind === "motor" && load.motor.thermal && run.periodIndex >= 0) {
    const { resistanceKPerW, capacityJPerK, ambientC } = load.motor.thermal;
    const lengthS = 1 / run.document.pwm.frequencyHz;
    const fade = Math.exp(-lengthS / (resistanceKPerW * capacityJPerK));
    const meanW = (copper - machine.copperAtPeriod) / lengthS;
    state.windingC = ambientC + (state.windingC - ambientC) * fade + meanW * resistanceKPerW * (1 - fade);
  }
  machine.copperAtPeriod = copper;
};

type Action = { timeS: number; order: number; apply: () => void };

const listActions = (machine: Machine): Action[] => {
  const { run, state } = machine;
  const actions: Action[] = [];
  for (const fault of run.document.faults) actions.push({ timeS: fault.atS, order: 0, apply: () => void state.faults.push(fault) });
  const load = run.document.load;
  if (load.kind === "motor") load.shaft.forEach((entry, n) => actions.push({ timeS: entry.timeS, order: 0, apply: () => void (state.shaftIndex = n) }));
  for (const period of run.schedule.periods)
    actions.push({
      timeS: period.startS,
      order: 1,
      apply: () => {
        warmWinding(machine);
        run.duty = period.duty;
        run.periodIndex = period.index;
      },
    });
  for (const gate of run.schedule.gates)
    actions.push({ timeS: gate.timeS, order: 2, apply: () => void (machine.requested[gate.leg] = { high: gate.high, low: gate.low }) });
  return actions.filter((action) => action.timeS < run.document.run.durationS - SAME_INSTANT_S);
};

/** Integrates to `toS`, hitting ramp ends, events and kinks on the way. */
const advanceTo = (machine: Machine, toS: number, observer: Observer, wish: { s: number }): void => {
  const { run } = machine;
  let stalled = 0;
  while (run.timeS < toS) {
    const limitS = Math.min(toS, ...run.mode.shares.map((share) => share.endS));
    const startS = run.timeS;
    if (limitS > run.timeS) {
      const step = advanceStep(run.mode, run.timeS, run.y, wish.s, limitS);
      wish.s = Math.max(step.nextS, 1e-15);
      observer.onStep(run, step);
      run.timeS = step.timeS;
      run.y = step.y;
      if (step.hasEvent) settleEvent(machine);
    }
    run.mode.shares = run.mode.shares.map((share) => (share.endS <= run.timeS ? still(share.target) : share)) as [Share, Share];
    observer.onChange(run);
    stalled = run.timeS > startS ? 0 : stalled + 1;
    if (stalled > 50) throw new Error(`the oracle does not get past ${run.timeS} s`);
  }
};

const settleEvent = (machine: Machine): void => {
  const { run } = machine;
  const values = eventValues(run.mode, run.timeS, run.y);
  if ((values[0] ?? -1) > 0) {
    run.y[0] = 0;
    run.events.push({ timeS: run.timeS, kind: "diodeEnds" });
  }
  if ((values[3] ?? -1) > 0) run.y[1] = 0;
  resolve(machine);
};

/** Runs the document through; shunt temperatures are given (they come from a first pass when there is self-heating). */
export const runDocument = (document: ScenarioDocument, shuntC: [number, number], makeObserver: (run: Run) => Observer): Run => {
  const machine = createMachine(document, shuntC);
  const { run } = machine;
  const observer = makeObserver(run);
  const stops: Action[] = [...observer.stopsS, document.run.durationS].map((timeS) => ({ timeS, order: 3, apply: () => undefined }));
  const queue = [...listActions(machine), ...stops].sort((x, y) => x.timeS - y.timeS);
  const wish = { s: 1e-9 };
  let isStart = true;
  for (let n = 0; n < queue.length; ) {
    const headS = queue[n]?.timeS ?? 0;
    const group: Action[] = [];
    while (n < queue.length && (queue[n]?.timeS ?? Infinity) <= headS + SAME_INSTANT_S) group.push(queue[n++] as Action);
    advanceTo(machine, headS, observer, wish);
    const changes = group.filter((action) => action.order < 3).sort((x, y) => x.order - y.order);
    for (const action of changes) action.apply();
    if (changes.length > 0) {
      refreshParameters(machine);
      resolve(machine, isStart);
      wish.s = Math.min(wish.s, 1e-8);
    }
    if (isStart) settleFilters(run);
    isStart = false;
    observer.onChange(run);
    for (const action of group) if (action.order === 3) observer.onStop(run, action.timeS);
  }
  return run;
};
