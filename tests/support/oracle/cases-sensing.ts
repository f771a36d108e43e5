import { makeCase, motorOf, points, withReference, type OracleCase } from "./base-document";

/** Sites, responses, poles, clipping, converter. */
export const SENSING_CASES: OracleCase[] = [
  makeCase("bottom-bipolar-reads-twice", "legBottom bipolar pair: i while driving, 2 i while both shunts carry the current, negative clip", (d) => {
    d.sensing.site = "legBottom";
    d.sensing.amplifier.response = "bipolar";
    d.sensing.amplifier.outputMinV = -0.41;
    d.sensing.amplifier.outputMaxV = 0.97;
    d.sensing.converter.input = "differential";
    withReference(d, 0.37);
  }),
  makeCase("bottom-unipolar-reverse", "legBottom unipolar in reverse with highSideRecirculation: chopped, crossed sign, shunt inductance", (d) => {
    d.pwm.scheme = "highSideRecirculation";
    d.command.points = points([0, -0.59, "step"]);
    d.initial = { currentA: -2.4, speedRadPerS: -283 };
    d.sensing.site = "legBottom";
    d.sensing.shunt.inductanceH = 9.7e-10;
    d.sensing.amplifier.arrangement = "combinedMidscale";
    withReference(d, 1.66);
  }),
  makeCase("top-bipolar-current-output", "legTop bipolar, current-output, both poles then clip at both ends, output below ground", (d) => {
    d.pwm.scheme = "fastDecay";
    d.sensing.amplifier.response = "bipolar";
    d.sensing.amplifier.gain = { inOhm: 1010, outOhm: 41300 };
    d.sensing.amplifier.outputMinV = -0.83;
    d.sensing.amplifier.outputMaxV = 1.29;
    d.sensing.filter = { capacitanceF: 1.7e-11 };
    withReference(d, 0.29);
  }),
  makeCase("line-common-mode", "line shunt: common mode swings with terminal A, fixed gain, clip before the filter pole, shunt inductance", (d) => {
    d.sensing.site = "line";
    d.sensing.shunt.inductanceH = 1.9e-9;
    d.sensing.amplifier.arrangement = "bipolarMidscale";
    d.sensing.amplifier.response = "bipolar";
    d.sensing.amplifier.cmrrDb = 74;
    d.sensing.amplifier.outputMaxV = 2.31;
    withReference(d, 1.47);
  }),
  makeCase("line-unipolar", "line shunt read from ground up by a unipolar channel, reversal cuts it off", (d) => {
    d.sensing.site = "line";
    d.sensing.amplifier.arrangement = "singleEnded";
    d.command.points = points([0, 0.49, "step"], [0.0005, -0.43, "step"]);
  }),
  makeCase("return-midscale", "return shunt lifts the low terminals, fast decay returns current through it", (d) => {
    d.pwm.scheme = "fastDecay";
    d.command.points = points([0, 0.69, "step"]);
    d.sensing.site = "return";
    d.sensing.shunt.resistanceOhm = 0.0173;
    d.sensing.amplifier.arrangement = "bipolarMidscale";
    d.sensing.amplifier.response = "bipolar";
    d.sensing.converter.input = "differential";
    withReference(d, 1.55);
  }),
  makeCase("averaged-and-apertured", "four conversions per period, aperture, average over three, differential midscale", (d) => {
    d.sensing.amplifier.arrangement = "combinedMidscale";
    d.sensing.converter = { ...d.sensing.converter, input: "differential", perPeriod: 4, average: 3, apertureS: 1.9e-6, phase: 0.83, bits: 15 };
    withReference(d, 1.53);
  }),
  makeCase("apertured-pair", "aperture over a pulse's edge, two per period, unipolar codes of both legs", (d) => {
    d.sensing.converter = { ...d.sensing.converter, perPeriod: 2, apertureS: 3.7e-6, phase: 0.47, bits: 16 };
  }),
  makeCase("equal-poles", "amplifier and filter pole 3e-6 apart", (d) => {
    d.sensing.filter = { resistanceOhm: 1 / (2 * Math.PI * 510000 * 1.3e-9) * 1.000003, capacitanceF: 1.3e-9 };
  }),
  makeCase("slow-poles", "poles near the motor's electrical pole, gain-bandwidth limited", (d) => {
    d.sensing.amplifier.gainBandwidthHz = 71000;
    d.sensing.filter = { resistanceOhm: 3900, capacitanceF: 1.2e-7 };
    d.sensing.amplifier.bandwidthHz = 97000;
    withReference(d, 1.46);
  }),
  makeCase("dead-zone", "negative offset makes a dead zone, current near zero, 24 bits", (d) => {
    d.sensing.amplifier.offsetV = -0.0037;
    d.sensing.converter.bits = 24;
    motorOf(d).shaft = [{ timeS: 0, kind: "constant", value: 0.003 }];
    d.initial = { currentA: 0.23, speedRadPerS: 301 };
  }),
  makeCase("slew-and-clip", "slew limit far below the edges together with clipping and a filter", (d) => {
    d.sensing.amplifier.slewVPerS = 97000;
    d.sensing.amplifier.outputMaxV = 0.53;
    d.sensing.amplifier.arrangement = "singleEnded";
  }),
];
