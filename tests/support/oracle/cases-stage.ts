import { makeCase, motorOf, points, withReference, type OracleCase } from "./base-document";

/** Supplies, loads, shafts, temperature. */
export const STAGE_CASES: OracleCase[] = [
  makeCase("source-resistance", "algebraic bus: source resistance without capacitance, supply shunt with a midscale output", (d) => {
    d.supply.resistanceOhm = 0.31;
    d.sensing.site = "supply";
    d.sensing.amplifier.arrangement = "bipolarMidscale";
    d.sensing.amplifier.response = "bipolar";
    withReference(d, 1.59);
  }),
  makeCase("bus-capacitor-brake", "bus capacitor with a returning source, reversal brakes into it, supply shunt read from ground up", (d) => {
    d.supply = { voltageV: 25.7, resistanceOhm: 0.27, busCapacitanceF: 4.7e-5, acceptsReturn: true };
    d.command.points = points([0, 0.67, "step"], [0.00033, -0.51, "step"]);
    d.sensing.site = "supply";
    d.sensing.amplifier.arrangement = "singleEnded";
    d.sensing.shunt.inductanceH = 1.1e-9;
  }),
  makeCase("blocking-source-pumps", "source that blocks return current: bus pumps up while the motor regenerates, then falls back", (d) => {
    d.supply = { voltageV: 24.9, resistanceOhm: 0.23, busCapacitanceF: 3.3e-5, acceptsReturn: false };
    d.pwm.scheme = "fastDecay";
    d.command.points = points([0, 0.47, "step"], [0.0006, 0.93, "step"]);
    d.initial = { currentA: 2.5, speedRadPerS: 257, busV: 24.1 };
    withReference(d, 1.44);
  }),
  makeCase("blocking-source-coasts", "blocking source, coast from high speed: both diodes rectify into the bus", (d) => {
    d.supply = { voltageV: 9.7, resistanceOhm: 0.21, busCapacitanceF: 2.2e-5, acceptsReturn: false };
    d.command.special = [{ fromS: 0.000213, toS: 0.000977, action: "coast" }];
    d.initial = { currentA: 1.7, speedRadPerS: 389 };
    motorOf(d).shaft = [{ timeS: 0, kind: "active", value: -0.031 }];
  }),
  makeCase("winding-warms", "winding node warms quickly, shunt temperature coefficient and self-heating, ambient given", (d) => {
    motorOf(d).motor.thermal = { resistanceKPerW: 9.1, capacityJPerK: 0.00071, ambientC: 37 };
    motorOf(d).motor.temperatureC = 59;
    d.sensing.ambientC = 43;
    d.sensing.shunt.tcrPpmPerK = 390;
    d.sensing.shunt.thermalResistanceKPerW = 310;
  }),
  makeCase("shaft-steps", "shaft steps: viscous, fan, active, none", (d) => {
    d.pwm.frequencyHz = 13000;
    motorOf(d).shaft = [
      { timeS: 0, kind: "viscous", value: 0.00029 },
      { timeS: 0.00041, kind: "fan", value: 1.9e-6 },
      { timeS: 0.00083, kind: "active", value: -0.057 },
      { timeS: 0.00129, kind: "none", value: 0 },
    ];
    d.run.durationS = 0.0017;
  }),
  makeCase("fan-strong", "strong fan load from high speed, light rotor", (d) => {
    motorOf(d).motor.inertiaKgM2 = 1.3e-6;
    motorOf(d).shaft = [{ timeS: 0, kind: "fan", value: 3.1e-6 }];
    d.command.points = points([0, 0.83, "step"], [0.0005, -0.29, "step"]);
  }),
  makeCase("gear-weight-lowers", "gear with efficiency and load inertia, weight stops the shaft, reverses it and drives it", (d) => {
    const load = motorOf(d);
    load.gear = { ratio: 3.7, efficiency: 0.79, loadInertiaKgM2: 7.3e-6 };
    load.motor.inertiaKgM2 = 1.1e-6;
    load.motor.coulombNm = 0.0013;
    load.motor.staticNm = 0.0019;
    load.shaft = [{ timeS: 0, kind: "active", value: 0.47 }];
    d.command.points = points([0, 0.11, "step"]);
    d.initial = { currentA: 1.9, speedRadPerS: 7.1 };
    d.run.durationS = 0.0021;
  }),
  makeCase("gear-weight-held", "weight held by friction at rest behind a gear, then lifted", (d) => {
    const load = motorOf(d);
    load.gear = { ratio: 5.3, efficiency: 0.83, loadInertiaKgM2: 0 };
    load.motor.inertiaKgM2 = 2.9e-6;
    load.motor.coulombNm = 0.021;
    load.motor.staticNm = 0.033;
    load.shaft = [{ timeS: 0, kind: "active", value: 0.113 }];
    d.command.points = points([0, 0.03, "step"], [0.0005, 0.37, "step"]);
    d.initial = { currentA: 0.2, speedRadPerS: 0 };
    d.run.durationS = 0.0019;
  }),
  makeCase("stick-reverse", "shaft brakes to a stop under a constant load, sticks, breaks away backwards", (d) => {
    const load = motorOf(d);
    load.motor.inertiaKgM2 = 1.7e-6;
    load.motor.coulombNm = 0.017;
    load.motor.staticNm = 0.029;
    load.shaft = [{ timeS: 0, kind: "constant", value: 0.023 }];
    d.command.points = points([0, 0.13, "step"], [0.0003, 0, "step"], [0.0013, -0.47, "step"]);
    d.initial = { currentA: 0.9, speedRadPerS: 17 };
    d.run.durationS = 0.0019;
  }),
  makeCase("locked-rotor", "locked rotor, line shunt, current-output amplifier without filter", (d) => {
    motorOf(d).motor.locked = true;
    motorOf(d).shaft = [];
    d.sensing.site = "line";
    d.sensing.amplifier.arrangement = "bipolarMidscale";
    d.sensing.amplifier.response = "bipolar";
    d.sensing.amplifier.gain = { inOhm: 1130, outOhm: 12700 };
    d.sensing.amplifier.cmrrDb = 93;
    delete d.sensing.filter;
    withReference(d, 1.63);
    d.initial = { currentA: -0.7, speedRadPerS: 0 };
    d.command.points = points([0, 0.19, "step"], [0.00061, -0.23, "step"]);
  }),
  makeCase("frictionless-oscillating", "no friction at all, complex pair of eigenvalues, K_e other than K_t, coast", (d) => {
    const { motor } = motorOf(d);
    motor.resistanceOhm = 0.13;
    motor.inertiaKgM2 = 4.7e-7;
    motor.viscousNmPerRadPerS = 0;
    motor.coulombNm = 0;
    motor.staticNm = 0;
    motor.backEmfVPerRadPerS = 0.0431;
    motorOf(d).shaft = [];
    d.command.special = [{ fromS: 0.00071, toS: 0.00093, action: "coast" }];
    d.initial = { currentA: 0.3, speedRadPerS: 173 };
  }),
  makeCase("inductive-load", "inductive load, reversal, slew, gain-bandwidth limit", (d) => {
    d.load = { kind: "inductive", resistanceOhm: 2.9, inductanceH: 0.00117 };
    d.command.points = points([0, 0.73, "step"], [0.00049, -0.67, "step"]);
    d.sensing.amplifier.gainBandwidthHz = 3100000;
    d.sensing.amplifier.slewVPerS = 290000;
    d.initial = { currentA: 1.3, speedRadPerS: 0 };
  }),
  makeCase("inductive-diodes", "inductive load on diodes: fast decay, discontinuous", (d) => {
    d.load = { kind: "inductive", resistanceOhm: 3.7, inductanceH: 0.00031 };
    d.pwm = { ...d.pwm, scheme: "fastDecay", synchronous: false };
    d.command.points = points([0, 0.31, "step"]);
    d.initial = { currentA: 0, speedRadPerS: 0 };
  }),
  makeCase("resistive-load", "resistive load, source resistance, both directions", (d) => {
    d.load = { kind: "resistive", resistanceOhm: 6.1 };
    d.supply.resistanceOhm = 0.19;
    d.pwm.scheme = "highSideRecirculation";
    d.command.points = points([0, 0.43, "step"], [0.0005, -0.57, "step"]);
    d.initial = { currentA: 0, speedRadPerS: 0 };
    withReference(d, 1.58);
  }),
  makeCase("resistive-antiphase-capacitor", "resistive load under lockedAntiphase from a bus capacitor, return shunt", (d) => {
    d.load = { kind: "resistive", resistanceOhm: 4.3 };
    d.supply = { voltageV: 23.9, resistanceOhm: 0.37, busCapacitanceF: 1.9e-5, acceptsReturn: true };
    d.pwm.scheme = "lockedAntiphase";
    d.command.points = points([0, 0.37, "step"]);
    d.sensing.site = "return";
    d.sensing.amplifier.arrangement = "singleEnded";
    d.initial = { currentA: 0, speedRadPerS: 0 };
  }),
];
