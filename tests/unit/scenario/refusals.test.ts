import { describe, expect, test } from "vitest";
import { parseScenario } from "@/lib/scenario/schema";
import { changedCase } from "./case-document";

type Changes = Record<string, unknown>;
const findingsOf = (changes: Changes, name?: string) => {
  const parsed = parseScenario(changedCase(changes, name));
  return parsed.ok ? [] : parsed.findings;
};
const pathsOf = (changes: Changes, name?: string) => findingsOf(changes, name).map((finding) => finding.path);

describe("a value outside its range is refused at its path, with the range", () => {
  test.each<[string, unknown, string]>([
    ["supply.voltageV", 3000, "Supply voltage is 3 kV; enter 0.1 V to 2 kV."],
    ["supply.voltageV", 0.09, "Supply voltage is 90 mV; enter 0.1 V to 2 kV."],
    ["supply.voltageV", 2000.0000001, "Supply voltage is 2.0000000001 kV; enter 0.1 V to 2 kV."],
    ["supply.resistanceOhm", 10.5, "Supply resistance is 10.5 Ω; enter 0 Ω to 10 Ω."],
    ["supply.busCapacitanceF", -1, "Bus capacitance is \u22121 F; enter 0 F to 1 F."],
    ["supply.busCapacitanceF", 1e-15, "Bus capacitance is 1 fF; enter 0, or 1 pF to 1 F."],
    ["bridge.deadTimeS", 2e-4, "Dead time is 200 µs; enter 0 s to 100 µs."],
    ["pwm.frequencyHz", 5, "PWM frequency is 5 Hz; enter 10 Hz to 1 MHz."],
    ["command.points.0.duty", 1.1, "Duty command is 1.1; enter \u22121 to 1."],
    ["load.motor.resistanceOhm", 0, "Winding resistance at 20 °C is 0 Ω; enter 100 µΩ to 10 kΩ."],
    ["load.motor.inertiaKgM2", 1e-10, "Rotor inertia is 100 ng·m²; enter 1 µg·m² to 10 Mg·m²."],
    ["load.motor.temperatureC", 251, "Winding temperature is 251 °C; enter \u221260 °C to 250 °C."],
    [
      "load.shaft.0.value",
      2e6,
      "Shaft load is 2\u2009000\u2009000; enter \u22121\u2009000\u2009000 to 1\u2009000\u2009000.",
    ],
    ["sensing.shunt.resistanceOhm", 11, "Shunt resistance is 11 Ω; enter 1 µΩ to 10 Ω."],
    ["sensing.shunt.tolerancePct", 51, "Shunt tolerance is 51 %; enter 0 % to 50 %."],
    ["sensing.amplifier.offsetV", 0.2, "Input offset is 200 mV; enter \u22120.1 V to 0.1 V."],
    ["sensing.amplifier.cmrrDb", 19, "Common-mode rejection is 19 dB; enter 20 dB to 160 dB."],
    ["sensing.amplifier.gain.fixed", 2e5, "Gain is 200\u2009000 V/V; enter 0.001 V/V to 100\u2009000 V/V."],
    ["sensing.converter.bits", 5, "Converter resolution is 5 bit; enter a whole number, 6 bit to 24 bit."],
    ["sensing.converter.bits", 12.5, "Converter resolution is 12.5 bit; enter a whole number, 6 bit to 24 bit."],
    ["sensing.converter.phase", 1, "Sample instant in the period is 1; enter 0 or more and less than 1."],
    ["sensing.converter.perPeriod", 65, "Conversions per period is 65; enter a whole number, 1 to 64."],
    ["sensing.filter.capacitanceF", 2e-3, "Filter capacitance is 2 mF; enter 0 F to 1 mF."],
    ["initial.currentA", NaN, "Initial motor current is NaN, not a number; enter \u2212100 kA to 100 kA."],
    ["run.durationS", Infinity, "Length of the run is Infinity, not a number; enter 1 µs to 60 s."],
    ["run.durationS", "0.002", 'Length of the run is "0.002", not a number; enter 1 µs to 60 s.'],
    ["run.durationS", undefined, "Length of the run is missing; enter 1 µs to 60 s."],
  ])("%s = %s", (path, value, text) => {
    expect(findingsOf({ [path]: value }).map((finding) => [finding.path, finding.text])).toEqual([[path, text]]);
  });
});

describe("limits themselves are accepted", () => {
  test.each<[string, unknown]>([
    ["supply.voltageV", 2000],
    ["supply.voltageV", 0.1],
    ["sensing.converter.phase", 0],
    ["sensing.converter.phase", 0.999999],
    ["sensing.shunt.tcrPpmPerK", -5000],
    ["load.motor.inertiaKgM2", 1e-9],
    ["command.points.0.duty", -1],
    ["bridge.commutationS", 0],
  ])("%s = %s", (path, value) => {
    expect(findingsOf({ [path]: value })).toEqual([]);
  });
});

describe("wrong shapes are refused at their path", () => {
  test.each<[string, Changes, string[]]>([
    ["format of another version", { format: "slackwater.scenario/2" }, ["format"]],
    ["empty title", { title: "" }, ["title"]],
    ["title of spaces", { title: "   " }, ["title"]],
    ["title with a line break", { title: "a\nb" }, ["title"]],
    ["title too long", { title: "x".repeat(121) }, ["title"]],
    ["notes with a NUL, which the database cannot keep", { notes: "a\u0000" }, ["notes"]],
    ["half a surrogate pair", { notes: "\ud800" }, ["notes"]],
    ["unknown scheme", { "pwm.scheme": "slow" }, ["pwm.scheme"]],
    ["unknown load", { "load.kind": "lamp" }, ["load.kind"]],
    ["unknown fault", { faults: [{ kind: "gremlin", atS: 0 }] }, ["faults.0.kind"]],
    ["fault without its parameter", { faults: [{ kind: "wornBrushes", atS: 0 }] }, ["faults.0.factor"]],
    ["fault with another's parameter", { faults: [{ kind: "openWinding", atS: 0, factor: 2 }] }, ["faults.0.factor"]],
    [
      "unknown fields, each with its path",
      { surprise: 1, "load.motor.colour": "red" },
      ["load.motor.colour", "surprise"],
    ],
    [
      "both ways of giving the gain",
      { "sensing.amplifier.gain": { fixed: 20, inOhm: 100, outOhm: 2000 } },
      ["sensing.amplifier.gain.fixed"],
    ],
    [
      "half of the gain resistors",
      { "sensing.amplifier.gain": { inOhm: 100 }, "sensing.filter": undefined },
      ["sensing.amplifier.gain.outOhm"],
    ],
    ["no gain", { "sensing.amplifier.gain": {} }, ["sensing.amplifier.gain.fixed"]],
    ["no command", { "command.points": [] }, ["command.points"]],
    [
      "too many points",
      { "command.points": Array.from({ length: 201 }, (_, n) => ({ timeS: n / 1e6, duty: 0, ramp: "step" })) },
      ["command.points"],
    ],
    ["a number for a word", { "supply.acceptsReturn": 1 }, ["supply.acceptsReturn"]],
    ["a list for an object", { supply: [] }, ["supply"]],
    ["nothing for an object", { sensing: null }, ["sensing"]],
    [
      "missing parts",
      { notes: undefined, "command.reversal": undefined, "load.shaft": undefined, initial: undefined },
      ["notes", "command.reversal", "load.shaft", "initial"],
    ],
  ])("%s", (_, changes, paths) => {
    expect(pathsOf(changes).sort()).toEqual([...paths].sort());
  });

  test("every problem is named at once, rules between fields among them", () => {
    const paths = pathsOf({
      "supply.voltageV": 3000,
      "pwm.scheme": "mixedDecay",
      "pwm.alignment": "centre",
      "load.motor.resistanceOhm": NaN,
      "sensing.site": "line",
      "sensing.amplifier.arrangement": "differencePair",
      "run.window": { fromS: 0.003, toS: 0.001 },
      extra: true,
    });
    expect(paths.sort()).toEqual(
      [
        "supply.voltageV",
        "pwm.alignment",
        "pwm.mixedFastShare",
        "load.motor.resistanceOhm",
        "sensing.amplifier.arrangement",
        "run.window.fromS",
        "extra",
      ].sort(),
    );
  });

  test.each([null, undefined, 5, "x", [], true])("%s instead of a document", (value) => {
    const parsed = parseScenario(value);
    expect(parsed.ok ? [] : parsed.findings.map((finding) => finding.path)).toEqual([""]);
  });

  test("a document too large, too deep or cyclic is refused as a whole", () => {
    const cyclic: Record<string, unknown> = { ...changedCase({}) };
    cyclic.self = cyclic;
    let deep: unknown = 1;
    for (let level = 0; level < 50_000; level += 1) deep = [deep];
    for (const value of [cyclic, deep, { list: new Array(30_000).fill({}) }]) {
      const parsed = parseScenario(value);
      expect(parsed.ok ? [] : parsed.findings.map((finding) => finding.code)).toEqual(["document.size"]);
    }
  });
});
