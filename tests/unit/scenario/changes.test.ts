import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { addRow, applyChange, removeRow } from "@/lib/scenario/changes";
import { CHOICES, choicesAt } from "@/lib/scenario/choices";
import { INPUTS, inputValue, resolveInput, rowInputs, sectionInputs } from "@/lib/scenario/inputs";
import { SECTIONS, type Input } from "@/lib/scenario/input-types";
import { getAt } from "@/lib/scenario/paths";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";
import { LIST_PATHS, ROWS_MAX } from "@/lib/scenario/starts";
import { templateById, TEMPLATES } from "@/lib/scenario/templates";

const reversal = () => templateById("reversal")!.document;
const problems = (document: ScenarioDocument) => {
  const parsed = parseScenario(document);
  return parsed.ok ? [] : parsed.findings.map((finding) => `${finding.path}: ${finding.text}`);
};
const rowsOf = (document: ScenarioDocument, list: string) => (getAt(document, list) as unknown[] | undefined) ?? [];

/** All inputs that can be seen in a document, rows included. */
const visible = (document: ScenarioDocument): Input[] => [
  ...SECTIONS.flatMap(({ id }) => sectionInputs(id, document)),
  ...LIST_PATHS.flatMap((list) => rowsOf(document, list).flatMap((_, index) => rowInputs(list, index, document))),
];

describe("choosing one thing changes what must go with it, and says so", () => {
  const changed = (path: string, value: unknown, document = reversal()) => {
    const applied = applyChange(document, path, value);
    expect(problems(applied.document)).toEqual([]);
    return { ...applied, paths: applied.alsoChanged.map((difference) => difference.path) };
  };

  test("a shunt in the motor line is read around midscale by a bipolar channel", () => {
    const { document, alsoChanged } = changed("sensing.site", "line");
    expect(document.sensing.amplifier).toMatchObject({ arrangement: "bipolarMidscale", response: "bipolar" });
    expect(alsoChanged.map(({ text }) => text)).toEqual([
      "Arrangement Combined, midscale to Bipolar, midscale",
      "Channel response Unipolar to Bipolar",
    ]);
  });
  test("and back at the legs, unipolar channels are combined", () => {
    const line = changed("sensing.site", "line").document;
    expect(changed("sensing.site", "legBottom", line).document.sensing.amplifier).toMatchObject({
      arrangement: "combinedMidscale",
      response: "unipolar",
    });
  });
  test("a midscale output gets a reference in the middle of the output's span", () => {
    const without = changed("sensing.reference", false);
    expect(without.document.sensing.amplifier.arrangement).toBe("differencePair");
    const back = changed("sensing.amplifier.arrangement", "combinedMidscale", without.document);
    expect(back.document.sensing.reference?.voltageV).toBe(1.65);
    expect(back.alsoChanged.map(({ text }) => text)).toEqual(["Reference added"]);
  });
  test("mixed decay is edge-aligned with a fast share, and leaves none behind", () => {
    const centre = changed("pwm.alignment", "centre").document;
    const mixed = changed("pwm.scheme", "mixedDecay", centre);
    expect(mixed.document.pwm).toMatchObject({ alignment: "edge", mixedFastShare: 0.5 });
    expect(changed("pwm.scheme", "fastDecay", mixed.document).document.pwm.mixedFastShare).toBeUndefined();
    expect(changed("pwm.alignment", "centre", mixed.document).document.pwm.scheme).toBe("lowSideRecirculation");
  });
  test("locked antiphase is synchronous and reverses directly", () => {
    const dwelling = changed("command.reversal.kind", "coast").document;
    expect(dwelling.command.reversal.dwellS).toBe(1e-3);
    const { document, paths } = changed(
      "pwm.scheme",
      "lockedAntiphase",
      changed("pwm.synchronous", false, dwelling).document,
    );
    expect([document.pwm.synchronous, document.command.reversal]).toEqual([true, { kind: "direct", dwellS: 0 }]);
    expect(paths.sort()).toEqual(["command.reversal.dwellS", "command.reversal.kind", "pwm.synchronous"]);
  });
  test("a supply that takes nothing back gets a capacitor and a resistance; taking one away makes it take back", () => {
    const stiff = changed("supply.busCapacitanceF", 0, changed("supply.resistanceOhm", 0).document).document;
    const rectifier = changed("supply.acceptsReturn", false, stiff).document;
    expect(rectifier.supply).toEqual({
      voltageV: 24,
      resistanceOhm: 0.05,
      busCapacitanceF: 1e-3,
      acceptsReturn: false,
    });
    expect(changed("supply.resistanceOhm", 0, rectifier).document.supply.acceptsReturn).toBe(true);
  });
  test("another load takes the motor's faults and speed away", () => {
    const faulty = addRow(reversal(), "faults").document;
    expect(faulty.faults).toEqual([{ kind: "stalledRotor", atS: 0.0035 }]);
    const { document } = changed("load.kind", "resistive", faulty);
    expect([document.faults, document.initial]).toEqual([[], { currentA: 0, speedRadPerS: 0 }]);
  });
  test("the back-EMF constant follows the torque constant while they are equal, and no longer when they are not", () => {
    const followed = changed("load.motor.torqueConstantNmPerA", 0.07).document;
    expect(getAt(followed, "load.motor.backEmfVPerRadPerS")).toBe(0.07);
    const apart = changed("load.motor.backEmfVPerRadPerS", 0.068, followed).document;
    expect(
      getAt(changed("load.motor.torqueConstantNmPerA", 0.09, apart).document, "load.motor.backEmfVPerRadPerS"),
    ).toBe(0.068);
  });
  test("two gain resistors keep the gain, and the filter its resistance", () => {
    const resistors = changed("sensing.amplifier.gain.kind", "resistors").document;
    expect(resistors.sensing.amplifier.gain).toEqual({ inOhm: 1000, outOhm: 30000 });
    expect(resistors.sensing.filter).toEqual({ capacitanceF: 1e-9 });
    const fixed = changed("sensing.amplifier.gain.kind", "fixed", resistors).document;
    expect([fixed.sensing.amplifier.gain, fixed.sensing.filter]).toEqual([
      { fixed: 30 },
      { resistanceOhm: 30000, capacitanceF: 1e-9 },
    ]);
  });
  test("a fault of a shunt takes a leg where there are legs", () => {
    const faulty = addRow(reversal(), "faults").document;
    const open = changed("faults.0.kind", "shuntOpen", faulty).document;
    expect(open.faults[0]).toEqual({ kind: "shuntOpen", atS: 0.0035, leg: "A" });
    expect(changed("sensing.site", "return", open).document.faults[0]).toEqual({ kind: "shuntOpen", atS: 0.0035 });
  });
  test("another kind of shaft load keeps about its torque", () => {
    // 0.21 N·m at 120 rad/s: 1.46e-5 N·m·s² of a fan, 1.75e-3 N·m·s of viscous friction
    const fan = changed("load.shaft.0.kind", "fan").document;
    expect(getAt(fan, "load.shaft.0")).toEqual({ timeS: 0, kind: "fan", value: 1.46e-5 });
    expect(getAt(changed("load.shaft.0.kind", "viscous", fan).document, "load.shaft.0.value")).toBe(1.75e-3);
    expect(getAt(changed("load.shaft.0.kind", "none", fan).document, "load.shaft.0.value")).toBe(0);
  });
  test("a window beyond a shorter run falls back to the usual one", () => {
    expect(changed("run.durationS", 0.002).document.run).toEqual({ durationS: 0.002 });
  });
  test("a number out of range stays, for the page to show what is wrong", () => {
    const { document } = applyChange(reversal(), "supply.voltageV", 3000);
    expect(problems(document)).toEqual(["supply.voltageV: Supply voltage is 3 kV; enter 0.1 V to 2 kV."]);
  });
  test("the document given is left as it was", () => {
    const before = structuredClone(reversal());
    applyChange(reversal(), "sensing.site", "line");
    addRow(reversal(), "command.points");
    removeRow(reversal(), "command.points", 1);
    expect(reversal()).toEqual(before);
  });
});

describe("rows", () => {
  test.each(LIST_PATHS)("of %s are added in order until the list is full", (list) => {
    let document = reversal();
    for (let count = 0; count < 12; count += 1) {
      document = addRow(document, list).document;
      expect(problems(document)).toEqual([]);
    }
    const longer = rowsOf(document, list).length;
    document = removeRow(document, list, longer - 1).document;
    expect(rowsOf(document, list)).toHaveLength(longer - 1);
    while (rowsOf(document, list).length < ROWS_MAX[list]) {
      const grown = addRow(document, list).document;
      if (rowsOf(grown, list).length === rowsOf(document, list).length) break;
      document = grown;
    }
    expect(rowsOf(document, list)).toHaveLength(ROWS_MAX[list]);
    expect(addRow(document, list).document).toBe(document);
  });
  test("the first command point stays", () => {
    expect(removeRow(reversal(), "command.points", 0).document.command.points).toHaveLength(2);
    expect(removeRow(reversal(), "command.points", 1).document.command.points).toHaveLength(1);
  });
});

describe("the table of inputs", () => {
  test("reaches every number and every choice of every template", () => {
    const leaves = (node: unknown, path: string): string[] =>
      typeof node === "object" && node !== null
        ? Object.entries(node).flatMap(([key, child]) => leaves(child, path === "" ? key : `${path}.${key}`))
        : [path];
    for (const { document } of TEMPLATES) {
      const shown = new Set(visible(document).map((input) => input.path));
      // Not inputs: what names the document, the first point's time and ramp, which rules fix, and fields a choice hides
      const fixed = [
        "format",
        "title",
        "notes",
        "command.points.0.timeS",
        "command.points.0.ramp",
        "command.reversal.dwellS",
        ...(document.load.kind === "motor" ? [] : ["initial.speedRadPerS"]),
      ];
      expect(leaves(document, "").filter((path) => !shown.has(path) && !fixed.includes(path))).toEqual([]);
    }
  });
  test("gives each its label, section and limits once", () => {
    expect(new Set(INPUTS.map((input) => input.path)).size).toBe(INPUTS.length);
    for (const input of INPUTS) {
      expect(input.label).toMatch(/^[A-Z]/);
      expect(SECTIONS.map(({ id }) => id)).toContain(input.section);
      if (input.kind !== "quantity" || !input.slider) continue;
      expect(input.slider.min).toBeGreaterThanOrEqual(input.min);
      expect(input.slider.max).toBeLessThanOrEqual(input.max);
      if (input.slider.scale === "log") expect(input.slider.min).toBeGreaterThan(0);
    }
  });
  test("names the unit of a shaft load by its kind", () => {
    const fan = applyChange(reversal(), "load.shaft.0.kind", "fan").document;
    expect(resolveInput("load.shaft.0.value", fan)).toMatchObject({ unit: "N·m·s²/rad²", min: 0 });
    const weight = applyChange(reversal(), "load.shaft.0.kind", "active").document;
    expect(resolveInput("load.shaft.0.value", weight)).toMatchObject({ unit: "N·m", min: -1e6 });
  });
  test("offers only arrangements that the site allows", () => {
    expect(choicesAt("sensing.amplifier.arrangement", reversal()).map(({ value }) => value)).toEqual([
      "singleEnded",
      "differencePair",
      "combinedMidscale",
    ]);
    const line = applyChange(reversal(), "sensing.site", "line").document;
    expect(choicesAt("sensing.amplifier.arrangement", line).map(({ value }) => value)).toEqual([
      "singleEnded",
      "bipolarMidscale",
    ]);
  });
  test("has words for every choice of the schema", () => {
    for (const input of INPUTS) if (input.kind === "choice") expect(Object.keys(CHOICES)).toContain(input.path);
  });
});

/** A person's edits: any visible choice, flag or part, a number within its limits, a row more or less. */
type Edit = { pick: number; value: number };
function edited(document: ScenarioDocument, { pick, value }: Edit): ScenarioDocument {
  const inputs = visible(document).filter(
    (input) =>
      input.kind !== "quantity" ||
      !/timeS$|fromS$|toS$|outputM|commonMode|durationS|apertureS|frequencyHz/.test(input.path),
  );
  const list = LIST_PATHS[Math.floor(value * LIST_PATHS.length) % LIST_PATHS.length];
  if (pick % 9 === 0) return addRow(document, list).document;
  if (pick % 9 === 1) return removeRow(document, list, Math.floor(value * rowsOf(document, list).length)).document;
  const input = inputs[pick % inputs.length];
  if (input.kind === "choice") {
    const options = choicesAt(input.path, document);
    return applyChange(document, input.path, options[Math.floor(value * options.length)].value).document;
  }
  if (input.kind !== "quantity") return applyChange(document, input.path, !inputValue(input, document)).document;
  const raw = input.min + (input.max - input.min) * value;
  return applyChange(document, input.path, value < 0.15 ? input.min : input.isWhole ? Math.round(raw) : raw).document;
}

test("no sequence of edits through the table leaves an invalid document", () => {
  const edits = fc.array(fc.record({ pick: fc.nat(), value: fc.double({ min: 0, max: 0.999, noNaN: true }) }), {
    minLength: 1,
    maxLength: 25,
  });
  fc.assert(
    fc.property(fc.constantFrom(...TEMPLATES), edits, (template, sequence) => {
      let document = template.document;
      for (const edit of sequence) {
        document = edited(document, edit);
        expect(problems(document)).toEqual([]);
      }
    }),
    { numRuns: 300 },
  );
});
