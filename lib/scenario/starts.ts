import { FAULT_KINDS } from "./kinds";
import { LENGTHS } from "./ranges";
import type { CommandPoint, Fault, FaultKind, Load, ScenarioDocument, ShaftEntry, SpecialInterval } from "./schema";

/** Values that a part, a row or a kind starts with when a person adds it: plausible ones, all to be changed. */

/** 15 significant digits are enough, and 0.30000000000000004 is no value to show. */
const tidy = (value: number) => Number(value.toPrecision(12));

const middleOfOutput = ({ sensing }: ScenarioDocument) =>
  tidy((sensing.amplifier.outputMinV + sensing.amplifier.outputMaxV) / 2);

const PARTS: Readonly<Record<string, (document: ScenarioDocument) => unknown>> = {
  "load.gear": () => ({ ratio: 30, efficiency: 0.75 }),
  "load.motor.thermal": (document) => ({
    resistanceKPerW: 4,
    capacityJPerK: 30,
    ambientC: document.load.kind === "motor" ? document.load.motor.temperatureC : 20,
  }),
  "load.motor.commutation": () => ({ barsCount: 12, rippleShare: 0.03 }),
  "sensing.reference": (document) => ({
    voltageV: middleOfOutput(document),
    tolerancePct: 0.2,
    tempcoPpmPerK: 25,
    sampledByConverter: false,
  }),
  "sensing.filter": (document) => ({
    ...("fixed" in document.sensing.amplifier.gain ? { resistanceOhm: 1000 } : {}),
    capacitanceF: 1e-9,
  }),
  "run.window": (document) => ({ fromS: tidy(document.run.durationS / 2), toS: document.run.durationS }),
};

export const isPart = (path: string): boolean => Object.hasOwn(PARTS, path);

/** What an optional part holds when it is switched on. */
export const startOfPart = (path: string, document: ScenarioDocument): unknown => PARTS[path]?.(document);

export function startOfLoad(kind: Load["kind"]): Load {
  if (kind === "inductive") return { kind, resistanceOhm: 6, inductanceH: 0.012 };
  if (kind === "resistive") return { kind, resistanceOhm: 6 };
  const motor = {
    resistanceOhm: 0.62,
    inductanceH: 0.00046,
    torqueConstantNmPerA: 0.058,
    backEmfVPerRadPerS: 0.058,
    inertiaKgM2: 4.2e-5,
    viscousNmPerRadPerS: 2e-5,
    coulombNm: 0.009,
    staticNm: 0.009,
    temperatureC: 20,
    locked: false,
  };
  return { kind, motor, shaft: [{ timeS: 0, kind: "constant", value: 0.12 }] };
}

/** A fault of a kind with its onset; the leg is filled in or left out by the mends. */
export function startOfFault(kind: FaultKind, atS: number, document: ScenarioDocument): Fault {
  switch (kind) {
    case "stalledRotor":
    case "lostLoad":
    case "openWinding":
    case "shuntOpen":
    case "shuntShorted":
      return { kind, atS };
    case "risingFriction":
      return { kind, atS, coulombNm: 0.05, overS: 0.002 };
    case "wornBrushes":
      return { kind, atS, factor: 1.6 };
    case "shortedTurns":
      return { kind, atS, resistanceFactor: 0.7, inductanceFactor: 0.5, torqueFactor: 0.8 };
    case "switchStuckOpen":
    case "switchShorted":
      return { kind, atS, leg: "A", side: "high" };
    case "shuntDrifted":
      return { kind, atS, factor: 1.2 };
    case "amplifierOffsetShift":
      return { kind, atS, deltaV: 0.001 };
    case "amplifierStuckOutput":
      return { kind, atS, voltageV: document.sensing.amplifier.outputMaxV };
    case "referenceDrift":
      return { kind, atS, deltaV: 0.05 };
    case "supplySag":
      return { kind, atS, voltageV: tidy(document.supply.voltageV * 0.7) };
  }
}

export const LIST_PATHS = ["command.points", "command.special", "load.shaft", "faults"] as const;
export type ListPath = (typeof LIST_PATHS)[number];

export const ROWS_MAX: Readonly<Record<ListPath, number>> = {
  "command.points": LENGTHS.points[1],
  "command.special": LENGTHS.special[1],
  "load.shaft": LENGTHS.shaft[1],
  faults: LENGTHS.faults[1],
};

/** A time after `lastS` inside the run where there is room, else a tenth of the run later. */
function timeAfter(lastS: number | undefined, durationS: number): number {
  if (lastS === undefined) return 0;
  return tidy(lastS < durationS ? lastS + (durationS - lastS) / 2 : lastS + durationS / 10);
}

/** The row that "Add" appends to a list; keeps the times of the list in order. */
export function startOfRow(
  list: ListPath,
  document: ScenarioDocument,
): CommandPoint | SpecialInterval | ShaftEntry | Fault {
  const { durationS } = document.run;
  if (list === "command.points") {
    const last = document.command.points.at(-1);
    return { timeS: timeAfter(last?.timeS, durationS), duty: last ? -last.duty : 0.5, ramp: "step" };
  }
  if (list === "command.special") {
    const lastS = Math.max(0, ...document.command.special.map((interval) => interval.toS));
    const fromS = document.command.special.length === 0 ? tidy(durationS / 2) : timeAfter(lastS, durationS);
    return { fromS, toS: tidy(fromS + durationS / 10), action: "coast" };
  }
  if (list === "load.shaft") {
    const last = document.load.kind === "motor" ? document.load.shaft.at(-1) : undefined;
    const timeS = timeAfter(last?.timeS, durationS);
    return last ? { timeS, kind: last.kind, value: tidy(last.value * 1.5) } : { timeS, kind: "constant", value: 0.1 };
  }
  return startOfFault(FAULT_KINDS[0], tidy(durationS / 2), document);
}
