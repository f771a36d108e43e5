import { makeCase, motorOf, points, withReference, type OracleCase } from "./base-document";

/** Schemes, alignment, dead time, reversal and special intervals. */
export const DRIVE_CASES: OracleCase[] = [
  makeCase("low-reverse-diodes", "lowSideRecirculation in reverse, recirculating diode, current-output gain with its filter, common-mode error", (d) => {
    d.pwm.synchronous = false;
    d.command.points = points([0, -0.47, "step"]);
    d.initial = { currentA: -2.1, speedRadPerS: -231 };
    d.sensing.amplifier.arrangement = "singleEnded";
    d.sensing.amplifier.gain = { inOhm: 970, outOhm: 21300 };
    d.sensing.amplifier.cmrrDb = 81;
    d.sensing.filter = { capacitanceF: 3.7e-11 };
  }),
  makeCase("high-reverse-diodes-centre", "highSideRecirculation in reverse, diodes, centre-aligned, two different offsets", (d) => {
    d.pwm = { ...d.pwm, scheme: "highSideRecirculation", synchronous: false, alignment: "centre" };
    d.command.points = points([0, -0.41, "step"]);
    d.initial = { currentA: -1.9, speedRadPerS: -207 };
    d.sensing.amplifier.offsetV = -0.00023;
    d.sensing.amplifier.offsetBV = 0.00031;
  }),
  makeCase("fast-sync-centre-below-half", "fastDecay synchronous below half duty, centre-aligned, mean voltage negative, combined output, slew limit", (d) => {
    d.pwm = { ...d.pwm, scheme: "fastDecay", alignment: "centre" };
    d.command.points = points([0, 0.37, "step"]);
    d.initial = { currentA: 1.7, speedRadPerS: 113 };
    d.sensing.amplifier.arrangement = "combinedMidscale";
    d.sensing.amplifier.slewVPerS = 410000;
    withReference(d, 1.57);
  }),
  makeCase("fast-diodes-to-zero", "fastDecay on diodes, command steps to zero (all off) and the current dies out", (d) => {
    d.pwm = { ...d.pwm, scheme: "fastDecay", synchronous: false };
    d.command.points = points([0, 0.71, "step"], [0.00047, 0, "step"], [0.00081, 0.33, "step"]);
    d.initial = { currentA: 2.9, speedRadPerS: 197 };
  }),
  makeCase("mixed-sync", "mixedDecay synchronous, three conversions per period", (d) => {
    d.pwm = { ...d.pwm, scheme: "mixedDecay", mixedFastShare: 0.38 };
    d.command.points = points([0, 0.57, "step"]);
    d.sensing.converter.perPeriod = 3;
    withReference(d, 1.43);
  }),
  makeCase("mixed-diodes-light", "mixedDecay on diodes at light load: discontinuous, bottom shunts", (d) => {
    d.pwm = { ...d.pwm, scheme: "mixedDecay", mixedFastShare: 0.61, synchronous: false };
    d.command.points = points([0, 0.27, "step"], [0.0007, 0, "step"]);
    d.sensing.site = "legBottom";
    motorOf(d).shaft = [{ timeS: 0, kind: "constant", value: 0.0047 }];
    d.initial = { currentA: 0, speedRadPerS: 139 };
  }),
  makeCase("antiphase-centre", "lockedAntiphase, centre-aligned, current swings through zero every period, crossed bottom pair, combined", (d) => {
    d.pwm = { ...d.pwm, scheme: "lockedAntiphase", alignment: "centre", frequencyHz: 17000 };
    d.command.points = points([0, 0.07, "step"]);
    d.sensing.site = "legBottom";
    d.sensing.amplifier.arrangement = "combinedMidscale";
    withReference(d, 1.61);
    motorOf(d).shaft = [{ timeS: 0, kind: "viscous", value: 0.00013 }];
    d.initial = { currentA: 0.13, speedRadPerS: 41 };
  }),
  makeCase("antiphase-edge-reverse", "lockedAntiphase, edge-aligned, command through zero, top pair", (d) => {
    d.pwm = { ...d.pwm, scheme: "lockedAntiphase" };
    d.command.points = points([0, 0.61, "step"], [0.0009, -0.83, "linear"]);
    d.initial = { currentA: 1.3, speedRadPerS: 87 };
  }),
  makeCase("swallowed-short-on", "on-times shorter than the dead time: swallowed pulses that still delay", (d) => {
    d.bridge.deadTimeS = 1.37e-6;
    d.command.points = points([0, 0.021, "step"]);
    d.initial = { currentA: 1.1, speedRadPerS: 19 };
  }),
  makeCase("swallowed-short-off", "off-times shorter than the dead time, then full on without edges", (d) => {
    d.bridge.deadTimeS = 1.61e-6;
    d.command.points = points([0, 0.971, "step"], [0.0006, 1, "step"], [0.00091, 0.43, "step"]);
    d.initial = { currentA: 2.7, speedRadPerS: 311 };
  }),
  makeCase("swallowed-high-side-reverse", "swallowed pulses with highSideRecirculation in reverse", (d) => {
    d.pwm = { ...d.pwm, scheme: "highSideRecirculation" };
    d.bridge.deadTimeS = 1.13e-6;
    d.command.points = points([0, -0.017, "step"], [0.0005, -0.983, "step"]);
    d.initial = { currentA: -0.7, speedRadPerS: -23 };
  }),
  makeCase("dwell-coast", "reversal with a coast dwell that ends inside a period, centre-aligned, run ends inside a period", (d) => {
    d.pwm.alignment = "centre";
    d.command.points = points([0, 0.63, "step"], [0.00037, -0.59, "step"]);
    d.command.reversal = { kind: "coast", dwellS: 0.000213 };
    d.run = { durationS: 0.001217, window: { fromS: 0.00031, toS: 0.00117 } };
    withReference(d, 1.52);
  }),
  makeCase("dwell-brake-and-back", "brakeLow dwell, sign change back during the dwell, special brakeHigh on top", (d) => {
    d.command.points = points([0, 0.61, "step"], [0.0003, -0.53, "step"], [0.00049, 0.39, "step"]);
    d.command.reversal = { kind: "brakeLow", dwellS: 0.000277 };
    d.command.special = [{ fromS: 0.000401, toS: 0.000457, action: "brakeHigh" }];
  }),
  makeCase("special-intervals", "coast, brakeLow and brakeHigh at odd times inside periods", (d) => {
    d.command.special = [
      { fromS: 0.0001313, toS: 0.0002171, action: "coast" },
      { fromS: 0.0003317, toS: 0.0004799, action: "brakeLow" },
      { fromS: 0.0006133, toS: 0.0007019, action: "brakeHigh" },
      { fromS: 0.0007019, toS: 0.0008237, action: "coast" },
    ];
    withReference(d, 1.49);
  }),
  makeCase("zero-dead-time", "dead time and commutation time zero, u = -1 and a linear ramp through zero", (d) => {
    d.bridge.deadTimeS = 0;
    d.bridge.commutationS = 0;
    d.command.points = points([0, -1, "step"], [0.00021, -0.9, "step"], [0.0009, 0.77, "linear"]);
    d.initial = { currentA: -1.3, speedRadPerS: -157 };
  }),
  makeCase("long-commutation", "commutation longer than the dead time, shunt inductance, ramps turned round before they end", (d) => {
    d.bridge.deadTimeS = 4.1e-7;
    d.bridge.commutationS = 1.9e-6;
    d.sensing.shunt.inductanceH = 1.7e-9;
    d.command.points = points([0, 0.038, "step"], [0.0006, 0.57, "step"]);
    d.initial = { currentA: 2.2, speedRadPerS: 31 };
    withReference(d, 1.38);
  }),
];
