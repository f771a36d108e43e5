import { lsbV } from "@/lib/engine/index";
import type { Simulation } from "@/lib/engine/results";
import { formatQuantity } from "@/lib/units/format";
import { gainOf, isLegSite, type ScenarioDocument } from "@/lib/scenario/schema";

/** Numbers that several explanations put in, as text and as value. */

export type Explanation = {
  title: string;
  /** Plain text with Unicode signs. */
  formula: string;
  /** The same with the numbers of this run. */
  withValues: string;
  /** Where the formula is from: a standard, a textbook law, or a decision of this product, said as it is. */
  source: string;
};

export const text = (value: number | null, unit: string, digits = 4): string =>
  formatQuantity(value, unit, { digits }).text;

export const windowText = ({ window }: Simulation): string => `${text(window.fromS, "s")} to ${text(window.toS, "s")}`;

export const gainText = ({ sensing }: ScenarioDocument): string => {
  const { gain } = sensing.amplifier;
  const value = text(gainOf(sensing.amplifier), "V/V");
  return "fixed" in gain
    ? `G = ${value}`
    : `G = R_out/R_in = ${text(gain.outOhm, "Ω")}/${text(gain.inOhm, "Ω")} = ${value}`;
};

export const shuntText = ({ sensing }: ScenarioDocument): string => `R_s = ${text(sensing.shunt.resistanceOhm, "Ω")}`;

/** G R_s, in volts per ampere. */
export const sensitivity = ({ sensing }: ScenarioDocument): number =>
  gainOf(sensing.amplifier) * sensing.shunt.resistanceOhm;

export const hasLegShunts = ({ sensing }: ScenarioDocument): boolean => isLegSite(sensing.site);

export const isMidscale = ({ sensing }: ScenarioDocument): boolean =>
  sensing.amplifier.arrangement === "combinedMidscale" || sensing.amplifier.arrangement === "bipolarMidscale";

/** LSB and zero of the reconstruction (D-22). */
export function converterFacts(document: ScenarioDocument): { lsbV: number; zeroV: number } {
  const { converter, reference } = document.sensing;
  return {
    lsbV: lsbV(converter.bits, converter.fullScaleV, converter.input),
    zeroV: isMidscale(document) && converter.input === "unipolar" ? (reference?.voltageV ?? 0) : 0,
  };
}

/** Copper: 0.393 % per kelvin at 20 °C. */
export const COPPER_PER_K = 0.00393;

/** Resistance that carries the load's current, and how it comes about. */
export function windingText(document: ScenarioDocument): { ohm: number; text: string } {
  const { load } = document;
  if (load.kind !== "motor") return { ohm: load.resistanceOhm, text: `R = ${text(load.resistanceOhm, "Ω")}` };
  const { resistanceOhm, temperatureC, thermal } = load.motor;
  const ohm = resistanceOhm * (1 + COPPER_PER_K * (temperatureC - 20));
  const start = thermal ? " at the start" : "";
  return {
    ohm,
    text: `R = ${text(resistanceOhm, "Ω")} · (1 + 0.00393 · (${temperatureC} − 20)) = ${text(ohm, "Ω")}${start}`,
  };
}
