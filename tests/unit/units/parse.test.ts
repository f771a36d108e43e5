import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { formatQuantity } from "@/lib/units/format";
import { parseQuantity, type ParseOptions } from "@/lib/units/parse";
import { UNITS } from "@/lib/units/unit-table";

const valueOf = (text: string, unit: string, options?: ParseOptions) => {
  const parsed = parseQuantity(text, unit, options);
  return parsed.ok ? parsed.value : parsed.code;
};

describe("a person may write a quantity as", () => {
  test.each([
    // look.md section 7, "Number field"
    ["10m", "Ω", 0.01],
    ["10 mΩ", "Ω", 0.01],
    ["10 mohm", "Ω", 0.01],
    ["0.01", "Ω", 0.01],
    ["1e-2", "Ω", 0.01],
    ["12k", "Ω", 12000],
    ["-35 %", "%", -35],
    ["0,45 mH", "H", 0.00045],
    ["47 µF", "F", 47e-6],
    ["47 μF", "F", 47e-6],
    ["47 uF", "F", 47e-6],
    // product.md, "Rules of the surface"
    ["4m", "Ω", 0.004],
    ["18k", "Hz", 18000],
    ["12 A", "A", 12],
    // a Kelvin sign of a resistor, a letter for the point (IEC 60062)
    ["4k7", "Ω", 4700],
    ["0R012", "Ω", 0.012],
    ["R012", "Ω", 0.012],
    // other ways to write the unit
    ["20 khz", "Hz", 20000],
    ["-120uV", "V", -120e-6],
    ["\u221235 %", "%", -35],
    ["30", "V/V", 30],
    ["30 V/V", "V/V", 30],
    ["40 nV/rtHz", "V/√Hz", 40e-9],
    ["0.8 µV/°C", "V/K", 0.8e-6],
    ["2.5 V/us", "V/s", 2.5e6],
    ["50 ppm/K", "ppm/K", 50],
    ["18 K/W", "K/W", 18],
    ["61 mN·m/A", "N·m/A", 0.061],
    ["61 mNm/A", "N·m/A", 0.061],
    ["0.061 Vs/rad", "V·s/rad", 0.061],
    ["23 mg·m²", "kg·m²", 23e-6],
    ["230 g·cm²", "kg·m²", 23e-6],
    ["0.000023 kg m2", "kg·m²", 23e-6],
    ["55 %", "share", 0.55],
    ["55", "share", 0.55],
    ["35%", "", 0.35],
    ["3000 rpm", "rad/s", 100 * Math.PI],
    // thousands
    ["1 234,5", "V", 1234.5],
    ["1\u2009500\u2009000", "Hz", 1.5e6],
    ["1,000,000", "Hz", 1e6],
    ["1.234,5", "V", 1234.5],
    ["1,234.5", "V", 1234.5],
    ["+5", "V", 5],
    ["- 5", "V", -5],
    [".5", "V", 0.5],
  ])("%j in %s", (text, unit, expected) => {
    const parsed = parseQuantity(text, unit);
    expect(parsed.ok && parsed.value).toBeCloseTo(expected, 12);
    expect(parsed.ok && Math.abs(parsed.value / expected - 1)).toBeLessThan(1e-15);
  });
});

test.each([
  ["", "V", "empty"],
  ["  ", "V", "empty"],
  ["abc", "V", "number"],
  ["1.2.3", "V", "number"],
  ["12 34", "V", "number"],
  ["1e999", "V", "number"],
  ["--5", "V", "number"],
  ["NaN", "V", "number"],
  ["Infinity", "V", "number"],
  ["5 A", "V", "unit"],
  ["5 mm", "Ω", "unit"],
  ["5 k", "dB", "unit"],
  ["5 %", "V", "unit"],
  ["5 K", "K/W", "unit"],
  ["1".repeat(65), "V", "number"],
])("%j in %s is refused as %s", (text, unit, code) => {
  expect(valueOf(text, unit)).toBe(code);
});

describe("a bare number", () => {
  const range = { min: 1e-6, max: 10 };
  test("takes the unit shown", () => {
    expect(valueOf("50", "Ω", { displayPrefix: "m", range })).toBe(0.05);
    expect(valueOf("23", "kg·m²", { displayPrefix: "m" })).toBe(23e-6);
  });
  test("takes the base unit when only that is in range, and the line says so", () => {
    expect(parseQuantity("0.0005", "Ω", { displayPrefix: "m", range })).toEqual({
      ok: true,
      value: 0.0005,
      reading: "500 µΩ",
      note: "Read in Ω, because in mΩ it would be out of range.",
    });
  });
  test("is refused with the range when neither fits", () => {
    expect(parseQuantity("70000", "Ω", { displayPrefix: "m", range })).toEqual({
      ok: false,
      code: "range",
      value: 70,
      text: "70 Ω is outside 1 µΩ to 10 Ω.",
    });
  });
  test("does not take the unit shown when a prefix was typed", () => {
    expect(valueOf("2k", "Ω", { displayPrefix: "m" })).toBe(2000);
  });
});

const units = fc.constantFrom(...Object.keys(UNITS));

describe("for any text and unit", () => {
  test("reading never throws and never gives NaN or an infinity", () => {
    const letters = fc.string({
      unit: fc.constantFrom(..."0123456789.,+-eEkKmMµμunpfGTRΩVAHzs%·/²√ ()'\u2009\u2212"),
      maxLength: 14,
    });
    fc.assert(
      fc.property(
        fc.oneof(letters, fc.string()),
        units,
        fc.constantFrom("", "m", "µ", "k"),
        (text, unit, displayPrefix) => {
          const parsed = parseQuantity(text, unit, { displayPrefix });
          if (parsed.ok) {
            expect(Number.isFinite(parsed.value)).toBe(true);
            expect(Object.is(parsed.value, -0)).toBe(false);
          } else expect(parsed.text.length).toBeGreaterThan(0);
        },
      ),
      { numRuns: 3000 },
    );
  });

  test("what is formatted reads back within the digits shown", () => {
    const values = fc
      .tuple(fc.integer({ min: -9_999_999, max: 9_999_999 }), fc.integer({ min: -22, max: 12 }))
      .map(([mantissa, exponent]) => Number(`${mantissa}e${exponent}`));
    fc.assert(
      fc.property(values, units, fc.integer({ min: 2, max: 9 }), fc.boolean(), (value, unit, digits, isFixed) => {
        const shown = formatQuantity(value, unit, { digits, isFixed });
        const read = parseQuantity(shown.text, unit);
        // Half a unit of the last digit shown, and the double rounding of the two conversions
        const allowed = Math.abs(value) * (0.5 * 10 ** (1 - digits) * (1 + 1e-9) + 1e-15);
        expect(read.ok ? Math.abs(read.value - value) : shown.text).toBeLessThanOrEqual(allowed);
      }),
      { numRuns: 4000 },
    );
  });
});
