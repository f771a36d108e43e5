import type { EventKind, Simulation, SimulationEvent } from "@/lib/engine/results";

export type Milestone = { timeS: number; label: string; isSlack: boolean };

/** Kinds that make a milestone the first time they happen. */
const FIRST_OF: Partial<Record<EventKind, string>> = {
  clipStarts: "Clips",
  commonMode: "Common mode",
  sourceBlocks: "Bus rises",
  shaftSticks: "Stands still",
  breakAway: "Breaks away",
};
const MOST = 14;

/**
 * The few instants worth a name: start, commands that turn the motor, the zero crossing that follows each, faults, load steps, the first
 * clip and so on, and the end. In time order, at most 14.
 */
export function milestonesOf(simulation: Simulation): Milestone[] {
  const found: Milestone[] = [];
  const seen = new Set<EventKind>();
  let isTurning = false;
  for (const event of simulation.events) {
    const label = labelOf(event, seen, isTurning);
    if (event.kind === "command") isTurning = true;
    if (event.kind === "currentZero") isTurning = false;
    seen.add(event.kind);
    if (label !== null) found.push({ timeS: event.timeS, label, isSlack: event.kind === "currentZero" });
  }
  const inner = found.filter((mark) => mark.timeS > 0 && mark.timeS < simulation.durationS).slice(0, MOST - 2);
  return [{ timeS: 0, label: "Start", isSlack: false }, ...inner, { timeS: simulation.durationS, label: "End", isSlack: false }];
}

function labelOf(event: SimulationEvent, seen: Set<EventKind>, isTurning: boolean): string | null {
  if (event.kind === "command") return "Command";
  if (event.kind === "currentZero") return isTurning ? "Slack" : null;
  if (event.kind === "fault") return "Fault";
  if (event.kind === "shaftStep") return "Load";
  return seen.has(event.kind) ? null : (FIRST_OF[event.kind] ?? null);
}
