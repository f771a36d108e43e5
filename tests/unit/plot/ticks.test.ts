import { describe, expect, it } from "vitest";
import { cursorFormat, decimalsOf, fixed, formatTime, laneTicks, niceTicks, paddedDomain, stickyDomain, tickTexts, timeFormat, unitScale } from "@/components/plot/ticks";

describe("ticks", () => {
  it("are round, inside the range and free of accumulated error", () => {
    expect(niceTicks(-3.2, 6.1, 4)).toEqual([0, 5]);
    expect(niceTicks(0, 0.6, 6)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6]);
    expect(niceTicks(0, 600, 5)).toEqual([0, 200, 400, 600]);
  });

  it("of a lane stay 14 px apart and never more than five", () => {
    for (const [min, max, heightPx] of [
      [-4.4, 6, 66],
      [0, 3.3, 31],
      [-0.012, 0.0471, 94],
      [0, 24.5, 180],
    ] as const) {
      const ticks = laneTicks(min, max, heightPx);
      const gaps = ticks.slice(1).map((tick, index) => ((tick - ticks[index]!) * heightPx) / (max - min));
      expect(ticks.length).toBeGreaterThan(0);
      expect(ticks.length).toBeLessThanOrEqual(5);
      expect(gaps.every((gap) => gap >= 13.9)).toBe(true);
      expect(ticks.every((tick) => tick >= min - 1e-12 && tick <= max + 1e-12)).toBe(true);
    }
  });

  it("of a step of 2.5 are written with their decimal", () => {
    expect(tickTexts([-2.5, 0, 2.5, 5], 1, true)).toEqual(["−2.5", "0.0", "+2.5", "+5.0"]);
    expect([5, 2.5, 0.25, 0.1, 1000].map(decimalsOf)).toEqual([0, 1, 2, 1, 0]);
  });
});

describe("numbers", () => {
  it("use the true minus, group thousands and give a rounded zero no sign", () => {
    expect(fixed(-3.836, 2)).toBe("−3.84");
    expect(fixed(-0.0004, 2, true)).toBe("0.00");
    expect(fixed(12345.6, 1)).toBe("12\u2009345.6");
    expect(fixed(3.84, 2, true)).toBe("+3.84");
  });

  it("of a lane share the prefix of its largest value", () => {
    expect(unitScale(0.0384, "V")).toEqual({ factor: 1e-3, unit: "mV" });
    expect(unitScale(5.2, "A")).toEqual({ factor: 1, unit: "A" });
    expect(unitScale(0, "A")).toEqual({ factor: 1, unit: "A" });
  });
});

describe("times", () => {
  it("keep one unit across a window", () => {
    expect(timeFormat({ fromS: 0, toS: 6e-4 }, 600)).toMatchObject({ unit: "µs", decimals: 2 });
    expect(timeFormat({ fromS: 0, toS: 0.05 }, 600).unit).toBe("ms");
    expect(timeFormat({ fromS: 0, toS: 10 }, 600).unit).toBe("s");
  });

  it("of the cursor tell a thousandth of a PWM period apart, however long the run", () => {
    expect(formatTime(2.25e-4, cursorFormat({ fromS: 0, toS: 6e-4 }, 5e-5))).toBe("225.00 µs");
    const long = cursorFormat({ fromS: 0, toS: 10 }, 5e-5);
    expect(formatTime(4.0002, long)).not.toBe(formatTime(4.0002 + 5e-8, long));
  });
});

describe("a lane's domain", () => {
  it("has air around the data and always shows its base", () => {
    const domain = paddedDomain(2, 5, 0, 0.001);
    expect(domain.min).toBeLessThan(0);
    expect(domain.max).toBeGreaterThan(5);
  });

  it("is never empty", () => {
    const domain = paddedDomain(0, 0, 0, 0.01);
    expect(domain.max - domain.min).toBeGreaterThan(0.01);
    expect(paddedDomain(Infinity, -Infinity, 1.65, 0.01).max).toBeGreaterThan(1.65);
  });

  it("only grows while a value is dragged", () => {
    const before = { min: -4, max: 6 };
    expect(stickyDomain(before, { min: -1, max: 2 }, true)).toBe(before);
    expect(stickyDomain(before, { min: -1, max: 9 }, true)).toEqual({ min: -4, max: 9 });
  });

  it("follows afterwards only when the data fill less than 60 % of it", () => {
    const before = { min: 0, max: 10 };
    expect(stickyDomain(before, { min: 1, max: 9 }, false)).toBe(before);
    expect(stickyDomain(before, { min: 1, max: 4 }, false)).toEqual({ min: 1, max: 4 });
    expect(stickyDomain(before, { min: 1, max: 11 }, false)).toEqual({ min: 1, max: 11 });
  });
});
