import { choiceInput, detail, flagInput, linear, log, quantityInput } from "./input-parts";
import type { Input } from "./input-types";
import type { ScenarioDocument } from "./schema";

const isScheme = (scheme: ScenarioDocument["pwm"]["scheme"]) => (document: ScenarioDocument) =>
  document.pwm.scheme === scheme;
const isNotAntiphase = (document: ScenarioDocument) => document.pwm.scheme !== "lockedAntiphase";
const hasBusState = (document: ScenarioDocument) =>
  document.supply.busCapacitanceF > 0 && document.supply.resistanceOhm > 0;

const supply: Input[] = [
  quantityInput("supply", "supply.voltageV", { label: "Voltage", symbol: "V_s", slider: linear(5, 60, 0.5) }),
  quantityInput("supply", "supply.resistanceOhm", {
    label: "Source resistance",
    symbol: "R_src",
    slider: linear(0, 0.5, 0.005),
  }),
  quantityInput("supply", "supply.busCapacitanceF", {
    label: "Bus capacitance",
    symbol: "C_bus",
    series: "E12",
    slider: linear(0, 4.7e-3, 1e-4),
  }),
  flagInput("supply", "supply.acceptsReturn", {
    label: "Takes current back",
    help: "A rectifier does not: the bus then rises while the motor regenerates.",
  }),
  quantityInput("supply", "initial.busV", {
    label: "Bus voltage at the start",
    isOptional: true,
    isDetail: true,
    applies: hasBusState,
  }),
];

const device = (side: "high" | "low"): Input[] => [
  quantityInput("bridge", `bridge.${side}Side.onResistanceOhm`, {
    label: `On-resistance, ${side}`,
    symbol: side === "high" ? "r_H" : "r_L",
    slider: linear(0, 0.2, 0.001),
  }),
  ...detail([
    quantityInput("bridge", `bridge.${side}Side.diodeForwardV`, {
      label: `Diode voltage, ${side}`,
      symbol: side === "high" ? "V_FH" : "V_FL",
      slider: linear(0, 1.5, 0.01),
    }),
    quantityInput("bridge", `bridge.${side}Side.diodeResistanceOhm`, {
      label: `Diode resistance, ${side}`,
      symbol: side === "high" ? "r_dH" : "r_dL",
      slider: linear(0, 0.1, 0.001),
    }),
  ]),
];

const bridge: Input[] = [
  choiceInput("bridge", "pwm.scheme", { label: "Idle path" }),
  quantityInput("bridge", "pwm.mixedFastShare", {
    label: "Fast share",
    symbol: "m",
    unit: "share",
    slider: linear(0, 1, 0.01),
    applies: isScheme("mixedDecay"),
  }),
  quantityInput("bridge", "pwm.frequencyHz", { label: "PWM frequency", symbol: "f_PWM", slider: log(1e3, 1e5) }),
  choiceInput("bridge", "pwm.alignment", {
    label: "Alignment",
    applies: (document) => document.pwm.scheme !== "mixedDecay",
  }),
  flagInput("bridge", "pwm.synchronous", {
    label: "Synchronous",
    help: "Off: the diode of the recirculating switch carries the current.",
    applies: isNotAntiphase,
  }),
  quantityInput("bridge", "bridge.deadTimeS", { label: "Dead time", symbol: "t_d", slider: linear(0, 5e-6, 5e-8) }),
  ...device("high"),
  ...device("low"),
  quantityInput("bridge", "bridge.commutationS", {
    label: "Commutation time",
    symbol: "t_c",
    slider: linear(0, 5e-7, 1e-8),
    isDetail: true,
    help: "Time in which a leg's current moves from one rail to the other, as the shunt sees it.",
  }),
];

const command: Input[] = [
  quantityInput("command", "command.points.*.timeS", { label: "At", symbol: "t", applies: (_, index) => index !== 0 }),
  quantityInput("command", "command.points.*.duty", {
    label: "Duty",
    symbol: "D",
    unit: "share",
    slider: linear(-1, 1, 0.01),
  }),
  choiceInput("command", "command.points.*.ramp", { label: "Reached by", applies: (_, index) => index !== 0 }),
  choiceInput("command", "command.reversal.kind", { label: "Reverses", applies: isNotAntiphase }),
  quantityInput("command", "command.reversal.dwellS", {
    label: "Dwell",
    symbol: "t_r",
    slider: linear(0, 5e-3, 5e-5),
    applies: (document) => isNotAntiphase(document) && document.command.reversal.kind !== "direct",
  }),
  choiceInput("command", "command.special.*.action", { label: "Action" }),
  quantityInput("command", "command.special.*.fromS", { label: "From" }),
  quantityInput("command", "command.special.*.toS", { label: "To" }),
];

export const DRIVE_INPUTS: readonly Input[] = [...supply, ...bridge, ...command];
