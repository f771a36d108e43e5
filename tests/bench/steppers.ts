import { createRequire } from "node:module";
import { STATE_SIZE, writeSlope, type Drive } from "./drive-equations";

/** The part of the package that is used here; it ships sources that strict type checks do not accept. */
type Extrapolator = {
  absoluteTolerance: number;
  relativeTolerance: number;
  initialStepSize: number;
  maxSteps: number;
  solve: (slope: (t: number, y: number[]) => number[], from: number, y: number[], to: number) => { y: number[]; outcome: number };
};
const { Solver } = createRequire(import.meta.url)("odex") as { Solver: new (size: number) => Extrapolator };

/** Classical Runge-Kutta of order 4 in equal steps fitted to every piece of the period. */
export const runFixedStep = (drive: Drive, start: Float64Array, periodCount: number, longestStepS: number): Float64Array => {
  const y = Float64Array.from(start);
  const [k1, k2, k3, k4, trial] = [0, 1, 2, 3, 4].map(() => new Float64Array(STATE_SIZE)) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  const blend = (slope: Float64Array, h: number): void => {
    for (let n = 0; n < STATE_SIZE; n += 1) trial[n] = (y[n] as number) + h * (slope[n] as number);
  };
  for (let period = 0; period < periodCount; period += 1)
    for (const piece of drive.pieces) {
      const count = Math.ceil(piece.lengthS / longestStepS);
      const h = piece.lengthS / count;
      for (let step = 0; step < count; step += 1) {
        const t = step * h;
        writeSlope(drive, piece, t, y, k1);
        blend(k1, h / 2);
        writeSlope(drive, piece, t + h / 2, trial, k2);
        blend(k2, h / 2);
        writeSlope(drive, piece, t + h / 2, trial, k3);
        blend(k3, h);
        writeSlope(drive, piece, t + h, trial, k4);
        for (let n = 0; n < STATE_SIZE; n += 1) y[n] = (y[n] as number) + (h / 6) * ((k1[n] as number) + 2 * (k2[n] as number) + 2 * (k3[n] as number) + (k4[n] as number));
      }
    }
  return y;
};

/** The extrapolation package, started anew at every piece as such packages must be. */
export const runExtrapolation = (drive: Drive, start: Float64Array, periodCount: number, tolerance: number): Float64Array => {
  let y = Array.from(start);
  for (let period = 0; period < periodCount; period += 1)
    for (const piece of drive.pieces) {
      const slope = new Array<number>(STATE_SIZE).fill(0);
      const solver = new Solver(STATE_SIZE);
      solver.absoluteTolerance = tolerance;
      solver.relativeTolerance = tolerance;
      solver.initialStepSize = piece.lengthS / 4;
      solver.maxSteps = 100_000;
      const slopeOf = (t: number, now: number[]): number[] => {
        writeSlope(drive, piece, t, now, slope);
        return slope.slice();
      };
      y = solver.solve(slopeOf, 0, y, piece.lengthS).y;
    }
  return Float64Array.from(y);
};
