import type { Figures, InstantReading } from "@/lib/engine/results";
import { formatQuantity, type FormattedQuantity } from "@/lib/units/format";

/** The figures of a run in the order in which every list shows them: panel, copied text, CSV, API documents. */
export type FigureName = keyof Figures;
export type FigureGroup = "Motor" | "Shunts and bridge" | "Power" | "Outputs" | "Reading" | "Run";

export type FigureEntry = {
  name: FigureName;
  label: string;
  symbol: string;
  /** For lib/units; `share` is stored as a fraction and shown in per cent. */
  unit: string;
  /** Significant digits. */
  digits: number;
  group: FigureGroup;
};

const entry = (
  group: FigureGroup,
  name: FigureName,
  label: string,
  symbol: string,
  unit: string,
  digits = 3,
): FigureEntry => ({ name, label, symbol, unit, digits, group });

export const FIGURE_LIST: readonly FigureEntry[] = [
  entry("Motor", "motorMeanA", "Average motor current", "ī", "A"),
  entry("Motor", "motorRmsA", "RMS motor current", "I_rms", "A"),
  entry("Motor", "motorPeakA", "Peak motor current", "Î", "A"),
  entry("Motor", "motorRippleA", "Ripple, peak to peak", "Δi", "A"),
  entry("Motor", "speedMeanRadPerS", "Average speed", "ω", "rad/s", 4),
  entry("Motor", "torqueMeanNm", "Average torque", "T_em", "N·m"),
  entry("Motor", "commutationRippleHz", "Commutation ripple frequency", "f_c", "Hz"),
  entry("Shunts and bridge", "topARmsA", "RMS current, upper rail A", "I_topA", "A"),
  entry("Shunts and bridge", "topBRmsA", "RMS current, upper rail B", "I_topB", "A"),
  entry("Shunts and bridge", "shuntAW", "Dissipation, shunt A", "P_A", "W"),
  entry("Shunts and bridge", "shuntBW", "Dissipation, shunt B", "P_B", "W"),
  entry("Shunts and bridge", "switchesW", "Dissipation, switches and diodes", "P_sw", "W"),
  entry("Shunts and bridge", "busMaxV", "Highest bus voltage", "V_bus", "V", 4),
  entry("Power", "inputW", "Power from the supply", "P_in", "W"),
  entry("Power", "copperW", "Copper loss", "P_Cu", "W"),
  entry("Power", "mechanicalW", "Mechanical power", "P_m", "W"),
  entry("Power", "supplyMeanA", "Average supply current", "I_s", "A"),
  entry("Outputs", "outAMeanV", "Average output A", "V_A", "V", 4),
  entry("Outputs", "outBMeanV", "Average output B", "V_B", "V", 4),
  entry("Outputs", "differenceMeanV", "Average difference", "V_d", "V", 4),
  entry("Outputs", "combinedMeanV", "Average combined output", "V_c", "V", 4),
  entry("Outputs", "headroomV", "Headroom", "V_h", "V"),
  entry("Outputs", "clippedShare", "Time clipped", "s_c", "share"),
  entry("Reading", "reconstructionErrorMeanA", "Reconstructed current, average error", "ē", "A"),
  entry("Reading", "reconstructionErrorMaxA", "Reconstructed current, worst error", "e_max", "A"),
  entry("Run", "energyResidualShare", "Energy balance, residual", "r_E", ""),
];

const SINGLE_SHUNT_LABELS: Partial<Record<FigureName, string>> = {
  shuntAW: "Dissipation, shunt",
  outAMeanV: "Average output",
};

/** The label for this document: a single shunt has no letter. */
export function figureLabel(name: FigureName, hasLegShunts: boolean): string {
  const own = hasLegShunts ? undefined : SINGLE_SHUNT_LABELS[name];
  return own ?? FIGURE_LIST.find((figure) => figure.name === name)!.label;
}

/** A figure as it is shown everywhere; a dash where this run has none. */
export function formatFigure(name: FigureName, value: number | null): FormattedQuantity {
  const { unit, digits } = FIGURE_LIST.find((figure) => figure.name === name)!;
  // The residual is a rounding error: its size matters, not its digits
  if (name === "energyResidualShare" && value !== null) {
    const text = value === 0 ? "0" : value.toExponential(1).replace("e", " × 10^").replace("^+", "^");
    return { number: text, unit: "", text, prefix: "" };
  }
  return formatQuantity(value, unit, { digits, isFixed: value !== 0 });
}

export type ReadoutName = Exclude<keyof InstantReading, "state" | "timeS">;
export type ReadoutEntry = { name: ReadoutName; label: string; symbol: string; unit: string; digits: number };

const readout = (name: ReadoutName, label: string, symbol: string, unit: string, digits = 4): ReadoutEntry => ({
  name,
  label,
  symbol,
  unit,
  digits,
});

/** Quantities of one instant; also the columns of the waveforms' CSV. */
export const READOUT_LIST: readonly ReadoutEntry[] = [
  readout("dutyCommand", "Duty command", "u", "share", 3),
  readout("motorCurrentA", "Motor current", "i", "A"),
  readout("speedRadPerS", "Speed", "ω", "rad/s"),
  readout("busV", "Bus voltage", "v_bus", "V"),
  readout("terminalAV", "Terminal A", "v_A", "V"),
  readout("terminalBV", "Terminal B", "v_B", "V"),
  readout("topAA", "Upper rail A", "i_topA", "A"),
  readout("topBA", "Upper rail B", "i_topB", "A"),
  readout("bottomAA", "Lower rail A", "i_bottomA", "A"),
  readout("bottomBA", "Lower rail B", "i_bottomB", "A"),
  readout("supplyA", "Supply current", "i_s", "A"),
  readout("bridgeA", "Bridge current", "i_bridge", "A"),
  readout("senseAV", "Across shunt A", "v_sA", "V"),
  readout("senseBV", "Across shunt B", "v_sB", "V"),
  readout("outAV", "Output A", "v_outA", "V"),
  readout("outBV", "Output B", "v_outB", "V"),
  readout("differenceV", "Difference", "v_d", "V"),
  readout("combinedV", "Combined output", "v_c", "V"),
];

export const readoutEntry = (name: ReadoutName): ReadoutEntry => READOUT_LIST.find((one) => one.name === name)!;
