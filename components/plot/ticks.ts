/** Round tick values, value domains that stay put, and numbers as the plot writes them. */
export const MINUS = "\u2212";
export const THIN_SPACE = "\u2009";

/** 1, 2 or 5 times a power of ten, at least `span / count`. */
export function roundStep(span: number, count: number): number {
  const rough = span / Math.max(1, count);
  if (!(rough > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(rough));
  const head = rough / power;
  return (head <= 1 ? 1 : head <= 2 ? 2 : head <= 5 ? 5 : 10) * power;
}

/** Multiples of a round step inside [min, max], about `count` of them, each computed from its own index so that no error adds up. */
export function niceTicks(min: number, max: number, count: number): number[] {
  if (!(max > min)) return [min];
  const step = roundStep(max - min, count);
  return multiplesIn(step, min, max);
}

const LEAST_TICK_PX = 14;
const MOST_LANE_TICKS = 5;
const LANE_STEPS = [1, 2, 2.5, 5, 10, 20, 25, 50, 100];

/** Ticks of a lane: the smallest of the steps 1, 2, 2.5, 5 times a power of ten that leaves 14 px between two of them and at most five. */
export function laneTicks(min: number, max: number, heightPx: number): number[] {
  const leastStep = ((max - min) * LEAST_TICK_PX) / Math.max(1, heightPx);
  if (!(leastStep > 0)) return [min];
  const power = 10 ** Math.floor(Math.log10(leastStep));
  let ticks: number[] = [];
  for (const head of LANE_STEPS) {
    const step = head * power;
    if (step < leastStep * (1 - 1e-9)) continue;
    ticks = multiplesIn(step, min, max);
    if (ticks.length <= MOST_LANE_TICKS) break;
  }
  return ticks;
}

function multiplesIn(step: number, min: number, max: number): number[] {
  const multiples: number[] = [];
  for (let index = Math.ceil(min / step - 1e-9); index * step <= max + step * 1e-9; index += 1) multiples.push(index === 0 ? 0 : Number((index * step).toPrecision(12)));
  return multiples;
}

export type Domain = { min: number; max: number };

/** The data with 6 % of air, never empty, with `around` always inside. */
export function paddedDomain(min: number, max: number, around: number | null, leastSpan: number): Domain {
  let low = around === null ? min : Math.min(min, around);
  let high = around === null ? max : Math.max(max, around);
  if (!Number.isFinite(low) || !Number.isFinite(high)) [low, high] = [around ?? 0, around ?? 0];
  if (high - low < leastSpan) {
    const middle = (low + high) / 2;
    [low, high] = [middle - leastSpan / 2, middle + leastSpan / 2];
  }
  const air = (high - low) * 0.06;
  return { min: low - air, max: high + air };
}

/**
 * A domain that does not jump while a value is dragged. While `isHeld` it only grows; otherwise it is left alone as long as
 * the data fill more than 60 % of it (a smaller share reads badly; a tighter rule would make the scale flicker).
 */
export function stickyDomain(previous: Domain | undefined, wanted: Domain, isHeld: boolean): Domain {
  if (previous === undefined) return wanted;
  const grown = { min: Math.min(previous.min, wanted.min), max: Math.max(previous.max, wanted.max) };
  const isInside = wanted.min >= previous.min && wanted.max <= previous.max;
  if (isHeld) return isInside ? previous : grown;
  return isInside && wanted.max - wanted.min > 0.6 * (previous.max - previous.min) ? previous : wanted;
}

const PREFIXES: readonly (readonly [number, string])[] = [
  [1e9, "G"],
  [1e6, "M"],
  [1e3, "k"],
  [1, ""],
  [1e-3, "m"],
  [1e-6, "µ"],
  [1e-9, "n"],
  [1e-12, "p"],
];

/** The prefix that suits the largest magnitude of a lane: all of its ticks and readouts keep it. */
export function unitScale(maxAbs: number, unit: string): { factor: number; unit: string } {
  const magnitude = Math.abs(maxAbs);
  for (const [factor, prefix] of PREFIXES) {
    if (magnitude >= factor * 0.9999) return { factor, unit: prefix + unit };
  }
  return { factor: 1, unit };
}

/** Fixed decimals, U+2212, thin space between thousands; `isSigned` writes the plus as well. A rounded zero has no sign. */
export function fixed(value: number, decimals: number, isSigned = false): string {
  const digits = Math.abs(value).toFixed(decimals);
  const isZero = Number(digits) === 0;
  const [whole = "0", fraction] = digits.split(".");
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+(?!\d))/g, THIN_SPACE) : whole;
  const sign = isZero ? "" : value < 0 ? MINUS : isSigned ? "+" : "";
  return sign + grouped + (fraction === undefined ? "" : "." + fraction);
}

/** Decimals that write a step out in full, at most 9: 0 for 5, 1 for 2.5, 2 for 0.25. */
export function decimalsOf(step: number): number {
  for (let decimals = 0; decimals < 9; decimals += 1) {
    const shifted = step * 10 ** decimals;
    if (shifted >= 1 - 1e-9 && Math.abs(shifted - Math.round(shifted)) < 1e-6 * shifted) return decimals;
  }
  return 9;
}

export function tickTexts(ticks: readonly number[], factor: number, isSigned: boolean): string[] {
  const step = ticks.length > 1 ? Math.abs((ticks[1] ?? 0) - (ticks[0] ?? 0)) / factor : 1;
  return ticks.map((tick) => fixed(tick / factor, decimalsOf(step), isSigned));
}

/** How times are written for a window: one unit, and as many decimals as a pixel is worth. */
export type TimeFormat = { factor: number; unit: string; decimals: number };

export function timeFormat(window: { fromS: number; toS: number }, pixelCount: number): TimeFormat {
  const largestS = Math.max(Math.abs(window.fromS), Math.abs(window.toS));
  const { factor, unit } = largestS < 2e-3 ? { factor: 1e-6, unit: "µs" } : largestS < 2 ? { factor: 1e-3, unit: "ms" } : { factor: 1, unit: "s" };
  const pixelS = (window.toS - window.fromS) / Math.max(1, pixelCount) / factor;
  return { factor, unit, decimals: Math.min(6, Math.max(2, Math.ceil(-Math.log10(pixelS) - 1e-9))) };
}

/** How the cursor's own time is written: to a thousandth of a PWM period, so that any two events read differently. */
export function cursorFormat(window: { fromS: number; toS: number }, periodS: number): TimeFormat {
  const format = timeFormat(window, 1);
  return { ...format, decimals: Math.min(9, Math.max(2, Math.ceil(-Math.log10(periodS / 1000 / format.factor) - 1e-9))) };
}

export const formatTime = (timeS: number, format: TimeFormat): string => `${fixed(timeS / format.factor, format.decimals)} ${format.unit}`;
