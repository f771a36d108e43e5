import type { Figures, Simulation } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { hasLegShunts, text, windowText, type Explanation } from "./facts";
import { figureLabel, formatFigure, type FigureName } from "./figure-list";
import { OUTPUT_EXPLAINERS } from "./output-figures";
import { POWER_EXPLAINERS } from "./power-figures";

export type { Explanation } from "./facts";

/** What an explanation is made of; `result` is the figure as shown, with its unit. */
export type Explainer = (
  document: ScenarioDocument,
  simulation: Simulation,
  result: string,
) => Omit<Explanation, "title">;

const MEAN = "Definition of the mean value (IEC 60050-103).";

const MOTOR_EXPLAINERS = {
  motorMeanA: (_, simulation, result) => ({
    formula: "ī = 1/(t₂ − t₁) ∫ i dt",
    withValues: `from ${windowText(simulation)}: ī = ${result}`,
    source: `${MEAN} The integral is exact between events.`,
  }),
  motorRmsA: (_, simulation, result) => ({
    formula: "I_rms = √( 1/(t₂ − t₁) ∫ i² dt )",
    withValues: `from ${windowText(simulation)}: I_rms = ${result}`,
    source: "Definition of the root-mean-square value (IEC 60050-103).",
  }),
  motorPeakA: (_, simulation, result) => ({
    formula: "Î = max |i|",
    withValues: `largest magnitude from ${windowText(simulation)}: Î = ${result}`,
    source:
      "Decision of this product: the largest magnitude within the window, turning points between events included.",
  }),
  motorRippleA: (_, simulation, result) => ({
    formula: "Δi = max i − min i",
    withValues: `from ${windowText(simulation)}: Δi = ${result}. In steady state with low- or high-side recirculation it is near V (1 − d) d T/L.`,
    source:
      "Definition of the peak-to-valley value (IEC 60050-103), taken over the whole window: a reversal inside the window counts.",
  }),
  speedMeanRadPerS: (_, simulation, result) => {
    const perMinute = (simulation.figures.speedMeanRadPerS * 30) / Math.PI;
    return {
      formula: "ω̄ = 1/(t₂ − t₁) ∫ ω dt;  J dω/dt = K_t i − B ω − T_C sgn ω − T_load",
      withValues: `from ${windowText(simulation)}: ω̄ = ${result} = ${text(perMinute, "", 4)} r/min`,
      source: `${MEAN} Equation of motion: Newton's second law for rotation.`,
    };
  },
  torqueMeanNm: ({ load }, { figures }, result) => ({
    formula: "T_em = K_t ī",
    withValues:
      load.kind === "motor"
        ? `${text(load.motor.torqueConstantNmPerA, "N·m/A")} · ${text(figures.motorMeanA, "A")} = ${result}`
        : "this load has no shaft: 0 N·m",
    source: "Torque law of the permanent-magnet DC motor; textbook of electric drives.",
  }),
  commutationRippleHz: ({ load }, { figures }, result) => {
    const bars = load.kind === "motor" ? load.motor.commutation?.barsCount : undefined;
    if (bars === undefined)
      return {
        formula: "f_c = m · bars · |ω̄|/(2π)",
        withValues: "the number of commutator bars is not given",
        source: RIPPLE_SOURCE,
      };
    const perBar = bars % 2 === 1 ? 2 : 1;
    return {
      formula: "f_c = m · bars · |ω̄|/(2π),  m = 2 for an odd number of bars, 1 for an even one",
      withValues: `${perBar} · ${bars} · ${text(Math.abs(figures.speedMeanRadPerS), "rad/s")}/(2π) = ${result}`,
      source: RIPPLE_SOURCE,
    };
  },
} satisfies Partial<Record<FigureName, Explainer>>;

const RIPPLE_SOURCE =
  "Decision of this product, after common practice with brushed motors: a figure for speed estimates, without effect on the run.";

const EXPLAINERS: Record<FigureName, Explainer> = { ...MOTOR_EXPLAINERS, ...POWER_EXPLAINERS, ...OUTPUT_EXPLAINERS };

/** The "why" of a figure: formula, the numbers of this run put in, and where the formula comes from. */
export function explainFigure(name: FigureName, document: ScenarioDocument, simulation: Simulation): Explanation {
  const value: Figures[FigureName] = simulation.figures[name];
  const title = figureLabel(name, hasLegShunts(document));
  const explanation = EXPLAINERS[name](document, simulation, formatFigure(name, value).text);
  return value === null
    ? {
        title,
        ...explanation,
        withValues: `Not available in this run: ${ABSENT[name] ?? "the site or the arrangement has no such output"}.`,
      }
    : { title, ...explanation };
}

const ABSENT: Partial<Record<FigureName, string>> = {
  commutationRippleHz: "the number of commutator bars is not given",
  energyResidualShare: "a stall takes kinetic energy away at once",
  combinedMeanV: "there is no reference",
  shuntBW: "there is one shunt only",
  reconstructionErrorMeanA: "no conversion falls into the window",
  reconstructionErrorMaxA: "no conversion falls into the window",
};
