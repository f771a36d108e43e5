import type { ScenarioDocument } from "./schema";
import { benchMotor, gateDrive, latchMotor } from "./template-parts";

export type Template = {
  id: string;
  title: string;
  /** One sentence: what it is for. */
  purpose: string;
  tags: readonly string[];
  document: ScenarioDocument;
};

/** The gate drive with some parts changed. */
function variant(
  id: string,
  title: string,
  purpose: string,
  notes: string,
  tags: readonly string[],
  change: (document: ScenarioDocument) => void,
): Template {
  const document = gateDrive();
  change(document);
  return { id, title, purpose, tags, document: { ...document, title, notes } };
}

const differential = (document: ScenarioDocument, bits: number, fullScaleV: number) => {
  document.sensing.amplifier.arrangement = "differencePair";
  Object.assign(document.sensing.converter, { input: "differential", bits, fullScaleV });
};

const step = (timeS: number, duty: number) => ({ timeS, duty, ramp: "step" as const });

export const TEMPLATES: readonly Template[] = [
  variant(
    "reversal",
    "Gate drive, direct reversal",
    "The motor current passes through zero while both shunts at the top of the legs are watched.",
    "The command turns from forward to reverse at 2 ms. The current first returns to the supply, passes through zero and builds up the other way; output A goes to rest and output B takes over.",
    ["reversal", "shunts at the top"],
    (document) => {
      document.command.points = [step(0, 0.45), step(0.002, -0.3)];
      document.run = { durationS: 0.007, window: { fromS: 0.0015, toS: 0.0045 } };
    },
  ),
  variant(
    "continuous-on",
    "Gate drive, continuous on",
    "Full duty and no chopping: what the outputs show when only the load changes.",
    "Both diagonal switches stay on. The load torque steps up at 3 ms, as when a gate meets silt; output A follows the motor current, output B rests.",
    ["continuous", "load step"],
    (document) => {
      document.command.points = [step(0, 1)];
      document.sensing.amplifier.arrangement = "singleEnded";
      document.load = {
        ...(document.load as Extract<ScenarioDocument["load"], { kind: "motor" }>),
        shaft: [
          { timeS: 0, kind: "constant", value: 0.21 },
          { timeS: 0.003, kind: "constant", value: 0.42 },
        ],
      };
      document.initial = { currentA: 3.8, speedRadPerS: 334 };
      document.run = { durationS: 0.02 };
    },
  ),
  variant(
    "low-side-recirculation",
    "Gate drive, recirculating low",
    "With shunts at the top, low-side recirculation hides the current from both of them in the off-time.",
    "Compare with the high-side twin: same drive, same motor current, but here the difference is chopped and only a sample in the on-time is right.",
    ["recirculation", "comparison"],
    (document) => differential(document, 12, 3.3),
  ),
  variant(
    "high-side-recirculation",
    "Gate drive, recirculating high",
    "The same drive as its low-side twin: recirculating through the top keeps the difference on the motor current.",
    "In the off-time the current runs through shunt A and back through shunt B. Channel B is cut off, channel A goes on reading, so any sample instant clear of the edges is right.",
    ["recirculation", "comparison"],
    (document) => {
      differential(document, 12, 3.3);
      document.pwm.scheme = "highSideRecirculation";
    },
  ),
  variant(
    "large-shunt",
    "Latch motor, large shunt",
    "A small motor and a shunt large enough that an ordinary amplifier's offset does not matter.",
    "100 mΩ at under 1 A: the drop is large against the offset, at the price of heat and of voltage that the motor does not get. The shunts sit at the bottom of the legs.",
    ["large shunt", "shunts at the bottom"],
    (document) => {
      document.supply = { voltageV: 12, resistanceOhm: 0.08, busCapacitanceF: 0.00022, acceptsReturn: true };
      document.load = { kind: "motor", motor: latchMotor(), shaft: [{ timeS: 0, kind: "constant", value: 0.013 }] };
      document.command.points = [step(0, 0.6)];
      document.initial = { currentA: 0.6, speedRadPerS: 205 };
      document.sensing.site = "legBottom";
      Object.assign(document.sensing.shunt, {
        resistanceOhm: 0.1,
        tolerancePct: 1,
        tcrPpmPerK: 100,
        ratingW: 0.5,
        thermalResistanceKPerW: 60,
      });
      Object.assign(document.sensing.amplifier, {
        gain: { fixed: 20 },
        offsetV: 4e-4,
        offsetBV: -3e-4,
        arrangement: "singleEnded",
      });
      document.run = { durationS: 0.004 };
    },
  ),
  variant(
    "sub-milliohm",
    "Gate drive, sub-milliohm precision",
    "A 0.4 mΩ shunt with a gain of 1000 and a few microvolts of offset: almost no heat, still milliamperes.",
    "The gain is set by two resistors, 100 kΩ over 100 Ω; the filter is the output node. Offset of 4 µV stands for 10 mA.",
    ["precision", "small shunt"],
    (document) => {
      document.pwm.scheme = "highSideRecirculation";
      Object.assign(document.sensing.shunt, {
        resistanceOhm: 0.0004,
        tolerancePct: 0.5,
        tcrPpmPerK: 75,
        ratingW: 3,
        thermalResistanceKPerW: 9,
        layoutOhm: 4e-6,
      });
      document.sensing.amplifier = {
        ...document.sensing.amplifier,
        gain: { inOhm: 100, outOhm: 100000 },
        gainTolerancePct: 0.2,
        offsetV: 4e-6,
        offsetBV: -3e-6,
        offsetDriftVPerK: 3e-8,
        bandwidthHz: 400000,
        outputMaxV: 5,
        cmrrDb: 152,
        psrrDb: 136,
        noiseVPerRtHz: 2.2e-8,
      };
      document.sensing.filter = { capacitanceF: 1.2e-11 };
      differential(document, 16, 5);
    },
  ),
  variant(
    "combined-midscale",
    "Gate drive, combined output around midscale",
    "One output for both directions: up for forward, down for reverse, 1.65 V at standstill.",
    "The command ramps from forward to reverse in 12 ms. With high-side recirculation the combined output follows the motor current all the way through the reference.",
    ["combined output", "reversal"],
    (document) => {
      document.pwm.scheme = "highSideRecirculation";
      document.command.points = [
        step(0, 0.45),
        { timeS: 0.002, duty: 0.45, ramp: "linear" },
        { timeS: 0.014, duty: -0.45, ramp: "linear" },
      ];
      document.run = { durationS: 0.018, window: { fromS: 0.002, toS: 0.016 } };
    },
  ),
  variant(
    "two-output-difference",
    "Gate drive, difference of two outputs",
    "Each leg keeps an output of its own, and a differential converter reads one minus the other.",
    "The reversal waits 1.2 ms with all switches off; the diodes carry the current to zero and the difference says so. Centre-aligned, high-side recirculation.",
    ["difference", "reversal"],
    (document) => {
      differential(document, 13, 3.3);
      Object.assign(document.pwm, { scheme: "highSideRecirculation", alignment: "centre" });
      document.sensing.converter.phase = 0.5;
      document.command.points = [step(0, 0.4), step(0.002, -0.3)];
      document.command.reversal = { kind: "coast", dwellS: 0.0012 };
      document.initial = { currentA: 3.6, speedRadPerS: 100 };
      document.run = { durationS: 0.008, window: { fromS: 0.0015, toS: 0.0055 } };
    },
  ),
  variant(
    "battery-coil",
    "Penstock valve coil from a battery",
    "One direction only: a coil pulled in from a tired battery, with one shunt in the supply line.",
    "The coil is switched on at full voltage and held at half after 8 ms. The shunt in the supply line sees the coil only in the on-time.",
    ["one direction", "battery"],
    (document) => {
      document.supply = { voltageV: 12.6, resistanceOhm: 0.14, busCapacitanceF: 0, acceptsReturn: true };
      document.load = { kind: "inductive", resistanceOhm: 2.8, inductanceH: 0.0085 };
      document.command.points = [step(0, 1), step(0.008, 0.5)];
      document.initial = { currentA: 0, speedRadPerS: 0 };
      document.sensing.site = "supply";
      Object.assign(document.sensing.shunt, { resistanceOhm: 0.015, ratingW: 1 });
      document.sensing.amplifier.arrangement = "singleEnded";
      delete document.sensing.amplifier.offsetBV;
      delete document.sensing.reference;
      document.run = { durationS: 0.016, window: { fromS: 0.001, toS: 0.016 } };
    },
  ),
  variant(
    "bench-motor",
    "Bench motor M1, start at full voltage",
    "A small 12 V motor by its published figures, started from rest: nearly its stall current, then less as the speed builds up.",
    "Constants from published figures of a small brushed 12 V motor: 18 A and 0.28 N·m at stall, 1.6 A and 5800 turns a minute running free. Resistance, torque and back-EMF constants and the drag follow from them; inductance and inertia are typical of its size.",
    ["measured motor", "start"],
    (document) => {
      document.supply = { voltageV: 12, resistanceOhm: 0, busCapacitanceF: 0, acceptsReturn: true };
      document.load = { kind: "motor", motor: benchMotor(), shaft: [] };
      document.command.points = [step(0, 1)];
      document.initial = { currentA: 0, speedRadPerS: 0 };
      document.sensing.amplifier.gain = { fixed: 20 };
      document.run = { durationS: 0.02, window: { fromS: 0, toS: 0.02 } };
    },
  ),
];

export const templateById = (id: string): Template | undefined => TEMPLATES.find((template) => template.id === id);
