import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { emfDocument } from "@/tests/support/oracle/ideal-document";

/** Check values of filters, amplifiers, shunts and codes (check-values.json), each with id and source, through whole runs. */
const misses = (found: number | null | undefined, wanted: number): number => Math.abs((found ?? Number.NaN) - wanted) / Math.abs(wanted);
const f = 18000;
const T = 1 / f;

/** A pulsed leg with a steady 1 A: the upper shunt of leg A shows rectangular pulses of 1 A at duty 0.45. */
const pulseDocument = (bandwidthHz: number, gain = 1): ScenarioDocument => {
  const document = emfDocument({ voltageV: 2, frequencyHz: f, duty: 0.45, durationS: 30 * T, currentA: 1 }, 1e-3, 10, 0.9 - 1e-3);
  document.sensing.site = "legTop";
  document.sensing.shunt.resistanceOhm = 1e-3;
  document.sensing.amplifier.gain = { fixed: gain };
  document.sensing.amplifier.bandwidthHz = bandwidthHz;
  document.sensing.amplifier.response = "unipolar";
  if (document.load.kind === "motor") document.load.motor.resistanceOhm = 1e-3;
  return document;
};

describe("AMP-PULSE: rectangular pulses through one pole, D 0.45 at 18 kHz (periodic steady state of e^(-t/tau), COMPUTED)", () => {
  const rows = [
    [1e-6, 0.9999999999861121, 0.999996273346828],
    [5e-6, 0.9932768978604019, 0.9180958487871536],
    [2e-5, 0.7607990431203878, 0.5531137792957451],
  ] as const;
  test.each(rows)("tau %s s: end and centre of the pulse", (tau, end, centre) => {
    const document = pulseDocument(1 / (2 * Math.PI * tau), 100);
    const result = simulate(document, { at: [25.45 * T - 1e-12, 25.225 * T] });
    expect(misses(result.at[0]?.outAV, 0.1 * end)).toBeLessThan(1e-5);
    expect(misses(result.at[1]?.outAV, 0.1 * centre)).toBeLessThan(1e-5);
  });
});

test("AMP-SETTLE-PCT, AMP-RISE: 63.2 % after tau, 99 % after 4.6052 tau, 10 to 90 % in ln 9 tau (first order)", () => {
  const tau = 3e-6;
  const start = 0;
  const document = pulseDocument(1 / (2 * Math.PI * tau), 100);
  document.initial.currentA = 1;
  // The run starts settled at 1 A with A high, so the falling edge is the clean step: out = e^(-t/tau).
  const falls = [1, 4.605170185988091, 2.3025850929940455, 0.10536051565782628].map((times) => start + 0.45 * T + times * tau);
  const out = simulate(document, { at: falls }).at.map((one) => (one.outAV ?? Number.NaN) / 0.1);
  expect(misses(out[0], Math.exp(-1))).toBeLessThan(1e-5);
  expect(misses(out[1], 0.01)).toBeLessThan(1e-5);
  expect(misses(out[2], 0.1)).toBeLessThan(1e-5);
  expect(misses(out[3], 0.9)).toBeLessThan(1e-5);
});

// AMP-GBW: Scilab textbook companion 2825, example 9.4: 1 MHz and gain 10 leave 100 kHz (COMPUTED, inputs VERIFIED).
test("AMP-GBW: gain 10 of a 1 MHz amplifier settles with 1/(2 pi 100 kHz)", () => {
  const document = pulseDocument(5e6, 10);
  document.sensing.amplifier.gainBandwidthHz = 1e6;
  const after = 2.1e-6;
  const [at] = simulate(document, { at: [0.45 * T + after] }).at;
  expect(misses(at?.outAV, 0.01 * Math.exp(-2 * Math.PI * 1e5 * after))).toBeLessThan(1e-5);
});

// AMP-CMRR: input-referred V_cm/CMRR: 24 V and 100 dB are 240 uV, 48 mA on 5 milli-ohm (COMPUTED).
test("AMP-CMRR: 24 V of common mode at 100 dB reads 240 microvolts", () => {
  const document = emfDocument({ voltageV: 24, frequencyHz: f, duty: 1, durationS: 20 * T }, 0.6, 0.00045, 24);
  document.sensing.amplifier.cmrrDb = 100;
  document.sensing.amplifier.gain = { fixed: 20 };
  const [at] = simulate(document, { at: [10 * T] }).at;
  expect(misses(at?.outAV, 20 * 0.00024)).toBeLessThan(1e-6);
});

describe("AMP-TRI: triangle through one pole (closed form for D = 1/2, COMPUTED)", () => {
  const rows = [
    [1e-6, 0.9500934029997462, 6.931471805590817e-7],
    [5e-6, 0.7518560630009532, 3.446443569431209e-6],
    [2e-5, 0.32244832496365183, 9.410439931060398e-6],
  ] as const;
  test.each(rows)("tau %s s: peak-to-peak ratio at the stated delay", (tau, ratio, delayS) => {
    const drive = { voltageV: 24, frequencyHz: f, duty: 0, durationS: 60 * T, scheme: "lockedAntiphase" as const, currentA: -12 / 18000 / 4 / 0.01 };
    const document = emfDocument(drive, 1e-3, 0.02, 1e-9);
    document.sensing.shunt.resistanceOhm = 1e-3;
    if (document.load.kind === "motor") document.load.motor.resistanceOhm = 1e-4;
    document.sensing.amplifier.gain = { fixed: 1000 };
    document.sensing.amplifier.bandwidthHz = 1 / (2 * Math.PI * tau);
    const peaks = simulate(document, { at: [50 * T, 50.5 * T, 50.5 * T + delayS, 51 * T + delayS] }).at;
    const current = (peaks[1]?.motorCurrentA ?? 0) - (peaks[0]?.motorCurrentA ?? 0);
    const shown = (peaks[2]?.outAV ?? 0) - (peaks[3]?.outAV ?? 0);
    expect(misses(shown / current, ratio)).toBeLessThan(1e-5);
  });
});

// SH-ESL: 3 nH in series with 1 milli-ohm, 20 A in 50 ns: 1.2 V spike over 20 mV (L di/dt, COMPUTED).
test("SH-ESL: a commutation of 20 A in 50 ns shows a spike of 1.2 V on 3 nH", () => {
  const document = pulseDocument(1e5);
  document.initial.currentA = 20;
  document.sensing.shunt.inductanceH = 3e-9;
  document.bridge.commutationS = 5e-8;
  const [inside, after] = simulate(document, { at: [0.45 * T + 2.5e-8, 0.45 * T + 6e-8] }).at;
  expect(misses(inside?.senseAV, 0.5 * 0.02 - 1.2)).toBeLessThan(1e-4);
  expect(Math.abs(after?.senseAV ?? Number.NaN)).toBeLessThan(1e-6);
});

// SH-HEAT: R0 5 milli-ohm, 20 A, 40 K/W, 50 ppm/K: first pass 80 K, +0.4 % (D-33 takes one pass; COMPUTED).
test("SH-HEAT: self-heating raises the shunt by the first-order 0.4 %", () => {
  const document = emfDocument({ voltageV: 24, frequencyHz: f, duty: 1, durationS: 40 * T, currentA: 20 }, 0.6, 10, 12);
  document.sensing.shunt.resistanceOhm = 0.005;
  document.sensing.shunt.tcrPpmPerK = 50;
  document.sensing.shunt.thermalResistanceKPerW = 40;
  const [at] = simulate(document, { at: [30 * T] }).at;
  expect(misses((at?.senseAV ?? 0) / (at?.motorCurrentA ?? 1), 0.005 * 1.004)).toBeLessThan(1e-6);
});

describe("ADC-CODE rule A: code transition levels T[k] = (k - 1/2) Q, 12 bits over 3.3 V (IEEE Std 1241-2010, MEMORY+COMPUTED)", () => {
  const rows = [
    [0, 0], [0.000201416015625, 0], [0.000604248046875, 1], [0.0008056640625, 1],
    [1.649798583984375, 2048], [1.65, 2048], [3.2991943359375, 4095], [3.3, 4095], [3.4, 4095], [-0.1, 0],
  ] as const;
  test.each(rows)("%s V is code %s", (volts, code) => {
    const document = emfDocument({ voltageV: 24, frequencyHz: f, duty: 1, durationS: 20 * T }, 0.6, 0.00045, 24);
    // No current and no common-mode error worth a code: the pin stands at gain times offset.
    document.sensing.amplifier.gain = { fixed: 50 };
    document.sensing.amplifier.offsetV = volts / 50 - 24e-8;
    document.sensing.amplifier.outputMaxV = 5;
    document.sensing.converter = { ...document.sensing.converter, bits: 12, fullScaleV: 3.3, phase: 0.5 };
    const [sample] = simulate(document).samples.slice(-1);
    expect(sample?.codeA).toBe(code);
  });
});
