import type { View } from "@/lib/engine/results";

/** A stretch of time in which the motor current keeps its direction: 1 forward, -1 reverse, 0 none. */
export type Direction = 1 | -1 | 0;
export type SignRun = { fromS: number; toS: number; direction: Direction };

/** Below this share of the largest current of the view, current counts as none: it is far under a pixel of any lane. */
const NO_CURRENT_SHARE = 1e-6;

function addRun(runs: SignRun[], fromS: number, toS: number, direction: Direction): void {
  if (toS <= fromS) return;
  const last = runs[runs.length - 1];
  if (last !== undefined && last.direction === direction) last.toS = toS;
  else runs.push({ fromS, toS, direction });
}

const directionOf = (value: number, floor: number): Direction => (value > floor ? 1 : value < -floor ? -1 : 0);

/** Directions of the motor current over a view: they colour every lane. Between two points the crossing is where the straight line is zero. */
export function signRuns(view: View): SignRun[] {
  const current = view.traces.motorCurrentA;
  if (current === undefined || view.timeS.length === 0) return [];
  let largest = 0;
  for (let index = 0; index < current.max.length; index += 1) {
    largest = Math.max(largest, Math.abs(current.max[index]!), Math.abs(current.min[index]!));
  }
  const floor = largest * NO_CURRENT_SHARE;
  return view.kind === "exact" ? exactRuns(view, current.max, floor) : envelopeRuns(view, current, floor);
}

function exactRuns(view: View, values: Float64Array, floor: number): SignRun[] {
  const runs: SignRun[] = [];
  for (let index = 0; index + 1 < view.timeS.length; index += 1) {
    const fromS = view.timeS[index]!;
    const toS = view.timeS[index + 1]!;
    const before = directionOf(values[index]!, floor);
    const after = directionOf(values[index + 1]!, floor);
    if (before !== 0 && after !== 0 && before !== after) {
      const crossS = fromS + ((toS - fromS) * values[index]!) / (values[index]! - values[index + 1]!);
      addRun(runs, fromS, crossS, before);
      addRun(runs, crossS, toS, after);
    } else addRun(runs, fromS, toS, before === 0 ? after : before);
  }
  return runs;
}

function envelopeRuns(view: View, current: { min: Float64Array; max: Float64Array }, floor: number): SignRun[] {
  const runs: SignRun[] = [];
  for (let index = 0; index < view.timeS.length; index += 1) {
    const toS = index + 1 < view.timeS.length ? view.timeS[index + 1]! : view.toS;
    addRun(runs, view.timeS[index]!, toS, directionOf((current.min[index]! + current.max[index]!) / 2, floor));
  }
  return runs;
}

export type SignedPiece = { direction: Direction; timeS: number[]; values: number[] };

/**
 * Cuts a waveform (points `kept` of it) at the ends of the runs. A cut inside a line is interpolated; a cut at a jump takes the value
 * before it for the piece that ends and the value after it for the piece that starts.
 */
export function splitByRuns(times: ArrayLike<number>, values: ArrayLike<number>, kept: readonly number[], runs: readonly SignRun[]): SignedPiece[] {
  const pieces: SignedPiece[] = [];
  let next = 0;
  let start: { timeS: number; value: number } | null = null;
  for (const run of runs) {
    const piece: SignedPiece = { direction: run.direction, timeS: [], values: [] };
    if (start !== null) push(piece, start.timeS, start.value);
    while (next < kept.length && times[kept[next]!]! < run.toS) {
      const index = kept[next]!;
      if (times[index]! >= run.fromS || start === null) push(piece, times[index]!, values[index]!);
      next += 1;
    }
    start = cutAt(times, values, kept, next, run.toS, piece);
    while (next < kept.length && times[kept[next]!]! === run.toS) next += 1;
    if (piece.timeS.length > 1) pieces.push(piece);
  }
  return pieces;
}

function push(piece: SignedPiece, timeS: number, value: number): void {
  piece.timeS.push(timeS);
  piece.values.push(value);
}

/** Ends `piece` at `cutS` and says where the next one starts. */
function cutAt(times: ArrayLike<number>, values: ArrayLike<number>, kept: readonly number[], next: number, cutS: number, piece: SignedPiece) {
  if (next >= kept.length) return null;
  const right = kept[next]!;
  if (times[right] === cutS) {
    push(piece, cutS, values[right]!);
    let last = next;
    while (last + 1 < kept.length && times[kept[last + 1]!] === cutS) last += 1;
    return { timeS: cutS, value: values[kept[last]!]! };
  }
  if (next === 0) return null;
  const left = kept[next - 1]!;
  const share = (cutS - times[left]!) / (times[right]! - times[left]!);
  const value = values[left]! + share * (values[right]! - values[left]!);
  push(piece, cutS, value);
  return { timeS: cutS, value };
}
