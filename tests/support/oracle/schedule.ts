import type { ScenarioDocument } from "@/lib/scenario/schema";

/** Two instants closer than this are one (D-01, D-27), seconds. */
export const SAME_INSTANT_S = 1e-13;
/** Parts of a period shorter than this are left out (D-06), seconds. */
const SLIVER_S = 1e-12;

export type LegCommand = "high" | "low" | "off";
type PairCommand = { a: LegCommand; b: LegCommand };
type Overlay = { fromS: number; toS: number; command: PairCommand };
type Period = { index: number; startS: number; duty: number; direction: 1 | -1 };
export type GateChange = { timeS: number; leg: 0 | 1; high: boolean; low: boolean };
export type Schedule = { periods: Period[]; gates: GateChange[] };

const BOTH_OFF: PairCommand = { a: "off", b: "off" };

const actionCommand = (action: "coast" | "brakeLow" | "brakeHigh"): PairCommand =>
  action === "coast" ? BOTH_OFF : action === "brakeLow" ? { a: "low", b: "low" } : { a: "high", b: "high" };

/** u(t) of the command, right-continuous; a point within 1e-13 s after t counts as reached (D-01). */
export const commandAt = (document: ScenarioDocument, timeS: number): number => {
  const points = document.command.points;
  let reached = 0;
  for (let n = 0; n < points.length; n += 1) if ((points[n]?.timeS ?? Infinity) <= timeS + SAME_INSTANT_S) reached = n;
  const from = points[reached];
  const to = points[reached + 1];
  if (!from) return 0;
  if (!to || to.ramp === "step") return from.duty;
  const share = (timeS - from.timeS) / (to.timeS - from.timeS);
  return from.duty + (to.duty - from.duty) * Math.max(0, share);
};

/** All periods that start before the end of the run, with held command and direction (D-02, D-03). */
export const listPeriods = (document: ScenarioDocument): Period[] => {
  const periods: Period[] = [];
  let direction: 1 | -1 = 1;
  for (let index = 0; index / document.pwm.frequencyHz < document.run.durationS - SAME_INSTANT_S; index += 1) {
    const startS = index / document.pwm.frequencyHz;
    const duty = commandAt(document, startS);
    if (duty !== 0) direction = duty > 0 ? 1 : -1;
    periods.push({ index, startS, duty, direction });
  }
  return periods;
};

/** The forward commands of the on-time and the two kinds of off-time; reverse swaps the legs. */
const schemeCommands = (document: ScenarioDocument): { on: PairCommand; fast: PairCommand; slow: PairCommand } => {
  const { scheme, synchronous } = document.pwm;
  const on: PairCommand = { a: "high", b: "low" };
  const fast: PairCommand = synchronous ? { a: "low", b: "high" } : BOTH_OFF;
  const slow: PairCommand =
    scheme === "highSideRecirculation"
      ? { a: "high", b: synchronous ? "high" : "off" }
      : { a: synchronous ? "low" : "off", b: "low" };
  return { on, fast, slow };
};

/** Pieces of one period: offset from its start (s) and command, slivers left out. */
const periodPattern = (document: ScenarioDocument, period: Period): { offsetS: number; command: PairCommand }[] => {
  const { scheme, alignment, frequencyHz } = document.pwm;
  const lengthS = 1 / frequencyHz;
  const { on, fast, slow } = schemeCommands(document);
  const isLocked = scheme === "lockedAntiphase";
  const share = isLocked ? (1 + period.duty) / 2 : Math.abs(period.duty);
  const swap = (command: PairCommand): PairCommand => (!isLocked && period.direction < 0 ? { a: command.b, b: command.a } : command);
  const rest = isLocked ? { a: "low" as const, b: "high" as const } : scheme === "fastDecay" ? (period.duty === 0 ? BOTH_OFF : fast) : slow;
  const pieces: { fromS: number; toS: number; command: PairCommand }[] = [];
  const leadS = alignment === "centre" ? ((1 - share) * lengthS) / 2 : 0;
  const onEndS = leadS + share * lengthS;
  if (alignment === "centre") pieces.push({ fromS: 0, toS: leadS, command: rest });
  pieces.push({ fromS: leadS, toS: onEndS, command: on });
  if (scheme === "mixedDecay" && period.duty !== 0) {
    const fastEndS = onEndS + (document.pwm.mixedFastShare ?? 0) * (1 - share) * lengthS;
    pieces.push({ fromS: onEndS, toS: fastEndS, command: fast }, { fromS: fastEndS, toS: lengthS, command: rest });
  } else pieces.push({ fromS: onEndS, toS: lengthS, command: rest });
  return pieces.filter((piece) => piece.toS - piece.fromS >= SLIVER_S).map((piece) => ({ offsetS: piece.fromS, command: swap(piece.command) }));
};

/** Special intervals first (they win over a dwell), then the dwells at the periods where the sign of u changes (D-07). */
const listOverlays = (document: ScenarioDocument, periods: Period[]): Overlay[] => {
  const overlays: Overlay[] = document.command.special.map((one) => ({ fromS: one.fromS, toS: one.toS, command: actionCommand(one.action) }));
  const { kind, dwellS } = document.command.reversal;
  let before: 1 | -1 = 1;
  let hasDriven = false;
  for (const period of periods) {
    const isReversal = hasDriven && period.direction !== before;
    if (isReversal && kind !== "direct" && dwellS > 0)
      overlays.push({ fromS: period.startS, toS: period.startS + dwellS, command: actionCommand(kind) });
    if (period.duty !== 0) hasDriven = true;
    before = period.direction;
  }
  return overlays;
};

/** The commands that the legs get, in time order. */
const listCommands = (document: ScenarioDocument, periods: Period[]): { timeS: number; command: PairCommand }[] => {
  const pattern: { timeS: number; command: PairCommand }[] = [];
  for (const period of periods)
    for (const piece of periodPattern(document, period)) pattern.push({ timeS: period.startS + piece.offsetS, command: piece.command });
  const overlays = listOverlays(document, periods);
  const times = [...pattern.map((one) => one.timeS), ...overlays.flatMap((one) => [one.fromS, one.toS])].sort((x, y) => x - y);
  const commands: { timeS: number; command: PairCommand }[] = [];
  for (const timeS of times) {
    const isNear = (otherS: number): boolean => otherS <= timeS + SAME_INSTANT_S;
    const overlay = overlays.find((one) => isNear(one.fromS) && !isNear(one.toS));
    let current = pattern[0]?.command ?? BOTH_OFF;
    for (const one of pattern) if (isNear(one.timeS)) current = one.command;
    const last = commands.at(-1);
    const command = overlay?.command ?? current;
    if (last && timeS - last.timeS <= SAME_INSTANT_S) last.command = command;
    else commands.push({ timeS, command });
  }
  return commands;
};

/** Gate changes of one leg under the dead time rule (D-08). */
const gateLeg = (commands: { timeS: number; command: LegCommand }[], leg: 0 | 1, deadTimeS: number): GateChange[] => {
  const gates: GateChange[] = [];
  const leftS = { high: -Infinity, low: -Infinity };
  let held: LegCommand = "off";
  for (let n = 0; n < commands.length; n += 1) {
    const now = commands[n];
    if (!now || (now.command === held && n > 0)) continue;
    if (held !== "off") leftS[held] = now.timeS;
    held = now.command;
    const next = commands.slice(n + 1).find((one) => one.command !== now.command);
    if (now.command === "off") {
      gates.push({ timeS: now.timeS, leg, high: false, low: false });
      continue;
    }
    const onS = Math.max(now.timeS, leftS[now.command === "high" ? "low" : "high"] + deadTimeS);
    if (onS > now.timeS + SAME_INSTANT_S) gates.push({ timeS: now.timeS, leg, high: false, low: false });
    if (next && onS >= next.timeS - SAME_INSTANT_S) continue;
    gates.push({ timeS: Math.max(onS, now.timeS), leg, high: now.command === "high", low: now.command === "low" });
  }
  return gates;
};

export const buildSchedule = (document: ScenarioDocument): Schedule => {
  const periods = listPeriods(document);
  const commands = listCommands(document, periods);
  const { deadTimeS } = document.bridge;
  const legA = gateLeg(commands.map((one) => ({ timeS: one.timeS, command: one.command.a })), 0, deadTimeS);
  const legB = gateLeg(commands.map((one) => ({ timeS: one.timeS, command: one.command.b })), 1, deadTimeS);
  return { periods, gates: [...legA, ...legB].sort((x, y) => x.timeS - y.timeS) };
};
