import type { EventKind, LegName, SimulationEvent } from "../results";

export const EVENTS_KEPT_PER_KIND = 200; // D-55

/** Time-ordered events, the first of each kind kept and all counted. */
export class EventLog {
  readonly events: SimulationEvent[] = [];
  readonly counts: Partial<Record<EventKind, number>> = {};

  constructor(private readonly keptPerKind = EVENTS_KEPT_PER_KIND) {}

  /** Whether a further event of this kind would still be kept (so that its time is worth locating). */
  isKept(kind: EventKind): boolean {
    return (this.counts[kind] ?? 0) < this.keptPerKind;
  }

  add(timeS: number, kind: EventKind, detail: string, leg?: LegName): void {
    const count = (this.counts[kind] ?? 0) + 1;
    this.counts[kind] = count;
    if (count <= this.keptPerKind) this.events.push(leg ? { timeS, kind, leg, detail } : { timeS, kind, detail });
  }
}
