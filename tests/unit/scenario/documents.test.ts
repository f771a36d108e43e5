import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine/index";
import { defaultDocument, WARM_UP_DOCUMENT } from "@/lib/scenario/defaults";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";
import { templateById, TEMPLATES } from "@/lib/scenario/templates";
import { upgradeScenario } from "@/lib/scenario/upgrade";
import { caseDocument, changedCase } from "./case-document";

const CASES = [
  "01-low-forward-sync",
  "03-high-forward-sync-difference",
  "06-fast-reverse-diode-discontinuous",
  "11-reversal-direct",
  "16-stick-and-break-away",
  "22-fault-stalled-rotor",
];

describe("the public cases", () => {
  test.each(CASES)("%s is accepted as it is", (name) => {
    const sent = caseDocument(name);
    const parsed = parseScenario(sent);
    expect(parsed.ok ? [] : parsed.findings).toEqual([]);
    expect(parsed.ok && parsed.document).toMatchObject(sent);
  });
});

test("left-out fields take their defaults, those of another field too", () => {
  const without = [
    "supply.resistanceOhm",
    "supply.busCapacitanceF",
    "supply.acceptsReturn",
    "bridge.highSide.diodeForwardV",
    "bridge.lowSide.diodeResistanceOhm",
    "bridge.deadTimeS",
    "bridge.commutationS",
    "pwm.synchronous",
    "command.special",
    "command.reversal.dwellS",
    "load.motor.backEmfVPerRadPerS",
    "load.motor.viscousNmPerRadPerS",
    "load.motor.staticNm",
    "load.motor.temperatureC",
    "load.motor.locked",
    "sensing.shunt.inductanceH",
    "sensing.converter.perPeriod",
    "sensing.converter.average",
    "sensing.converter.apertureS",
    "faults",
    "initial.currentA",
    "initial.speedRadPerS",
  ];
  const parsed = parseScenario(changedCase(Object.fromEntries(without.map((path) => [path, undefined]))));
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.findings));
  const { supply, bridge, pwm, command, load, sensing, faults, initial } = parsed.document;
  expect(supply).toEqual({ voltageV: 24, resistanceOhm: 0, busCapacitanceF: 0, acceptsReturn: true });
  expect([
    bridge.highSide.diodeForwardV,
    bridge.lowSide.diodeResistanceOhm,
    bridge.deadTimeS,
    bridge.commutationS,
  ]).toEqual([0.8, 0, 5e-7, 5e-8]);
  expect([pwm.synchronous, command.special, command.reversal, faults]).toEqual([
    true,
    [],
    { kind: "direct", dwellS: 0 },
    [],
  ]);
  expect(load).toMatchObject({
    motor: {
      backEmfVPerRadPerS: 0.0412,
      coulombNm: 0.0061,
      staticNm: 0.0061,
      viscousNmPerRadPerS: 0,
      temperatureC: 20,
      locked: false,
    },
  });
  expect([
    sensing.shunt.inductanceH,
    sensing.converter.perPeriod,
    sensing.converter.average,
    sensing.converter.apertureS,
  ]).toEqual([0, 1, 1, 0]);
  expect(initial).toEqual({ currentA: 0, speedRadPerS: 0 });
});

describe("format versions", () => {
  test("version 1 is read", () => {
    expect(upgradeScenario(caseDocument()).ok).toBe(true);
  });
  test("a later version is refused with what to do", () => {
    expect(upgradeScenario(changedCase({ format: "slackwater.scenario/3" }))).toEqual({
      ok: false,
      findings: [
        {
          path: "format",
          code: "format.unknown",
          text: "This document has format version 3; this Slackwater reads version 1. Open it with a newer one.",
        },
      ],
    });
  });
  test("another format is refused by name, a missing one with the rest of the problems", () => {
    const other = upgradeScenario({ format: "circuit/2" });
    expect(other.ok ? "" : other.findings[0].text).toBe(
      '"circuit/2" is no format of a scenario; slackwater.scenario/1 is expected.',
    );
    const none = upgradeScenario(changedCase({ format: undefined, "supply.voltageV": 0 }));
    expect(none.ok ? [] : none.findings.map((finding) => finding.path)).toEqual(["format", "supply.voltageV"]);
  });
});

const run = (document: ScenarioDocument) => simulate(document, { at: [0, document.run.durationS] });

describe.each(TEMPLATES.map((template) => [template.id, template] as const))("template %s", (id, template) => {
  test("is valid, complete, and runs for 2 to 20 ms to its end", () => {
    expect(parseScenario(template.document)).toEqual({ ok: true, document: template.document });
    expect(template.document.run.durationS).toBeGreaterThanOrEqual(0.002);
    expect(template.document.run.durationS).toBeLessThanOrEqual(0.02);
    expect(template.purpose).toMatch(/^[A-Z](?:[^.]|\.\d)*\.$/);
    expect(templateById(id)).toBe(template);
    const simulation = run(template.document);
    expect(simulation.status).toBe("reached-end");
    expect(simulation.figures.energyResidualShare).toBeLessThan(1e-9);
    expect(simulation.figures.clippedShare).toBe(0);
  });
});

describe("the templates show what they say", () => {
  const figuresOf = (id: string) => run(templateById(id)!.document).figures;
  test("low-side recirculation hides the current in the off-time, high-side keeps it", () => {
    // 45 % duty: the same motor current, read 45 % of the time or all of the time through G R_s = 0.12 V/A
    const [low, high] = [figuresOf("low-side-recirculation"), figuresOf("high-side-recirculation")];
    expect(low.motorMeanA).toBeCloseTo(high.motorMeanA, 1);
    expect(high.differenceMeanV! / (0.12 * high.motorMeanA)).toBeCloseTo(1, 1);
    expect(low.differenceMeanV! / (0.12 * low.motorMeanA)).toBeCloseTo(0.45, 1);
  });
  test("the reversal passes through zero", () => {
    const { at } = run(templateById("reversal")!.document);
    expect(at[0].motorCurrentA).toBeGreaterThan(1);
    expect(at[1].motorCurrentA).toBeLessThan(-1);
  });
  test("the sub-milliohm shunt stays ten times cooler than the ordinary one", () => {
    const [small, ordinary] = [figuresOf("sub-milliohm"), figuresOf("high-side-recirculation")];
    expect(ordinary.shuntAW! / small.shuntAW!).toBeGreaterThan(9);
  });
  test("the battery coil is one-directional with one shunt", () => {
    const figures = figuresOf("battery-coil");
    expect([figures.outBMeanV, figures.combinedMeanV, figures.mechanicalW]).toEqual([null, null, 0]);
    expect(figures.outAMeanV).toBeGreaterThan(0.5);
  });
  test("ids and titles differ", () => {
    expect(new Set(TEMPLATES.map(({ id }) => id)).size).toBe(TEMPLATES.length);
    expect(new Set(TEMPLATES.map(({ title }) => title)).size).toBe(TEMPLATES.length);
  });
});

test("the new document and the worker's warm-up are valid", () => {
  expect(parseScenario(defaultDocument()).ok).toBe(true);
  expect(parseScenario(WARM_UP_DOCUMENT)).toEqual({ ok: true, document: WARM_UP_DOCUMENT });
});
