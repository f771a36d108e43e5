/** The words of the two unions, in the order in which they are offered. */
export const LOAD_KINDS = ["motor", "inductive", "resistive"] as const;

export const FAULT_KINDS = [
  "stalledRotor",
  "lostLoad",
  "risingFriction",
  "wornBrushes",
  "shortedTurns",
  "openWinding",
  "switchStuckOpen",
  "switchShorted",
  "shuntOpen",
  "shuntDrifted",
  "shuntShorted",
  "amplifierOffsetShift",
  "amplifierStuckOutput",
  "referenceDrift",
  "supplySag",
] as const;
