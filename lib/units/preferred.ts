/** Preferred values of IEC 60063:2015, tables 1 and 2, within one decade. */
const SERIES = {
  E12: [1, 1.2, 1.5, 1.8, 2.2, 2.7, 3.3, 3.9, 4.7, 5.6, 6.8, 8.2],
  E24: [
    1, 1.1, 1.2, 1.3, 1.5, 1.6, 1.8, 2, 2.2, 2.4, 2.7, 3, 3.3, 3.6, 3.9, 4.3, 4.7, 5.1, 5.6, 6.2, 6.8, 7.5, 8.2, 9.1,
  ],
} as const;

export type SeriesName = keyof typeof SERIES;

/** Values a hair apart are the same preferred value written by different sums. */
const SAME = 1e-9;

/** The value of a series in a decade, as the double nearest to its decimal digits. */
const inDecade = (digits: number, exponent: number) => Number(`${digits}e${exponent}`);

/** Three neighbours are enough to find the nearest one, the one below and the one above. */
function around(series: SeriesName, value: number): number[] {
  const exponent = Math.floor(Math.log10(value));
  return [exponent - 1, exponent, exponent + 1].flatMap((decade) =>
    SERIES[series].map((digits) => inDecade(digits, decade)),
  );
}

/** The preferred value nearest by ratio. @param value above 0; anything else comes back as it is */
export function nearestPreferred(series: SeriesName, value: number): number {
  if (!(value > 1e-300) || !Number.isFinite(value)) return value;
  let best = value;
  let bestDistance = Infinity;
  for (const candidate of around(series, value)) {
    const distance = Math.abs(Math.log(candidate / value));
    if (distance < bestDistance) [best, bestDistance] = [candidate, distance];
  }
  return best;
}

/** The next preferred value above (direction 1) or below (-1). @param value above 0; anything else comes back as it is */
export function nextPreferred(series: SeriesName, value: number, direction: 1 | -1): number {
  if (!(value > 1e-300) || !Number.isFinite(value)) return value;
  const candidates = around(series, value);
  if (direction === 1) return candidates.find((candidate) => candidate > value * (1 + SAME)) ?? value;
  return candidates.reverse().find((candidate) => candidate < value * (1 - SAME)) ?? value;
}
