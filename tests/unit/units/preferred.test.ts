import { readFileSync } from "node:fs";
import { join } from "node:path";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { nearestPreferred, nextPreferred } from "@/lib/units/preferred";

type Check = { id: string; inputs: { series?: string }; expected: unknown };
const { checks } = JSON.parse(readFileSync(join(import.meta.dirname, "../../reference/check-values.json"), "utf8")) as {
  checks: Check[];
};

describe.each(["E12", "E24"] as const)("%s", (series) => {
  // PV-E12 and PV-E24: IEC 60063:2015, tables of E3 to E24 (tests/reference/check-values.json)
  const table = checks.find((check) => check.id === `PV-${series}`)!.expected as number[];

  test("has the values of IEC 60063, one decade round", () => {
    const found: number[] = [];
    for (let value = 10; value < 99.9; value = nextPreferred(series, value, 1)) found.push(value);
    expect(found).toEqual(table);
  });

  test("goes down the way it goes up", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (value) => {
        const up = nextPreferred(series, value, 1);
        expect(up).toBeGreaterThan(value);
        const nearest = nearestPreferred(series, value);
        expect(nextPreferred(series, nextPreferred(series, nearest, 1), -1)).toBe(nearest);
      }),
    );
  });
});

test("the nearest value is the nearest by ratio", () => {
  expect(nearestPreferred("E24", 0.004)).toBe(0.0039);
  expect(nearestPreferred("E24", 0.0097)).toBe(0.01);
  expect(nearestPreferred("E12", 5120)).toBe(4700);
});

test("what is not above zero comes back as it is", () => {
  expect(nearestPreferred("E24", 0)).toBe(0);
  expect(nextPreferred("E24", -3, 1)).toBe(-3);
});
