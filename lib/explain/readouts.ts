import type { InstantReading } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { gainText, hasLegShunts, shuntText, text, type Explanation } from "./facts";
import { readoutEntry, type ReadoutName } from "./figure-list";

type ReadoutExplainer = (
  document: ScenarioDocument,
  reading: InstantReading,
  result: string,
) => Omit<Explanation, "title">;

const KCL = "Kirchhoff's current law with the conduction state of the leg.";

const terminal =
  (leg: "A" | "B"): ReadoutExplainer =>
  (_, reading, result) => ({
    formula: "v = rail voltage ∓ drop of the channel or diode that conducts and of the shunt in its rail",
    withValues: `leg ${leg} conducts in its ${reading.state[leg]}, ${text(reading.motorCurrentA, "A")} in the motor: ${result}`,
    source: "Ohm's law and Kirchhoff's voltage law; a diode is a voltage and a resistance.",
  });

const rail =
  (leg: "A" | "B", side: "top" | "bottom"): ReadoutExplainer =>
  (_, reading, result) => ({
    formula:
      side === "top"
        ? `i_top${leg} = ${leg === "A" ? "+" : "−"}i while leg ${leg} is high, else 0`
        : `i_bottom${leg} = ${leg === "A" ? "−" : "+"}i while leg ${leg} is low, else 0`,
    withValues: `leg ${leg}: ${reading.state[leg]}, i = ${text(reading.motorCurrentA, "A")}: ${result}`,
    source: KCL,
  });

const across: ReadoutExplainer = (document, _, result) => ({
  formula: "v_s = R_s(T) i + L_s di/dt, with the commutation ramp",
  withValues: `${shuntText(document)}, L_s = ${text(document.sensing.shunt.inductanceH, "H")}: ${result}`,
  source: "Ohm's law and Faraday's law; the linear ramp is a decision of this product.",
});

const output: ReadoutExplainer = (document, _, result) => ({
  formula:
    document.sensing.amplifier.response === "unipolar"
      ? "v_out = clip( G · max(0, v_s + V_os) ) after the poles"
      : "v_out = clip( G · (v_s + V_os) ) after the poles",
  withValues: `${gainText(document)}, V_os = ${text(document.sensing.amplifier.offsetV, "V")}, pin ${text(document.sensing.amplifier.outputMinV, "V")} to ${text(document.sensing.amplifier.outputMaxV, "V")}: ${result}`,
  source: "Amplifier with one pole and clipping, then the filter's pole.",
});

const EXPLAINERS: Record<ReadoutName, ReadoutExplainer> = {
  dutyCommand: (_, reading, result) => ({
    formula: "u held from the start of each PWM period",
    withValues: `period that contains ${text(reading.timeS, "s", 6)}: ${result}`,
    source: "Regular sampling of a PWM modulator; textbook of power electronics.",
  }),
  motorCurrentA: ({ load }, reading, result) => ({
    formula:
      load.kind === "motor"
        ? "L di/dt = v_A − v_B − R i − K_e ω"
        : load.kind === "inductive"
          ? "L di/dt = v_A − v_B − R i"
          : "i = (v_A − v_B)/R",
    withValues: `v_A − v_B = ${text(reading.terminalAV - reading.terminalBV, "V")}, ω = ${text(reading.speedRadPerS, "rad/s")}: i = ${result}`,
    source: "Kirchhoff's voltage law, solved exactly between events.",
  }),
  speedRadPerS: ({ load }, reading, result) => ({
    formula: "J dω/dt = K_t i − B ω − T_C sgn ω − T_load",
    withValues:
      load.kind === "motor"
        ? `K_t i = ${text(load.motor.torqueConstantNmPerA * reading.motorCurrentA, "N·m")}: ω = ${result}`
        : "this load has no shaft",
    source: "Newton's second law for rotation.",
  }),
  busV: ({ supply }, reading, result) => ({
    formula:
      supply.busCapacitanceF > 0 && supply.resistanceOhm > 0
        ? "C_bus dv_bus/dt = i_s − i_bridge"
        : "v_bus = V_s − R_src i_s",
    withValues: `V_s = ${text(supply.voltageV, "V")}, i_s = ${text(reading.supplyA, "A")}, i_bridge = ${text(reading.bridgeA, "A")}: ${result}`,
    source: "Kirchhoff's current law at the bus.",
  }),
  terminalAV: terminal("A"),
  terminalBV: terminal("B"),
  topAA: rail("A", "top"),
  topBA: rail("B", "top"),
  bottomAA: rail("A", "bottom"),
  bottomBA: rail("B", "bottom"),
  supplyA: ({ supply }, reading, result) => ({
    formula: "i_s = (V_s − v_bus)/R_src, or i_bridge without a bus capacitor",
    withValues: `V_s = ${text(supply.voltageV, "V")}, v_bus = ${text(reading.busV, "V")}, R_src = ${text(supply.resistanceOhm, "Ω")}: ${result}`,
    source: "Ohm's law at the source.",
  }),
  bridgeA: (_, reading, result) => ({
    formula: "i_bridge = i_topA + i_topB",
    withValues: `${text(reading.topAA, "A")} + ${text(reading.topBA, "A")} = ${result}`,
    source: "Kirchhoff's current law.",
  }),
  senseAV: across,
  senseBV: across,
  outAV: output,
  outBV: output,
  differenceV: (document, reading, result) => {
    const isCrossed = document.sensing.site === "legBottom";
    const [first, second] = isCrossed ? [reading.outBV, reading.outAV] : [reading.outAV, reading.outBV];
    return {
      formula: isCrossed ? "v_d = v_outB − v_outA" : "v_d = v_outA − v_outB",
      withValues: `${text(first, "V")} − ${text(second, "V")} = ${result}`,
      source: "Definition of a differential reading; forward is up.",
    };
  },
  combinedV: (document, _, result) => ({
    formula: hasLegShunts(document)
      ? "v_c = clip( V_ref + G · (u_A − u_B) ), crossed for shunts at the bottom"
      : "v_c = clip( V_ref + G · u )",
    withValues: `V_ref = ${text(document.sensing.reference?.voltageV ?? null, "V")}, ${gainText(document)}, ${shuntText(document)}: ${result}`,
    source: "Superposition in a summing amplifier.",
  }),
};

/** The "why" of a quantity at one instant. */
export function explainReadout(name: ReadoutName, document: ScenarioDocument, reading: InstantReading): Explanation {
  const { label, unit, digits } = readoutEntry(name);
  const value = reading[name];
  const explanation = EXPLAINERS[name](document, reading, text(value, unit, digits));
  return {
    title: label,
    ...explanation,
    ...(value === null ? { withValues: "The site or the arrangement has no such output." } : {}),
  };
}
