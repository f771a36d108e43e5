import { describe, expect, it } from "vitest";
import { levelLines, ringsAbove, thinned, valueAt, type Field, type Point } from "@/components/shell/contours";

const field = (rows: number, columns: number, value: (x: number, y: number) => number): Field =>
  Array.from({ length: rows }, (_, y) => Array.from({ length: columns }, (__, x) => value(x, y)));
/** Shoelace: positive when the ring runs anticlockwise in a frame whose y points up. */
const areaOf = (points: readonly Point[]) =>
  points.reduce((sum, [x0, y0], k) => {
    const [x1, y1] = points[(k + 1) % points.length]!;
    return sum + 0.5 * (x0 * y1 - x1 * y0);
  }, 0);

describe("level lines of a field", () => {
  it("follow a slope exactly and leave out the edge of the field", () => {
    const rings = ringsAbove(field(5, 7, (x, y) => 2 * x + 3 * y), 11);
    const lines = levelLines(rings);
    expect(lines).toHaveLength(1);
    for (const [x, y] of lines[0]!) expect(2 * x + 3 * y).toBeCloseTo(11, 12);
    const ends = [lines[0]![0]!, lines[0]!.at(-1)!].map(([x, y]) => `${x.toFixed(3)} ${y.toFixed(3)}`).sort();
    // where 2x + 3y = 11 meets the upper and the lower edge of a field of 6 by 4
    expect(ends).toEqual(["0.000 3.667", "5.500 0.000"]);
  });

  it("enclose the area above the level, with it on the left", () => {
    // a cone: above 0 within radius 8 of (10, 9)
    const cone = field(21, 23, (x, y) => 8 - Math.hypot(x - 10, y - 9));
    const rings = ringsAbove(cone, 0);
    expect(rings).toHaveLength(1);
    expect(rings[0]!.isEdge).not.toContain(true);
    // chords of a circle cut a little off: below 2 % at this grid
    const area = areaOf(rings[0]!.points);
    expect(area).toBeLessThan(Math.PI * 64);
    expect(area).toBeGreaterThan(0.98 * Math.PI * 64);
    expect(levelLines(rings)[0]!.at(-1)).toEqual(levelLines(rings)[0]![0]);
  });

  it("take the whole field when all of it is above, and nothing when none is", () => {
    const flat = field(4, 6, () => 5);
    const [ring, ...others] = ringsAbove(flat, 1);
    expect(others).toEqual([]);
    expect(areaOf(ring!.points)).toBeCloseTo(5 * 3, 12);
    expect(levelLines([ring!])).toEqual([]);
    expect(ringsAbove(flat, 7)).toEqual([]);
  });

  it("keep two hills of a saddle apart", () => {
    const rings = ringsAbove([[9, 0], [0, 9]], 5);
    expect(rings).toHaveLength(2);
    for (const ring of rings) expect(areaOf(ring.points)).toBeCloseTo(0.5 * (4 / 9) ** 2, 12);
  });

  it("share a hole with the ring round it, by turning the other way", () => {
    const crater = field(31, 31, (x, y) => 6 - Math.abs(Math.hypot(x - 15, y - 15) - 8));
    const areas = ringsAbove(crater, 2).map((ring) => areaOf(ring.points)).sort((a, b) => a - b);
    expect(areas).toHaveLength(2);
    expect(areas[0]! / (-Math.PI * 16)).toBeGreaterThan(0.94);
    expect(areas[1]! / (Math.PI * 144)).toBeGreaterThan(0.98);
  });
});

describe("points of a line", () => {
  it("are left out where the line is straight, never at a corner or an end", () => {
    expect(thinned([[0, 0], [1, 1], [2, 2], [3, 0], [4, -2]], 0.1)).toEqual([[0, 0], [2, 2], [4, -2]]);
  });
});

describe("the value between grid points", () => {
  it("is exact for a field that is linear, on the far edges too", () => {
    const slope = field(4, 6, (x, y) => 7 * x - 2 * y + 1);
    for (const [x, y] of [[0, 0], [1.25, 2.5], [5, 3], [4.9, 0.1]] as const) expect(valueAt(slope, x, y)).toBeCloseTo(7 * x - 2 * y + 1, 12);
  });
});
