import { performance } from "node:perf_hooks";
import { setFlagsFromString } from "node:v8";
import { runInNewContext } from "node:vm";
import { createRun, simulate } from "@/lib/engine";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { baseDocument, withReference } from "@/tests/support/oracle/base-document";
import { buildDrive, STATE_SIZE } from "./drive-equations";
import { runExtrapolation, runFixedStep } from "./steppers";

/**
 * `npm run bench`: speed of the engine on 1 s of drive at 20 kHz with every output, growth with the run's length, and
 * the ratio to two general ways of stepping at the engine's required accuracy (model.md section 8).
 * Warm figures are the median of runs 5 to 15 of one process; the cold view is the first thing this process does.
 */
const document = (durationS: number): ScenarioDocument => {
  const drive = baseDocument();
  drive.pwm.frequencyHz = 20000;
  withReference(drive, 1.25);
  drive.run = { durationS };
  return drive;
};

const timed = (work: () => void): number => {
  const startMs = performance.now();
  work();
  return performance.now() - startMs;
};
const middle = (values: number[]): number => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN;
/** Runs 5 to 15: median, and the fastest, which says more on a machine that does other things too. */
const warm = (work: () => void): { medianMs: number; bestMs: number } => {
  const times = Array.from({ length: 15 }, () => timed(work)).slice(4);
  return { medianMs: middle(times), bestMs: Math.min(...times) };
};
const said = ({ medianMs, bestMs }: { medianMs: number; bestMs: number }): string => `${medianMs.toFixed(2)} ms (fastest ${bestMs.toFixed(2)} ms)`;

setFlagsFromString("--expose-gc");
const collectGarbage = runInNewContext("gc") as () => void;

const heapMB = (): number => {
  collectGarbage();
  const { heapUsed, arrayBuffers } = process.memoryUsage();
  return (heapUsed + arrayBuffers) / 1e6;
};

/** Memory held by a finished run, its waveforms included. */
const heldMB = (durationS: number): number => {
  const before = heapMB();
  const run = createRun(document(durationS));
  while (!run.advance(20000));
  const result = run.finish();
  const held = heapMB() - before;
  return result.status === "reached-end" ? held : Number.NaN;
};

const coldView = (): number => {
  const drive = document(0.001);
  return timed(() => {
    const run = createRun(drive);
    while (!run.advance(20));
    run.finish();
    run.view({ fromS: 0, toS: 0.001, columnCount: 1200 });
  });
};

const ACCEPTED_STATE = 1e-6;
const ACCEPTED_OUTPUT = 1e-4;
const COMPARED_PERIODS = 200;

/** State at the start of the second period: the poles have settled by then, the amplifiers stand at their filters' values. */
const startState = (drive: ScenarioDocument): Float64Array => {
  const [at] = simulate(drive, { at: [(1 - 1e-9) / 20000] }).at;
  const [a, b, c] = [at?.outAV ?? 0, at?.outBV ?? 0, at?.combinedV ?? 0];
  return Float64Array.from([at?.motorCurrentA ?? 0, at?.speedRadPerS ?? 0, a, a, b, b, c - 1.25, c]);
};

/** Largest distance from `exact` in units of what model.md section 8 accepts; <= 1 is accurate enough. */
const distance = (found: Float64Array, exact: Float64Array, drive: ScenarioDocument): number => {
  const outputV = drive.sensing.amplifier.outputMaxV - drive.sensing.amplifier.outputMinV;
  const scale = [3.2 * ACCEPTED_STATE, 272 * ACCEPTED_STATE, ...Array.from({ length: STATE_SIZE - 2 }, () => outputV * ACCEPTED_OUTPUT)];
  return Math.max(...scale.map((limit, n) => Math.abs((found[n] ?? Number.NaN) - (exact[n] ?? 0)) / limit));
};

const bench = (): [string, string][] => {
  const coldMs = coldView();
  const one = document(1);
  const ten = document(10);
  const counters = simulate(one).counters;
  const oneRun = warm(() => void simulate(one));
  const tenRun = warm(() => void simulate(ten));
  const [oneMs, tenMs] = [oneRun.medianMs, tenRun.medianMs];
  const steps = equalAccuracy(one);
  // The number of switching intervals of the drive itself, however many of them the engine takes at once.
  const switchingCount = 20000 * buildDrive(one).pieces.length;
  const warmView = warm(() => void coldView());
  return [
    ["1 s of drive at 20 kHz, all outputs, warm", `${said(oneRun)}  (asked: at most 25 ms)`],
    ["real-time factor", `${(1000 / oneMs).toFixed(0)} x`],
    ["time per switching interval", `${((oneMs * 1e6) / switchingCount).toFixed(1)} ns over ${switchingCount} intervals  (asked: about 50 ns; engine counts ${counters.intervals})`],
    ["10 s of drive, warm", `${said(tenRun)}, ${(tenMs / oneMs).toFixed(2)} x the time of 1 s`],
    ["memory held after 1 s and 10 s", `${heldMB(1).toFixed(2)} MB and ${heldMB(10).toFixed(2)} MB`],
    ["fixed-step Runge-Kutta 4, equal accuracy", `${steps.fixedMs.toFixed(0)} ms for 1 s, ${(steps.fixedMs / oneMs).toFixed(0)} x the engine (longest step ${(steps.longestStepS * 1e9).toFixed(0)} ns, ${steps.fixedDistance.toFixed(2)} of what is accepted)`],
    ["extrapolation package, equal accuracy", `${steps.packageMs.toFixed(0)} ms for 1 s, ${(steps.packageMs / oneMs).toFixed(0)} x the engine (tolerance ${steps.tolerance}, ${steps.packageDistance.toFixed(2)} of what is accepted)`],
    ["engine against the finest fixed step", `${steps.engineDistance.toExponential(1)} of what is accepted after ${COMPARED_PERIODS} periods`],
    ["20-period view, first in this process", `${coldMs.toFixed(1)} ms  (asked: at most 16 ms)`],
    ["20-period view, warm", said(warmView)],
  ];
};

/** Finds the coarsest settings of both steppers that are accurate enough, and what 1 s of drive costs with them. */
const equalAccuracy = (one: ScenarioDocument) => {
  const drive = buildDrive(one);
  const start = startState(one);
  const exact = runFixedStep(drive, start, COMPARED_PERIODS, 2e-8);
  const [end] = simulate(one, { at: [(COMPARED_PERIODS + 1 - 1e-9) / 20000] }).at;
  const engine = Float64Array.from([end?.motorCurrentA ?? 0, end?.speedRadPerS ?? 0, exact[2] ?? 0, end?.outAV ?? 0, exact[4] ?? 0, end?.outBV ?? 0, exact[6] ?? 0, end?.combinedV ?? 0]);
  // The periodic state at a period's start hides the chopped pulse, so accuracy is asked inside it too: after the on-time.
  const probe = { ...drive, pieces: drive.pieces.slice(0, 3) };
  const worst = (run: (part: typeof drive, from: Float64Array, count: number) => Float64Array): number =>
    Math.max(distance(run(drive, start, COMPARED_PERIODS), exact, one), distance(run(probe, start, 1), runFixedStep(probe, start, 1, 2e-8), one));
  let longestStepS = 1.6e-6;
  while (!(worst((part, from, count) => runFixedStep(part, from, count, longestStepS)) <= 1)) longestStepS /= 1.1;
  let tolerance = 1e-3;
  while (!(worst((part, from, count) => runExtrapolation(part, from, count, tolerance)) <= 1)) tolerance /= 10;
  return {
    longestStepS,
    tolerance,
    fixedDistance: worst((part, from, count) => runFixedStep(part, from, count, longestStepS)),
    packageDistance: worst((part, from, count) => runExtrapolation(part, from, count, tolerance)),
    engineDistance: distance(engine, exact, one),
    fixedMs: 10 * warm(() => void runFixedStep(drive, start, 2000, longestStepS)).medianMs,
    packageMs: 100 * warm(() => void runExtrapolation(drive, start, 200, tolerance)).medianMs,
  };
};

const rows = bench();
const width = Math.max(...rows.map(([name]) => name.length));
for (const [name, value] of rows) console.log(`${name.padEnd(width)}  ${value}`);
