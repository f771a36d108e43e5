export type Point = readonly [x: number, y: number];
/** Values by row and column; rows of equal length. */
export type Field = readonly (readonly number[])[];
/** A closed line round all that lies above a level; `isEdge` marks the points where it runs along the edge of the field. */
export type Ring = { points: Point[]; isEdge: boolean[] };

type Crossing = { x: number; y: number; isEdge: boolean };

/** Which sides of a cell a line joins, by the corners above the level (bit 0 lower left, 1 lower right, 2 upper right, 3 upper left), with what is above on its left. */
const JOINS: readonly (readonly (readonly [Side, Side])[])[] = [
  [], [["foot", "left"]], [["right", "foot"]], [["right", "left"]],
  [["top", "right"]], [["foot", "left"], ["top", "right"]], [["top", "foot"]], [["top", "left"]],
  [["left", "top"]], [["foot", "top"]], [["right", "foot"], ["left", "top"]], [["right", "top"]],
  [["left", "right"]], [["foot", "right"]], [["left", "foot"]], [],
];
type Side = "left" | "right" | "foot" | "top";

/**
 * Marching squares: the lines round everything above a level, in columns (x) and rows (y) of the field, straight between
 * the crossings of its grid. The field counts as below the level outside, so every line closes along the edge.
 * @param field at least 2 x 2 finite values @param level in the unit of the field @returns closed rings, to be filled by the even-odd rule
 */
export function ringsAbove(field: Field, level: number): Ring[] {
  const rowCount = field.length;
  const columnCount = field[0]?.length ?? 0;
  const at = (r: number, c: number) => field[r]?.[c] ?? -Infinity;
  const crossing = (r0: number, c0: number, r1: number, c1: number): Crossing => {
    const [a, b] = [at(r0, c0), at(r1, c1)];
    // beside the field the line runs along its last row or column
    if (a === -Infinity) return { x: c1, y: r1, isEdge: true };
    if (b === -Infinity) return { x: c0, y: r0, isEdge: true };
    const share = (level - a) / (b - a);
    return { x: c0 + share * (c1 - c0), y: r0 + share * (r1 - r0), isEdge: false };
  };
  // each side of a cell has a name of its own, so that a line goes on in the neighbour
  const next = new Map<string, { to: string; from: Crossing }>();
  for (let r = -1; r < rowCount; r += 1)
    for (let c = -1; c < columnCount; c += 1) {
      const above = [at(r, c), at(r, c + 1), at(r + 1, c + 1), at(r + 1, c)].reduce((bits, value, k) => bits | (value > level ? 1 << k : 0), 0);
      const names: Record<Side, string> = { left: `v${r},${c}`, right: `v${r},${c + 1}`, foot: `h${r},${c}`, top: `h${r + 1},${c}` };
      const place: Record<Side, () => Crossing> = {
        left: () => crossing(r, c, r + 1, c),
        right: () => crossing(r, c + 1, r + 1, c + 1),
        foot: () => crossing(r, c, r, c + 1),
        top: () => crossing(r + 1, c, r + 1, c + 1),
      };
      for (const [from, to] of JOINS[above]!) next.set(names[from], { to: names[to], from: place[from]() });
    }
  const rings: Ring[] = [];
  for (const start of [...next.keys()]) {
    const ring: Ring = { points: [], isEdge: [] };
    for (let side = start, step = next.get(side); step; side = step.to, step = next.get(side)) {
      next.delete(side);
      ring.points.push([step.from.x, step.from.y]);
      ring.isEdge.push(step.from.isEdge);
    }
    if (ring.points.length > 2) rings.push(ring);
  }
  return rings;
}

/** The parts of the rings that are true level lines: what runs along the edge of the field is left out. */
export function levelLines(rings: readonly Ring[]): Point[][] {
  return rings.flatMap(({ points, isEdge }) => {
    const firstEdge = isEdge.indexOf(true);
    if (firstEdge < 0) return [[...points, points[0]!]];
    const parts: Point[][] = [];
    let part: Point[] = [];
    for (let n = 1; n <= points.length; n += 1) {
      const k = (firstEdge + n) % points.length;
      if (!isEdge[k]) part.push(points[k]!);
      else {
        if (part.length > 1) parts.push(part);
        part = [];
      }
    }
    return parts;
  });
}

/** Leaves out points that lie within `tolerance` of the straight line between their neighbours. */
export function thinned(points: readonly Point[], tolerance: number): Point[] {
  const kept: Point[] = [];
  points.forEach((point, k) => {
    const before = kept[kept.length - 1];
    const after = points[k + 1];
    if (!before || !after) return void kept.push(point);
    const [dx, dy] = [after[0] - before[0], after[1] - before[1]];
    const away = Math.abs(dx * (point[1] - before[1]) - dy * (point[0] - before[0])) / (Math.hypot(dx, dy) || 1);
    if (away > tolerance) kept.push(point);
  });
  return kept;
}

/** The value of the field between its grid points. */
export function valueAt(field: Field, x: number, y: number): number {
  const c = Math.min(Math.floor(x), field[0]!.length - 2);
  const r = Math.min(Math.floor(y), field.length - 2);
  const [u, v] = [x - c, y - r];
  const along = (row: readonly number[]) => row[c]! * (1 - u) + row[c + 1]! * u;
  return along(field[r]!) * (1 - v) + along(field[r + 1]!) * v;
}
