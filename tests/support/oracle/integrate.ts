import { stepDormandPrince, type Tolerance } from "./dormand-prince";
import { eventValues, kinkValues, slopeOf, type Mode } from "./system";

/** Controlled components: current (A), speed (rad/s), bus (V), six poles (V). */
const TOLERANCE: Tolerance = { relative: 1e-12, absolute: [1e-13, 1e-11, 1e-12, 1e-13, 1e-13, 1e-13, 1e-13, 1e-13, 1e-13] };
/** Below this length a step is taken whatever its error: it is far under the accuracy asked of event times, seconds. */
const SHORTEST_S = 1e-17;

export type Advance = {
  timeS: number;
  y: Float64Array;
  /** State half way through the step. */
  middle: Float64Array;
  middleS: number;
  hasEvent: boolean;
  /** Proposal for the next step, seconds. */
  nextS: number;
};

const hasChanged = (mode: Mode, timeS: number, y: Float64Array, kinks: number[]): boolean => {
  if (eventValues(mode, timeS, y).some((value) => value > 0)) return true;
  const now = kinkValues(mode, timeS, y);
  return kinks.some((before, n) => before * (now[n] ?? 0) < 0);
};

/**
 * One accepted step from `timeS` that ends at the latest at `limitS`, or just past the first event or kink.
 * The first change is looked for at quarters of the step, then bisected, each time stepping again from the start.
 */
export const advanceStep = (mode: Mode, timeS: number, y: Float64Array, wishS: number, limitS: number): Advance => {
  const slope = slopeOf(mode);
  const first = new Float64Array(y.length);
  slope(timeS, y, first);
  const step = (h: number) => stepDormandPrince(slope, timeS, y, first, h, TOLERANCE);
  let h = Math.min(wishS, limitS - timeS);
  let isWhole = wishS >= limitS - timeS;
  let taken = step(h);
  while (taken.error > 1 && h > SHORTEST_S) {
    h *= Math.max(0.2, 0.9 * taken.error ** (-1 / 8));
    isWhole = false;
    taken = step(h);
  }
  const grow = Math.min(5, 0.9 * Math.max(taken.error, 1e-10) ** (-1 / 8));
  const nextS = isWhole ? Math.max(wishS, h * grow) : h * grow;
  const share = firstChange(mode, timeS, y, h, step);
  if (share === null) {
    const middle = step(h / 2).state;
    return { timeS: isWhole ? limitS : timeS + h, y: taken.state, middle, middleS: timeS + h / 2, hasEvent: false, nextS };
  }
  const cut = share * h;
  const state = step(cut).state;
  const hasEvent = eventValues(mode, timeS + cut, state).some((value) => value > 0);
  return { timeS: timeS + cut, y: state, middle: step(cut / 2).state, middleS: timeS + cut / 2, hasEvent, nextS };
};

const firstChange = (mode: Mode, timeS: number, y: Float64Array, h: number, step: (h: number) => { state: Float64Array }): number | null => {
  const kinks = kinkValues(mode, timeS, y);
  const changedAt = (share: number): boolean => hasChanged(mode, timeS + share * h, step(share * h).state, kinks);
  const quarter = [0.25, 0.5, 0.75, 1].find(changedAt);
  if (quarter === undefined) return null;
  let low = quarter - 0.25;
  let high = quarter;
  while ((high - low) * h > Math.max(1e-18, 2e-16 * timeS) && high - low > 1e-15) {
    const middle = (low + high) / 2;
    if (changedAt(middle)) high = middle;
    else low = middle;
  }
  return high;
};
