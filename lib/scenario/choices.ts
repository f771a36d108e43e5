import type { ScenarioDocument } from "./schema";
import { generalPath } from "./paths";

/** Words of every choice of the document, in plain trade terms. */
export type Choice = { value: string; label: string; hint?: string };

export const CHOICES = {
  "pwm.scheme": [
    {
      value: "lowSideRecirculation",
      label: "Recirculate low side",
      hint: "Slow decay: in the off-time both low switches carry the current.",
    },
    {
      value: "highSideRecirculation",
      label: "Recirculate high side",
      hint: "Slow decay: in the off-time both high switches carry the current.",
    },
    { value: "fastDecay", label: "Fast decay", hint: "In the off-time the current returns to the supply." },
    { value: "mixedDecay", label: "Mixed decay", hint: "Fast decay first, then low-side recirculation." },
    {
      value: "lockedAntiphase",
      label: "Locked antiphase",
      hint: "The two diagonals take turns; half duty is standstill.",
    },
  ],
  "pwm.alignment": [
    { value: "edge", label: "Edge", hint: "The on-time starts with the period." },
    { value: "centre", label: "Centre", hint: "The on-time sits in the middle of the period." },
  ],
  "command.points.*.ramp": [
    { value: "step", label: "Step" },
    { value: "linear", label: "Ramp" },
  ],
  "command.special.*.action": [
    { value: "coast", label: "Coast", hint: "All switches off." },
    { value: "brakeLow", label: "Brake, low side", hint: "Both low switches on." },
    { value: "brakeHigh", label: "Brake, high side", hint: "Both high switches on." },
  ],
  "command.reversal.kind": [
    { value: "direct", label: "Direct" },
    { value: "coast", label: "Coast first", hint: "All switches off for the dwell." },
    { value: "brakeLow", label: "Brake first", hint: "Both low switches on for the dwell." },
  ],
  "load.kind": [
    { value: "motor", label: "Motor" },
    { value: "inductive", label: "Coil", hint: "Resistance and inductance: a solenoid or a valve." },
    { value: "resistive", label: "Resistor", hint: "A heater or a thermoelectric cooler." },
  ],
  "load.shaft.*.kind": [
    { value: "none", label: "No load" },
    { value: "constant", label: "Friction", hint: "Constant, against the motion." },
    { value: "active", label: "Weight", hint: "Constant, always the same way; positive brakes forward motion." },
    { value: "viscous", label: "Viscous", hint: "Grows with speed." },
    { value: "fan", label: "Fan or pump", hint: "Grows with speed squared." },
  ],
  "sensing.site": [
    { value: "legTop", label: "Top of each leg", hint: "A shunt in the upper rail of each leg." },
    { value: "legBottom", label: "Bottom of each leg", hint: "A shunt in the lower rail of each leg." },
    { value: "line", label: "Motor line", hint: "One shunt in series with the motor." },
    { value: "supply", label: "Supply", hint: "One shunt between bus capacitor and bridge." },
    { value: "return", label: "Ground return", hint: "One shunt in the bridge's ground return." },
  ],
  "sensing.amplifier.arrangement": [
    { value: "singleEnded", label: "One by one", hint: "Each output from ground up." },
    { value: "differencePair", label: "Difference", hint: "Both outputs, the converter reads their difference." },
    {
      value: "combinedMidscale",
      label: "Combined, midscale",
      hint: "One output: up for forward, down for reverse, the reference at zero.",
    },
    { value: "bipolarMidscale", label: "Bipolar, midscale", hint: "One bipolar channel around the reference." },
  ],
  "sensing.amplifier.response": [
    { value: "unipolar", label: "Unipolar", hint: "Reads one direction, rests at zero in the other." },
    { value: "bipolar", label: "Bipolar", hint: "Reads both directions." },
  ],
  "sensing.amplifier.gain.kind": [
    { value: "fixed", label: "Fixed" },
    { value: "resistors", label: "Two resistors", hint: "Current-output amplifier: output over input resistor." },
  ],
  "sensing.converter.input": [
    { value: "unipolar", label: "0 to full scale" },
    { value: "differential", label: "Differential", hint: "± full scale." },
  ],
  "faults.*.kind": [
    { value: "stalledRotor", label: "Stalled rotor" },
    { value: "lostLoad", label: "Lost load" },
    { value: "risingFriction", label: "Rising friction" },
    { value: "wornBrushes", label: "Worn brushes" },
    { value: "shortedTurns", label: "Shorted turns" },
    { value: "openWinding", label: "Open winding" },
    { value: "switchStuckOpen", label: "Switch stuck open" },
    { value: "switchShorted", label: "Switch shorted" },
    { value: "shuntOpen", label: "Shunt open" },
    { value: "shuntDrifted", label: "Shunt drifted" },
    { value: "shuntShorted", label: "Shunt shorted" },
    { value: "amplifierOffsetShift", label: "Amplifier offset shift" },
    { value: "amplifierStuckOutput", label: "Amplifier output stuck" },
    { value: "referenceDrift", label: "Reference drift" },
    { value: "supplySag", label: "Supply sag" },
  ],
  "faults.*.leg": [
    { value: "A", label: "Leg A" },
    { value: "B", label: "Leg B" },
  ],
  "faults.*.side": [
    { value: "high", label: "High side" },
    { value: "low", label: "Low side" },
  ],
} as const satisfies Record<string, readonly Choice[]>;

export type ChoicePath = keyof typeof CHOICES;

const hasLegs = (document: ScenarioDocument) =>
  document.sensing.site === "legTop" || document.sensing.site === "legBottom";

/** The choices that make sense with the rest of the document; choosing any of them leaves it valid (changes.ts). */
export function choicesAt(path: string, document: ScenarioDocument): readonly Choice[] {
  const general = generalPath(path);
  const all: readonly Choice[] = Object.hasOwn(CHOICES, general) ? CHOICES[general as ChoicePath] : [];
  if (general === "sensing.amplifier.arrangement") {
    return all.filter(({ value }) => value === "singleEnded" || (value === "bipolarMidscale") !== hasLegs(document));
  }
  if (general === "faults.*.kind") return all.filter(({ value }) => isFaultPossible(value, document));
  return all;
}

/** Whether a kind of fault can happen to this document (rules-faults.ts refuses the others). */
export function isFaultPossible(kind: string, document: ScenarioDocument): boolean {
  const load = document.load.kind;
  if (["stalledRotor", "lostLoad", "risingFriction", "wornBrushes"].includes(kind)) return load === "motor";
  if (kind === "shortedTurns") return load !== "resistive";
  return kind !== "referenceDrift" || document.sensing.reference !== undefined;
}

/** Words of one value of a choice: "lowSideRecirculation" -> "Recirculate low side". */
export function choiceLabel(path: string, value: string): string {
  const general = generalPath(path);
  const all: readonly Choice[] = Object.hasOwn(CHOICES, general) ? CHOICES[general as ChoicePath] : [];
  return all.find((choice) => choice.value === value)?.label ?? value;
}
