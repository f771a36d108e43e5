import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { compareResult, type Expected } from "@/tests/support/oracle/compare";
import { stepDormandPrince } from "@/tests/support/oracle/dormand-prince";
import { MATRIX, NODES, WEIGHTS } from "@/tests/support/oracle/dormand-prince-table";
import { simulateReference } from "@/tests/support/oracle/simulate";

/** The reference must earn its trust before anything is held against it. */
const linear = (matrix: number[][]) => (_t: number, y: Float64Array, slope: Float64Array): void => {
  matrix.forEach((row, r) => {
    slope[r] = row.reduce((sum, value, c) => sum + value * (y[c] ?? 0), 0);
  });
};

/** exp(A) column by column, in equal steps of the method. */
const exponential = (matrix: number[][], stepCount: number): number[][] => {
  const columns = matrix.map((_row, column) => {
    let y = new Float64Array(matrix.length);
    y[column] = 1;
    for (let n = 0; n < stepCount; n += 1) {
      const first = new Float64Array(y.length);
      linear(matrix)(0, y, first);
      y = new Float64Array(stepDormandPrince(linear(matrix), 0, y, first, 1 / stepCount, { relative: 1e-9, absolute: [] }).state);
    }
    return y;
  });
  return matrix.map((_row, r) => columns.map((column) => column[r] ?? Number.NaN));
};

const relativeMiss = (found: number[][], wanted: number[][]): number =>
  Math.max(...wanted.flatMap((row, r) => row.map((value, c) => Math.abs((found[r]?.[c] ?? Number.NaN) - value) / Math.max(Math.abs(value), 1e-300))));

describe("the step of order 8", () => {
  test("meets the simple order conditions to rounding", () => {
    const sum = (power: number): number => WEIGHTS.reduce((total, weight, n) => total + weight * (NODES[n] ?? 0) ** power, 0);
    for (let power = 0; power < 8; power += 1) expect(Math.abs(sum(power) - 1 / (power + 1))).toBeLessThan(1e-14);
    MATRIX.forEach((row, n) => expect(Math.abs(row.reduce((total, value) => total + value, 0) - (NODES[n] ?? 0))).toBeLessThan(1e-14));
  });
  test("gains 2^8 when the step is halved", () => {
    const oscillator = [[0, 1], [-4, -0.4]];
    const exact = exponential(oscillator, 64);
    const miss = (count: number): number => relativeMiss(exponential(oscillator, count), exact);
    expect(Math.log2(miss(2) / miss(4))).toBeGreaterThan(7.4);
  });
  // check-values.json MEX-MVL: C. Moler, C. Van Loan, SIAM Review 45 (2003) 3-49, tolerance rel 1e-12.
  test("reproduces MEX-MVL", () => {
    const wanted = [[-0.7357587581447531, 0.5518190996580977], [-1.4715175990882605, 1.1036382407155725]];
    expect(relativeMiss(exponential([[-49, 24], [-64, 31]], 2000), wanted)).toBeLessThan(1e-11);
  });
  // check-values.json MEX-LAUB: A. Laub, SIAM Review 52 (2010) 779-781.
  test("reproduces MEX-LAUB", () => {
    const wanted = [[0.3775604790970066, 0.009681037925564271], [-0.3775604790970066, -0.00968103792556426]];
    expect(relativeMiss(exponential([[0, 1], [-39, -40]], 400), wanted)).toBeLessThan(1e-12);
  });
  // check-values.json MEX-NIL and MEX-DEF: Moler and Van Loan 2003.
  test("reproduces MEX-NIL and MEX-DEF", () => {
    const nilpotent = [[0, 6, 0, 0], [0, 0, 6, 0], [0, 0, 0, 6], [0, 0, 0, 0]];
    const wanted = [[1, 6, 18, 36], [0, 1, 6, 18], [0, 0, 1, 6], [0, 0, 0, 1]];
    const found = exponential(nilpotent, 4);
    wanted.forEach((row, r) => row.forEach((value, c) => expect(Math.abs((found[r]?.[c] ?? Number.NaN) - value)).toBeLessThan(1e-13)));
    expect(Math.abs((exponential([[1, 1], [0, 1]], 8)[0]?.[1] ?? 0) - Math.E)).toBeLessThan(1e-13);
  });
});

// The long cases run in the generator's own check; these three keep the reference honest within seconds.
describe.each(["01-low-forward-sync", "03-high-forward-sync-difference", "06-fast-reverse-diode-discontinuous"])("public case %s", (name) => {
  const folder = join(import.meta.dirname, "../../reference/cases");
  const expected = JSON.parse(readFileSync(join(folder, `${name}.expected.json`), "utf8")) as Expected;
  const document = JSON.parse(readFileSync(join(folder, `${name}.json`), "utf8")) as ScenarioDocument;

  test("the reference made here agrees with the one made elsewhere to a hundredth of the tolerance", () => {
    const strict = { ...expected, accept: { ...expected.accept, at: tighten(expected.accept.at), figures: tighten(expected.accept.figures) } };
    const result = simulateReference(document, { at: expected.at.map((row) => Number(row.timeS)) });
    expect(compareResult(strict, result)).toEqual([]);
  }, 60_000);
});

const tighten = (limits: Record<string, number>): Record<string, number> => Object.fromEntries(Object.entries(limits).map(([key, value]) => [key, value / 100]));
