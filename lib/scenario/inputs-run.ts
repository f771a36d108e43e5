import { choiceInput, linear, log, partInput, quantityInput } from "./input-parts";
import type { Input } from "./input-types";
import type { Fault, ScenarioDocument } from "./schema";

const hasWindow = (document: ScenarioDocument) => document.run.window !== undefined;

const run: Input[] = [
  quantityInput("run", "run.durationS", { label: "Length", symbol: "t_end", slider: log(1e-4, 1) }),
  partInput("run", "run.window", {
    label: "Own window for figures",
    help: "Otherwise the last 20 whole periods.",
    isDetail: true,
  }),
  quantityInput("run", "run.window.fromS", { label: "Window from", applies: hasWindow, isDetail: true }),
  quantityInput("run", "run.window.toS", { label: "Window to", applies: hasWindow, isDetail: true }),
];

/** A parameter is editable if the fault of the row has it. */
const has = (field: string) => (document: ScenarioDocument, index?: number) => {
  const fault: Fault | undefined = document.faults[index ?? 0];
  return fault !== undefined && Object.hasOwn(fault, field);
};

const faults: Input[] = [
  choiceInput("faults", "faults.*.kind", { label: "Fault" }),
  quantityInput("faults", "faults.*.atS", { label: "From" }),
  choiceInput("faults", "faults.*.leg", { label: "Leg", applies: has("leg") }),
  choiceInput("faults", "faults.*.side", { label: "Switch", applies: has("side") }),
  quantityInput("faults", "faults.*.coulombNm", {
    label: "Friction reached",
    symbol: "T_C",
    applies: has("coulombNm"),
  }),
  quantityInput("faults", "faults.*.overS", { label: "Over", applies: has("overS") }),
  quantityInput("faults", "faults.*.factor", { label: "Factor", slider: log(0.1, 10), applies: has("factor") }),
  quantityInput("faults", "faults.*.resistanceFactor", {
    label: "Resistance factor",
    slider: linear(0.05, 1, 0.01),
    applies: has("resistanceFactor"),
  }),
  quantityInput("faults", "faults.*.inductanceFactor", {
    label: "Inductance factor",
    slider: linear(0.05, 1, 0.01),
    applies: has("inductanceFactor"),
  }),
  quantityInput("faults", "faults.*.torqueFactor", {
    label: "Torque factor",
    slider: linear(0, 1, 0.01),
    applies: has("torqueFactor"),
  }),
  quantityInput("faults", "faults.*.deltaV", { label: "Shift", applies: has("deltaV") }),
  quantityInput("faults", "faults.*.voltageV", { label: "Voltage", applies: has("voltageV") }),
];

export const RUN_INPUTS: readonly Input[] = [...run, ...faults];
