import { choiceInput, detail, flagInput, linear, log, partInput, quantityInput } from "./input-parts";
import type { Input } from "./input-types";
import type { Motor, MotorLoad, ScenarioDocument } from "./schema";

const motorLoad = (document: ScenarioDocument): MotorLoad | undefined =>
  document.load.kind === "motor" ? document.load : undefined;
const isMotor = (document: ScenarioDocument) => document.load.kind === "motor";
const isPlain = (document: ScenarioDocument) => document.load.kind !== "motor";
const has = (part: "thermal" | "commutation") => (document: ScenarioDocument) =>
  motorLoad(document)?.motor[part] !== undefined;
const hasGear = (document: ScenarioDocument) => motorLoad(document)?.gear !== undefined;
const canTurn = (document: ScenarioDocument) => motorLoad(document)?.motor.locked === false;

type MotorField = Extract<keyof Motor, string>;
const motorPath = (field: MotorField) => `load.motor.${field}`;

const motor: Input[] = [
  quantityInput("load", motorPath("resistanceOhm"), {
    label: "Resistance",
    symbol: "R",
    slider: log(0.05, 20),
    applies: isMotor,
    help: "Of the winding and brushes, at 20 °C.",
  }),
  quantityInput("load", motorPath("inductanceH"), {
    label: "Inductance",
    symbol: "L",
    slider: log(2e-5, 2e-2),
    applies: isMotor,
  }),
  quantityInput("load", motorPath("torqueConstantNmPerA"), {
    label: "Torque constant",
    symbol: "K_t",
    slider: log(1e-3, 1),
    applies: isMotor,
  }),
  quantityInput("load", motorPath("inertiaKgM2"), {
    label: "Rotor inertia",
    symbol: "J",
    slider: log(1e-7, 1e-2),
    applies: isMotor,
  }),
  ...detail([
    quantityInput("load", motorPath("backEmfVPerRadPerS"), {
      label: "Back-EMF constant",
      symbol: "K_e",
      slider: log(1e-3, 1),
      applies: isMotor,
    }),
    quantityInput("load", motorPath("viscousNmPerRadPerS"), {
      label: "Viscous friction",
      symbol: "B",
      slider: linear(0, 1e-3, 1e-6),
      applies: isMotor,
    }),
    quantityInput("load", motorPath("coulombNm"), {
      label: "Coulomb friction",
      symbol: "T_C",
      slider: linear(0, 0.1, 1e-3),
      applies: isMotor,
    }),
    quantityInput("load", motorPath("staticNm"), {
      label: "Static friction",
      symbol: "T_st",
      slider: linear(0, 0.1, 1e-3),
      applies: isMotor,
    }),
    quantityInput("load", motorPath("temperatureC"), {
      label: "Winding temperature",
      symbol: "ϑ_w",
      slider: linear(-40, 155, 1),
      applies: isMotor,
    }),
    flagInput("load", "load.motor.locked", { label: "Rotor locked", applies: isMotor }),
    partInput("load", "load.motor.thermal", { label: "Winding warms up", applies: isMotor }),
    quantityInput("load", "load.motor.thermal.resistanceKPerW", {
      label: "Thermal resistance",
      symbol: "R_th",
      slider: log(0.1, 100),
      applies: has("thermal"),
    }),
    quantityInput("load", "load.motor.thermal.capacityJPerK", {
      label: "Heat capacity",
      symbol: "C_th",
      slider: log(0.1, 1000),
      applies: has("thermal"),
    }),
    quantityInput("load", "load.motor.thermal.ambientC", {
      label: "Ambient",
      symbol: "ϑ_a",
      slider: linear(-40, 85, 1),
      applies: has("thermal"),
    }),
    partInput("load", "load.motor.commutation", {
      label: "Commutator known",
      applies: isMotor,
      help: "Gives the ripple frequency, from which speed can be told.",
    }),
    quantityInput("load", "load.motor.commutation.barsCount", { label: "Bars", applies: has("commutation") }),
    quantityInput("load", "load.motor.commutation.rippleShare", {
      label: "Ripple",
      unit: "share",
      applies: has("commutation"),
    }),
  ]),
];

const plain: Input[] = [
  quantityInput("load", "load.resistanceOhm", {
    label: "Resistance",
    symbol: "R",
    slider: log(0.1, 100),
    applies: isPlain,
  }),
  quantityInput("load", "load.inductanceH", {
    label: "Inductance",
    symbol: "L",
    slider: log(1e-5, 1),
    applies: (document) => document.load.kind === "inductive",
  }),
];

/** A shaft load's entry of this row. */
const entry = (document: ScenarioDocument, index: number | undefined) => motorLoad(document)?.shaft[index ?? 0];

const shaft: Input[] = [
  quantityInput("shaft", "initial.speedRadPerS", {
    label: "Speed at the start",
    symbol: "ω_0",
    slider: linear(-600, 600, 1),
    applies: canTurn,
  }),
  choiceInput("shaft", "load.shaft.*.kind", { label: "Load", applies: isMotor }),
  quantityInput("shaft", "load.shaft.*.value", {
    label: "Size",
    applies: (document, index) => isMotor(document) && entry(document, index)?.kind !== "none",
  }),
  quantityInput("shaft", "load.shaft.*.timeS", { label: "From", symbol: "t", applies: isMotor }),
  partInput("shaft", "load.gear", { label: "Gear", applies: isMotor, isDetail: true }),
  ...detail([
    quantityInput("shaft", "load.gear.ratio", { label: "Ratio", symbol: "n", slider: log(1, 200), applies: hasGear }),
    quantityInput("shaft", "load.gear.efficiency", {
      label: "Efficiency",
      symbol: "η",
      unit: "share",
      slider: linear(0.2, 1, 0.01),
      applies: hasGear,
    }),
    quantityInput("shaft", "load.gear.loadInertiaKgM2", {
      label: "Inertia at the output",
      symbol: "J_L",
      isOptional: true,
      applies: hasGear,
    }),
  ]),
];

export const LOAD_INPUTS: readonly Input[] = [
  choiceInput("load", "load.kind", { label: "Load" }),
  quantityInput("load", "initial.currentA", {
    label: "Current at the start",
    symbol: "i_0",
    slider: linear(-20, 20, 0.1),
    isDetail: true,
    applies: (document) => document.load.kind !== "resistive",
  }),
  ...motor,
  ...plain,
  ...shaft,
];
