import type { QuantityInput } from "@/lib/scenario/inputs";
import { sliderPosition } from "@/lib/scenario/sliders";
import { nearestPreferred, nextPreferred } from "@/lib/units/preferred";

/** More ticks than this run together on a hairline. */
const MOST = 60;

/** Where preferred values sit along a slider, 0 to 1: every one, or those of each decade if there are too many. */
export function preferredPositions({ slider, series }: QuantityInput): number[] {
  if (!slider || !series || slider.scale !== "log") return [];
  const all: number[] = [];
  for (let value = nearestPreferred(series, slider.min); value <= slider.max; value = nextPreferred(series, value, 1)) {
    if (value >= slider.min) all.push(value);
  }
  const isDecade = (value: number) => /^1e/.test(value.toExponential());
  return (all.length <= MOST ? all : all.filter(isDecade)).map((value) => sliderPosition(slider, value));
}
