import { ERROR_FIFTH, ERROR_THIRD, MATRIX, NODES, WEIGHTS } from "./dormand-prince-table";

/** Writes dy/dt of the state `y` at time `t` into `slope`; all in SI units. */
export type Slope = (t: number, y: Float64Array, slope: Float64Array) => void;

export type Step = {
  /** State at t + h. */
  state: Float64Array;
  /** Error of the controlled components over their tolerance; accepted when <= 1. */
  error: number;
};

/** Tolerances of the first `relative.length` components; the rest (quadratures) ride along. */
export type Tolerance = { relative: number; absolute: readonly number[] };

/**
 * One step of the order 8 method. The error is the one of DOP853 (order 5 damped by order 3).
 * A shorter step from the same start is at least as exact as the whole one, so events are located by stepping again
 * with a smaller h: no interpolation formula comes into the results.
 */
export const stepDormandPrince = (slope: Slope, t: number, y: Float64Array, first: Float64Array, h: number, tolerance: Tolerance): Step => {
  const size = y.length;
  const slopes: Float64Array[] = [first];
  const trial = new Float64Array(size);
  for (let stage = 1; stage < NODES.length; stage += 1) {
    const row = MATRIX[stage] ?? [];
    trial.set(y);
    for (let earlier = 0; earlier < stage; earlier += 1) {
      const factor = h * (row[earlier] ?? 0);
      const known = slopes[earlier];
      if (factor !== 0 && known) for (let n = 0; n < size; n += 1) trial[n] = (trial[n] ?? 0) + factor * (known[n] ?? 0);
    }
    const next = new Float64Array(size);
    slope(t + (NODES[stage] ?? 0) * h, trial, next);
    slopes.push(next);
  }
  const state = combine(y, slopes, h);
  return { state, error: estimateError(y, state, slopes, h, tolerance) };
};

const combine = (y: Float64Array, slopes: Float64Array[], h: number): Float64Array => {
  const state = new Float64Array(y.length);
  for (let n = 0; n < y.length; n += 1) {
    let sum = 0;
    for (let stage = 0; stage < slopes.length; stage += 1) sum += (WEIGHTS[stage] ?? 0) * (slopes[stage]?.[n] ?? 0);
    state[n] = (y[n] ?? 0) + h * sum;
  }
  return state;
};

const estimateError = (y: Float64Array, state: Float64Array, slopes: Float64Array[], h: number, tolerance: Tolerance): number => {
  const count = tolerance.absolute.length;
  let fifth = 0;
  let third = 0;
  for (let n = 0; n < count; n += 1) {
    const scale = (tolerance.absolute[n] ?? 0) + tolerance.relative * Math.max(Math.abs(y[n] ?? 0), Math.abs(state[n] ?? 0));
    let e5 = 0;
    let e3 = 0;
    for (let stage = 0; stage < slopes.length; stage += 1) {
      const value = slopes[stage]?.[n] ?? 0;
      e5 += (ERROR_FIFTH[stage] ?? 0) * value;
      e3 += (ERROR_THIRD[stage] ?? 0) * value;
    }
    fifth += (e5 / scale) ** 2;
    third += (e3 / scale) ** 2;
  }
  if (fifth === 0 && third === 0) return 0;
  return (Math.abs(h) * fifth) / Math.sqrt((fifth + 0.01 * third) * count);
};
