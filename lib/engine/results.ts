/**
 * What a run gives back: plain data only, so that the same object crosses from the worker, is printed by the command
 * line and is served by the API. Field names end in their unit. Signs: motor current is positive from terminal A to B.
 */

export type LegState = "high channel" | "low channel" | "high diode" | "low diode" | "open";
export type LegName = "A" | "B";

/** Every quantity of one instant, after any event at that same instant (D-27). `null`: the site or reference has none. */
export type InstantReading = {
  timeS: number;
  dutyCommand: number;
  motorCurrentA: number;
  speedRadPerS: number;
  busV: number;
  terminalAV: number;
  terminalBV: number;
  topAA: number;
  topBA: number;
  bottomAA: number;
  bottomBA: number;
  supplyA: number;
  bridgeA: number;
  senseAV: number;
  senseBV: number | null;
  outAV: number | null;
  outBV: number | null;
  differenceV: number | null;
  combinedV: number | null;
  state: { A: LegState; B: LegState };
};

export type EventKind =
  | "gate"
  | "deadTime"
  | "diodeEnds"
  | "diodeStarts"
  | "currentZero"
  | "shaftSticks"
  | "breakAway"
  | "sourceBlocks"
  | "sourceConducts"
  | "clipStarts"
  | "clipEnds"
  | "commonMode"
  | "fault"
  | "shaftStep"
  | "command"
  | "sample";

export type SimulationEvent = { timeS: number; kind: EventKind; leg?: LegName; detail: string };

/** One conversion (or one block of averaged conversions) of the converter. */
export type Conversion = {
  timeS: number;
  codeA: number | null;
  codeB: number | null;
  code: number;
  reconstructedA: number;
  trueA: number;
  meanA: number;
};

/** Figures over the window (D-26). `null` where the site or the arrangement has no such output. */
export type Figures = {
  motorMeanA: number;
  motorRmsA: number;
  motorPeakA: number;
  motorRippleA: number;
  topARmsA: number;
  topBRmsA: number;
  supplyMeanA: number;
  shuntAW: number | null;
  shuntBW: number | null;
  copperW: number;
  switchesW: number;
  mechanicalW: number;
  inputW: number;
  speedMeanRadPerS: number;
  torqueMeanNm: number;
  outAMeanV: number | null;
  outBMeanV: number | null;
  differenceMeanV: number | null;
  combinedMeanV: number | null;
  headroomV: number | null;
  clippedShare: number;
  reconstructionErrorMeanA: number | null;
  reconstructionErrorMaxA: number | null;
  busMaxV: number;
  energyResidualShare: number | null;
  commutationRippleHz: number | null;
};

export type Severity = "fault" | "caution" | "note";
/** `title` is the finding in a few words, `text` why and what to change; `path` names the input to go to. */
export type Notice = { code: string; severity: Severity; title: string; text: string; timeS?: number; path?: string };

export type RunStatus = "reached-end" | "step-limit" | "not-finite";

export type Simulation = {
  status: RunStatus;
  /** One sentence with time, state and likely cause when the status is not `reached-end`. */
  statusText: string;
  durationS: number;
  window: { fromS: number; toS: number };
  at: InstantReading[];
  events: SimulationEvent[];
  /** All events of each kind; `events` keeps the first 200 of each (D-55). */
  eventCounts: Partial<Record<EventKind, number>>;
  samples: Conversion[];
  figures: Figures;
  notices: Notice[];
  counters: { periods: number; intervals: number; crossings: number; operatorBuilds: number };
};

/* ---------------------------------------------------------------- traces ------------------------------------------------ */

export const TRACE_NAMES = [
  "motorCurrentA",
  "speedRadPerS",
  "busV",
  "terminalAV",
  "terminalBV",
  "topAA",
  "topBA",
  "bottomAA",
  "bottomBA",
  "supplyA",
  "bridgeA",
  "senseAV",
  "senseBV",
  "outAV",
  "outBV",
  "differenceV",
  "combinedV",
  "idealV",
] as const;
/** `idealV`: what the output that the converter reads would show if it followed the motor current (dotted line). */
export type TraceName = (typeof TRACE_NAMES)[number];

/** In words: what the bridge does with the motor current during a band. */
export type Conduction =
  | "driveForward"
  | "driveReverse"
  | "returnToSupply"
  | "recirculateLow"
  | "recirculateHigh"
  | "deadTime"
  | "coasting"
  | "shootThrough";

export type Band = {
  fromS: number;
  toS: number;
  conduction: Conduction;
  stateA: LegState;
  stateB: LegState;
  /** Which switches are on. */
  gates: { highA: boolean; lowA: boolean; highB: boolean; lowB: boolean };
};

export type ViewRequest = { fromS: number; toS: number; columnCount: number };

/**
 * Waveforms of an interval, for plotting.
 * `exact`: `timeS` are break points in ascending order, two equal times where a value jumps; `min` and `max` are the same array.
 * `envelope`: `timeS` are the column starts, `min`/`max` bound each waveform within its column.
 * Traces that the site has not are absent.
 */
export type View = {
  kind: "exact" | "envelope";
  fromS: number;
  toS: number;
  timeS: Float64Array;
  traces: Partial<Record<TraceName, { min: Float64Array; max: Float64Array }>>;
  /** Conduction bands; empty for envelopes. */
  bands: Band[];
  /** Conversions and events inside the view; empty for envelopes. */
  samples: Conversion[];
  events: SimulationEvent[];
};
