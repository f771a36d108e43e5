import type { AffineMode } from "../model/affine";
import { stateAfter, type Spectrum } from "./spectrum";

/** A Newton step below this ends the search: three decades inside the 1e-12 s that model.md section 8 asks for. */
const LOCATE_S = 1e-15;
/** An extremum located to this share of the piece is right to the square of it. */
export const EXTREMUM_SHARE = 1e-7;
const SCRATCH = new Float64Array(3);

/** Value of the row [c0 c1 c2 | c3] at the state x. */
export const rowValue = (row: Float64Array, x: Float64Array) => row[0]! * x[0]! + row[1]! * x[1]! + row[2]! * x[2]! + row[3]!;

/** Time derivative of the row along dx/dt = A x + b. */
export function rowSlope(row: Float64Array, { a, b }: AffineMode, x: Float64Array): number {
  const d0 = a[0]! * x[0]! + a[1]! * x[1]! + a[2]! * x[2]! + b[0]!;
  const d1 = a[3]! * x[0]! + a[4]! * x[1]! + a[5]! * x[2]! + b[1]!;
  const d2 = a[6]! * x[0]! + a[7]! * x[1]! + a[8]! * x[2]! + b[2]!;
  return row[0]! * d0 + row[1]! * d1 + row[2]! * d2;
}

/**
 * Root of f on [lo, hi], f(lo) and f(hi) of opposite sign: Newton steps kept inside the bracket, bisection where they
 * leave it or where no slope is given. `f` writes value and slope (0: unknown) to `at`.
 */
export function bracketedRoot(f: (tauS: number, at: Float64Array) => void, lo: number, valueLo: number, hi: number, valueHi: number, toleranceS = LOCATE_S): number {
  if (valueHi === 0) return hi;
  const at = new Float64Array(2);
  const isLoPositive = valueLo > 0;
  let tau = lo + ((hi - lo) * valueLo) / (valueLo - valueHi);
  for (let n = 0; n < 100; n++) {
    if (!(tau > lo && tau < hi)) tau = 0.5 * (lo + hi);
    f(tau, at);
    const value = at[0]!;
    if (value === 0) return tau;
    if (value > 0 === isLoPositive) lo = tau;
    else hi = tau;
    const step = at[1] !== 0 ? value / at[1]! : Infinity;
    if (Math.abs(step) <= toleranceS || hi - lo <= toleranceS) {
      const last = tau - step;
      return last > lo && last < hi ? last : tau;
    }
    tau -= step;
  }
  return tau;
}

/**
 * First time in [0, h] at which a row of the state passes zero downwards (from > 0 to <= 0), or -1; 0 when it stands at
 * or below zero and falls. A dip below zero between two positive ends is found through the row's slope (taken to turn once at most); a tangent touch is not.
 */
export function firstDownCrossing(row: Float64Array, mode: AffineMode, spectrum: Spectrum, x0: Float64Array, x1: Float64Array, h: number): number {
  const value0 = rowValue(row, x0);
  const value1 = rowValue(row, x1);
  const slope0 = rowSlope(row, mode, x0);
  if (value0 > 0 && value1 <= 0) return rowRoot(row, mode, spectrum, x0, 0, value0, h, value1);
  if (value0 <= 0) {
    if (value1 > 0) return -1;
    if (slope0 <= 0 || value0 < 0) return 0;
    // rises from zero and comes back: the peak first, then the way down
    const slope1 = rowSlope(row, mode, x1);
    if (slope1 >= 0) return 0;
    const peakS = slopeRoot(row, mode, spectrum, x0, slope0, slope1, h);
    stateAfter(mode, spectrum, x0, peakS, SCRATCH);
    const peak = rowValue(row, SCRATCH);
    return peak > 0 ? rowRoot(row, mode, spectrum, x0, peakS, peak, h, value1) : 0;
  }
  // with a slope that turns once the row cannot fall below its first tangent: spares nearly every interval the search
  if (slope0 >= 0 || value0 + slope0 * h > 0) return -1;
  const slope1 = rowSlope(row, mode, x1);
  if (slope1 <= 0) return -1;
  const dipS = slopeRoot(row, mode, spectrum, x0, slope0, slope1, h);
  stateAfter(mode, spectrum, x0, dipS, SCRATCH);
  const dip = rowValue(row, SCRATCH);
  return dip < 0 ? rowRoot(row, mode, spectrum, x0, 0, value0, dipS, dip) : -1;
}

/** Time of the row's zero between two times with values of opposite sign. */
export function rowRoot(row: Float64Array, mode: AffineMode, spectrum: Spectrum, x0: Float64Array, fromS: number, from: number, toS: number, to: number): number {
  return bracketedRoot((tau, at) => {
    stateAfter(mode, spectrum, x0, tau, SCRATCH);
    at[0] = rowValue(row, SCRATCH);
    at[1] = rowSlope(row, mode, SCRATCH);
  }, fromS, from, toS, to);
}

function slopeRoot(row: Float64Array, mode: AffineMode, spectrum: Spectrum, x0: Float64Array, slope0: number, slope1: number, h: number): number {
  return bracketedRoot((tau, at) => {
    stateAfter(mode, spectrum, x0, tau, SCRATCH);
    at[0] = rowSlope(row, mode, SCRATCH);
    at[1] = 0;
  }, 0, slope0, h, slope1, EXTREMUM_SHARE * h);
}

/** State at which the row has an extremum inside (0, h), or null; the returned array is overwritten at the next call. */
export function rowRootOfSlope(row: Float64Array, mode: AffineMode, spectrum: Spectrum, x0: Float64Array, x1: Float64Array, h: number): Float64Array | null {
  const slope0 = rowSlope(row, mode, x0);
  const slope1 = rowSlope(row, mode, x1);
  if (!(slope0 * slope1 < 0)) return null;
  const atS = slopeRoot(row, mode, spectrum, x0, slope0, slope1, h);
  stateAfter(mode, spectrum, x0, atS, SCRATCH);
  return SCRATCH;
}
