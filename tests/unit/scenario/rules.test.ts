import { describe, expect, test } from "vitest";
import { parseScenario } from "@/lib/scenario/schema";
import { changedCase } from "./case-document";

type Changes = Record<string, unknown>;

function findingsOf(changes: Changes, name?: string) {
  const parsed = parseScenario(changedCase(changes, name));
  return parsed.ok ? [] : parsed.findings.map((finding) => `${finding.path} ${finding.code}`);
}

const point = (timeS: number) => ({ timeS, duty: 0.3, ramp: "step" });
const special = (fromS: number, toS: number) => ({ fromS, toS, action: "coast" });
const inductive = { load: { kind: "inductive", resistanceOhm: 3, inductanceH: 0.01 }, "initial.speedRadPerS": 0 };
const resistive = { load: { kind: "resistive", resistanceOhm: 3 }, "initial.speedRadPerS": 0, "initial.currentA": 0 };
const singleShunt = { "sensing.site": "line", "sensing.reference": undefined };
const resistorGain = { "sensing.amplifier.gain": { inOhm: 1000, outOhm: 21000 } };
const fault = (more: Changes) => ({ faults: [{ atS: 0.001, ...more }] });

/** Name, changes to the first public case, findings. */
const REFUSED: Array<[string, Changes, string[]]> = [
  [
    "D-09: a source that takes nothing back needs capacitor and resistance",
    { "supply.acceptsReturn": false },
    ["supply.busCapacitanceF rule.blockingSource", "supply.resistanceOhm rule.blockingSource"],
  ],
  [
    "D-09: the capacitor alone is not enough",
    { "supply.acceptsReturn": false, "supply.busCapacitanceF": 1e-3 },
    ["supply.resistanceOhm rule.blockingSource"],
  ],
  [
    "D-45: a stiff bus starts at the supply voltage",
    { "supply.busCapacitanceF": 1e-3, "initial.busV": 23 },
    ["initial.busV rule.stiffBus"],
  ],
  [
    "D-45: a bus without capacitor too",
    { "supply.resistanceOhm": 0.1, "initial.busV": 23 },
    ["initial.busV rule.stiffBus"],
  ],
  [
    "D-05: mixed decay is edge-aligned",
    { "pwm.scheme": "mixedDecay", "pwm.mixedFastShare": 0.4, "pwm.alignment": "centre" },
    ["pwm.alignment rule.mixedDecayEdge"],
  ],
  ["mixed decay needs its share", { "pwm.scheme": "mixedDecay" }, ["pwm.mixedFastShare rule.mixedFastShare"]],
  ["other schemes have no share", { "pwm.mixedFastShare": 0.4 }, ["pwm.mixedFastShare rule.mixedFastShare"]],
  [
    "D-28: locked antiphase is synchronous",
    { "pwm.scheme": "lockedAntiphase", "pwm.synchronous": false },
    ["pwm.synchronous rule.antiphaseSynchronous"],
  ],
  [
    "D-28: locked antiphase reverses directly",
    { "pwm.scheme": "lockedAntiphase", "command.reversal": { kind: "coast", dwellS: 0.001 } },
    ["command.reversal.kind rule.antiphaseReversal"],
  ],
  [
    "D-01: the first point is at 0",
    { "command.points": [point(0.001), point(0.002)] },
    ["command.points.0.timeS rule.startsAtZero"],
  ],
  [
    "points ascend",
    { "command.points": [point(0), point(0.002), point(0.002), point(0.001)] },
    ["command.points.2.timeS rule.ascending", "command.points.3.timeS rule.ascending"],
  ],
  [
    "shaft loads ascend",
    { "load.shaft": [0.001, 0].map((timeS) => ({ timeS, kind: "none", value: 0 })) },
    ["load.shaft.1.timeS rule.ascending"],
  ],
  [
    "D-07: special intervals do not overlap, in any order",
    { "command.special": [special(0.001, 0.0015), special(0.0002, 0.00101)] },
    ["command.special.0.fromS rule.overlap"],
  ],
  [
    "a special interval ends after it starts",
    { "command.special": [special(0.001, 0.001)] },
    ["command.special.0.toS rule.intervalOrder"],
  ],
  ["D-17: a locked rotor stands still", { "load.motor.locked": true }, ["initial.speedRadPerS rule.lockedRotor"]],
  ["a coil has no speed", { ...inductive, "initial.speedRadPerS": 3 }, ["initial.speedRadPerS rule.noShaft"]],
  [
    "D-29: a resistor has no current of its own",
    { ...resistive, "initial.currentA": 1 },
    ["initial.currentA rule.resistiveLoad"],
  ],
  [
    "D-29: nor a shunt with inductance",
    { ...resistive, "sensing.shunt.inductanceH": 1e-9 },
    ["sensing.shunt.inductanceH rule.resistiveLoad"],
  ],
  ["D-39: friction-like loads are magnitudes", { "load.shaft.0.value": -0.1 }, ["load.shaft.0.value rule.shaftSign"]],
  [
    "D-55: at most two million periods",
    { "run.durationS": 60, "pwm.frequencyHz": 40_000 },
    ["run.durationS rule.periods"],
  ],
  ["the window lies in the run", { "run.window": { fromS: 0.001, toS: 0.0021 } }, ["run.window.toS rule.window"]],
  ["the window has a length", { "run.window": { fromS: 0.001, toS: 0.001 } }, ["run.window.fromS rule.window"]],
  [
    "D-21: legs cannot be read around midscale by one channel",
    { "sensing.amplifier.arrangement": "bipolarMidscale", "sensing.amplifier.response": "bipolar" },
    ["sensing.amplifier.arrangement rule.arrangement"],
  ],
  [
    "D-21: one shunt has no pair",
    { ...singleShunt, "sensing.amplifier.arrangement": "differencePair" },
    ["sensing.amplifier.arrangement rule.arrangement"],
  ],
  [
    "D-21: nor a combination",
    { "sensing.site": "supply", "sensing.amplifier.arrangement": "combinedMidscale" },
    ["sensing.amplifier.arrangement rule.arrangement"],
  ],
  [
    "D-21: a channel around midscale is bipolar",
    { "sensing.site": "return", "sensing.amplifier.arrangement": "bipolarMidscale" },
    ["sensing.amplifier.response rule.midscaleResponse"],
  ],
  [
    "a midscale output needs a reference",
    { "sensing.amplifier.arrangement": "combinedMidscale", "sensing.reference": undefined },
    ["sensing.reference rule.referenceNeeded"],
  ],
  [
    "D-39: one shunt read from ground has no reference",
    { "sensing.site": "line" },
    ["sensing.reference rule.referenceUnused"],
  ],
  [
    "D-39: lowest output below highest",
    { "sensing.amplifier.outputMinV": 3.3 },
    ["sensing.amplifier.outputMinV rule.order"],
  ],
  ["common mode in order", { "sensing.amplifier.commonModeMinV": 61 }, ["sensing.amplifier.commonModeMinV rule.order"]],
  [
    "operating range within the absolute one",
    { "sensing.amplifier.commonModeAbsMaxV": 59 },
    ["sensing.amplifier.commonModeMaxV rule.order"],
  ],
  [
    "the filter of a fixed gain needs its resistor",
    { "sensing.filter": { capacitanceF: 1e-9 } },
    ["sensing.filter.resistanceOhm rule.filterResistance"],
  ],
  ["the filter of gain resistors has theirs", resistorGain, ["sensing.filter.resistanceOhm rule.filterResistance"]],
  [
    "D-20: an inductive shunt needs a ramp",
    { "bridge.commutationS": 0, "sensing.shunt.inductanceH": 1e-9 },
    ["bridge.commutationS rule.impulse"],
  ],
  [
    "one converter takes conversions one after the other",
    { "sensing.converter.apertureS": 3e-5, "sensing.converter.perPeriod": 2 },
    ["sensing.converter.apertureS rule.aperture"],
  ],
  ["D-35: at leg sites a shunt's fault names its leg", fault({ kind: "shuntOpen" }), ["faults.0.leg rule.faultLeg"]],
  [
    "D-35: at a single shunt it does not",
    { ...singleShunt, ...fault({ kind: "amplifierStuckOutput", leg: "A", voltageV: 1 }) },
    ["faults.0.leg rule.faultLeg"],
  ],
  ["a coil cannot stall", { ...inductive, ...fault({ kind: "stalledRotor" }) }, ["faults.0.kind rule.faultLoad"]],
  [
    "a resistor has no turns",
    { ...resistive, ...fault({ kind: "shortedTurns", resistanceFactor: 1, inductanceFactor: 1, torqueFactor: 1 }) },
    ["faults.0.kind rule.faultLoad"],
  ],
  [
    "no reference, no drift",
    { "sensing.reference": undefined, ...fault({ kind: "referenceDrift", deltaV: 0.1 }) },
    ["faults.0.kind rule.faultReference"],
  ],
  [
    "D-36: something limits shoot-through",
    {
      ...singleShunt,
      "bridge.highSide.onResistanceOhm": 0,
      "bridge.lowSide.onResistanceOhm": 0,
      ...fault({ kind: "switchShorted", leg: "A", side: "low" }),
    },
    ["faults.0.kind rule.shootThrough"],
  ],
];

/** What stands close to a refusal and is allowed. */
const ACCEPTED: Array<[string, Changes]> = [
  [
    "a source that takes nothing back, with both parts",
    { "supply.acceptsReturn": false, "supply.busCapacitanceF": 1e-3, "supply.resistanceOhm": 0.1, "initial.busV": 31 },
  ],
  ["a stiff bus at the supply voltage", { "supply.busCapacitanceF": 1e-3, "initial.busV": 24 }],
  ["mixed decay with share 0", { "pwm.scheme": "mixedDecay", "pwm.mixedFastShare": 0 }],
  ["special intervals that touch", { "command.special": [special(0.001, 0.0015), special(0.0005, 0.001)] }],
  ["a locked rotor at rest", { "load.motor.locked": true, "initial.speedRadPerS": 0 }],
  ["a weight that drives", { "load.shaft": [{ timeS: 0, kind: "active", value: -0.1 }] }],
  ["exactly two million periods", { "run.durationS": 60, "pwm.frequencyHz": 1e6 / 30 }],
  ["the window up to the end", { "run.window": { fromS: 0, toS: 0.002 } }],
  ["no reference with outputs one by one", { "sensing.reference": undefined }],
  [
    "a bipolar channel around midscale",
    {
      "sensing.site": "return",
      "sensing.amplifier.arrangement": "bipolarMidscale",
      "sensing.amplifier.response": "bipolar",
    },
  ],
  ["a combination of the legs", { "sensing.amplifier.arrangement": "combinedMidscale" }],
  ["no filter", { "sensing.filter": undefined }],
  ["a filter of capacitance 0 without resistor", { "sensing.filter": { capacitanceF: 0 } }],
  ["gain resistors with the filter at the output node", { ...resistorGain, "sensing.filter": { capacitanceF: 1e-11 } }],
  [
    "gain resistors with the resistance said again",
    { ...resistorGain, "sensing.filter": { resistanceOhm: 21000, capacitanceF: 1e-11 } },
  ],
  [
    "an inductive shunt in the motor line without ramp",
    { ...singleShunt, "bridge.commutationS": 0, "sensing.shunt.inductanceH": 1e-9 },
  ],
  ["an aperture as long as the period", { "sensing.converter.apertureS": 5e-5 }],
  ["a fault of a leg's shunt", fault({ kind: "shuntDrifted", leg: "B", factor: 1.3 })],
  ["a fault of the single shunt", { ...singleShunt, ...fault({ kind: "shuntShorted" }) }],
  ["a coil", inductive],
  ["a resistor", resistive],
  ["a shorted switch with resistance in its leg", fault({ kind: "switchShorted", leg: "B", side: "high" })],
  [
    "gear with load inertia, ambient and leg B's offset",
    {
      "load.gear": { ratio: 30, efficiency: 0.7, loadInertiaKgM2: 0.2 },
      "sensing.ambientC": 60,
      "sensing.amplifier.offsetBV": 1e-5,
    },
  ],
];

describe("an impossible combination is refused at its path", () => {
  test.each(REFUSED)("%s", (_, changes, expected) => {
    expect(findingsOf(changes).sort()).toEqual([...expected].sort());
  });

  test("every text says what to enter, choose or leave out", () => {
    for (const [, changes] of REFUSED) {
      const parsed = parseScenario(changedCase(changes));
      for (const finding of parsed.ok ? [] : parsed.findings) {
        expect(finding.text).toMatch(/enter|choose|leave|give|remove|must|set /);
        expect(finding.text).toMatch(/\.$/);
      }
    }
  });
});

describe("what is possible is accepted", () => {
  test.each(ACCEPTED)("%s", (_, changes) => {
    expect(findingsOf(changes)).toEqual([]);
  });
});
