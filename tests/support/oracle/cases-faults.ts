import { makeCase, motorOf, points, withReference, type OracleCase } from "./base-document";

/** Faults of D-35, each with what the outputs show. */
export const FAULT_CASES: OracleCase[] = [
  makeCase("fault-switch-shorted", "high switch of leg B shorted: shoot-through through source resistance, bottom shunts", (d) => {
    d.supply.resistanceOhm = 0.47;
    d.sensing.site = "legBottom";
    d.sensing.shunt.inductanceH = 0;
    d.faults = [{ kind: "switchShorted", atS: 0.000523, leg: "B", side: "high" }];
    d.run = { durationS: 0.00093 };
  }),
  makeCase("fault-switch-open-and-sag", "high switch of leg B stuck open in reverse, then the supply sags", (d) => {
    d.command.points = points([0, -0.51, "step"]);
    d.initial = { currentA: -1.9, speedRadPerS: -211 };
    d.faults = [
      { kind: "switchStuckOpen", atS: 0.000317, leg: "B", side: "high" },
      { kind: "supplySag", atS: 0.000731, voltageV: 17.3 },
    ];
  }),
  makeCase("fault-low-open-diode-carries", "low switch of leg B stuck open while driving forwards", (d) => {
    d.faults = [{ kind: "switchStuckOpen", atS: 0.000409, leg: "B", side: "low" }];
  }),
  makeCase("fault-motor-wear", "worn brushes, shorted turns, lost load, offset shift", (d) => {
    d.faults = [
      { kind: "wornBrushes", atS: 0.000213, factor: 1.61 },
      { kind: "shortedTurns", atS: 0.000447, resistanceFactor: 0.83, inductanceFactor: 0.77, torqueFactor: 0.89 },
      { kind: "lostLoad", atS: 0.000659 },
      { kind: "amplifierOffsetShift", atS: 0.000787, leg: "B", deltaV: 0.0019 },
    ];
    d.run = { durationS: 0.00131, window: { fromS: 0.00079, toS: 0.00127 } };
  }),
  makeCase("fault-rising-friction", "friction rises until the shaft stops", (d) => {
    const { motor } = motorOf(d);
    motor.inertiaKgM2 = 1.9e-6;
    d.initial = { currentA: 2.3, speedRadPerS: 37 };
    d.command.points = points([0, 0.21, "step"]);
    d.faults = [{ kind: "risingFriction", atS: 0.000173, coulombNm: 0.271, overS: 0.00071 }];
    motor.staticNm = 0.0059;
  }),
  makeCase("fault-shunts", "a shunt drifts, the other is shorted, reference drifts", (d) => {
    d.pwm.scheme = "highSideRecirculation";
    d.faults = [
      { kind: "shuntDrifted", atS: 0.000237, leg: "A", factor: 1.37 },
      { kind: "shuntShorted", atS: 0.000511, leg: "B" },
      { kind: "referenceDrift", atS: 0.000703, deltaV: -0.043 },
    ];
    d.sensing.amplifier.arrangement = "combinedMidscale";
    withReference(d, 1.51);
  }),
  makeCase("fault-stuck-output", "output of leg A sticks, then the rotor stalls", (d) => {
    d.faults = [
      { kind: "amplifierStuckOutput", atS: 0.000341, leg: "A", voltageV: 1.19 },
      { kind: "stalledRotor", atS: 0.000617 },
    ];
  }),
  makeCase("fault-open-winding", "the winding opens: the current is gone at once", (d) => {
    d.faults = [{ kind: "openWinding", atS: 0.000613 }];
  }),
];
