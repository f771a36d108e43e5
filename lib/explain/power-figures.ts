import type { Simulation } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { shuntText, text, windingText, windowText } from "./facts";
import type { FigureName } from "./figure-list";
import type { Explainer } from "./figures";

const JOULE = "Joule's law and the definition of mean power (IEC 60050-131).";
const RAILS =
  "Kirchhoff's current law with the conduction state of each leg; root-mean-square value as in IEC 60050-103.";

const railRms =
  (leg: "A" | "B"): Explainer =>
  (_, simulation, result) => ({
    formula: `I_top${leg} = √( 1/(t₂ − t₁) ∫ i_top${leg}² dt ),  i_top${leg} = ${leg === "A" ? "+" : "−"}i while leg ${leg} is high, 0 while it is low`,
    withValues: `from ${windowText(simulation)}, of ${text(simulation.figures.motorRmsA, "A")} in the motor: I_top${leg} = ${result}`,
    source: RAILS,
  });

/** RMS current of a shunt from its own dissipation: what the power says, not a second computation. */
function shuntLoss(leg: "A" | "B", document: ScenarioDocument, { figures }: Simulation, result: string): string {
  const power = leg === "A" ? figures.shuntAW : figures.shuntBW;
  const { resistanceOhm, tcrPpmPerK, ratingW } = document.sensing.shunt;
  const currentA = power === null ? null : Math.sqrt(power / resistanceOhm);
  const drift = tcrPpmPerK === 0 ? "" : `, at ${text(tcrPpmPerK, "ppm/K")} from 25 °C`;
  return `${shuntText(document)}${drift}, I_rms ≈ ${text(currentA, "A")}: P = ${result} of ${text(ratingW, "W")} rated`;
}

const shuntPower =
  (leg: "A" | "B"): Explainer =>
  (document, simulation, result) => ({
    formula: "P = R_s(T) · I_rms²,  R_s(T) = R_25 (1 + TCR (T − 25 °C))",
    withValues: shuntLoss(leg, document, simulation, result),
    source: JOULE,
  });

export const POWER_EXPLAINERS = {
  topARmsA: railRms("A"),
  topBRmsA: railRms("B"),
  shuntAW: shuntPower("A"),
  shuntBW: shuntPower("B"),
  switchesW: ({ bridge }, simulation, result) => ({
    formula: "P_sw = mean of Σ r_on i² (channels) + Σ (V_F + r_d |i|) |i| (diodes)",
    withValues: `r_on ${text(bridge.highSide.onResistanceOhm, "Ω")} high, ${text(bridge.lowSide.onResistanceOhm, "Ω")} low; V_F ${text(bridge.highSide.diodeForwardV, "V")}, ${text(bridge.lowSide.diodeForwardV, "V")}; from ${windowText(simulation)}: ${result}`,
    source: `${JOULE} Conduction only: switching losses are not part of the model.`,
  }),
  busMaxV: ({ supply }, simulation, result) => ({
    formula:
      supply.busCapacitanceF > 0 && supply.resistanceOhm > 0
        ? "C_bus dv_bus/dt = i_s − i_bridge"
        : "v_bus = V_s − R_src i_s",
    withValues: `V_s = ${text(supply.voltageV, "V")}, R_src = ${text(supply.resistanceOhm, "Ω")}, C_bus = ${text(supply.busCapacitanceF, "F")}; highest from ${windowText(simulation)}: ${result}`,
    source: "Kirchhoff's current law at the bus; source behind its resistance.",
  }),
  inputW: ({ supply }, { figures }, result) => ({
    formula: "P_in = V_s · ī_s",
    withValues: `${text(supply.voltageV, "V")} · ${text(figures.supplyMeanA, "A")} = ${result}`,
    source:
      "Definition of mean power at a constant voltage. Taken at the ideal source, before its resistance; a sag during the window is counted at its own voltage.",
  }),
  copperW: (document, { figures }, result) => {
    const winding = windingText(document);
    return {
      formula: "P_Cu = R(ϑ) · I_rms²,  R(ϑ) = R_20 (1 + 0.00393 (ϑ − 20 °C))",
      withValues: `${winding.text}; ${text(winding.ohm, "Ω")} · (${text(figures.motorRmsA, "A")})² = ${result}`,
      source:
        "Joule's law; temperature coefficient of copper at 20 °C from IEC 60028. Faults and warming during the run are in the result.",
    };
  },
  mechanicalW: ({ load }, { figures }, result) => ({
    formula: "P_m = mean of K_t i ω",
    withValues:
      load.kind === "motor"
        ? `K_t = ${text(load.motor.torqueConstantNmPerA, "N·m/A")}, ī = ${text(figures.motorMeanA, "A")}, ω̄ = ${text(figures.speedMeanRadPerS, "rad/s")}: ${result}; negative means the motor brakes`
        : "this load has no shaft: 0 W",
    source: "Electromagnetic power of the permanent-magnet DC motor, friction included; textbook of electric drives.",
  }),
  supplyMeanA: ({ supply }, simulation, result) => ({
    formula: "ī_s = 1/(t₂ − t₁) ∫ i_s dt,  i_s = i_topA + i_topB without a bus capacitor",
    withValues: `out of the source of ${text(supply.voltageV, "V")}, from ${windowText(simulation)}: ${result}; negative means it takes current back`,
    source: "Definition of the mean value (IEC 60050-103); Kirchhoff's current law.",
  }),
  energyResidualShare: (_, simulation, result) => ({
    formula:
      "r_E = |E_in − losses − friction and load work − change of ½ L i² + ½ J ω² + ½ C v²| / sum of the magnitudes",
    withValues: `over ${windowText(simulation)}: ${result}; below 10^-6 the run can be trusted to have lost no energy`,
    source: "Conservation of energy; the scale is a decision of this product.",
  }),
} satisfies Partial<Record<FigureName, Explainer>>;
