/** Linear map between time and pixels; the only place that knows how a visible window meets a width. */
export type PlotWindow = { fromS: number; toS: number };
export type TimeScale = { fromS: number; toS: number; x0: number; x1: number };

export const xOf = (scale: TimeScale, timeS: number): number =>
  scale.x0 + ((timeS - scale.fromS) / (scale.toS - scale.fromS)) * (scale.x1 - scale.x0);

export const timeOf = (scale: TimeScale, x: number): number =>
  scale.fromS + ((x - scale.x0) / (scale.x1 - scale.x0)) * (scale.toS - scale.fromS);

export type ValueScale = { min: number; max: number; y0: number; y1: number };

/** `y0` is the pixel of `max` (top), `y1` that of `min` (bottom). */
export const yOf = (scale: ValueScale, value: number): number =>
  scale.y0 + ((scale.max - value) / (scale.max - scale.min)) * (scale.y1 - scale.y0);

export const clamp = (value: number, low: number, high: number): number => Math.min(high, Math.max(low, value));

/** No window is shorter than this share of a PWM period: below it the solver's own event tolerance would show. */
const SHORTEST_SHARE_OF_PERIOD = 1e-3;

/** The sum may round to just past the run's end, where no view can be asked for. */
const endOf = (fromS: number, lengthS: number, durationS: number): number => Math.min(durationS, fromS + lengthS);

export function fitWindow(window: PlotWindow, durationS: number, periodS: number): PlotWindow {
  const lengthS = clamp(window.toS - window.fromS, Math.min(durationS, periodS * SHORTEST_SHARE_OF_PERIOD), durationS);
  const fromS = clamp(window.fromS, 0, durationS - lengthS);
  return { fromS, toS: endOf(fromS, lengthS, durationS) };
}

/** Zooms so that `aboutS` keeps its place on screen. `factor` below 1 shows less time. */
export function zoomWindow(window: PlotWindow, factor: number, aboutS: number, durationS: number, periodS: number): PlotWindow {
  const lengthS = (window.toS - window.fromS) * factor;
  const longestS = Math.min(Math.max(lengthS, Math.min(durationS, periodS * SHORTEST_SHARE_OF_PERIOD)), durationS);
  const share = (aboutS - window.fromS) / (window.toS - window.fromS);
  const fromS = aboutS - share * longestS;
  return fitWindow({ fromS, toS: fromS + longestS }, durationS, periodS);
}

export function panWindow(window: PlotWindow, byS: number, durationS: number): PlotWindow {
  const lengthS = window.toS - window.fromS;
  const fromS = clamp(window.fromS + byS, 0, Math.max(0, durationS - lengthS));
  return { fromS, toS: endOf(fromS, lengthS, durationS) };
}

/** Moves the window only as far as it takes to show `timeS`, with a margin of 8 % so that the cursor never sits on the edge. */
export function revealTime(window: PlotWindow, timeS: number, durationS: number): PlotWindow {
  const marginS = (window.toS - window.fromS) * 0.08;
  if (timeS < window.fromS) return panWindow(window, timeS - marginS - window.fromS, durationS);
  if (timeS > window.toS) return panWindow(window, timeS + marginS - window.toS, durationS);
  return window;
}
