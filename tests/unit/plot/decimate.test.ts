import { describe, expect, it } from "vitest";
import { decimate, envelopeColumns, lowerBound, upperBound } from "@/components/plot/decimate";

/** A repeatable rough wave: linear congruential generator, so that no two runs differ. */
function roughWave(count: number): { times: Float64Array; values: Float64Array } {
  const times = new Float64Array(count);
  const values = new Float64Array(count);
  let seed = 12345;
  for (let index = 0; index < count; index += 1) {
    seed = (seed * 1103515245 + 12345) % 2147483648;
    times[index] = (index + 0.37) * 1e-6; // never on the border of two columns
    values[index] = Math.sin(index / 700) * 5 + (seed / 2147483648 - 0.5) * 3;
  }
  return { times, values };
}

const scale = { fromS: 0, toS: 0.05, x0: 100, x1: 700 };

describe("decimate", () => {
  it("keeps the smallest and the largest value of every pixel column", () => {
    const { times, values } = roughWave(49_999);
    const kept = new Set(decimate(times, values, scale));
    const perColumn = new Map<number, { min: number; max: number; keptMin: number; keptMax: number }>();
    for (let index = 0; index < times.length; index += 1) {
      const column = Math.min(599, Math.floor((times[index]! / 0.05) * 600));
      const entry = perColumn.get(column) ?? { min: Infinity, max: -Infinity, keptMin: Infinity, keptMax: -Infinity };
      entry.min = Math.min(entry.min, values[index]!);
      entry.max = Math.max(entry.max, values[index]!);
      if (kept.has(index)) {
        entry.keptMin = Math.min(entry.keptMin, values[index]!);
        entry.keptMax = Math.max(entry.keptMax, values[index]!);
      }
      perColumn.set(column, entry);
    }
    const wrong = [...perColumn.values()].filter((entry) => entry.min !== entry.keptMin || entry.max !== entry.keptMax);
    expect(wrong).toHaveLength(0);
  });

  it("leaves at most four points a pixel, plus one beyond each edge", () => {
    const { times, values } = roughWave(50_001);
    const kept = decimate(times, values, scale);
    expect(kept.length).toBeLessThanOrEqual(600 * 4 + 2);
    expect(kept.length).toBeGreaterThan(600 * 2);
  });

  it("gives indices in ascending order without repeats", () => {
    const { times, values } = roughWave(9_000);
    const kept = decimate(times, values, { fromS: 0.001, toS: 0.008, x0: 0, x1: 300 });
    expect(kept.every((index, place) => place === 0 || index > kept[place - 1]!)).toBe(true);
  });

  it("keeps both sides of a jump between dense points", () => {
    const times: number[] = [];
    const values: number[] = [];
    for (let index = 0; index < 4000; index += 1) {
      times.push(index * 1e-6);
      values.push(index < 2001 ? 1 : 7);
      if (index === 2000) {
        times.push(index * 1e-6);
        values.push(7);
      }
    }
    const kept = decimate(times, values, { fromS: 0, toS: 4e-3, x0: 0, x1: 200 });
    const sides = kept.filter((index) => times[index] === 2000e-6).map((index) => values[index]);
    expect(sides).toEqual([1, 7]);
  });

  it("keeps every point when there are fewer than pixels", () => {
    expect(decimate([0, 1, 2, 3], [5, 1, 9, 2], { fromS: 0, toS: 3, x0: 0, x1: 50 })).toEqual([0, 1, 2, 3]);
  });

  it("keeps one point beyond each edge of the window", () => {
    expect(decimate([0, 1, 2, 3, 4, 5], [0, 0, 0, 0, 0, 0], { fromS: 1.5, toS: 3.5, x0: 0, x1: 50 })).toEqual([1, 2, 3, 4]);
  });
});

describe("envelope columns", () => {
  it("are merged to a pixel and still bound the waveform", () => {
    const times = Float64Array.from({ length: 1000 }, (_, index) => index * 1e-3);
    const min = Float64Array.from({ length: 1000 }, (_, index) => -index);
    const max = Float64Array.from({ length: 1000 }, (_, index) => 2 * index);
    const columns = envelopeColumns(times, min, max, 1, { fromS: 0, toS: 1, x0: 0, x1: 250 });
    expect(columns.length).toBeLessThanOrEqual(334);
    expect(Math.min(...columns.map((column) => column.min))).toBe(-999);
    expect(Math.max(...columns.map((column) => column.max))).toBe(1998);
    expect(columns[columns.length - 1]!.toS).toBe(1);
    expect(columns.every((column, index) => index === 0 || column.fromS === columns[index - 1]!.toS)).toBe(true);
  });
});

describe("bounds", () => {
  it("tell the first of equal times from the one after them", () => {
    const times = [1, 2, 2, 2, 3];
    expect([lowerBound(times, 2), upperBound(times, 2)]).toEqual([1, 4]);
    expect([lowerBound(times, 0), upperBound(times, 9)]).toEqual([0, 5]);
  });
});
