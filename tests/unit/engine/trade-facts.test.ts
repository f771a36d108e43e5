import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import type { InstantReading } from "@/lib/engine/results";
import { baseDocument, motorOf, withReference } from "@/tests/support/oracle/base-document";

/** Facts of the trade (trade-facts.md): common practice, no source. Our own numbers. */
const onTime = (duty: number, change: (document: ReturnType<typeof baseDocument>) => void = () => undefined): InstantReading => {
  const document = baseDocument();
  document.command.points = [{ timeS: 0, duty, ramp: "step" }];
  const sign = Math.sign(duty);
  document.initial = { currentA: 2.3 * sign, speedRadPerS: 271 * sign };
  document.sensing.amplifier.offsetV = 0;
  document.sensing.amplifier.cmrrDb = 160;
  change(document);
  const middleS = 20.3 / document.pwm.frequencyHz;
  const [at] = simulate(document, { at: [middleS] }).at;
  if (!at) throw new Error("no reading");
  return at;
};

describe("TF-1: a shunt at the top of each leg", () => {
  test("forward drive shows on leg A while leg B rests at zero", () => {
    const at = onTime(0.53);
    expect(at.outAV).toBeGreaterThan(0.3);
    expect(Math.abs(at.outBV ?? Number.NaN)).toBeLessThan(1e-6);
    expect(at.differenceV).toBeGreaterThan(0.3);
  });
  test("reversed, they change places and the difference turns its sign", () => {
    const forward = onTime(0.53);
    const reverse = onTime(-0.53);
    expect(reverse.outBV).toBeCloseTo(forward.outAV ?? Number.NaN, 9);
    expect(Math.abs(reverse.outAV ?? Number.NaN)).toBeLessThan(1e-6);
    expect(reverse.differenceV).toBeCloseTo(-(forward.differenceV ?? Number.NaN), 9);
  });
});

describe("TF-2: combined output around 2.5 V on 10 milli-ohm shunts", () => {
  const combined = (duty: number): InstantReading =>
    onTime(duty, (document) => {
      document.sensing.shunt.resistanceOhm = 0.01;
      document.sensing.amplifier.arrangement = "combinedMidscale";
      document.sensing.amplifier.outputMaxV = 5;
      withReference(document, 2.5);
    });
  test("rises for positive and falls for negative current by gain times drop", () => {
    for (const duty of [0.53, -0.53]) {
      const at = combined(duty);
      expect(Math.abs((at.combinedV ?? Number.NaN) - (2.5 + 19 * 0.01 * at.motorCurrentA))).toBeLessThan(0.01 * 5);
      expect(Math.sign((at.combinedV ?? 0) - 2.5)).toBe(Math.sign(duty));
    }
  });
  test("stands at the reference at zero current", () => {
    const document = baseDocument();
    document.command.points = [{ timeS: 0, duty: 0, ramp: "step" }];
    document.initial = { currentA: 0, speedRadPerS: 0 };
    motorOf(document).shaft = [];
    document.sensing.amplifier.arrangement = "combinedMidscale";
    document.sensing.amplifier.offsetV = 0;
    withReference(document, 2.5);
    document.sensing.amplifier.outputMaxV = 5;
    expect(simulate(document, { at: [0.0009] }).at[0]?.combinedV).toBeCloseTo(2.5, 9);
  });
});

describe("TF-7: the conducting diagonal sets the direction, duty sets the torque", () => {
  const locked = (duty: number) => {
    const document = baseDocument();
    motorOf(document).motor.locked = true;
    motorOf(document).shaft = [];
    document.command.points = [{ timeS: 0, duty, ramp: "step" }];
    document.initial = { currentA: 0, speedRadPerS: 0 };
    document.run.durationS = 0.01;
    document.sensing.amplifier.outputMaxV = 12;
    return simulate(document);
  };
  test("u = +1 and u = -1 give the whole supply and the stall current of either sign", () => {
    const stallA = 26.3 / (0.91 * (1 + 0.00393 * 3) + 0.037 + 0.029 + 0.0131);
    for (const duty of [1, -1]) {
      const result = locked(duty);
      expect(Math.abs(result.figures.motorMeanA - duty * stallA)).toBeLessThan(1e-5 * stallA);
    }
  });
  test("torque at locked rotor rises with duty throughout", () => {
    const torques = [-1, -0.7, -0.3, -0.05, 0.05, 0.3, 0.7, 1].map((duty) => locked(duty).figures.torqueMeanNm);
    for (let n = 1; n < torques.length; n += 1) expect(torques[n]).toBeGreaterThan(torques[n - 1] ?? Infinity);
  });
});
