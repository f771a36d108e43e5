import type { Band, Conduction, Conversion, SimulationEvent } from "@/lib/engine/results";
import { bandAt } from "./bands";
import { isMiss } from "./draw-reading";
import { sampleNumberAt } from "./sample-schedule";
import type { SensingFacts } from "./sensing-facts";

/** One line of the events table: everything that happens at one instant. */
export type EventRow = {
  timeS: number;
  label: string;
  /** Number from 1 and verdict (null: not known) of the conversion at this instant. */
  sample: { number: number; isMiss: boolean | null } | null;
};

const switchName = (leg: string | undefined, detail: string): string => `${leg ?? ""}${detail.startsWith("high") ? "H" : "L"}`;

/** An event in plain words, without its time. */
export function eventWords(event: SimulationEvent): string {
  const { leg, detail } = event;
  const of = leg === undefined ? "" : `, leg ${leg}`;
  switch (event.kind) {
    case "gate":
      return `${switchName(leg, detail)} ${detail.endsWith("off") ? "off" : "on"}`;
    case "deadTime":
      return "dead time";
    case "diodeStarts":
      return `${switchName(leg, detail)} diode conducts`;
    case "diodeEnds":
      return "diode current ends";
    case "currentZero":
      return detail === "" ? "current is zero" : `current is zero, ${detail}`;
    case "clipStarts":
      return `output${leg === undefined ? "" : ` ${leg}`} clips${detail === "" ? "" : ` at ${detail}`}`;
    case "clipEnds":
      return `output${leg === undefined ? "" : ` ${leg}`} free again`;
    case "commonMode":
      return `common mode ${detail}${of}`;
    case "shaftSticks":
      return "shaft stands still";
    case "breakAway":
      return "shaft breaks away";
    case "sourceBlocks":
      return "source blocks: bus rises";
    case "sourceConducts":
      return "source conducts again";
    case "shaftStep":
      return `shaft load: ${detail}`;
    case "command":
      return `command ${detail}`;
    case "fault":
      return `fault: ${detail.replace(/([A-Z])/g, " $1").toLowerCase()}${of}`;
    case "sample":
      return "sample";
  }
}

/** What a switch that turns on leads to, short enough for a row of the table. */
const LEADS_TO: Record<Conduction, string> = {
  driveForward: "drive fwd",
  driveReverse: "drive rev",
  returnToSupply: "return",
  recirculateLow: "recirculate",
  recirculateHigh: "recirculate",
  deadTime: "dead time",
  coasting: "coast",
  shootThrough: "shoot-through",
};

/** Order of words within one instant: what a reader looks for first comes first. */
const RANK: Partial<Record<SimulationEvent["kind"], number>> = { fault: 0, command: 1, sample: 2, currentZero: 3, clipStarts: 4, commonMode: 4, gate: 5, deadTime: 6, diodeStarts: 8, diodeEnds: 8 };
const rank = (event: SimulationEvent): number => RANK[event.kind] ?? 7;

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

function labelOf(events: readonly SimulationEvent[], band: Band | null, sampleNumber: number | null): string {
  const words: string[] = [];
  for (const event of [...events].sort((a, b) => rank(a) - rank(b))) {
    if (event.kind === "sample" && sampleNumber !== null) continue;
    if (event.kind === "diodeStarts" && events.some((other) => other.kind === "deadTime")) continue;
    const word = eventWords(event);
    if (!words.includes(word)) words.push(word);
  }
  if (sampleNumber !== null) words.unshift(`sample ${sampleNumber}`);
  const isGateFirst = / (on|off)$/.test(words[0] ?? "");
  if (isGateFirst && words[1] === "dead time") words.splice(0, 2, `${words[0]}: dead time`);
  else if (isGateFirst && words.length === 1 && band !== null) words[0] += `: ${LEADS_TO[band.conduction]}`;
  return capital(words.slice(0, 2).join(", ")) + (words.length > 2 ? " …" : "");
}

/**
 * Events of a run as table rows in time order. `samples` are the conversions whose verdict is known; their numbers follow from the
 * schedule. `bands` (of the visible window) add what the bridge does after a switch has turned on.
 */
export function eventRows(events: readonly SimulationEvent[], samples: readonly Conversion[], bands: readonly Band[], facts: SensingFacts): EventRow[] {
  const sameS = facts.instantS;
  const rows: EventRow[] = [];
  let sampleIndex = 0;
  for (let index = 0; index < events.length; ) {
    const timeS = events[index]!.timeS;
    let end = index + 1;
    while (end < events.length && events[end]!.timeS - timeS <= sameS) end += 1;
    const group = events.slice(index, end);
    while (sampleIndex < samples.length && samples[sampleIndex]!.timeS < timeS - sameS) sampleIndex += 1;
    const known = samples[sampleIndex];
    const isKnown = known !== undefined && Math.abs(known.timeS - timeS) <= sameS;
    const number = group.some((event) => event.kind === "sample") ? sampleNumberAt(facts.samples, timeS, sameS) : null;
    rows.push({
      timeS,
      label: labelOf(group, bandAt(bands, timeS + 2 * sameS), number),
      sample: number === null ? null : { number, isMiss: isKnown ? isMiss(known, facts.sampleLimitA) : null },
    });
    index = end;
  }
  return rows;
}

/** Events of the run (the first 200 of each kind) together with all those of the visible window, each once. */
export function mergeEvents(ofRun: readonly SimulationEvent[], ofView: readonly SimulationEvent[]): SimulationEvent[] {
  const seen = new Set<string>();
  const merged: SimulationEvent[] = [];
  for (const event of [...ofRun, ...ofView]) {
    const key = `${event.timeS}|${event.kind}|${event.leg ?? ""}|${event.detail}`;
    if (seen.has(key)) continue;
    seen.add(key);
    merged.push(event);
  }
  return merged.sort((a, b) => a.timeS - b.timeS);
}

/** Index of the row in force at `timeS` (the last one not after it), or -1 before the first. */
export function rowAt(rows: readonly { timeS: number }[], timeS: number, slackS: number): number {
  let low = 0;
  let high = rows.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (rows[middle]!.timeS <= timeS + slackS) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}
