import { timeOf, type TimeScale } from "./scale";

/** First index whose time is at least `timeS` (`timeS` ascending). */
export function lowerBound(times: ArrayLike<number>, timeS: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (times[middle]! < timeS) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** First index whose time is greater than `timeS`. */
export function upperBound(times: ArrayLike<number>, timeS: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (times[middle]! <= timeS) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * Indices of a waveform worth drawing: of each pixel column the first and the last point (so that a jump at the border of two
 * columns stays upright and both sides of an event stay) and the smallest and the largest value (so that no peak is lost).
 * At most four points a column; a column with four or fewer points keeps them all. One point outside each edge is kept, so that lines
 * leave the picture in the right direction. `times` ascending, equal times allowed.
 */
export function decimate(times: ArrayLike<number>, values: ArrayLike<number>, scale: TimeScale): number[] {
  const columnCount = Math.max(1, Math.ceil(scale.x1 - scale.x0));
  const start = Math.max(0, lowerBound(times, scale.fromS) - 1);
  const end = Math.min(times.length, upperBound(times, scale.toS) + 1);
  if (end - start <= columnCount) return Array.from({ length: Math.max(0, end - start) }, (_, index) => start + index);
  const kept: number[] = [];
  let index = start;
  let column = 0;
  while (index < end) {
    while (column < columnCount && times[index]! >= timeOf(scale, scale.x0 + column + 1)) column += 1;
    const limitS = column >= columnCount ? Infinity : timeOf(scale, scale.x0 + column + 1);
    const first = index;
    let lowest = index;
    let highest = index;
    while (index < end && times[index]! < limitS) {
      if (values[index]! < values[lowest]!) lowest = index;
      if (values[index]! > values[highest]!) highest = index;
      index += 1;
    }
    keepColumn(kept, first, lowest, highest, index - 1);
  }
  return kept;
}

function keepColumn(kept: number[], first: number, lowest: number, highest: number, last: number): void {
  if (last - first < 4) {
    for (let index = first; index <= last; index += 1) kept.push(index);
    return;
  }
  const [early, late] = lowest < highest ? [lowest, highest] : [highest, lowest];
  kept.push(first);
  if (early > first) kept.push(early);
  if (late > early && late > first) kept.push(late);
  if (last > late) kept.push(last);
}

export type EnvelopeColumn = { fromS: number; toS: number; min: number; max: number };

/** Columns of an envelope inside the window, merged until none is narrower than a pixel. */
export function envelopeColumns(times: ArrayLike<number>, min: ArrayLike<number>, max: ArrayLike<number>, viewToS: number, scale: TimeScale): EnvelopeColumn[] {
  const pixelS = (scale.toS - scale.fromS) / Math.max(1, scale.x1 - scale.x0);
  const columns: EnvelopeColumn[] = [];
  const start = Math.max(0, upperBound(times, scale.fromS) - 1);
  for (let index = start; index < times.length && times[index]! < scale.toS; index += 1) {
    const fromS = times[index]!;
    const toS = index + 1 < times.length ? times[index + 1]! : viewToS;
    const last = columns[columns.length - 1];
    if (last !== undefined && toS - last.fromS <= pixelS * 1.0001) {
      last.toS = toS;
      last.min = Math.min(last.min, min[index]!);
      last.max = Math.max(last.max, max[index]!);
    } else columns.push({ fromS, toS, min: min[index]!, max: max[index]! });
  }
  return columns;
}
