import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { inputAt } from "@/lib/scenario/inputs";
import type { QuantityInput } from "@/lib/scenario/input-types";
import { limited, pageStepped, sliderPosition, snapped, stepped, valueAtPosition } from "@/lib/scenario/sliders";

const quantity = (path: string) => inputAt(path) as QuantityInput;
const shunt = quantity("sensing.shunt.resistanceOhm");
const duty = quantity("command.points.*.duty");
const bits = quantity("sensing.converter.bits");
const phase = quantity("sensing.converter.phase");

describe("a slider", () => {
  test("on a log scale has the geometric mean in the middle", () => {
    // 0.2 mΩ to 0.5 Ω: √(2e-4 · 0.5) = 0.01
    expect(valueAtPosition(shunt, 0.5)).toBe(0.01);
    expect(sliderPosition(shunt.slider!, 0.01)).toBeCloseTo(0.5, 12);
  });
  test("on a linear scale moves in its steps", () => {
    expect(valueAtPosition(duty, 0.7749)).toBe(0.55);
    expect(sliderPosition(duty.slider!, -0.35)).toBeCloseTo(0.325, 12);
  });
  test("stands at its end for values beyond it, and never leaves the limits", () => {
    expect(sliderPosition(shunt.slider!, 3)).toBe(1);
    fc.assert(
      fc.property(
        fc.constantFrom(shunt, duty, bits, phase),
        fc.double({ min: -2, max: 3, noNaN: true }),
        (input, position) => {
          const value = valueAtPosition(input, position);
          expect(value).toBeGreaterThanOrEqual(input.min);
          expect(value).toBeLessThanOrEqual(input.max);
          if (input.isMaxOpen) expect(value).toBeLessThan(input.max);
          if (input.isWhole) expect(Number.isInteger(value)).toBe(true);
        },
      ),
    );
  });
  test("snaps to a preferred value that is near, and to none that is not", () => {
    expect(snapped(shunt, 0.00992, 0.02)).toBe(0.01);
    expect(snapped(shunt, 0.0104, 0.001)).toBe(0.0104);
    expect(snapped(duty, 0.333, 0.02)).toBe(0.333);
  });
});

describe("the keyboard", () => {
  test("steps by the slider's step, ten of them, or a tenth", () => {
    expect([stepped(duty, 0.45, 1, 1), stepped(duty, 0.45, -1, 10), stepped(duty, 0.45, 1, 0.1)]).toEqual([
      0.46, 0.35, 0.451,
    ]);
  });
  test("steps by the second digit on a log scale", () => {
    expect([stepped(shunt, 0.0047, 1, 1), stepped(shunt, 0.0047, -1, 10)]).toEqual([0.0048, 0.0037]);
  });
  test("steps whole numbers by one, and stops at the limits", () => {
    expect([stepped(bits, 12, 1, 0.1), stepped(bits, 24, 1, 10), stepped(bits, 6, -1, 1)]).toEqual([13, 24, 6]);
    expect(stepped(duty, 1, 1, 1)).toBe(1);
    expect(limited(phase, 1)).toBeLessThan(1);
  });
  test("pages to the next preferred value, or ten steps", () => {
    expect([pageStepped(shunt, 0.004, 1), pageStepped(shunt, 0.004, -1), pageStepped(duty, 0.4, 1)]).toEqual([
      0.0043, 0.0039, 0.5,
    ]);
  });
});
