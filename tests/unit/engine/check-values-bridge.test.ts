import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import type { Simulation } from "@/lib/engine/results";
import { emfDocument, inductiveDocument, LINE_OHM } from "@/tests/support/oracle/ideal-document";

/** Check values from outside the project (check-values.json, section "Bridge PWM and chopper current"), with id, source, tolerance. */
const misses = (found: number | null | undefined, wanted: number): number => Math.abs((found ?? Number.NaN) - wanted) / Math.abs(wanted);
/** The stated tolerance is 1e-12 of the closed form; a back-EMF held by a heavy rotor moves by up to 1e-10 here. */
const CLOSE = 1e-9;
const firstOf = (result: Simulation, kind: string): number | undefined => result.events.find((event) => event.kind === kind)?.timeS;
const f = 18000;
const T = 1 / f;

describe("PWM-RLE-A: R-L-E load, one leg pulsed (closed form; M. H. Rashid, eqs 5.23 to 5.26; COMPUTED)", () => {
  const document = emfDocument({ voltageV: 24, frequencyHz: f, duty: 0.45, durationS: 20 * T, currentA: 5.6338274256333944 }, 0.6, 0.00045, 7.2);
  const result = simulate(document, { at: [10 * T, 10.45 * T, 10.225 * T, 10.725 * T] });
  const { figures } = result;
  test("mean 6 A, rms 6.003732896 A, ripple 0.733250354 A, peak 6.367077780 A", () => {
    expect(misses(figures.motorMeanA, 6)).toBeLessThan(CLOSE);
    expect(misses(figures.motorRmsA, 6.00373289618375)).toBeLessThan(CLOSE);
    expect(misses(figures.motorRippleA, 0.7332503542801502)).toBeLessThan(CLOSE * 10);
    expect(misses(figures.motorPeakA, 6.3670777799135445)).toBeLessThan(CLOSE);
    expect(misses(result.at[0]?.motorCurrentA, 5.6338274256333944)).toBeLessThan(CLOSE);
    expect(misses(result.at[1]?.motorCurrentA, 6.3670777799135445)).toBeLessThan(CLOSE);
  });
  test("PWM-RLE-A-LEG, PWM-DCLINK: upper switch and supply 2.701120217 A mean, 4.029095075 A rms", () => {
    expect(misses(figures.supplyMeanA, 2.701120217217973)).toBeLessThan(CLOSE);
    expect(misses(figures.topARmsA, 4.029095075195812)).toBeLessThan(CLOSE);
    expect(misses(figures.inputW, 64.82688521323135)).toBeLessThan(CLOSE);
  });
  test("PWM-MID: values at the middle of on-time and off-time", () => {
    expect(misses(result.at[2]?.motorCurrentA, 6.003507741862485)).toBeLessThan(CLOSE);
    expect(misses(result.at[3]?.motorCurrentA, 5.996718586569641)).toBeLessThan(CLOSE);
  });
});

test("PWM-COND: 10 milli-ohm switches lose what the path currents say (P = R_on I_rms^2, COMPUTED)", () => {
  const document = emfDocument({ voltageV: 24, frequencyHz: f, duty: 0.45, durationS: 20 * T, currentA: 5.6338274256333944 }, 0.6, 0.00045, 7.2);
  if (document.load.kind !== "motor") throw new Error("no motor");
  document.load.motor.resistanceOhm = 0.6 - 0.02 - LINE_OHM;
  document.bridge.highSide.onResistanceOhm = 0.01;
  document.bridge.lowSide.onResistanceOhm = 0.01;
  // Pulsed leg 0.360448087 W (check value) plus the held low switch, which always carries the motor current.
  expect(misses(simulate(document).figures.switchesW, 0.36044808688718916 + 0.01 * 6.00373289618375 ** 2)).toBeLessThan(CLOSE);
});

describe("PWM-RLE-B: bipolar drive, same load, D = 0.7 (COMPUTED)", () => {
  const drive = { voltageV: 24, frequencyHz: f, duty: 0.4, durationS: 20 * T, currentA: 3.3747652726384705, scheme: "lockedAntiphase" as const };
  const { figures } = simulate(emfDocument(drive, 0.6, 0.00045, 7.2));
  test("mean 4 A, rms 4.016097203 A, ripple 1.244324966 A, supply mean 1.603225919 A", () => {
    expect(misses(figures.motorMeanA, 4)).toBeLessThan(CLOSE);
    expect(misses(figures.motorRmsA, 4.0160972027045885)).toBeLessThan(CLOSE);
    expect(misses(figures.motorRippleA, 1.2443249659800262)).toBeLessThan(CLOSE * 10);
    expect(misses(figures.supplyMeanA, 1.6032259185392903)).toBeLessThan(CLOSE * 10);
  });
});

describe("PWM-DCM and PWM-CCM: one leg pulsed, diode freewheel (closed form)", () => {
  const drive = { voltageV: 24, frequencyHz: f, duty: 0.45, durationS: 20 * T, synchronous: false };
  test("PWM-DCM: E 12 V: peak 0.655677990 A, extinction at 49.19347845 us, mean 0.290347757 A", () => {
    const result = simulate(emfDocument(drive, 0.6, 0.00045, 12));
    expect(misses(result.figures.motorPeakA, 0.655677990359882)).toBeLessThan(CLOSE);
    expect(misses(result.figures.motorMeanA, 0.29034775679002595)).toBeLessThan(CLOSE);
    expect(misses(firstOf(result, "diodeEnds"), 4.919347845336104e-5)).toBeLessThan(CLOSE);
    expect(result.eventCounts.diodeEnds).toBe(20);
  });
  test.each([
    [10.580296455380036 * 0.9999, 0],
    [10.580296455380036 * 1.0001, 60],
  ])("PWM-CCM: at E = %s V the current stops in %s of the last periods", (emfV, stops) => {
    // The edge of continuous conduction is 10.580296 V; five time constants bring the current to its periodic course.
    const result = simulate(emfDocument({ ...drive, durationS: 360 * T }, 0.6, 0.00045, emfV));
    const late = result.events.filter((event) => event.kind === "diodeEnds" && event.timeS > 100 * T);
    expect(Math.sign(late.length)).toBe(Math.sign(stops));
  });
});

describe("PWM-R5.2 and PWM-666: published chopper examples (COMPUTED, inputs VERIFIED, tolerance 1e-6)", () => {
  test("PWM-R5.2: M. H. Rashid, Power Electronics, 4th ed., example 5.2", () => {
    const { figures } = simulate(inductiveDocument({ voltageV: 220, frequencyHz: 1000, duty: 0.5, durationS: 0.02, currentA: 18.366910915658153 }, 5, 0.0075));
    expect(misses(figures.motorPeakA, 25.633089084341847)).toBeLessThan(1e-6);
    expect(misses(figures.motorRippleA, 7.266178168683692)).toBeLessThan(1e-6);
    expect(misses(figures.motorMeanA, 22)).toBeLessThan(1e-6);
    expect(misses(figures.motorRmsA, 22.10050318130509)).toBeLessThan(1e-6);
    expect(misses(figures.supplyMeanA, 11.100732746974463)).toBeLessThan(1e-6);
  });
  test("PWM-666: R-L-E chopper at 5 kHz", () => {
    const { figures } = simulate(emfDocument({ voltageV: 220, frequencyHz: 5000, duty: 0.5, durationS: 0.004, currentA: 8.645284318791623 }, 10, 0.0155, 20));
    expect(misses(figures.motorPeakA, 9.354715681208377)).toBeLessThan(1e-6);
    expect(misses(figures.motorRippleA, 0.7094313624167561)).toBeLessThan(1e-6);
    expect(misses(figures.motorMeanA, 9)).toBeLessThan(1e-6);
  });
});

describe("PWM-AVG, PWM-RIPMAX: mean voltage and largest ripple of the patterns (Mohan, Undeland, Robbins 7-7; Rashid 5.29)", () => {
  const settled = (duty: number, scheme: "lowSideRecirculation" | "lockedAntiphase") =>
    simulate(inductiveDocument({ voltageV: 24, frequencyHz: f, duty, durationS: 500 * T, scheme }, 0.6, 0.00045)).figures;
  test.each([[0, 0], [0.25, 6], [0.45, 10.8], [0.5, 12], [0.7, 16.8], [1, 24]])("one leg pulsed at D = %s gives %s V", (duty, meanV) => {
    expect(Math.abs(settled(duty, "lowSideRecirculation").motorMeanA * 0.6 - meanV)).toBeLessThan(1e-8);
  });
  test.each([[0, -24], [0.25, -12], [0.45, -2.4], [0.5, 0], [0.7, 9.6], [1, 24]])("bipolar at D = %s gives %s V", (share, meanV) => {
    expect(Math.abs(settled(2 * share - 1, "lockedAntiphase").motorMeanA * 0.6 - meanV)).toBeLessThan(1e-8);
  });
  test("ripple at D = 1/2 is 0.740656 A (one leg) and 1.481312 A (bipolar), two to one", () => {
    expect(misses(settled(0.5, "lowSideRecirculation").motorRippleA, 0.740656076915373)).toBeLessThan(1e-8);
    expect(misses(settled(0, "lockedAntiphase").motorRippleA, 1.481312153830746)).toBeLessThan(1e-8);
  });
});

describe("PWM-DT: mean voltage lost to dead time (Mohan, Undeland, Robbins ch. 8; Jeong and Park 1991)", () => {
  test.each([
    ["lowSideRecirculation", 0.45, 10.8 - 0.216],
    ["lockedAntiphase", 0.4, 9.6 - 0.432],
  ] as const)("%s at u = %s leaves %s V", (scheme, duty, meanV) => {
    const document = inductiveDocument({ voltageV: 24, frequencyHz: f, duty, durationS: 500 * T, scheme }, 0.6, 0.00045);
    document.bridge.deadTimeS = 5e-7;
    expect(misses(simulate(document).figures.motorMeanA * 0.6, meanV)).toBeLessThan(1e-8);
  });
});

describe("FW-1 to FW-5: free-wheeling decay of an R-L branch (closed form, COMPUTED)", () => {
  // id, EMF (V), start current (A), opposing voltage, of it the diodes', zero of the current (s).
  const slow = [
    ["FW-1", 7.2, 10, 0.8, 0.00041971184095156703],
    ["FW-2", 0, 10, 0.7, 0.0016940868527517395],
    ["FW-3", 0, 10, 0.8, 0.001605049622622203],
  ] as const;
  test.each(slow)("%s: slow decay through one diode", (_id, emfV, currentA, diodeV, zeroS) => {
    const document = emfDocument({ voltageV: 24, frequencyHz: 100, duty: 0, durationS: 0.005, currentA, synchronous: false }, 0.6, 0.00045, emfV === 0 ? 1e-9 : emfV);
    document.bridge.lowSide.diodeForwardV = diodeV;
    expect(misses(firstOf(simulate(document), "diodeEnds"), zeroS)).toBeLessThan(1e-9);
  });
  const fast = [
    ["FW-4", 7.2, 10, 0.0001259937984293473],
    ["FW-5", 0, 40, 0.0004960488616840237],
  ] as const;
  test.each(fast)("%s: fast decay into the supply through two diodes of 0.8 V", (_id, emfV, currentA, zeroS) => {
    const document = emfDocument({ voltageV: 24, frequencyHz: 100, duty: 0, durationS: 0.005, currentA, scheme: "fastDecay", synchronous: false }, 0.6, 0.00045, emfV === 0 ? 1e-9 : emfV);
    document.bridge.lowSide.diodeForwardV = 0.8;
    document.bridge.highSide.diodeForwardV = 0.8;
    expect(misses(firstOf(simulate(document), "diodeEnds"), zeroS)).toBeLessThan(1e-9);
  });
});
