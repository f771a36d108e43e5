import { expect, test } from "vitest";
import { diffDocuments, labelOf, valueText } from "@/lib/scenario/diff";
import { setAt } from "@/lib/scenario/paths";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { templateById } from "@/lib/scenario/templates";

const before = (): ScenarioDocument => templateById("reversal")!.document;
const textsAfter = (changes: Record<string, unknown>) => {
  let after = before();
  for (const [path, value] of Object.entries(changes)) after = setAt(after, path, value);
  return diffDocuments(before(), after).map(({ text }) => text);
};

test("the same document has no differences", () => {
  expect(diffDocuments(before(), structuredClone(before()))).toEqual([]);
});

test("a difference has path, label, both values and a line", () => {
  expect(diffDocuments(before(), setAt(before(), "sensing.shunt.resistanceOhm", 0.01))).toEqual([
    {
      path: "sensing.shunt.resistanceOhm",
      label: "Shunt resistance",
      before: "4 mΩ",
      after: "10 mΩ",
      text: "Shunt resistance 4 mΩ to 10 mΩ",
    },
  ]);
});

test("numbers, words, switches, rows and parts read in the product's words", () => {
  expect(
    textsAfter({
      "command.points.1.duty": -0.35,
      "pwm.scheme": "fastDecay",
      "pwm.synchronous": false,
      "sensing.converter.phase": 0.5,
      title: "Another drive",
    }),
  ).toEqual([
    "Title Gate drive, direct reversal to Another drive",
    "Drive scheme Recirculate low side to Fast decay",
    "Synchronous rectification on to off",
    "Command point 2, duty \u221230 % to \u221235 %",
    "Sample instant in the period 25 % to 50 %",
  ]);
  expect(textsAfter({ "load.gear": { ratio: 30, efficiency: 0.7 }, "sensing.filter": undefined })).toEqual([
    "Gear added",
    "Output filter removed",
  ]);
  expect(textsAfter({ "command.points.1": undefined })).toEqual(["Command point 2 removed"]);
  expect(textsAfter({ "sensing.ambientC": 60 })).toEqual(["Ambient temperature of the shunt none to 60 °C"]);
});

test("rows are counted from one", () => {
  expect(labelOf("load.shaft.0.value", before())).toBe("Shaft load 1, size");
  expect(valueText("load.shaft.0.value", 0.21, before())).toBe("210 mN·m");
});

test("a path outside the document is a programmer's mistake", () => {
  expect(() => setAt(before(), "__proto__.polluted", 1)).toThrow("not a path");
  expect(({} as Record<string, unknown>).polluted).toBeUndefined();
});
