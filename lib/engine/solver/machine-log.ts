import type { ScenarioDocument } from "../../scenario/schema";
import { GATE_HIGH, isDiodeState, LEG_HIGH_DIODE, LEG_OPEN } from "../model/legs";
import type { LegName } from "../results";
import type { EventLog } from "./event-log";
import { rowRoot } from "./locate";
import type { Machine } from "./machine";
import { PIECE_LENGTH, PIECE_START } from "./piece";
import type { PowerStage } from "./power-stage";
import { STAGE_BREAK_FORWARD, STAGE_BREAK_REVERSE, STAGE_DIODE_ENDS, STAGE_SHAFT_ZERO, STAGE_SOURCE } from "./stage-guards";

/**
 * What of the machine's doings becomes an event, and in which words. Most functions take the machine rather than the time:
 * a number as an argument of a call that is not inlined would be an allocation (see piece.ts).
 */

const CURRENT_ROW = new Float64Array([1, 0, 0, 0]);

/** The command of the period that starts now turns the bridge round. */
export function noteReversal(log: EventLog, machine: Machine): void {
  const { kind } = machine.document.command.reversal;
  log.add(machine.periodStartS, "command", `${machine.duty > 0 ? "forward" : "reverse"}${kind === "direct" ? "" : `, ${kind} first`}`);
}

/** A leg's gate changes at the machine's instant. */
export function noteGate(log: EventLog, machine: Machine, leg: LegName, before: number, after: number, isWaiting: boolean): void {
  if (before === after) return;
  if (before !== 0) log.add(machine.timeS, "gate", before === GATE_HIGH ? "high off" : "low off", leg);
  if (after !== 0) log.add(machine.timeS, "gate", after === GATE_HIGH ? "high on" : "low on", leg);
  if (isWaiting && after === 0) log.add(machine.timeS, "deadTime", "both switches of the leg off", leg);
}

/** Faults and shaft entries of the document with times from `fromS` to `toS`, both included. */
export function noteChanges(log: EventLog, document: ScenarioDocument, fromS: number, toS: number): void {
  for (const fault of document.faults) if (fault.atS >= fromS && fault.atS <= toS) log.add(fault.atS, "fault", fault.kind, "leg" in fault ? fault.leg : undefined);
  if (document.load.kind !== "motor") return;
  for (const entry of document.load.shaft) if (entry.timeS >= fromS && entry.timeS <= toS) log.add(entry.timeS, "shaftStep", `${entry.kind} ${entry.value}`);
}

/** Diodes that conduct now and did not while the legs stood as given. */
export function noteDiodes(log: EventLog, machine: Machine, legABefore: number, legBBefore: number): void {
  const { mode } = machine.stage.slot;
  if (isDiodeState(mode.legA) && !isDiodeState(legABefore)) log.add(machine.timeS, "diodeStarts", mode.legA === LEG_HIGH_DIODE ? "high diode" : "low diode", "A");
  if (isDiodeState(mode.legB) && !isDiodeState(legBBefore)) log.add(machine.timeS, "diodeStarts", mode.legB === LEG_HIGH_DIODE ? "high diode" : "low diode", "B");
}

/** A zero crossing inside the piece while both legs conduct in channels changes no mode but is an event (D-46). */
export function noteCurrentZero(log: EventLog, stage: PowerStage, isStageEvent: boolean): void {
  if (isStageEvent && stage.eventKind === STAGE_DIODE_ENDS) return;
  const { piece, slot, x, xEnd } = stage;
  const atS = log.isKept("currentZero") ? rowRoot(CURRENT_ROW, slot.mode, slot.spectrum, x, 0, x[0]!, piece[PIECE_LENGTH]!, xEnd[0]!) : 0;
  log.add(piece[PIECE_START]! + atS, "currentZero", xEnd[0]! > 0 ? "to forward" : "to reverse");
}

/** The stage's event has been applied; the legs stood as given before it. */
export function noteStageEvent(log: EventLog, machine: Machine, kind: number, legA: number, legB: number): void {
  const { stage, timeS } = machine;
  if (kind === STAGE_DIODE_ENDS) {
    const { mode } = stage.slot;
    const leg: LegName | undefined = isDiodeState(legA) && isDiodeState(legB) ? undefined : isDiodeState(legA) ? "A" : "B";
    log.add(timeS, "diodeEnds", mode.legA === LEG_OPEN || mode.legB === LEG_OPEN ? "the current has ended" : "the current turns", leg);
    log.add(timeS, "currentZero", "");
  } else if (kind === STAGE_SHAFT_ZERO) {
    if (stage.shaftSign === 0) log.add(timeS, "shaftSticks", "friction holds the shaft");
  } else if (kind === STAGE_BREAK_FORWARD) log.add(timeS, "breakAway", "+");
  else if (kind === STAGE_BREAK_REVERSE) log.add(timeS, "breakAway", "-");
  else if (kind === STAGE_SOURCE) log.add(timeS, stage.sourceConducts ? "sourceConducts" : "sourceBlocks", "");
}
