import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import { emfDocument, idealMotorDocument, type IdealMotor } from "@/tests/support/oracle/ideal-document";

/**
 * Check values from outside the project (check-values.json, section "DC motor" and event location), each with its id,
 * source and stated tolerance. Full duty or a chopped supply on a lossless bridge stands for the textbook's source.
 */
const misses = (found: number | undefined, wanted: number): number => Math.abs((found ?? Number.NaN) - wanted) / Math.abs(wanted);

describe("MOT-CTMS: control tutorials of three universities, DC motor speed, system analysis (VERIFIED+COMPUTED)", () => {
  const motor: IdealMotor = { ohm: 1, henry: 0.5, torqueNmPerA: 0.01, inertia: 0.01, viscous: 0.1 };
  const document = idealMotorDocument({ voltageV: 1, frequencyHz: 40, duty: 1, durationS: 10 }, motor);
  // MOT-CTMS-0.1 ... MOT-CTMS-5: time, speed (rad/s), current (A); tolerance rel 1e-12 there, 1e-11 through the whole engine.
  const rows = [
    [0.1, 0.006855537180611048, 0.18126448220009744],
    [0.5, 0.054170099960474026, 0.6319257472568014],
    [1, 0.08303711117081235, 0.8641301548225788],
    [2, 0.0976234889033721, 0.9807938039199819],
    [3, 0.09959276364175638, 0.9965430775151346],
    [5, 0.09989449892398514, 0.9989562051988996],
  ] as const;
  test.each(rows)("state %s s after a step of 1 V from rest", (timeS, speed, currentA) => {
    const [at] = simulate(document, { at: [timeS] }).at;
    expect(misses(at?.speedRadPerS, speed)).toBeLessThan(1e-11);
    expect(misses(at?.motorCurrentA, currentA)).toBeLessThan(1e-11);
  });
  test("MOT-CTMS-GAIN: DC gain 0.0999 rad/s and 0.999 A per volt", () => {
    const [at] = simulate(document, { at: [10] }).at;
    expect(misses(at?.speedRadPerS, 0.0999000999000999)).toBeLessThan(1e-7);
    expect(misses(at?.motorCurrentA, 0.999000999000999)).toBeLessThan(1e-7);
  });
  test("MOT-CTMS-TS: the speed enters its 2 % band at 2.0651886 s and never overshoots", () => {
    const times = Array.from({ length: 200 }, (_, n) => 0.05 * (n + 1));
    const result = simulate(document, { at: [2.0651886193693207, ...times] });
    expect(Math.abs((result.at[0]?.speedRadPerS ?? 0) / 0.0999000999000999 - 0.98)).toBeLessThan(1e-8);
    for (const one of result.at) expect(one.speedRadPerS).toBeLessThan(0.0999000999000999);
  });
});

describe("MOT-POS: position motor of the same tutorials, poles 24 558 apart (COMPUTED, inputs VERIFIED)", () => {
  test("the step response is the sum of the two published exponentials", () => {
    const [slow, fast] = [-59.2260384878323, -1454487.31502041];
    const [J, b, K, R, V] = [3.2284e-6, 3.5077e-6, 0.0274, 4, 1];
    const document = idealMotorDocument({ voltageV: V, frequencyHz: 100, duty: 1, durationS: 0.05 }, { ohm: R, henry: 2.75e-6, torqueNmPerA: K, inertia: J, viscous: b });
    const final = (K * V) / (R * b + K * K);
    const times = [1e-6, 7.3e-4, 0.011, 0.043];
    simulate(document, { at: times }).at.forEach((one) => {
      const t = one.timeS;
      const speed = final * (1 + (fast * Math.exp(slow * t) - slow * Math.exp(fast * t)) / (slow - fast));
      expect(Math.abs(one.speedRadPerS - speed) / final).toBeLessThan(1e-9);
    });
  });
});

describe("MOT-LINE: torque-speed line, 24 V, 0.6 ohm, K 0.042 (Sen; Fitzgerald et al., MEMORY+COMPUTED)", () => {
  const motor: IdealMotor = { ohm: 0.6, henry: 0.00045, torqueNmPerA: 0.042, inertia: 0.00012, viscous: 2e-5 };
  test("stalls at 40 A and 1.68 N m", () => {
    const { figures } = simulate(idealMotorDocument({ voltageV: 24, frequencyHz: 18000, duty: 1, durationS: 0.03, currentA: 0 }, { ...motor, locked: true }));
    expect(misses(figures.motorMeanA, 40)).toBeLessThan(1e-9);
    expect(misses(figures.torqueMeanNm, 1.68)).toBeLessThan(1e-9);
  });
  test("runs free at 567.5676 rad/s", () => {
    const result = simulate(idealMotorDocument({ voltageV: 24, frequencyHz: 1000, duty: 1, durationS: 1.5 }, motor), { at: [1.5] });
    expect(misses(result.at[0]?.speedRadPerS, 567.5675675675676)).toBeLessThan(1e-9);
  });
  test("gives its most, 240 W, at half the free speed", () => {
    const heavy = { ...motor, inertia: 1e4, viscous: 0 };
    const halfSpeed = 24 / 0.042 / 2;
    const { figures } = simulate(idealMotorDocument({ voltageV: 24, frequencyHz: 18000, duty: 1, durationS: 0.02, currentA: 20, speedRadPerS: halfSpeed }, heavy));
    expect(misses(figures.mechanicalW, 240)).toBeLessThan(1e-8);
  });
});

// MOT-ELS11.3: M. A. El-Sharkawi, Fundamentals of Electric Drives, example 11.3 (COMPUTED, inputs VERIFIED); L negligible.
test("MOT-ELS11.3: 63.2 % of the final speed after tau = 1.3333 s", () => {
  const document = idealMotorDocument({ voltageV: 100, frequencyHz: 20, duty: 1, durationS: 2 }, { ohm: 2, henry: 1e-6, torqueNmPerA: 3, inertia: 6 });
  const [at] = simulate(document, { at: [1.3333333333333333] }).at;
  expect(misses(at?.speedRadPerS, (100 / 3) * (1 - Math.exp(-1)))).toBeLessThan(1e-6);
});

// MOT-NISE: N. S. Nise, Control Systems Engineering, example 2.23: speed over voltage 0.041667/(s + 1.66667); L negligible.
test("MOT-NISE: gain and pole from the torque-speed line", () => {
  const motor = { ohm: 1, henry: 1e-6, torqueNmPerA: 5, emfVs: 2, inertia: 12, viscous: 10 };
  const times = [0.3, 0.6, 1.8];
  for (const at of simulate(idealMotorDocument({ voltageV: 100, frequencyHz: 20, duty: 1, durationS: 2 }, motor), { at: times }).at) {
    // Load side speed is a tenth of the motor's: 0.041667 V^-1 s^-2 there is 0.41667 at the motor shaft.
    const speed = ((0.41666666666666664 * 100) / 1.6666666666666667) * (1 - Math.exp(-1.6666666666666667 * at.timeS));
    // The book's pole tolerance is 5e-4; the electrical lag L/R = 1 us left here costs 2e-6.
    expect(misses(at.speedRadPerS, speed)).toBeLessThan(5e-6);
  }
});

// MOT-R14.8: M. H. Rashid, Power Electronics, 4th ed., example 14.8 (COMPUTED, inputs VERIFIED); ripple-free armature.
test("MOT-R14.8: chopper-fed drive takes 90 kW and gives 954.375 N m at 91.028 rad/s", () => {
  const motor = { ohm: 0.05, henry: 10, torqueNmPerA: 1.527 * 2.5, inertia: 1e4 };
  const drive = { voltageV: 600, frequencyHz: 2000, duty: 0.6, durationS: 0.02, currentA: 250, speedRadPerS: 91.02815979043878 };
  const { figures } = simulate(idealMotorDocument(drive, motor));
  expect(misses(figures.inputW, 90000)).toBeLessThan(1e-4);
  expect(misses(figures.torqueMeanNm, 954.375)).toBeLessThan(1e-4);
  expect(misses(figures.motorMeanA, 250)).toBeLessThan(1e-4);
});

describe("EVT-REV: current reversal after the bridge flips (closed form, mpmath, COMPUTED)", () => {
  const motor = { ohm: 0.6, henry: 0.00045, torqueNmPerA: 0.042, inertia: 0.00012, viscous: 2e-5, activeNm: 0.1 };
  const document = idealMotorDocument({ voltageV: 24, frequencyHz: 500, duty: -1, durationS: 0.1, currentA: 6, speedRadPerS: 400 }, motor);
  const rows = [
    [1e-5, 5.0198769321611705, 400.0102809668072],
    [1e-4, -3.2372075389075596, 399.9547563423832],
    [1e-3, -48.243547757874246, 389.6289252466329],
    [5e-3, -62.0912617349692, 299.825041518529],
    [2e-2, -42.00476596371412, 16.76224428960241],
    [0.1, -3.8083414507358473, -518.6135298138596],
  ] as const;
  const result = simulate(document, { at: [...rows.map(([timeS]) => timeS), 0.0031205391574168984] });
  test.each(rows.map((row, n) => [n, ...row] as const))("state %# of the run", (n, _timeS, currentA, speed) => {
    expect(misses(result.at[n]?.motorCurrentA, currentA)).toBeLessThan(1e-10);
    expect(misses(result.at[n]?.speedRadPerS, speed)).toBeLessThan(1e-10);
  });
  test("the zero of the current is located at 63.41707440383928 microseconds", () => {
    const crossing = result.events.find((event) => event.kind === "currentZero");
    expect(misses(crossing?.timeS, 6.341707440383928e-5)).toBeLessThan(1e-9);
  });
  test("the peak is -64.0175 A", () => {
    expect(misses(result.at[6]?.motorCurrentA, -64.01751253298916)).toBeLessThan(1e-10);
  });
});

// CU-RHO: IEC 60028:1925, copper 0.00393 per kelvin at 20 degC: R(100 degC) = 1.3144 R(20 degC) (VERIFIED).
test("CU-RHO: a locked motor at 100 degC draws 1/1.3144 of its current at 20 degC", () => {
  const document = idealMotorDocument({ voltageV: 24, frequencyHz: 18000, duty: 1, durationS: 0.03 }, { ohm: 0.6, henry: 0.00045, torqueNmPerA: 0.042, inertia: 1e-4, locked: true });
  if (document.load.kind !== "motor") throw new Error("no motor");
  document.load.motor.temperatureC = 100;
  expect(misses(simulate(document).figures.motorMeanA, 24 / ((0.6 - 1e-6) * 1.3144 + 1e-6))).toBeLessThan(1e-9);
});

// MOT-R14.9 (part): while regenerating through a chopper the mean terminal voltage is (1 - k) V_s = 240 V at k = 0.6.
test("MOT-R14.9: regenerative braking returns 60 kW at 240 V mean", () => {
  const document = emfDocument({ voltageV: 600, frequencyHz: 2000, duty: 0.4, durationS: 0.02, currentA: -250 }, 0.02 + 0.03, 10, 252.5);
  const { figures } = simulate(document);
  expect(misses(figures.inputW, -60000)).toBeLessThan(1e-4);
});
