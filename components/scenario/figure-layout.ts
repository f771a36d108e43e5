import { FIGURE_LIST, type FigureName } from "@/lib/explain/figure-list";

/** The figures that matter most, two a line, with labels short enough for half a column; the rest follow on request. */
export const MAIN_FIGURES: readonly { name: FigureName; label: string }[] = [
  { name: "motorMeanA", label: "Average" },
  { name: "motorRmsA", label: "RMS" },
  { name: "motorRippleA", label: "Ripple" },
  { name: "motorPeakA", label: "Peak" },
  { name: "shuntAW", label: "Loss, shunt A" },
  { name: "shuntBW", label: "Loss, shunt B" },
];

/** These have a line of their own. */
const WIDE: readonly FigureName[] = ["headroomV", "reconstructionErrorMaxA"];

const SHORT: Partial<Record<FigureName, string>> = {
  speedMeanRadPerS: "Speed",
  torqueMeanNm: "Torque",
  commutationRippleHz: "Brush ripple",
  topARmsA: "Upper rail A, RMS",
  topBRmsA: "Upper rail B, RMS",
  switchesW: "Loss, switches",
  busMaxV: "Highest bus",
  inputW: "From the supply",
  copperW: "Loss, copper",
  mechanicalW: "Mechanical",
  supplyMeanA: "Supply, average",
  outAMeanV: "Output A",
  outBMeanV: "Output B",
  differenceMeanV: "Difference",
  combinedMeanV: "Combined",
  clippedShare: "Time clipped",
  reconstructionErrorMeanA: "Average error",
  energyResidualShare: "Energy residual",
};

const isShownAbove = (name: FigureName): boolean =>
  WIDE.includes(name) || MAIN_FIGURES.some((figure) => figure.name === name);

export const MORE_FIGURES: readonly { name: FigureName; label: string }[] = FIGURE_LIST.filter(
  ({ name }) => !isShownAbove(name),
).map(({ name, label }) => ({ name, label: SHORT[name] ?? label }));

/** Figures whose sign says a direction: a plus is written too. */
const SIGNED: readonly FigureName[] = [
  "motorMeanA",
  "supplyMeanA",
  "reconstructionErrorMeanA",
  "torqueMeanNm",
  "speedMeanRadPerS",
];
export const withSign = (name: FigureName, value: number | null, number: string): string =>
  value !== null && value > 0 && SIGNED.includes(name) ? `+${number}` : number;
