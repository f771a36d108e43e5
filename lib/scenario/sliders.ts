import { nearestPreferred, nextPreferred } from "@/lib/units/preferred";
import type { QuantityInput, Slider } from "./input-types";

/** Arithmetic of sliders and arrow keys, for inputs of the table. Values stay within the hard limits of the input. */

const tidy = (value: number, digits = 12) => Number(value.toPrecision(digits));

/** The closest value the input takes. */
export function limited(input: QuantityInput, value: number): number {
  const whole = input.isWhole ? Math.round(value) : value;
  // The largest allowed value of an open range is a step below its end, where the field shows it
  const max = input.isMaxOpen ? input.max - (input.slider?.step ?? 1e-3) : input.max;
  return Math.min(max, Math.max(input.min, whole));
}

/** Where the thumb stands, 0 to 1; values outside the slider stand at its end. */
export function sliderPosition(slider: Slider, value: number): number {
  const { min, max, scale } = slider;
  const position =
    scale === "log" ? Math.log(Math.max(value, min) / min) / Math.log(max / min) : (value - min) / (max - min);
  return Math.min(1, Math.max(0, position));
}

/** The value at a position of the thumb, rounded to the slider's step, or to three digits on a log scale. */
export function valueAtPosition(input: QuantityInput, position: number): number {
  const { slider } = input;
  if (!slider) return input.min;
  const place = Math.min(1, Math.max(0, position));
  if (slider.scale === "log") return limited(input, tidy(slider.min * (slider.max / slider.min) ** place, 3));
  const raw = slider.min + (slider.max - slider.min) * place;
  const step = slider.step ?? (slider.max - slider.min) / 100;
  return limited(input, tidy(Math.round(raw / step) * step));
}

/** The preferred value that the thumb snaps to when it is within `distance` of the slider's length; otherwise the value itself. */
export function snapped(input: QuantityInput, value: number, distance: number): number {
  if (!input.series || !input.slider || !(value > 0)) return value;
  const preferred = nearestPreferred(input.series, value);
  const gap = Math.abs(sliderPosition(input.slider, preferred) - sliderPosition(input.slider, value));
  return gap <= distance ? limited(input, preferred) : value;
}

/**
 * What an arrow key does: one step up or down. @param size 1, or 10 with Shift, 0.1 with Alt
 * Without a linear slider the step is one unit of the value's second digit: 4.7 mΩ -> 4.8 mΩ.
 */
export function stepped(input: QuantityInput, value: number, direction: 1 | -1, size: number): number {
  if (input.isWhole) return limited(input, value + direction * Math.max(1, Math.round(size)));
  const ownStep = value === 0 ? (input.slider?.min ?? 1e-3) : 10 ** (Math.floor(Math.log10(Math.abs(value))) - 1);
  const step = input.slider?.scale === "linear" ? (input.slider.step ?? ownStep) : ownStep;
  return limited(input, tidy(value + direction * step * size));
}

/** What PgUp and PgDn do: the next preferred value, or ten steps where there is no series. */
export function pageStepped(input: QuantityInput, value: number, direction: 1 | -1): number {
  if (input.series && value > 0) return limited(input, nextPreferred(input.series, value, direction));
  return stepped(input, value, direction, 10);
}
