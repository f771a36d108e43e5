import { UNITS } from "@/lib/units/unit-table";
import { describe, expect, test } from "vitest";
import { formatQuantity, formatRange } from "@/lib/units/format";

describe("a quantity is written", () => {
  test.each([
    [0.012, "Ω", "12 mΩ"],
    [0.0004, "Ω", "400 µΩ"],
    [4700, "Ω", "4.7 kΩ"],
    [20000, "Hz", "20 kHz"],
    [-0.35, "V", "\u2212350 mV"],
    [0, "V", "0 V"],
    [-0, "V", "0 V"],
    [999.96, "V", "1 kV"],
    [999.94, "V", "999.9 V"],
    [23e-6, "kg·m²", "23 mg·m²"],
    [0.5, "kg·m²", "500 g·m²"],
    [0, "kg·m²", "0 kg·m²"],
    [0.55, "share", "55 %"],
    [-0.35, "share", "\u221235 %"],
    [12.5, "%", "12.5 %"],
    [314.159, "rad/s", "314.2 rad/s"],
    [12345, "rad/s", "12\u2009350 rad/s"],
    [2e6, "LSB", "2\u2009000\u2009000 LSB"],
    [1 / 3, "", "0.3333"],
    [1e-17, "V", "0.01 fV"],
    [null, "V", "\u2013"],
    [NaN, "V", "\u2013"],
    [Infinity, "V", "\u2013"],
  ])("%s in %s", (value, unit, text) => {
    expect(formatQuantity(value, unit).text).toBe(text);
  });

  test("with trailing zeros where columns must line up", () => {
    expect(formatQuantity(3.5, "A", { digits: 3, isFixed: true }).text).toBe("3.50 A");
    expect(formatQuantity(0.079, "W", { digits: 3, isFixed: true }).text).toBe("79.0 mW");
  });

  test("with a given prefix, so that the unit does not jump while a slider moves", () => {
    expect(formatQuantity(1.25, "Ω", { prefix: "m" })).toEqual({
      number: "1250",
      unit: "mΩ",
      text: "1250 mΩ",
      prefix: "m",
    });
    expect(formatQuantity(0.5, "V", { prefix: "" }).text).toBe("0.5 V");
  });

  test("in parts that a field can show apart", () => {
    expect(formatQuantity(-0.00012, "V", { digits: 3 })).toEqual({
      number: "\u2212120",
      unit: "µV",
      text: "\u2212120 µV",
      prefix: "µ",
    });
  });
});

test("a range is written with the unit at both ends", () => {
  expect(formatRange(0.1, 2000, "V")).toBe("0.1 V to 2 kV");
  expect(formatRange(1e-6, 10, "Ω")).toBe("1 µΩ to 10 Ω");
  expect(formatRange(-1, 1, "")).toBe("\u22121 to 1");
});

test("a number at the end of the doubles is written in every unit", () => {
  for (const unit of Object.keys(UNITS)) expect(formatQuantity(Number.MAX_VALUE, unit).number).toMatch(/\d/);
});
