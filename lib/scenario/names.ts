import { generalPath } from "./paths";
import { rangeOf } from "./ranges";

/** Words for the fields that are no numbers; numbers have theirs in ranges.ts. */
const NAMES: Readonly<Record<string, string>> = {
  "": "The document",
  format: "Format",
  title: "Title",
  notes: "Text of the notes",
  supply: "Supply",
  "supply.acceptsReturn": "Supply takes current back",
  bridge: "Bridge",
  "bridge.highSide": "High-side switches",
  "bridge.lowSide": "Low-side switches",
  pwm: "PWM",
  "pwm.alignment": "PWM alignment",
  "pwm.scheme": "Drive scheme",
  "pwm.synchronous": "Synchronous rectification",
  command: "Command",
  "command.points": "Command points",
  "command.points.*": "Command point",
  "command.points.*.ramp": "Way to this point",
  "command.special": "Special intervals",
  "command.special.*": "Special interval",
  "command.special.*.action": "Action of the special interval",
  "command.reversal": "Reversal",
  "command.reversal.kind": "Way of reversing",
  load: "Load",
  "load.kind": "Kind of load",
  "load.motor": "Motor",
  "load.motor.locked": "Rotor locked",
  "load.motor.thermal": "Winding thermal model",
  "load.motor.commutation": "Commutator",
  "load.gear": "Gear",
  "load.shaft": "Shaft loads",
  "load.shaft.*": "Shaft load",
  "load.shaft.*.kind": "Kind of shaft load",
  sensing: "Sensing",
  "sensing.site": "Shunt site",
  "sensing.shunt": "Shunt",
  "sensing.amplifier": "Amplifier",
  "sensing.amplifier.arrangement": "Arrangement",
  "sensing.amplifier.response": "Channel response",
  "sensing.amplifier.gain": "Gain",
  "sensing.reference": "Reference",
  "sensing.reference.sampledByConverter": "Reference sampled by the converter",
  "sensing.filter": "Output filter",
  "sensing.converter": "Converter",
  "sensing.converter.input": "Converter input",
  faults: "Faults",
  "faults.*": "Fault",
  "faults.*.kind": "Kind of fault",
  "faults.*.leg": "Leg of the fault",
  "faults.*.side": "Switch of the fault",
  initial: "Initial state",
  run: "Run",
  "run.window": "Window of the figures",
};

/** What a field is called, in sentence case, without its place in a list. */
export function nameOf(path: string, faultKind?: string): string {
  const general = generalPath(path);
  const word = Object.hasOwn(NAMES, general) ? NAMES[general] : undefined;
  return word ?? rangeOf(path, faultKind)?.name ?? `Field ${path.split(".").at(-1)}`;
}
