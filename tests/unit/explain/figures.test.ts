import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine/index";
import type { Figures } from "@/lib/engine/results";
import { FIGURE_LIST, figureLabel, formatFigure, READOUT_LIST } from "@/lib/explain/figure-list";
import { explainFigure } from "@/lib/explain/figures";
import { explainReadout } from "@/lib/explain/readouts";
import { parseQuantity } from "@/lib/units/parse";
import { templateById, TEMPLATES } from "@/lib/scenario/templates";

const at = (id: string) => {
  const { document } = templateById(id)!;
  return { document, simulation: simulate(document, { at: [0, 0.00121, document.run.durationS] }) };
};

test("the list holds every figure of a run once, and every quantity of an instant", () => {
  const { simulation } = at("reversal");
  expect(FIGURE_LIST.map(({ name }) => name).sort()).toEqual(Object.keys(simulation.figures).sort());
  const readouts = Object.keys(simulation.at[0]).filter((name) => name !== "timeS" && name !== "state");
  expect(READOUT_LIST.map(({ name }) => name as string).sort()).toEqual(readouts.sort());
});

describe.each(TEMPLATES.map(({ id }) => id))("in template %s", (id) => {
  const { document, simulation } = at(id);

  test.each(FIGURE_LIST.map(({ name }) => name))("%s has title, formula, values and source", (name) => {
    const explanation = explainFigure(name, document, simulation);
    for (const part of Object.values(explanation)) {
      expect(part.length).toBeGreaterThan(2);
      expect(part).not.toMatch(/NaN|undefined|null|Infinity/);
    }
    expect(explanation.source).toMatch(/[.]$/);
    const value = simulation.figures[name];
    if (value === null) expect(explanation.withValues).toMatch(/^Not available in this run: .+\.$/);
    else if (document.load.kind === "motor") expect(explanation.withValues).toContain(formatFigure(name, value).text);
  });

  test.each(READOUT_LIST.map(({ name }) => name))("%s is explained at an instant", (name) => {
    for (const reading of simulation.at) {
      const explanation = explainReadout(name, document, reading);
      for (const part of Object.values(explanation)) expect(part).not.toMatch(/NaN|undefined|null|Infinity/);
    }
  });
});

describe("the numbers put in give the result that is shown", () => {
  /** Evaluates "a · b = c" of an explanation, units and all. */
  const numbersOf = (text: string, unit: string) =>
    [...text.matchAll(/(\u2212?\d[\d.\u2009]*)\s*([fpnµmkMGT]?)([^\s\d\u2212·();=,]*)/g)].map(([, number, prefix]) => {
      const parsed = parseQuantity(number + prefix, unit);
      return parsed.ok ? parsed.value : NaN;
    });
  const close = (a: number, b: number) => expect(a / b).toBeCloseTo(1, 2);

  test("torque is the torque constant times the mean current", () => {
    const { document, simulation } = at("continuous-on");
    const [constant, current, torque] = numbersOf(
      explainFigure("torqueMeanNm", document, simulation).withValues,
      "N·m",
    );
    close(constant * current, torque);
    close(torque, simulation.figures.torqueMeanNm);
  });
  test("copper loss is the resistance times the current squared", () => {
    const { document, simulation } = at("continuous-on");
    const { withValues } = explainFigure("copperW", document, simulation);
    const [ohm, current, loss] = numbersOf(withValues.split("; ")[1].replace("²", ""), "W");
    close(ohm * current ** 2, loss);
  });
  test("power from the supply is voltage times mean current", () => {
    const { document, simulation } = at("high-side-recirculation");
    const [voltage, current, power] = numbersOf(explainFigure("inputW", document, simulation).withValues, "W");
    close(voltage * current, power);
  });
  test("the difference is crossed for shunts at the bottom", () => {
    const { document, simulation } = at("large-shunt");
    const explanation = explainFigure("differenceMeanV", { ...document }, simulation);
    expect(explanation.formula).toBe("v_d = v_outB − v_outA");
    const [outB, outA, difference] = numbersOf(explanation.withValues.replace(" − ", " · "), "V");
    close(outB - outA, difference);
  });
  test("gain and sensitivity come from the resistors", () => {
    const { document, simulation } = at("sub-milliohm");
    expect(explainFigure("outAMeanV", document, simulation).withValues).toContain(
      "G = R_out/R_in = 100 kΩ/100 Ω = 1000 V/V, R_s = 400 µΩ: 400 mV/A",
    );
  });
  test("one LSB of the converter in ampere", () => {
    const { document, simulation } = at("combined-midscale");
    // 3.3 V/4096 = 805.66 µV; over 30 V/V times 4 mΩ: 6.7139 mA
    expect(explainFigure("reconstructionErrorMaxA", document, simulation).withValues).toMatch(
      /^LSB = 805\.7 µV, V_zero = 1\.65 V, G R_s = 120 mV\/A, so one LSB is 6\.714 mA;/,
    );
  });
  test("ripple frequency counts twice for an odd number of bars", () => {
    const { document, simulation } = at("reversal");
    if (document.load.kind !== "motor") throw new Error("the reversal has a motor");
    const odd = {
      ...document,
      load: { ...document.load, motor: { ...document.load.motor, commutation: { barsCount: 7, rippleShare: 0.02 } } },
    };
    const figures: Figures = {
      ...simulation.figures,
      speedMeanRadPerS: -100,
      commutationRippleHz: (2 * 7 * 100) / (2 * Math.PI),
    };
    expect(explainFigure("commutationRippleHz", odd, { ...simulation, figures }).withValues).toBe(
      "2 · 7 · 100 rad/s/(2π) = 223 Hz",
    );
  });
});

test("a single shunt has no letter", () => {
  expect([figureLabel("shuntAW", true), figureLabel("shuntAW", false)]).toEqual([
    "Dissipation, shunt A",
    "Dissipation, shunt",
  ]);
});

test("figures are written with their digits", () => {
  expect(formatFigure("motorRmsA", 3.5).text).toBe("3.50 A");
  expect(formatFigure("clippedShare", 0.0314).text).toBe("3.14 %");
  expect(formatFigure("clippedShare", 0).text).toBe("0 %");
  expect(formatFigure("energyResidualShare", 8.03e-15).text).toBe("8.0 × 10^-15");
  expect(formatFigure("headroomV", null).text).toBe("\u2013");
});
