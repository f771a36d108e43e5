import type { ScenarioDocument } from "@/lib/scenario/schema";
import { converterFacts, gainText, hasLegShunts, sensitivity, shuntText, text, windowText } from "./facts";
import type { FigureName } from "./figure-list";
import type { Explainer } from "./figures";

const CHANNEL = "Ohm's law at the shunt; gain and clipping of an amplifier with its one pole, and the filter's.";

const clamp = ({ sensing }: ScenarioDocument): string =>
  `${text(sensing.amplifier.outputMinV, "V")} to ${text(sensing.amplifier.outputMaxV, "V")}`;

const rectified = ({ sensing }: ScenarioDocument): string =>
  sensing.amplifier.response === "unipolar" ? "max(0, R_s i_A + V_os)" : "R_s i_A + V_os";

const legOutput =
  (leg: "A" | "B"): Explainer =>
  (document, simulation, result) => ({
    formula: `v_out${leg} = clip( G · ${rectified(document).replace("i_A", hasLegShunts(document) ? `i_${leg}` : "i_s")} ), averaged`,
    withValues: `${gainText(document)}, ${shuntText(document)}: ${text(sensitivity(document), "V/A")}; pin ${clamp(document)}; from ${windowText(simulation)}: ${result}`,
    source: CHANNEL,
  });

const ERROR_FORMULA = "î = (code · LSB − V_zero)/(G R_s);  e = î − i at the sample instant";

const reconstruction =
  (ending: string, source: string): Explainer =>
  (document, _, result) => {
    const { lsbV, zeroV } = converterFacts(document);
    return {
      formula: ERROR_FORMULA,
      withValues: `LSB = ${text(lsbV, "V")}, V_zero = ${text(zeroV, "V")}, G R_s = ${text(sensitivity(document), "V/A")}, so one LSB is ${text(lsbV / sensitivity(document), "A")}; ${ending}: ${result}`,
      source,
    };
  };

export const OUTPUT_EXPLAINERS = {
  outAMeanV: legOutput("A"),
  outBMeanV: legOutput("B"),
  differenceMeanV: (document, { figures }, result) => {
    const isCrossed = document.sensing.site === "legBottom";
    const [first, second] = isCrossed ? [figures.outBMeanV, figures.outAMeanV] : [figures.outAMeanV, figures.outBMeanV];
    return {
      formula: isCrossed ? "v_d = v_outB − v_outA" : "v_d = v_outA − v_outB",
      withValues: `${text(first, "V")} − ${text(second, "V")} = ${result}`,
      source: `Definition of a differential reading${isCrossed ? "; crossed for shunts at the bottom, so that forward is up (decision of this product)" : ""}.`,
    };
  },
  combinedMeanV: (document, simulation, result) => {
    const { site, reference } = document.sensing;
    const pair = !hasLegShunts(document) ? "u" : site === "legBottom" ? "(u_B − u_A)" : "(u_A − u_B)";
    return {
      formula: `v_c = clip( V_ref + G · ${pair} ), averaged`,
      withValues: `V_ref = ${text(reference?.voltageV ?? null, "V")}, ${gainText(document)}, ${shuntText(document)}; from ${windowText(simulation)}: ${result}`,
      source: "Superposition in a summing amplifier; up for forward, down for reverse, the reference at zero.",
    };
  },
  headroomV: (document, simulation, result) => {
    const isMidscale = document.sensing.amplifier.arrangement.endsWith("Midscale");
    return {
      formula: isMidscale
        ? "V_h = min over the window of min(V_max − v, v − V_min)"
        : "V_h = min over the window of V_max − v",
      withValues: `pin ${clamp(document)}; worst of the outputs that the converter reads, from ${windowText(simulation)}: ${result}`,
      source: isMidscale
        ? HEADROOM_SOURCE
        : `${HEADROOM_SOURCE} An output from ground up rests at its floor, so only the ceiling counts.`,
    };
  },
  clippedShare: (document, simulation, result) => ({
    formula: "s_c = time with at least one read output beyond its limits / length of the window",
    withValues: `pin ${clamp(document)}, beyond by more than 1 nV; from ${windowText(simulation)}: ${result}`,
    source: "Decision of this product. The 1 nV keep rounding of an output at rest from counting.",
  }),
  reconstructionErrorMeanA: reconstruction(
    "average over the conversions in the window, with its sign",
    "Quantisation of an ideal converter, half up; nominal gain, shunt and reference. Signed mean: decision of this product.",
  ),
  reconstructionErrorMaxA: reconstruction(
    "largest magnitude over the conversions in the window",
    "Quantisation of an ideal converter, half up; nominal gain, shunt and reference. Largest magnitude: decision of this product.",
  ),
} satisfies Partial<Record<FigureName, Explainer>>;

const HEADROOM_SOURCE = "Decision of this product: the smallest distance to a limit that matters.";
