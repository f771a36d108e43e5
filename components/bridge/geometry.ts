import type { Flow, LegFlow } from "./flow";

/** Places of the drawing in its own units. One layout serves all shunt sites: only the staff and its words move. */
export type BridgeGeometry = {
  width: number;
  height: number;
  xSupply: number;
  xA: number;
  xB: number;
  yTop: number;
  yMid: number;
  yBottom: number;
  yHigh: number;
  yLow: number;
  yTopStaff: number;
  yBottomStaff: number;
  motorRadius: number;
};

export const WIDE: BridgeGeometry = { width: 640, height: 268, xSupply: 42, xA: 204, xB: 458, yTop: 16, yMid: 135, yBottom: 254, yHigh: 91, yLow: 179, yTopStaff: 43, yBottomStaff: 227, motorRadius: 30 };
export const PHONE: BridgeGeometry = { width: 358, height: 244, xSupply: 29, xA: 122, xB: 318, yTop: 13, yMid: 122, yBottom: 231, yHigh: 82, yLow: 162, yTopStaff: 38, yBottomStaff: 206, motorRadius: 28 };

/** The phone's drawing with a column of readings at its right: where a wide drawing would shrink until its words meet. */
export const MEDIUM: BridgeGeometry = { ...PHONE, width: 486 };

/** A diode's side channel: how far off the leg's axis, and how far above and below the switch it leaves it. */
export const BYPASS_OUT = 23;
export const BYPASS_REACH = 19;
export const CHANNEL = 16;

export type Point = readonly [number, number];

/** From the rail to the motor's terminal along one leg, by the channel or round by the diode. */
export function legPath(geometry: BridgeGeometry, leg: "A" | "B", flow: Pick<LegFlow, "side" | "isDiode">): Point[] {
  const x = leg === "A" ? geometry.xA : geometry.xB;
  const isHigh = flow.side === "high";
  const rail: Point = [x, isHigh ? geometry.yTop : geometry.yBottom];
  const terminal: Point = [x, geometry.yMid];
  if (!flow.isDiode) return [rail, terminal];
  const out = x + (leg === "A" ? -BYPASS_OUT : BYPASS_OUT);
  const y = isHigh ? geometry.yHigh : geometry.yLow;
  const [near, far] = isHigh ? [y - BYPASS_REACH, y + BYPASS_REACH] : [y + BYPASS_REACH, y - BYPASS_REACH];
  return [rail, [x, near], [out, near], [out, far], [x, far], terminal];
}

export type Ribbon = { kind: "motor" | "throughA" | "throughB"; currentA: number; points: Point[] };

/** Closed path of the motor current, in the direction of flow; `null` when a leg is open. */
export function motorLoop(geometry: BridgeGeometry, flow: Flow): Point[] | null {
  const { A, B } = flow;
  if (A.side === "open" || B.side === "open") return null;
  const railOf = (leg: LegFlow) => (leg.side === "high" ? geometry.yTop : geometry.yBottom);
  const loop = [...legPath(geometry, "A", A), ...legPath(geometry, "B", B).reverse()];
  if (A.side !== B.side) loop.push([geometry.xSupply, railOf(B)], [geometry.xSupply, railOf(A)]);
  return flow.motorA >= 0 ? loop : loop.reverse();
}

/** Every ribbon of an instant. A through current is drawn first, so that the motor's lies over it. */
export function ribbonsOf(geometry: BridgeGeometry, flow: Flow): Ribbon[] {
  const ribbons: Ribbon[] = [];
  for (const leg of ["A", "B"] as const) {
    const { throughA } = flow[leg];
    if (throughA <= 0) continue;
    const x = leg === "A" ? geometry.xA : geometry.xB;
    const points: Point[] = [
      [geometry.xSupply, geometry.yTop],
      [x, geometry.yTop],
      [x, geometry.yBottom],
      [geometry.xSupply, geometry.yBottom],
    ];
    ribbons.push({ kind: leg === "A" ? "throughA" : "throughB", currentA: throughA, points });
  }
  const loop = motorLoop(geometry, flow);
  if (loop !== null) ribbons.push({ kind: "motor", currentA: flow.motorA, points: loop });
  return ribbons;
}

/** Width of a ribbon: 1.8 plus 10.6 at full scale, never over 12.4; nothing under half a per cent of full scale. */
export function ribbonWidth(currentA: number, fullScaleA: number): number {
  const share = Math.abs(currentA) / fullScaleA;
  return !(share >= 0.005) ? 0 : 1.8 + 10.6 * Math.min(1, share);
}

const cut = (value: number): string => String(Number(value.toFixed(1)));

/** SVG path of a closed polygon with rounded corners. */
export function roundClosedPath(points: readonly Point[], radius: number): string {
  const count = points.length;
  const parts = points.map((corner, index) => {
    const before = points[(index + count - 1) % count]!;
    const after = points[(index + 1) % count]!;
    const [entry, leave] = [toward(corner, before, radius), toward(corner, after, radius)];
    return `${index === 0 ? "M" : "L"}${cut(entry[0])} ${cut(entry[1])}Q${cut(corner[0])} ${cut(corner[1])} ${cut(leave[0])} ${cut(leave[1])}`;
  });
  return parts.join("") + "Z";
}

function toward(from: Point, to: Point, radius: number): Point {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const share = length === 0 ? 0 : Math.min(radius, length / 2) / length;
  return [from[0] + (to[0] - from[0]) * share, from[1] + (to[1] - from[1]) * share];
}

export type Chevron = { x: number; y: number; angleDeg: number };

/** Places along a closed path every `step` units, none within `clear` of a corner. */
export function chevronsAlong(points: readonly Point[], step: number, clear: number): Chevron[] {
  const places: Chevron[] = [];
  points.forEach((start, index) => {
    const end = points[(index + 1) % points.length]!;
    const length = Math.hypot(end[0] - start[0], end[1] - start[1]);
    const count = Math.floor((length - 2 * clear) / step);
    if (length < 2 * clear) return;
    const first = (length - count * step) / 2;
    const angleDeg = (Math.atan2(end[1] - start[1], end[0] - start[0]) * 180) / Math.PI;
    for (let place = 0; place <= count; place += 1) {
      const share = (first + place * step) / length;
      places.push({ x: start[0] + (end[0] - start[0]) * share, y: start[1] + (end[1] - start[1]) * share, angleDeg });
    }
  });
  return places;
}
